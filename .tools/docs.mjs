// Runs the examples of README.md, DEVELOPERS.md and docs/*.md against the built program, so that nothing documented is untrue.
//   ```console  lines "$ untwist …" are run, what follows each must be its output; a line "…" stands for any lines
//   ```yaml     a block that begins with "untwist: 1" must be derived without error
import { spawnSync } from 'node:child_process';
import { mkdtempSync, readdirSync, readFileSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';

const root = join(dirname(fileURLToPath(import.meta.url)), '..');
const bin = join(root, 'dist/bin.js');
const scratch = mkdtempSync(join(tmpdir(), 'untwist-docs-'));
const files = ['README.md', 'DEVELOPERS.md', ...readdirSync(join(root, 'docs')).map((f) => `docs/${f}`)];
let ran = 0;
const faults = [];

const words = (line) => [...line.matchAll(/'([^']*)'|"([^"]*)"|(\S+)/g)].map((m) => m[1] ?? m[2] ?? m[3]);
const run = (args, input) =>
  spawnSync(process.execPath, [bin, ...args], {
    cwd: root,
    input,
    encoding: 'utf8',
    env: { ...process.env, NO_COLOR: '1' },
  });

/** Whether the lines of a text match a pattern in which a line "…" stands for any number of lines. */
function matches(pattern, lines) {
  if (pattern.length === 0) return lines.length === 0;
  const [first, ...rest] = pattern;
  if (first.trim() === '…') return lines.some((_, i) => matches(rest, lines.slice(i))) || matches(rest, []);
  return lines.length > 0 && lines[0].trimEnd() === first.trimEnd() && matches(rest, lines.slice(1));
}

for (const file of files.filter((f) => f.endsWith('.md'))) {
  const text = readFileSync(join(root, file), 'utf8');
  for (const [, language, body] of text.matchAll(/^```(\w+)[^\n]*\n([\s\S]*?)^```$/gm)) {
    if (language === 'yaml' && body.startsWith('untwist: 1')) {
      ran++;
      const { status, stderr } = run(['derive', '-', '--json'], body);
      if (status !== 0) faults.push(`${file}: a theory does not derive\n${stderr}`);
    }
    if (language !== 'console') continue;
    for (const part of body.split(/^\$ /m).slice(1)) {
      const [command, ...expected] = part.trimEnd().split('\n');
      if (!command.startsWith('untwist ')) continue;
      ran++;
      const args = words(command).slice(1);
      const writes = args[0] === 'derive' && !args.includes('--json') && !args.includes('--out');
      const { stdout, stderr } = run(writes ? [...args, '--out', join(scratch, `${ran}`)] : args, '');
      const lines = (stdout + stderr).trimEnd().split('\n');
      if (expected.length > 0 && !matches(expected, lines))
        faults.push(`${file}: $ ${command}\n--- documented\n${expected.join('\n')}\n--- printed\n${lines.join('\n')}`);
    }
  }
}
rmSync(scratch, { recursive: true, force: true });
for (const fault of faults) console.error(`${fault}\n`);
console.log(`docs: ${ran} examples, ${faults.length} faults`);
process.exit(faults.length > 0 ? 1 : 0);
