/** `untwist invariants`: all independent scalars of a given content of torsion and curvature. */
import { printRational } from '../algebra/rational.js';
import { InputError } from '../notation/diagnostics.js';
import { printLagrangian } from '../notation/print.js';
import { constantTerm, UNIT } from '../notation/scalar-term.js';
import type { TensorSymbol } from '../tensor/expression.js';
import { type IndependentScalars, independentScalars, type Parity } from '../tensor/independent-scalars.js';
import { EXIT, type Io } from './io.js';

export interface InvariantsOptions {
  readonly torsion?: string;
  readonly curvature?: string;
  readonly parity: string;
  readonly relations?: boolean;
  readonly json?: boolean;
}

/** @returns the exit code. @throws InputError `bad-count`, `bad-parity`, `content-limit`. */
export function invariantsCommand(options: InvariantsOptions, io: Io): number {
  const content = { torsion: count(options.torsion, 'torsion'), curvature: count(options.curvature, 'curvature') };
  if (content.torsion + content.curvature === 0)
    throw refusal('bad-count', 'no content was asked for', 'for example --torsion 2, or --torsion 2 --curvature 1');
  const found = paritiesOf(options.parity).map((parity) => independentScalars(content, parity));
  io.stdout(
    options.json ? `${JSON.stringify(found.map(json), null, 2)}\n` : found.map((f) => text(f, options)).join('\n'),
  );
  return EXIT.done;
}

const refusal = (code: string, message: string, hint: string): InputError =>
  new InputError([{ code, severity: 'error', message, hint }]);

function count(typed: string | undefined, what: string): number {
  if (typed === undefined) return 0;
  if (/^[0-9]{1,3}$/.test(typed)) return Number(typed);
  throw refusal('bad-count', `--${what} takes a number, not ${JSON.stringify(typed.slice(0, 40))}`, 'a small number');
}

function paritiesOf(typed: string): Parity[] {
  if (typed === 'both') return ['even', 'odd'];
  if (typed === 'even' || typed === 'odd') return [typed];
  throw refusal('bad-parity', `${JSON.stringify(typed.slice(0, 40))} is not a parity`, 'write even, odd or both');
}

const plain = (factors: readonly TensorSymbol[]): string => printLagrangian([{ scalar: UNIT, factors }]);
const unicode = (factors: readonly TensorSymbol[]): string =>
  printLagrangian([{ scalar: UNIT, factors }], { unicode: true });

function text({ parity, basis, dependent }: IndependentScalars, options: InvariantsOptions): string {
  const others = dependent.length === 0 ? '' : `; ${dependent.length} more are combinations of them`;
  const lines = [`${parity} parity: ${basis.length}${others}`, ...basis.map((factors) => `  ${unicode(factors)}`)];
  if (options.relations)
    for (const { factors, along } of dependent) {
      const terms = along.flatMap((c, i) => (c.num === 0n ? [] : [{ scalar: constantTerm(c), factors: basis[i]! }]));
      lines.push(`  ${unicode(factors)} = ${printLagrangian(terms, { unicode: true })}`);
    }
  return `${lines.join('\n')}\n`;
}

const json = ({ parity, basis, dependent }: IndependentScalars) => ({
  parity,
  count: basis.length,
  independent: basis.map(plain),
  dependent: dependent.map(({ factors, along }) => ({ product: plain(factors), along: along.map(printRational) })),
});
