const files = import.meta.glob<string>('./*/*.liquid', { query: '?raw', import: 'default', eager: true });

/** The templates, for bundles: text by path below this folder. Import it where an export is made, not before. */
export const templates: Readonly<Record<string, string>> = Object.fromEntries(
  Object.entries(files).map(([path, text]) => [path.replace(/^\.\//, ''), text]),
);
