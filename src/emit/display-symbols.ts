/**
 * What the generators of a ring are called on paper and which part they play there. Imports no printer.
 */
import { jetName } from '../algebra/ring.js';
import type { Derivation } from '../derivation.js';
import type { GeometrySymbol } from '../geometry/geometry.js';
import { latexName } from '../notation/latex-symbol.js';
import { widthOf } from './latex-width.js';

/**
 * constant, scale: couplings; parameter: a constant of the geometry, such as k; density: of a fluid; length: a scale
 * factor; rate: its logarithmic derivative; field: any other function of time; component: of torsion or curvature.
 */
export type SymbolRole = 'constant' | 'scale' | 'parameter' | 'density' | 'length' | 'rate' | 'field' | 'component';

export interface DisplaySymbol {
  /** Name of the generator in its ring. */
  readonly generator: string;
  /** Name as in a theory file, without derivatives: `phi`, `H`, `c0`, `rho_dust`. */
  readonly name: string;
  /** LaTeX of that name. */
  readonly latex: string;
  readonly role: SymbolRole;
  /** Time derivatives (dots). */
  readonly order: number;
  /** Place among symbols of the same role, in order of declaration. */
  readonly rank: number;
  /** Power of the scale factor that belongs to it on dimensional grounds: 2 for k. */
  readonly dimension: number;
  /** Whether the LaTeX stands for a name that is too long for a formula. */
  readonly isAbbreviated: boolean;
}

/** By generator. */
export type SymbolTable = ReadonlyMap<string, DisplaySymbol>;

/** Highest time derivative that may be displayed: images of fields in other variables contain one of their own. */
export const MAX_ORDER = 6;
/** Points beyond which the LaTeX of a symbol would leave no room for anything else on a line. */
const MAX_SYMBOL_WIDTH = 80;

/**
 * All symbols of a derivation in some choice of fields.
 * @param rateField generator of the rate of a scale factor.
 */
export function symbolTable(
  { theory, geometry, ring }: Derivation,
  fields: readonly GeometrySymbol[],
  rateField: (scale: string) => string,
): SymbolTable {
  const table = new Map<string, DisplaySymbol>();
  const put = (symbol: Pick<DisplaySymbol, 'generator' | 'name' | 'latex' | 'role'> & Partial<DisplaySymbol>): void => {
    table.set(symbol.generator, { order: 0, dimension: 0, rank: table.size, isAbbreviated: false, ...symbol });
  };
  fields.forEach((field, rank) => {
    const { name, latex } = field;
    const rate = geometry.rates.get(name);
    if (name === geometry.lapse) return;
    if (rate !== undefined) put({ generator: name, name, latex, role: 'length', rank });
    const base = rate === undefined ? name : rateField(name);
    for (let order = 0; order <= MAX_ORDER; order++)
      put({
        generator: jetName(base, order),
        name: rate ?? name,
        latex: rate === undefined ? latex : latexName(rate),
        role: rate === undefined ? 'field' : 'rate',
        order,
        rank,
      });
  });
  for (const { name, latex, dimension } of geometry.parameters)
    put({ generator: name, name, latex, role: 'parameter', dimension });
  for (const { name, latex, role } of theory.symbols)
    put({ generator: name, name, latex, role: role === 'vacuum' || role === 'spin' ? 'density' : role });
  for (const { density, latex } of theory.matter)
    if (table.get(density)?.role !== 'density') put({ generator: density, name: density, latex, role: 'density' });
  // What the program adds itself: the reduced Planck mass, and roots of parameters.
  for (const g of ring.generators) {
    if (g.kind === 'jet' || table.has(g.name)) continue;
    if (g.kind === 'radical')
      put({
        generator: g.name,
        name: g.name,
        latex: `\\sqrt{${latexName(g.square)}}`,
        role: 'parameter',
        dimension: 1,
      });
    else put({ generator: g.name, name: g.name, latex: latexName(g.name), role: 'scale' });
  }
  let count = 0;
  for (const [key, symbol] of table)
    if (widthOf(symbol.latex) > MAX_SYMBOL_WIDTH)
      table.set(key, { ...symbol, latex: `\\mathsf{s}_{${++count}}`, isAbbreviated: true });
  return table;
}

/** The components of torsion and curvature, as generators of their own ring. */
export const componentTable = ({ geometry }: Derivation): SymbolTable =>
  new Map(
    geometry.components.map((c, rank): [string, DisplaySymbol] => [
      c.name,
      {
        generator: c.name,
        name: c.name,
        latex: c.latex,
        role: 'component',
        order: 0,
        rank,
        dimension: 0,
        isAbbreviated: false,
      },
    ]),
  );
