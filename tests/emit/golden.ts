/**
 * Golden files in tests/golden/<folder>. `UPDATE_GOLDEN=1 npx vitest run tests/emit` writes them anew; a file that no test
 * asked for is an orphan.
 */
import { mkdirSync, readdirSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { expect } from 'vitest';

export class GoldenFolder {
  private readonly path: string;
  private readonly asked = new Set<string>();

  constructor(folder: string) {
    this.path = join(import.meta.dirname, '../golden', folder);
  }

  expect(name: string, actual: string): void {
    this.asked.add(name);
    const path = join(this.path, name);
    if (process.env.UPDATE_GOLDEN) {
      mkdirSync(this.path, { recursive: true });
      writeFileSync(path, actual);
    }
    expect(actual).toBe(readFileSync(path, 'utf8'));
  }

  /** Files that belong to no test; to be asked for after the others. */
  orphans(): string[] {
    return readdirSync(this.path).filter((name) => !this.asked.has(name));
  }
}
