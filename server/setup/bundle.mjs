// Bundles the server or the command line for Node.js: `node bundle.mjs server|cli`.
import { build } from 'vite';
import { inRoot, root } from './paths.mjs';

const bundles = {
  // Packages stay outside: the server loads them from node_modules.
  server: {
    input: { main: inRoot('server/main.ts'), worker: inRoot('server/jobs/worker.ts') },
    minify: false,
    noExternal: undefined,
  },
  // Packages come along, in parts that load only when called for: `report` starts as fast as Node.js itself.
  cli: { input: { stepwell: inRoot('server/cli/main.ts') }, minify: true, noExternal: true },
};

const name = process.argv[2];
const { input, minify, noExternal } = bundles[name];

await build({
  configFile: false,
  root,
  logLevel: 'warn',
  publicDir: false,
  ssr: { noExternal, target: 'node' },
  build: {
    ssr: true,
    target: 'node20',
    outDir: inRoot('dist', name),
    emptyOutDir: true,
    minify,
    sourcemap: name === 'server',
    rollupOptions: { input, output: { entryFileNames: '[name].js', chunkFileNames: '[name]-[hash].js' } },
  },
});
