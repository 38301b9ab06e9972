export { changedSettings, type SettingChange } from './changes.ts';
export { listSettings, type SettingInWords } from './list.ts';
export { nameOfSetting } from './names.ts';
export { sayInWords } from './source-words.ts';
export { sayValue } from './values.ts';
