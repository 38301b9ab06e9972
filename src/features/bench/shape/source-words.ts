export { sayInWords } from '../../../settings/source-words.ts';
