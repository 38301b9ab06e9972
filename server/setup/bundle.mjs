// Bundles the server or the command line for Node.js: `node bundle.mjs server|cli`.
import { spawnSync } from 'node:child_process';
import { writeFileSync } from 'node:fs';
import { relative } from 'node:path';
import { build } from 'vite';
import { cliSourcesFile } from './freshness.mjs';
import { inRoot, root } from './paths.mjs';

const bundles = {
  // Packages stay outside: the server loads them from node_modules.
  server: {
    noExternal: undefined,
    minify: false,
    input: { main: inRoot('server/main.ts'), worker: inRoot('server/jobs/worker.ts') },
    output: { format: 'es', entryFileNames: '[name].js', chunkFileNames: '[name]-[hash].js' },
  },
  // One script with its packages in it, so that it can be kept compiled: `report` starts almost as fast as Node.js.
  cli: {
    noExternal: true,
    minify: true,
    input: { stepwell: inRoot('server/cli/main.ts') },
    output: { format: 'cjs', entryFileNames: '[name].cjs', codeSplitting: false },
  },
};

const name = process.argv[2];
const { input, output, minify, noExternal } = bundles[name];

const built = await build({
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
    rollupOptions: { input, output },
  },
});

if (name === 'cli') {
  noteSources(built.output.flatMap((chunk) => chunk.moduleIds ?? []));
  keepCompiled();
}

/** The lock file stands for all packages, and the set-up for how they are put together. */
function noteSources(modules) {
  const own = modules.map((file) => relative(root, file)).filter((file) => /^(server|shared)\//.test(file));
  const setUp = ['bundle', 'run-cli'].map((part) => `server/setup/${part}.mjs`);
  writeFileSync(cliSourcesFile, ['package-lock.json', ...setUp, ...own.sort()].join('\n'));
}

/** Runs one report and keeps the code that V8 compiled for it. Without it the command line is slower, not wrong. */
function keepCompiled() {
  const definition = {
    schema: 1,
    name: 'sample',
    source: { kind: 'harmonics', partials: [{ harmonic: 1, amplitude: 1, phaseDeg: 0 }] },
    table: { length: 64, bits: 8 },
  };
  const runner = `import { runCli } from ${JSON.stringify(new URL('./run-cli.mjs', import.meta.url).href)}; runCli({ keep: true });`;
  spawnSync(process.execPath, ['--input-type=module', '-e', runner, 'stepwell', 'report', '-'], {
    input: JSON.stringify(definition),
    stdio: ['pipe', 'ignore', 'ignore'],
  });
}
