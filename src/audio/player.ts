// What a page that plays fetches beside itself.
export { fetchWorklet } from './player-node.ts';
export { AudioPreview } from './preview.ts';
