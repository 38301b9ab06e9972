import { watch } from 'node:fs';

/** Several files saved at once make one restart, in ms. */
const settle = 150;

/** Calls `restart` after changes to TypeScript files in the folders; answers how to stop watching. */
export function restartOnChange(folders, restart) {
  let timer;
  let last = Promise.resolve();
  const later = () => {
    clearTimeout(timer);
    timer = setTimeout(() => (last = last.then(restart)), settle);
  };
  const watchers = folders.map((folder) =>
    watch(folder, { recursive: true }, (_event, file) => {
      if (file?.endsWith('.ts')) later();
    }),
  );
  return () => {
    clearTimeout(timer);
    for (const watcher of watchers) watcher.close();
  };
}
