export { calmed, lasting } from './calm.ts';
export { createLive, joined, partOf, type Live, type SettableLive } from './live.ts';
export { useAsLive, useLive } from './use-live.ts';
