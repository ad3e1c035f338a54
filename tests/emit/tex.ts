/** pdflatex for tests: runs it in a temporary folder and returns the log. Missing in CI is an error, elsewhere a skip. */
import { execFileSync, spawnSync } from 'node:child_process';
import { mkdtempSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';

const isThere = spawnSync('pdflatex', ['--version']).status === 0;

/** Whether tests that need TeX are skipped. */
export const WITHOUT_TEX = !isThere && !process.env.CI;

export const CLASSES = {
  'one column': '\\documentclass{article}',
  'two columns': '\\documentclass[aps,prd,twocolumn]{revtex4-2}',
} as const;

/** The log of a run. The exit code is not trusted: what the log says is. */
export function logOf(document: string, files: Readonly<Record<string, string>> = {}): string {
  const folder = mkdtempSync(join(tmpdir(), 'untwist-tex-'));
  try {
    for (const [name, text] of Object.entries({ ...files, 'main.tex': document }))
      writeFileSync(join(folder, name), text);
    try {
      // Long log lines, so that a message is never cut in two.
      const env = { ...process.env, max_print_line: '10000' };
      execFileSync('pdflatex', ['-interaction=nonstopmode', '-no-shell-escape', 'main.tex'], {
        cwd: folder,
        env,
        stdio: 'pipe',
      });
    } catch {
      // The log tells.
    }
    return readFileSync(join(folder, 'main.log'), 'latin1');
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
}

/** What a good log does not contain; undefined references are those of a first run. */
export const faultsOf = (log: string): string[] =>
  log
    .split('\n')
    .filter((line) => /^!|Overfull|undefined control|multiply defined|Missing character|Emergency stop/i.test(line))
    .concat(/Output written on/.test(log) ? [] : ['no output']);
