// Bundles one module into one minified file, as the product ships it: node bundle-process.mjs ENTRY OUT-DIR NAME
import process from 'node:process';
import { build } from 'vite';

const [entry, outDir, fileName] = process.argv.slice(2);
await build({
  configFile: false,
  logLevel: 'warn',
  publicDir: false,
  build: {
    target: 'es2022',
    outDir,
    emptyOutDir: true,
    minify: true,
    lib: { entry, formats: ['es'], fileName },
  },
});
