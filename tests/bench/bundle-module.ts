import { fileURLToPath } from 'node:url';
import { build } from 'vite';
import { projectFolder } from '../../server/project-folder.ts';

/** Bundles a module that imports `shared/` into one minified file, as the product ships it, and answers its path. */
export async function bundleModule(entry: URL, name: string): Promise<string> {
  const outDir = `${projectFolder}/.cache/bundles/${name}`;
  await build({
    configFile: false,
    root: projectFolder,
    logLevel: 'warn',
    publicDir: false,
    build: {
      target: 'es2022',
      outDir,
      emptyOutDir: true,
      minify: true,
      lib: { entry: fileURLToPath(entry), formats: ['es'], fileName: name },
    },
  });
  return `${outDir}/${name}.js`;
}
