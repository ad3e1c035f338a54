import { describe, expect, it } from 'vitest';
import { JULIA } from '../../src/emit/code-julia.js';
import { firstOrderModule, HOSTILE_THEORY, HOSTILE_TITLES, modelOf, named } from './code-fixtures.js';
import { readJulia } from './julia-subset.js';

describe('Julia', () => {
  it('is a module of the forms that are surely Julia', () => {
    const m = modelOf(HOSTILE_THEORY, false);
    for (const title of HOSTILE_TITLES) {
      const module = readJulia(JULIA.write({ ...named(m, title), conditions: [title] }));
      expect(module.name).toBe('HarbourLight');
      expect([...module.functions.keys()]).toContain('curvature_obstruction');
      const read = module.constants
        .get('THEORY')!
        .replace(/\\U(.{8})/g, (_, c) => String.fromCodePoint(Number.parseInt(c, 16)));
      expect(JSON.parse(read.replaceAll('\\$', '$'))).toBe(title);
    }
  });

  it('returns vectors, matrices and numbers', () => {
    const { functions } = readJulia(JULIA.write(firstOrderModule()));
    expect(functions.get('rates')!.result).toBe('[_value1, _value2, _value3, _value4]');
    expect(functions.get('rates_jacobian')!.result).toMatch(/^\[(?:_value\d+ ){3}_value4; .*_value16\]$/);
    expect(functions.get('energy_constraint')!.result).toBe('_value1');
  });

  it('is read by a reader that admits nothing else', () => {
    const text = JULIA.write(firstOrderModule());
    for (const [from, to] of [
      ['    return _value1', '    return _value1 + 1'],
      [' = "First order"', ' = "First $order"'],
      ['end # module', 'end; end # module'],
      ['    g = float(couplings.g)', '    end = float(couplings.g)'],
    ] as const) {
      expect(text).toContain(from);
      const changed = text.replace(from, () => to);
      if (from.includes('return'))
        expect(readJulia(changed).functions.get('energy_constraint')!.result).toContain('+ 1');
      else expect(() => readJulia(changed)).toThrow();
    }
  });
});
