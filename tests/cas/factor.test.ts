import { spawnSync } from 'node:child_process';
import { existsSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { describe, expect, it } from 'vitest';
import { splitUnit } from '../../src/algebra/division.js';
import { infix } from '../../src/algebra/infix.js';
import { primitive } from '../../src/algebra/linear.js';
import {
  add,
  constant,
  equals,
  generator,
  isCanonical,
  monomial,
  multiply,
  type Poly,
  power,
  scale,
  subtract,
  sum,
  zero,
} from '../../src/algebra/poly.js';
import { rational } from '../../src/algebra/rational.js';
import { constantsOf, jetsOf, makeRing } from '../../src/algebra/ring.js';
import { type Factorisation, factor, type Proposer } from '../../src/cas/factor.js';
import { firstSeed, Random, runs } from '../oracle/random.js';

const ring = makeRing([
  ...jetsOf('phi', 1),
  ...jetsOf('psi', 1),
  ...constantsOf(['S', 'W', 'k', 'tu']),
  { kind: 'radical', name: 's', square: 'k' },
]);
const g = (name: string, e = 1): Poly => generator(ring, name, e);
const one = constant(ring, 1);
const LIMIT = { timeLimitMs: 60_000 };

/** A stand-in for a package, which notes what it is asked. */
function fake(name: Proposer['name'], reply: string | undefined): Proposer & { readonly asked: string[] } {
  const asked: string[] = [];
  return {
    name,
    asked,
    async propose(polynomial) {
      asked.push(polynomial);
      return reply;
    },
  };
}

function expectFactors(p: Poly, found: Factorisation | undefined): Factorisation {
  expect(found).toBeDefined();
  const { unit, factors } = found!;
  expect(unit.size).toBe(1);
  expect(isCanonical(unit)).toBe(true);
  let product = unit;
  factors.forEach(({ base, power: n }, i) => {
    expect(isCanonical(base) && base.size > 1 && n >= 1).toBe(true);
    expect(equals(primitive(splitUnit(base).reduced), base)).toBe(true);
    expect(factors.slice(0, i).some((f) => equals(f.base, base))).toBe(false);
    product = multiply(product, power(base, n));
  });
  expect(equals(product, p)).toBe(true);
  return found!;
}
const texts = (found: Factorisation): string[] => found.factors.map(({ base, power: n }) => `${infix(base)} ^ ${n}`);

describe('what the kernel knows by itself', () => {
  const silent = { ...LIMIT, proposers: [] };
  it('needs no package', async () => {
    const unit = monomial(ring, rational(-3, 4), [
      ['phi', -2],
      ['S', 1],
    ]);
    expect(expectFactors(unit, await factor(unit, silent))).toMatchObject({ factors: [], by: 'kernel' });
    const irreducible = add(multiply(g('S'), g('psi', 2)), g('tu'));
    const found = expectFactors(
      scale(multiply(irreducible, g('phi', -1)), rational(-1, 6)),
      await factor(scale(multiply(irreducible, g('phi', -1)), rational(-1, 6)), silent),
    );
    expect(found.by).toBe('kernel');
    expect(infix(found.unit)).toBe('-1/(6*phi)');
    expect(texts(found)).toEqual([`${infix(irreducible)} ^ 1`]);
    const nothing = await factor(zero(ring), silent);
    expect(nothing!.unit.size).toBe(0);
    expect(nothing!.factors).toEqual([]);
  });

  it('is not more than that', async () => {
    // Linear in tu, but with the factor W + 1 of both coefficients.
    const p = multiply(add(g('W'), one), add(multiply(g('tu'), g('phi')), g('k')));
    expect(await factor(p, silent)).toBeUndefined();
  });
});

describe('proposals', () => {
  const p = multiply(
    multiply(subtract(g('phi', 2), g('psi', 2)), add(g('phi'), one)),
    monomial(ring, rational(3, 2), [['S', -1]]),
  );

  it('are asked for without units, with renamed symbols and integers', async () => {
    const stub = fake('nerdamer', undefined);
    expect(await factor(p, { ...LIMIT, proposers: [stub] })).toBeUndefined();
    expect(stub.asked).toHaveLength(1);
    expect(stub.asked[0]).toMatch(/^[-+*^()v0-9]+$/);
    expect(stub.asked[0]).not.toContain('v3');
  });

  it('are taken when they multiply to the polynomial', async () => {
    const right = fake('nerdamer', '-(v2-v1)*(1+v1)*(v1+v2)');
    const never = fake('algebrite', undefined);
    const found = expectFactors(p, await factor(p, { ...LIMIT, proposers: [right, never] }));
    expect(found.by).toBe('nerdamer');
    expect(never.asked).toEqual([]);
    expect(infix(found.unit)).toBe('3/(2*S)');
    expect(texts(found).sort()).toEqual(['phi + 1 ^ 1', 'phi + psi ^ 1', 'phi - psi ^ 1']);
  });

  it('have equal and proportional factors joined', async () => {
    const square = power(subtract(g('phi'), scale(g('psi'), 2)), 3);
    const found = expectFactors(
      square,
      await factor(square, { ...LIMIT, proposers: [fake('nerdamer', '(2*v2-v1)*(v1-2*v2)*(2*v2-v1)*v1/v1')] }),
    );
    expect(texts(found)).toEqual(['phi - 2*psi ^ 3']);
  });

  it('are rejected when wrong, and the next one is asked', async () => {
    const wrong = [
      '(v1-v2)*(v1+v2)*(1+v1)*2',
      '(v1-v2)*(v1+v2)',
      '(v1-v2)^2*(1+v1)',
      'v1',
      '0',
      '1',
      '1.0*(v1-v2)*(v1+v2)*(1+v1)',
      '(v1^4-v2^4)*(1+v1)/(v1^2+v2^2)',
      'v1^600*(v1+v2)',
      '(v1+v2)^500',
      'Stop: syntax error',
      'v9',
      'nonsense(',
      '',
    ];
    for (const reply of wrong) {
      expect(await factor(p, { ...LIMIT, proposers: [fake('nerdamer', reply)] }), reply).toBeUndefined();
      const second = fake('algebrite', '(v1-v2)*(v1+v2)*(1+v1)');
      const found = expectFactors(p, await factor(p, { ...LIMIT, proposers: [fake('nerdamer', reply), second] }));
      expect(found.by).toBe('algebrite');
    }
  });

  it('that split nothing count only when no other splits', async () => {
    const whole = '-v2^2-v1*v2^2+v1^2+v1^3';
    const lazy = fake('nerdamer', whole);
    const found = expectFactors(
      p,
      await factor(p, { ...LIMIT, proposers: [lazy, fake('algebrite', '(v1-v2)*(v1+v2)*(1+v1)')] }),
    );
    expect(found.by).toBe('algebrite');
    const alone = expectFactors(p, await factor(p, { ...LIMIT, proposers: [lazy, fake('algebrite', undefined)] }));
    expect(alone.by).toBe('nerdamer');
    expect(alone.factors).toHaveLength(1);
  });

  it('may use that a radical squares to its radicand', async () => {
    const q = subtract(g('phi', 2), g('k', 1));
    const withRoot = multiply(q, add(g('s'), g('W', 2)));
    const stub = fake('nerdamer', '(v1^2-v3)*(v4+v2^2)');
    const found = expectFactors(withRoot, await factor(withRoot, { ...LIMIT, proposers: [stub] }));
    expect(found.factors).toHaveLength(2);
  });
});

describe('the packages themselves', () => {
  it('factor what reduced Lagrangians contain', async () => {
    // φ⁴ − 2φ²ψ² + ψ⁴ is beyond the first package, large numbers beyond the second.
    const difference = subtract(g('phi', 2), g('psi', 2));
    const square = power(difference, 2);
    const found = expectFactors(square, await factor(square, LIMIT));
    expect(texts(found).sort()).toEqual(['phi + psi ^ 2', 'phi - psi ^ 2']);
    const p = scale(
      multiply(multiply(difference, g('phi', -3)), add(multiply(g('S'), g('phi')), g('W', 2))),
      rational(-5, 3),
    );
    expect(expectFactors(p, await factor(p, LIMIT)).factors).toHaveLength(3);
  }, 120_000);

  it('never get a wrong product past the kernel', async () => {
    for (let i = 0; i < runs(4); i++) {
      const random = new Random(firstSeed(300) + i);
      const small = (): Poly =>
        sum(
          ring,
          Array.from({ length: 2 + random.below(2) }, () =>
            monomial(ring, rational(1 + random.below(4)), [
              [random.pick(['phi', 'psi', 'S', 'tu']), 1 + random.below(2)],
              [random.pick(['phi', 'W']), random.below(2)],
            ]),
          ),
        );
      const p = multiply(small(), small());
      const found = await factor(p, LIMIT);
      if (found) expectFactors(p, found);
    }
  }, 240_000);

  it('are given up at the time limit', async () => {
    const start = performance.now();
    const p = multiply(power(add(g('phi', 3), g('psi')), 2), add(g('S', 2), one));
    expect(await factor(p, { timeLimitMs: 1 })).toBeUndefined();
    expect(performance.now() - start).toBeLessThan(10_000);
  }, 20_000);
});

describe('the compiled program', () => {
  const dist = fileURLToPath(new URL('../../dist/', import.meta.url));
  const script = `
    import { createRequire } from 'node:module';
    const { factor } = await import('${dist}cas/factor.js');
    const { makeRing, constantsOf } = await import('${dist}algebra/ring.js');
    const { add, generator, multiply, subtract } = await import('${dist}algebra/poly.js');
    const { infix } = await import('${dist}algebra/infix.js');
    const loaded = () => Object.keys(createRequire(import.meta.url).cache).filter((f) => /nerdamer|algebrite/.test(f)).length;
    const ring = makeRing(constantsOf(['a', 'b']));
    const [a, b] = ['a', 'b'].map((name) => generator(ring, name));
    const before = loaded();
    const found = await factor(subtract(multiply(a, a), multiply(b, b)), { timeLimitMs: 60000 });
    console.log(JSON.stringify({ before, after: loaded(), by: found?.by, factors: found?.factors.map((f) => infix(f.base)) }));
  `;

  it('asks in the same way, and loads no package into its own thread', () => {
    expect(existsSync(`${dist}cas/worker.js`), 'compiled by npm run build').toBe(true);
    const { stdout, stderr } = spawnSync(process.execPath, ['--input-type=module', '-e', script], { encoding: 'utf8' });
    expect(stderr).toBe('');
    expect(JSON.parse(stdout)).toEqual({
      before: 0,
      after: 0,
      by: 'nerdamer',
      factors: expect.arrayContaining(['a - b', 'a + b']),
    });
  }, 90_000);
});
