export { DefinitionText } from './definition-text.tsx';
