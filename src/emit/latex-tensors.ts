/** Products of tensors as TeX: derivatives, quantities of the metric connection and irreducible parts included. */
import type { IndexSlot } from '../notation/theory.js';
import type { TensorSymbol } from '../tensor/expression.js';
import { METRIC_CURVATURE, METRIC_NABLA_TORSION } from '../tensor/metric-decomposition.js';
import { differentiated, isNabla } from '../tensor/variation.js';

/** Slots in order, equal heights together: `^{a}{}_{bc}`. */
export function slotsTex(slots: readonly IndexSlot[]): string {
  let out = '';
  let height: boolean | undefined;
  for (const { name, up } of slots) {
    if (up !== height) out += `${out === '' ? '' : '}{}'}${up ? '^' : '_'}{`;
    height = up;
    out += name.startsWith('\\') ? `${name} ` : name;
  }
  return out === '' ? '' : `${out}}`;
}

const HEADS: ReadonlyMap<string, string> = new Map([
  ['epsilon', '\\epsilon'],
  ['eta', '\\eta'],
  ['delta', '\\delta'],
  [METRIC_CURVATURE, '\\mathring{R}'],
]);

/** One tensor with its indices, for instance `\nabla_{d} T_{abc}`. */
export function tensorTex({ head, part, slots }: TensorSymbol): string {
  if (isNabla(head))
    return `\\nabla${slotsTex(slots.slice(0, 1))} ${tensorTex({ head: differentiated(head), slots: slots.slice(1) })}`;
  if (head === METRIC_NABLA_TORSION)
    return `\\mathring{\\nabla}${slotsTex(slots.slice(0, 1))} T${slotsTex(slots.slice(1))}`;
  const name = HEADS.get(head) ?? (head.length === 1 ? head : `\\mathrm{${head}}`);
  return `${part === undefined ? '' : `{}^{(\\mathrm{${part}})}`}${name}${slotsTex(slots)}`;
}

/** The factors of a product; a derivative acts on its own factor only and stands last among them. */
export function factorsTex(factors: readonly TensorSymbol[]): string[] {
  const acts = (f: TensorSymbol): boolean => isNabla(f.head) || f.head === METRIC_NABLA_TORSION;
  const plain = factors.filter((f) => !acts(f));
  const derivatives = factors.filter(acts);
  return [
    ...plain.map(tensorTex),
    // Several derivatives in one product need brackets to say what each acts on.
    ...derivatives.map((f, i) => (i < derivatives.length - 1 ? `(${tensorTex(f)})` : tensorTex(f))),
  ];
}
