/**
 * Claims that are combinations of the equations as they stand, found without solving them: by one equation alone, by the
 * balance of energy, or by all equations, each divided once by those before it. Only certificates whose denominators are couplings count, so that the answer
 * holds on every solution whatever branches there are. Imports eliminations, certificates.
 */
import { PRIMES } from '../algebra/modular.js';
import { constant, generator, isZero, multiply, type Poly, subtract } from '../algebra/poly.js';
import { boundIn } from './budget.js';
import { type Certificate, Certifier, certifies } from './certificate.js';
import { conditionsOf, type Verdict } from './consequence.js';
import { type Arena, type Link, leaderOf, makeLink, reduce } from './elimination.js';
import { degreeIn, isVariable } from './factors.js';
import type { Known, Step } from './known.js';
import { pointOn, randomResidues } from './points.js';
import { type RankingName, rankingOf } from './ranking.js';
import { type Bound, budgetOf, type Equations } from './system.js';

/** Rankings under which the equations are taken. */
const TRIED: readonly RankingName[] = ['connection', 'expansion'];

/** "Follows", or undefined when nothing was found. */
export function identically(equations: Equations, p: Poly, bound: Bound): Verdict | undefined {
  for (const name of TRIED) {
    const { space } = equations;
    const arena: Arena = { space, ranking: rankingOf(space, name), budget: budgetOf(bound), pivots: [] };
    const single = [...equations.given, ...balanceOf(equations)].map((known) => () => onePass(arena, [known]));
    for (const make of [...single, () => onePass(arena, equations.given)])
      try {
        const links = make();
        const certificate = certificateBy(arena, links, p, bound);
        if (!certificate) continue;
        if (!certifies(space, certificate, p)) throw new Error('a certificate does not multiply out');
        checkAtPoints(arena, links, equations, p);
        return { verdict: 'follows', certificate, conditions: conditionsOf(space, certificate, p) };
      } catch (error) {
        if (!boundIn(error)) throw error;
      }
  }
  return undefined;
}

/** dE_N/dt − Σ q̇ E_q, by the Noether identity of time reparametrisation the balance of the energy of matter. */
function balanceOf({ space, given }: Equations): Known[] {
  const { ring } = space;
  const of = (name: string): Known | undefined => given.find((g) => g.kind === 'given' && g.name === name);
  const lapse = of(space.lapse);
  if (!lapse) return [];
  const base: Known = { kind: 'rate', poly: space.rate(lapse.poly), of: lapse };
  let rest = base.poly;
  const steps: Step[] = [];
  for (const name of new Set(space.places.map((place) => place.field))) {
    const known = of(name);
    if (!known || !ring.position.has(name)) continue;
    const q = space.rate(generator(ring, name));
    steps.push({ u: [], d: [], q, known });
    rest = subtract(rest, multiply(q, known.poly));
  }
  return isZero(rest) ? [] : [{ kind: 'combined', poly: rest, base, steps, unit: constant(ring, 1), divided: [] }];
}

/** Each equation divided by those before it, simplest first; nothing is differentiated, split or taken up again. */
function onePass(arena: Arena, given: readonly Known[]): Link[] {
  const { space } = arena;
  const links: Link[] = [];
  const rank = ({ poly }: Known): number => arena.ranking[leaderOf(arena, poly) ?? -1] ?? -1;
  for (const base of [...given].sort((a, b) => rank(a) - rank(b) || a.poly.size - b.poly.size)) {
    const { rest, steps } = reduce(arena, base.poly, links);
    const leader = leaderOf(arena, rest);
    if (isZero(rest) || leader === undefined) continue;
    const one = constant(space.ring, 1);
    const known: Known = { kind: 'combined', poly: rest, base, steps, unit: one, divided: [] };
    const link = makeLink(arena, known, leader);
    const twin = links.findIndex((l) => l.field === link.field);
    if (twin >= 0) links.splice(twin, 1);
    links.push(link);
  }
  return links;
}

function certificateBy(arena: Arena, links: readonly Link[], p: Poly, bound: Bound): Certificate | undefined {
  const { space } = arena;
  const { rest, steps } = reduce(arena, p, links);
  if (!isZero(rest)) return undefined;
  const certificate = new Certifier(space, budgetOf(bound)).ofZero(steps);
  const varies = ({ base }: Certificate['denominator'][number]): boolean =>
    space.places.some((_, g) => isVariable(space, g) && degreeIn(base, g) > 0);
  return certificate.denominator.some(varies) ? undefined : certificate;
}

/** Second route: the claim vanishes at random points at which the equations do. */
function checkAtPoints(arena: Arena, links: readonly Link[], { given, nonzero }: Equations, p: Poly): void {
  const branch = { links, zero: [], nonzero, pivots: [] };
  const equations = given.map((g) => g.poly);
  for (const prime of PRIMES) {
    const point = pointOn(arena, branch, [], prime, randomResidues(prime));
    if (!point || equations.some((e) => point.at(e) !== 0)) continue;
    if (point.at(p) !== 0) throw new Error('a certified equation does not hold where the equations do');
  }
}
