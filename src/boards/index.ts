export { exampleBoard, exampleBoardInput } from './example-board.ts';
export { readList } from './read-list.ts';
export { boardLines, outputKindWords, sayFilter, sayOutput } from './words.ts';
