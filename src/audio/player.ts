// What is fetched when play is first pressed.
export { linesBeyond } from './lines-beyond.ts';
export { AudioPreview } from './preview.ts';
