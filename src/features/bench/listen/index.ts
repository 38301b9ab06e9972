export { driveOf, toneOfDrive } from './drive.ts';
export { ListenPanel, type ListenPanelProps } from './listen-panel.tsx';
export { defaultPlayback, playbackSchema, type Playback } from './playback.ts';
