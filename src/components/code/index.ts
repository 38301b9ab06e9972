// Apart from the other components: the code view is large, and loads with the first export that is opened.
export { codeLook } from './code-look.ts';
export { FilesView, type FilesViewProps } from './files-view.tsx';
export { OptionField, type OptionOrigin } from './option-field.tsx';
export { OptionGroups } from './option-groups.tsx';
export { useCopy } from './use-copy.ts';
