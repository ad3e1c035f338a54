// Brings a fresh clone to the state that a command needs: packages installed, and with --build the library compiled.
// Does nothing, quickly, when there is nothing to do. Reads only modification times; imports nothing.
import { spawnSync } from 'node:child_process';
import { existsSync, readdirSync, statSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';

const root = join(dirname(fileURLToPath(import.meta.url)), '..');
const major = Number(process.versions.node.split('.')[0]);
if (major < 20) {
  console.error(`untwist needs Node 20 or newer; this is ${process.versions.node}.`);
  process.exit(1);
}
const time = (file) => (existsSync(file) ? statSync(file).mtimeMs : 0);
const newest = (dir) =>
  Math.max(
    0,
    ...readdirSync(dir, { withFileTypes: true }).map((e) =>
      e.isDirectory() ? newest(join(dir, e.name)) : time(join(dir, e.name)),
    ),
  );
const run = (words, why) => {
  console.error(why);
  const { status } = spawnSync(words[0], words.slice(1), { cwd: root, stdio: ['ignore', 2, 2] });
  if (status !== 0) process.exit(status ?? 1);
};

const installed = time(join(root, 'node_modules/.package-lock.json'));
if (installed < time(join(root, 'package-lock.json'))) {
  run(['npm', 'ci', '--no-audit', '--no-fund', '--loglevel=error'], 'Installing packages …');
}
const sources = Math.max(
  newest(join(root, 'src')),
  time(join(root, 'package-lock.json')),
  time(join(root, 'tsconfig.json')),
);
if (process.argv.includes('--build') && time(join(root, 'dist/index.js')) < sources) {
  run(['npm', 'run', '--silent', 'build'], 'Compiling …');
}
