/** The conventions that a theory file may choose among, as data. Imports nothing. */

/** Every key of `conventions` with its values, the internal one first. */
export const CHOICES = {
  /** Only η changes: T^a_bc, R^a_bcd, R_ab and ε_abcd keep their definitions. */
  signature: ['-+++', '+---'],
  /** T^a = ½ T^a_bc e^b e^c, or T^a_bc e^b e^c. */
  torsion: ['full', 'half'],
  'torsion-sign': ['+1', '-1'],
  /** T^a_bc or T_bc^a. */
  'torsion-index': ['first', 'last'],
  /** T_a as a contraction of torsion. */
  'torsion-trace': ['T^b_{ab}', 'T^b_{ba}'],
  'curvature-sign': ['+1', '-1'],
  /** R^a_b cd or R_cd^a_b, where c and d are the indices of the two-form. */
  'curvature-indices': ['frame-first', 'form-first'],
  /** R_ab as a contraction of curvature, written with the indices frame first. */
  ricci: ['R^c_{acb}', 'R^c_{abc}', 'R^c_{bca}', 'R^c_{bac}'],
  /** ε_0123. */
  epsilon: ['+1', '-1'],
  /** The action is this times the integral of the Lagrangian. */
  action: ['+1', '-1'],
  /** The coupling of gravity: M, κ = M⁻², or 8πG = M⁻². */
  units: ['mass', 'kappa', '8piG'],
} as const;

export type ConventionKey = keyof typeof CHOICES;
export type Conventions = { readonly [K in ConventionKey]: (typeof CHOICES)[K][number] };
export const CONVENTION_KEYS = Object.keys(CHOICES) as readonly ConventionKey[];

/** The conventions inside the program. */
export const INTERNAL: Conventions = Object.freeze(
  Object.fromEntries(CONVENTION_KEYS.map((key) => [key, CHOICES[key][0]])),
) as Conventions;

/** Everything internal except the signature, which the geometries know. */
export const internalWith = (signature: Conventions['signature']): Conventions => ({ ...INTERNAL, signature });
