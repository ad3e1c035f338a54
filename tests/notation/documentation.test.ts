// docs/notation.md and docs/errors.md say what the program does: their tables are run here.
import { readdirSync, readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { CHOICES } from '../../src/notation/conventions.js';
import * as limits from '../../src/notation/limits.js';
import { printLagrangian } from '../../src/notation/print.js';
import { conventionPresets, presetConventions } from '../../src/notation/read-conventions.js';
import { readTheory } from '../../src/notation/read-theory.js';
import { lagrangianErrors, SYMBOLS, terms, theoryFile } from './rendered.js';

const root = new URL('../../', import.meta.url);
const read = (path: string): string => readFileSync(new URL(path, root), 'utf8');
const notation = read('docs/notation.md');
const errors = read('docs/errors.md');

/** The rows, without the two of the header, of every table that begins with this header. */
function rows(text: string, header: string): string[][] {
  const tables = text.split('\n\n').filter((block) => block.startsWith(header));
  expect(tables.length).toBeGreaterThan(0);
  return tables.flatMap((table) =>
    table
      .trimEnd()
      .split('\n')
      .slice(2)
      .map((line) => line.slice(2, -2).split(' | ')),
  );
}
const code = (cell: string): string => cell.replace(/^`|`$/g, '');

describe('docs/notation.md', () => {
  it.each(rows(notation, '| typed | understood |'))('%s is understood as %s', (typed, understood) => {
    expect(terms(code(typed!))).toEqual(terms(code(understood!)));
    if (!understood!.includes('\\mu')) {
      expect(printLagrangian(terms(code(typed!)), { symbols: SYMBOLS })).toBe(code(understood!));
    }
  });

  it.each(rows(notation, '| refused | because |'))('%s is refused: %s', (typed, because) => {
    expect(lagrangianErrors(code(typed!)).split('\n')[0]).toMatch(/ error: /);
    expect(lagrangianErrors(code(typed!))).toContain(`error: ${because}\n`);
  });

  it('shows the bundled example', () => {
    const shown = /```yaml\n(untwist: 1\nname: Harbour light[\s\S]*?)```/.exec(notation)![1]!;
    const bundled = read('rules/examples/harbour-light.yaml');
    const plain = ({ lagrangian, symbols, matter }: ReturnType<typeof readTheory>) => ({ lagrangian, symbols, matter });
    expect(plain(readTheory(shown, 'shown'))).toEqual(plain(readTheory(bundled, 'bundled')));
  });

  it('states the limits that hold', () => {
    const stated = new Map(
      rows(notation, '| what | limit |').map(([what, n]) => [what, Number(n!.replaceAll(' ', ''))]),
    );
    expect(Object.fromEntries(stated)).toEqual({
      'characters of a file or a relation': limits.MAX_TEXT,
      'brackets inside brackets': limits.MAX_NESTING,
      'YAML collections inside collections': limits.MAX_YAML_DEPTH,
      'digits of an integer, typed or computed': limits.MAX_DIGITS,
      'absolute value of an exponent, order of a jet': limits.MAX_EXPONENT,
      'tensors in a product': limits.MAX_FACTORS,
      'terms after multiplying out': limits.MAX_TERMS,
      'indices of a declared tensor': limits.MAX_SLOTS,
      'constants, scales and tensors': limits.MAX_SYMBOLS,
      'characters of a name': limits.MAX_NAME,
      'errors shown': limits.MAX_DIAGNOSTICS,
    });
    expect(Object.keys(limits)).toHaveLength(stated.size);
  });
});

describe('docs/conventions.md', () => {
  const conventions = read('docs/conventions.md');
  const codes = (cell: string): string[] => [...cell.matchAll(/`([^`]*)`/g)].map((m) => m[1]!);

  it('lists every key with its choices, the internal one first', () => {
    const listed = rows(conventions, '| key | choices | in the text |').map(([key, choices]) => [
      code(key!),
      codes(choices!),
    ]);
    expect(Object.fromEntries(listed)).toEqual(CHOICES);
  });

  it('lists every preset with what it says', () => {
    const listed = rows(conventions, '| preset | conventions |').map(([name, text]) => {
      const { conventions: meant } = readTheory(theoryFile(`conventions: ${code(text!)}`, 'lagrangian: R^2'), 'f');
      return [code(name!), meant];
    });
    const presets = conventionPresets().map((name) => [name, presetConventions(name)]);
    expect(Object.fromEntries(listed)).toEqual(Object.fromEntries(presets));
  });

  it('shows a declaration that is read', () => {
    const shown = /```yaml\n(conventions: .*)\n```/.exec(conventions)![1]!;
    expect(readTheory(theoryFile(shown, 'lagrangian: R^2'), 'f').conventions).toMatchObject({ units: 'kappa' });
  });
});

describe('docs/errors.md', () => {
  const files = readdirSync(new URL('src/', root), { recursive: true, encoding: 'utf8' }).filter((f) =>
    f.endsWith('.ts'),
  );
  const sources = files.map((file) => read(`src/${file}`));
  const documented = new Set([...errors.matchAll(/^\| `([a-z-]+)` \|/gm)].map((match) => match[1]!));

  it('lists every code that the program uses', () => {
    const call = /(?:fail|report|fault|refuse|refusal|errorAt|warningAt)\(\s*(?:[^'()]|\([^()]*\))*?/.source;
    const field = /code(?:: | = )(?:[^';]*\? )?/.source;
    const used = new Set(
      sources.flatMap((text) =>
        [...text.matchAll(new RegExp(`(?:${call}|${field})'([a-z]+(?:-[a-z]+)*)'`, 'g'))].map((m) => m[1]!),
      ),
    );
    expect(used.size).toBeGreaterThan(60);
    expect([...used].filter((c) => !documented.has(c))).toEqual([]);
  });

  it('lists no code that is not used', () => {
    expect([...documented].filter((c) => !sources.some((text) => text.includes(`'${c}'`)))).toEqual([]);
  });
});
