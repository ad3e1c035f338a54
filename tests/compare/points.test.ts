import { describe, expect, it } from 'vitest';
import { multiplyMod, PRIMES } from '../../src/algebra/modular.js';
import { generator } from '../../src/algebra/poly.js';
import { NoPoint, pointOn, randomResidues, rootMod } from '../../src/compare/points.js';
import { BOUNDS, equationsOf, solve } from '../../src/compare/system.js';
import { firstSeed, runs } from '../oracle/random.js';
import { derivationOf, poly, spaceOf } from './derivations.js';

const [p] = PRIMES;

describe('roots modulo a prime', () => {
  const value = (f: readonly number[], x: number): number =>
    f.reduceRight((total, c) => (multiplyMod(total, x, p) + c) % p, 0);

  it('finds a root of a product of linear factors, whatever the degree', () => {
    for (let run = 0; run < runs(20); run++) {
      const random = randomResidues(firstSeed(9500) + run);
      let f = [random(p)];
      for (let n = 0; n < 1 + (run % 5); n++) {
        const r = random(p);
        const longer = [0, ...f];
        f = longer.map((c, i) => (c + multiplyMod(p - r, f[i] ?? 0, p)) % p);
      }
      expect(value(f, rootMod(f, p, random))).toBe(0);
    }
  });

  it('says when there is none', () => {
    const random = randomResidues(3);
    const squares = new Set<boolean>();
    for (let n = 2; n < 40; n++) {
      try {
        const root = rootMod([p - n, 0, 1], p, random);
        expect(multiplyMod(root, root, p)).toBe(n);
        squares.add(true);
      } catch (error) {
        expect(error).toBeInstanceOf(NoPoint);
        squares.add(false);
      }
    }
    expect(squares.size).toBe(2);
    expect(() => rootMod([5], p, random)).toThrow(NoPoint);
    expect(() => rootMod([5, 0], p, random)).toThrow(NoPoint);
  });
});

describe('random solutions', () => {
  const space = spaceOf();
  const d = derivationOf({ lagrangian: '1/2 M^2 R' });
  const solved = solve(equationsOf(space, d, false), 'connection', BOUNDS[0]);
  const [branch] = solved.solutions.branches;
  const equations = solved.given.map((g) => g.poly);

  it('solve all equations and are reproducible', () => {
    const at = () => pointOn(solved.arena, branch!, equations, p, randomResidues(12))!;
    const point = at();
    expect(point.at(poly(space, [1, 'phi'], [-1, 'H']))).toBe(0);
    expect(point.at(poly(space, [1, 'D(phi,2)'], [-1, 'D(H,2)']))).toBe(0);
    expect(point.at(generator(space.ring, 'H'))).not.toBe(0);
    expect(at().at(generator(space.ring, 'H'))).toBe(point.at(generator(space.ring, 'H')));
  });

  it('keep what is fixed', () => {
    const k = space.ring.position.get('k')!;
    const fixed: (number | undefined)[] = [];
    fixed[k] = 7;
    expect(pointOn(solved.arena, branch!, [], p, randomResidues(5), fixed)!.at(generator(space.ring, 'k'))).toBe(7);
  });

  it('are refused where an excluded factor vanishes everywhere', () => {
    const never = { ...branch!, nonzero: [poly(space, [1, 'psi'])] };
    expect(pointOn(solved.arena, never, [], p, randomResidues(5))).toBeUndefined();
  });

  it('make a chain that does not belong to the equations a fault of the program', () => {
    expect(() => pointOn(solved.arena, branch!, [poly(space, [1, 'H'])], p, randomResidues(5))).toThrow(
      'does not solve the equations',
    );
  });
});
