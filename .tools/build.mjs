// Compiles the library to dist/ and bundles the command line, whose start-up would otherwise go into opening files.
// Chunks lie two levels below the root, like the modules they come from, so that paths to rules/ stay the same.
import { spawnSync } from 'node:child_process';
import { chmodSync, rmSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { build } from 'esbuild';

const root = join(dirname(fileURLToPath(import.meta.url)), '..');
rmSync(join(root, 'dist'), { recursive: true, force: true });
const tsc = join(root, 'node_modules/.bin', process.platform === 'win32' ? 'tsc.cmd' : 'tsc');
const compiled = spawnSync(tsc, ['-p', join(root, 'tsconfig.json')], {
  stdio: 'inherit',
  shell: process.platform === 'win32',
});
if (compiled.status !== 0) process.exit(compiled.status ?? 1);
await build({
  absWorkingDir: root,
  entryPoints: ['src/bin.ts'],
  outdir: 'dist',
  chunkNames: 'chunks/[name]-[hash]',
  bundle: true,
  splitting: true,
  format: 'esm',
  platform: 'node',
  target: 'node20',
  external: ['nerdamer', 'algebrite', 'katex'],
  // yaml and commander are CommonJS inside and ask for Node's own modules.
  banner: {
    js: "import { createRequire as __createRequire } from 'node:module'; const require = __createRequire(import.meta.url);",
  },
  logLevel: 'warning',
});
chmodSync(join(root, 'dist/bin.js'), 0o755);
