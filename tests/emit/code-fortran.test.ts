import { describe, expect, it } from 'vitest';
import { FORTRAN, FORTRAN_NAMING } from '../../src/emit/code-fortran.js';
import { makeNameTable } from '../../src/emit/identifiers.js';
import { HOSTILE_THEORY, HOSTILE_TITLES, modelOf, named, QUARTIC } from './code-fixtures.js';

const bytes = (line: string): number => new TextEncoder().encode(line).length;

describe('Fortran', { timeout: 60_000 }, () => {
  it('has lines of at most 132 columns and few continuation lines, whatever the names', () => {
    const hostile = modelOf(HOSTILE_THEORY);
    for (const m of [hostile, modelOf(QUARTIC), ...HOSTILE_TITLES.map((t) => named(hostile, t.repeat(9)))])
      for (const text of [FORTRAN.write(m), FORTRAN.example(m, 'model.f90')]) {
        let continued = 0;
        for (const line of text.split('\n')) {
          // Comments may be longer in any unit, and are not.
          expect(line.length, line).toBeLessThanOrEqual(132);
          if (!line.trimStart().startsWith('!')) expect(bytes(line), line).toBeLessThanOrEqual(132);
          continued = line.endsWith('&') ? continued + 1 : 0;
          expect(continued).toBeLessThanOrEqual(255);
        }
      }
  });

  it('tells names apart that differ in case or beyond 63 characters', () => {
    const names = makeNameTable(['jets'], FORTRAN_NAMING);
    const long = 'x'.repeat(63);
    expect(['b1', 'B1', 'Jets', 'end', 'END'].map((n) => names.claim(n))).toEqual([
      'b1',
      'B1_',
      'Jets_',
      'end_',
      'END_v2',
    ]);
    expect([`${long}1`, `${long}2`].map((n) => names.claim(n))).toEqual([long, `${'x'.repeat(62)}_`]);
  });

  it('names the module otherwise when it would be one of its functions', () => {
    const m = { ...modelOf('untwist: 1\nname: x\nlagrangian: T_a T^a\n'), slug: 'lagrangian' };
    expect(FORTRAN.write(m)).toContain('module lagrangian_\n');
  });
});
