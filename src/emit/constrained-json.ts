/** Multipliers, branches and spin as plain data for the JSON, documented in docs/formats.md. */
import { symbolsOf } from '../algebra/collect.js';
import type { Fraction } from '../algebra/fraction.js';
import { infix } from '../algebra/infix.js';
import type { Poly } from '../algebra/poly.js';
import { bracketed, PRECEDENCE } from '../algebra/precedence.js';
import { printRational } from '../algebra/rational.js';
import type { ConstrainedBranch, Derivation, ScalarTensorForm } from '../derivation.js';
import type { InvariantTensor } from '../geometry/invariant-components.js';
import { conditionText } from '../mechanics/branches.js';
import type { ConstrainedTensor } from '../multipliers.js';
import { printLagrangian } from '../notation/print.js';
import { unpackIndices } from '../tensor/components.js';

type FormObject = (form: ScalarTensorForm) => Record<string, unknown>;

const texts = (map: ReadonlyMap<string, Poly>): Record<string, string> =>
  Object.fromEntries([...map].map(([key, p]) => [key, infix(p)]));

/** `{ "i0101": "1/3" }` by frame indices, all down, behind an i. */
const tensorObject = (tensor: InvariantTensor, slots: number): Record<string, string> =>
  Object.fromEntries([...tensor].map(([n, value]) => [`i${unpackIndices(n, slots).join('')}`, printRational(value)]));

const constraintObject = ({ constraint, independent, invariant, multipliers }: ConstrainedTensor) => ({
  constraint: constraint.text,
  understood: printLagrangian(constraint.terms),
  independent,
  invariant,
  fields: multipliers.map((m) => ({
    name: m.name,
    vanishes: infix(m.value),
    tensor: tensorObject(m.tensor, constraint.free.length),
  })),
});

const branchObject = (b: ConstrainedBranch, all: readonly string[], formObject: FormObject) => ({
  name: b.name,
  solution: texts(b.solution),
  values: texts(b.values),
  roots: Object.fromEntries(b.roots.map((r) => [r.name, infix(r.radicand)])),
  conditions: b.conditions.map(conditionText),
  ...(b.used.length > 0 ? { assumed: b.used } : {}),
  remaining: b.remaining.map((i) => all[i]!),
  lagrangian: infix(b.lagrangian),
  reduced: infix(b.reduced),
  equations: texts(b.equations),
  multiplierEquations: texts(b.multiplierEquations),
  undetermined: b.undetermined,
  further: texts(b.further),
  ...(b.friedmann ? { friedmann: { rho_T: infix(b.friedmann.rhoT), p_T: infix(b.friedmann.pT) } } : {}),
  scalarTensor: formObject(b.scalarTensor),
});

/** A fraction as infix text. */
export function fractionText({ numerator, denominator }: Fraction): string {
  const top = infix(numerator);
  if (denominator.length === 0) return top;
  const above = numerator.size > 1 ? bracketed(top, PRECEDENCE.sum, PRECEDENCE.product) : top;
  const below = denominator.map(({ base, power }) => `(${infix(base)})${power === 1 ? '' : `^${power}`}`);
  return `${above}/${below.length === 1 ? below[0] : `(${below.join('*')})`}`;
}

function spinObject({ spin, theory }: Derivation): Record<string, unknown> {
  if (!spin) return {};
  const { elimination } = spin;
  return {
    spin: {
      densities: theory.symbols.filter((s) => s.role === 'spin').map((s) => s.name),
      tensors: spin.tensors.map(({ source, independent, components }) => ({
        tensor: source.name,
        independent,
        components: components.map((c) => ({ name: c.name, tensor: tensorObject(c.tensor, source.tensor.slots) })),
      })),
      interaction: infix(spin.interaction),
      averages: Object.fromEntries(spin.averages.map((a) => [a.name, { rho: infix(a.rho), p: infix(a.pressure) }])),
      ...(elimination === undefined
        ? {}
        : typeof elimination === 'string'
          ? { elimination: { found: false, reason: elimination } }
          : {
              elimination: {
                found: true,
                solution: Object.fromEntries([...elimination.solution].map(([q, f]) => [q, fractionText(f)])),
                rho: fractionText(elimination.rho),
                ...(elimination.p ? { p: fractionText(elimination.p) } : {}),
              },
            }),
    },
  };
}

/** The keys `multipliers`, `branches` and `spin`, where there is something to say. */
export function constrainedObject(d: Derivation, formObject: FormObject): Record<string, unknown> {
  const { constrained } = d;
  const names = constrained?.tensors.flatMap((t) => t.multipliers.map((m) => m.name)) ?? [];
  return {
    ...(constrained
      ? {
          multipliers: constrained.tensors.map(constraintObject),
          branches: constrained.branches.map((b) => branchObject(b, names, formObject)),
          branchesComplete: constrained.complete,
          ...(constrained.excluded.length > 0 ? { branchesExcluded: constrained.excluded } : {}),
        }
      : {}),
    ...spinObject(d),
  };
}

/** Symbols of what is printed here besides those of the other keys. */
export function constrainedSymbols({ spin, ring, constrained }: Derivation): string[] {
  const elimination = spin && typeof spin.elimination === 'object' ? [spin.elimination] : [];
  const fractions = elimination.flatMap((e) => [...e.solution.values(), e.rho, ...(e.p ? [e.p] : [])]);
  const polys = [
    ...(spin ? [spin.interaction] : []),
    ...fractions.flatMap((f) => [f.numerator, ...f.denominator.map((x) => x.base)]),
    ...(constrained?.branches ?? []).flatMap((b) => [b.lagrangian, ...b.solution.values(), ...b.equations.values()]),
  ];
  return polys.flatMap(symbolsOf).filter((name) => ring.position.has(name));
}
