import { describe, expect, it } from 'vitest';
import { isNameText, nameFault, reservedMeaning } from '../../src/notation/names.js';

describe('names', () => {
  it.each([
    'b1',
    'alpha_1',
    'c',
    'M',
    'Lambda',
    'constructor',
    'toString',
    'A_1',
    'T_e1',
    'a__b',
    'c_',
    'delete',
    'rho',
  ])('%s may be declared', (name) => {
    expect(nameFault(name)).toBeUndefined();
  });

  it.each('R T A D N a k t H h f u v phi psi sqrt abs rho_dust rho_'.split(' '))('%s is reserved', (name) => {
    expect(nameFault(name)).toMatchObject({ code: 'reserved-name' });
    expect(reservedMeaning(name)).toBeTypeOf('string');
  });

  it.each(['__proto__', '1a', 'a b', 'a-b', '', 'é', 'a; process.exit()', 'x'.repeat(65)])('%j is no name', (name) => {
    expect(isNameText(name)).toBe(false);
    expect(nameFault(name)).toMatchObject({ code: 'bad-name' });
  });

  it.each(['T_eff', 'R_ab', 'A_s', 'delta_ab', 'epsilon_abcd', 'eta_x'])('%s would read as a tensor', (name) => {
    expect(nameFault(name)?.message).toBe(`the name ${name} reads as a tensor with indices`);
  });
});
