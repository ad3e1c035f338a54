import { describe, expect, it } from 'vitest';
import { ELIMINATIONS, RANKINGS, rankingOf } from '../../src/compare/ranking.js';
import { spaceOf, TORSION_SCALAR } from './derivations.js';

const space = spaceOf({ lagrangian: `M^2 (${TORSION_SCALAR})`, constrain: ['R^a_{bcd}'] });
const names = space.ring.generators.map((g) => g.name);

describe.each([...RANKINGS, ...ELIMINATIONS])('the ranking %s', (name) => {
  const ranking = rankingOf(space, name, new Set(['psi']));
  const rank = (generator: string): number => ranking[space.ring.position.get(generator)!]!;

  it('is a total order of everything but couplings', () => {
    const ranked = names.filter((_, g) => space.places[g]!.kind !== 'coupling');
    expect(new Set(ranked.map(rank)).size).toBe(ranked.length);
    for (const n of names) expect(rank(n) >= 0).toBe(ranked.includes(n));
  });

  it('is preserved by time derivatives', () => {
    const jets = names.filter((_, g) => space.places[g]!.kind === 'jet' && space.ring.next[g]! >= 0);
    const next = (n: string): string => names[space.ring.next[space.ring.position.get(n)!]!]!;
    for (const x of jets) {
      expect(rank(next(x))).toBeGreaterThan(rank(x));
      for (const y of jets) expect(rank(next(x)) > rank(next(y))).toBe(rank(x) > rank(y));
    }
  });
});

describe('what is solved for first', () => {
  const top = (name: Parameters<typeof rankingOf>[1], of: readonly string[]): string => {
    const ranking = rankingOf(space, name, new Set(['psi']));
    return of.reduce((a, b) => (ranking[space.ring.position.get(a)!]! > ranking[space.ring.position.get(b)!]! ? a : b));
  };

  it('depends on the ranking', () => {
    expect(top('connection', ['phi', 'H'])).toBe('phi');
    expect(top('expansion', ['phi', 'H'])).toBe('H');
    expect(top('connection', ['phi', 'D(H,1)'])).toBe('D(H,1)');
    expect(top('metric', ['phi', 'D(H,1)'])).toBe('phi');
    expect(top('connection', ['rho', 'D(phi,3)'])).toBe('rho');
    expect(top('matter', ['rho', 'phi'])).toBe('phi');
    expect(top('connection', ['rho_dust', 'rho'])).toBe('rho_dust');
    expect(top('matter', ['rho_dust', 'rho'])).toBe('rho');
    expect(top('connection', ['a', 'H'])).toBe('H');
  });

  it('puts what is to be eliminated above everything', () => {
    expect(top('elimination', ['psi', 'D(phi,3)'])).toBe('psi');
    expect(top('driven elimination', ['psi', 'rho'])).toBe('psi');
    expect(top('elimination', ['phi', 'rho'])).toBe('rho');
    expect(top('driven elimination', ['phi', 'rho'])).toBe('phi');
  });
});
