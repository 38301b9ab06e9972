export { ListenPanel, type ListenPanelProps } from './listen-panel.tsx';
export { defaultPlayback, playbackSchema, type Playback } from './playback.ts';
