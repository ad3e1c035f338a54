/** A theory's Lagrangian as it is written in conventions of choice, with the symbols that it then contains. */
import { type Conventions, internalWith, translate } from './conventions.js';
import { InputError } from './diagnostics.js';
import type { LagrangianTerm, Theory, TheorySymbol } from './theory.js';
import { UNIT_SYMBOLS, type UnitSymbol } from './units.js';

export interface WrittenLagrangian {
  readonly terms: readonly LagrangianTerm[];
  /** For printing: those of the theory, and those of the units. */
  readonly symbols: readonly TheorySymbol[];
}

/** @throws InputError `unit-symbol` when the units need a name that the theory uses for something else. */
export function lagrangianIn(theory: Theory, conventions: Conventions): WrittenLagrangian {
  const own = theory.conventions.units === conventions.units ? theory.unitSymbols : [];
  const symbols = [...theory.symbols];
  const units: readonly UnitSymbol[] = UNIT_SYMBOLS[conventions.units];
  for (const unit of units) {
    const taken = theory.symbols.find(({ name }) => name === unit.name);
    if (taken === undefined) {
      const { name, role, dimension, latex } = unit;
      symbols.push(own.find((symbol) => symbol.name === name) ?? { name, role, dimension, latex });
    } else if (theory.conventions.units !== conventions.units) {
      const message = `${unit.name} is a ${taken.role} of this theory and cannot be a unit of the output`;
      throw new InputError([
        { code: 'unit-symbol', severity: 'error', message, hint: 'rename it, or choose other units' },
      ]);
    }
  }
  return { terms: translate(theory.lagrangian, internalWith(theory.signature), conventions), symbols };
}
