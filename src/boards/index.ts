export { exampleBoard, exampleBoardInput } from './example-board.ts';
export { boardLines, outputKindWords, sayFilter, sayOutput } from './words.ts';
