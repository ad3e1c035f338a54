/** A world for commands under test: captured streams, given standard input, a folder that is removed afterwards. */
import { mkdtempSync, readdirSync, readFileSync, rmSync, statSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { onTestFinished } from 'vitest';
import type { Io } from '../../src/cli/io.js';
import { main } from '../../src/cli/main.js';

export interface Captured extends Io {
  readonly out: () => string;
  readonly err: () => string;
}

export function world(
  options: Partial<Pick<Io, 'color' | 'interactive'>> & { readonly stdin?: string } = {},
): Captured {
  const out: string[] = [];
  const err: string[] = [];
  return {
    stdout: (text) => void out.push(text),
    stderr: (text) => void err.push(text),
    stdin: async () => options.stdin ?? '',
    color: options.color ?? false,
    interactive: options.interactive ?? false,
    out: () => out.join(''),
    err: () => err.join(''),
  };
}

export interface Outcome {
  readonly code: number;
  readonly out: string;
  readonly err: string;
}

/** Runs the program as a shell would. */
export async function run(args: readonly string[], options: Parameters<typeof world>[0] = {}): Promise<Outcome> {
  const io = world(options);
  const code = await main(args, io);
  return { code, out: io.out(), err: io.err() };
}

/** An empty folder for one test. */
export function scratch(): string {
  const folder = mkdtempSync(join(tmpdir(), 'cli-test-'));
  onTestFinished(() => rmSync(folder, { recursive: true, force: true }));
  return folder;
}

/** Path below the folder → content, for all files. */
export function contentOf(folder: string): Record<string, string> {
  const out: Record<string, string> = {};
  for (const name of readdirSync(folder).sort()) {
    const path = join(folder, name);
    if (statSync(path).isDirectory()) for (const [n, t] of Object.entries(contentOf(path))) out[`${name}/${n}`] = t;
    else out[name] = readFileSync(path, 'utf8');
  }
  return out;
}

export const THEORY = `untwist: 1
name: Old pier
constants: [c0, b3]
scales: { M: mass }
lagrangian: 1/2 c0 M^2 R + b3 M^2 T_a T^a
matter: [dust]
`;
