/**
 * A derivation as a TypeScript module: no imports, strict-clean, doubles. What it computes at a point agrees with the
 * exact expressions to rounding. Text of the user reaches it only as keys, string literals and cleaned comments.
 */
import { select } from '../algebra/collect.js';
import type { Fraction } from '../algebra/fraction.js';
import type { Poly } from '../algebra/poly.js';
import type { BiScalarForm, Derivation, FriedmannForm, SpinElimination } from '../derivation.js';
import { currentFunctions } from './code-current.js';
import { frameFunctions } from './code-frames.js';
import { commentText, propertyKey, stringLiteral } from './identifiers.js';
import { dimensionsIn, dimensionsOf, modelParameters, type Parameter } from './parameters.js';
import { planSize } from './shared-subexpressions.js';
import { type Body, couplingTest, functionBody, type Output, wrapped } from './typescript-body.js';
import { type JetOrders, jetOrders, tupleType } from './typescript-jets.js';

/** Size of a plan that becomes one function; beyond, it calls others, since compilers give up on very long functions. */
const MOST_TERMS = 1200;
const PART_TERMS = 600;

interface Writer {
  readonly derivation: Derivation;
  readonly parameters: readonly Parameter[];
  readonly dimension: (p: Poly) => string;
}

/**
 * The module's text, ending in a newline. The same derivation gives the same text.
 * Exports `theory`, `geometry`, `variables`, `parameters`, `sources`; the interfaces `Couplings` and `Jets`; the functions
 * `lagrangian` and `equations` and, where the derivation has them, `rhoT`, `pT`, `wT`, `g4`, `kinetic`, `current`,
 * `potential`, `curvatureObstruction`, `connection`, `rhoSpin`, `pSpin`. Every function takes (couplings, jets).
 */
export function typescriptModule(d: Derivation): string {
  const dimensions = dimensionsOf(d);
  const writer: Writer = {
    derivation: d,
    parameters: modelParameters(d),
    dimension: (p) => dimensionText(dimensionsIn(p, dimensions)),
  };
  const blocks = [
    header(d),
    constants(writer),
    couplings(writer),
    jets(d, jetOrders(d)),
    lagrangian(writer),
    equations(writer),
    ...(d.friedmann ? friedmann(writer, d.friedmann) : []),
    ...(typeof d.spin?.elimination === 'object' ? spin(writer, d.spin.elimination) : []),
    ...(d.scalarTensor.form === 'bi-scalar' ? scalarTensor(writer, d.scalarTensor) : []),
    ...frames(writer),
  ];
  return `${blocks.join('\n\n')}\n`;
}

function dimensionText(found: readonly number[]): string {
  if (found.length === 0) return 'identically zero';
  if (found.length === 1) return found[0] === 0 ? 'dimensionless' : `mass dimension ${found[0]}`;
  const list = `${found.slice(0, -1).join(', ')} and ${found.at(-1)}`;
  return `terms of mass dimension ${list}, constants counted as declared`;
}

/** A doc comment at an indentation; each line is cleaned and kept on its own. */
function doc(lines: readonly string[], indent = ''): string {
  const clean = lines.map(commentText);
  if (clean.length === 1) return `${indent}/** ${clean[0]} */`;
  return [`${indent}/**`, ...clean.map((l) => `${indent} * ${l}`.trimEnd()), `${indent} */`].join('\n');
}

const header = (d: Derivation): string =>
  doc([
    `${d.theory.name}: reduced equations of a gravity theory with torsion; geometry: ${d.geometry.title}.`,
    '',
    'Written by untwist from the Lagrangian; do not edit. Units c = ħ = 1, so every dimension is a power of mass and a',
    'time derivative adds one. Times are cosmic time t with lapse N: ds² = −N² dt² + … . Numbers are doubles.',
    ...(d.relations.conditions.length > 0
      ? ['', 'Conditions that the couplings must meet and that were not used for rewriting:']
      : []),
    ...d.relations.conditions.map((c) => `    ${c.text}`),
  ]);

/** An array literal of strings. */
const strings = (names: readonly string[]): string => `[${wrapped(names.map(stringLiteral), '', '')}] as const`;

function constants({ derivation: d, parameters }: Writer): string {
  const sources = parameters.filter((p) => p.isSource).map((p) => p.name);
  const one = (about: string, name: string, value: string) => `/** ${about} */\nexport const ${name} = ${value};`;
  return [
    one('Name of the theory.', 'theory', stringLiteral(d.theory.name)),
    one('Geometry on which it was reduced.', 'geometry', stringLiteral(d.geometry.id)),
    one(
      'Functions of time that are varied, in the order of the equations.',
      'variables',
      strings([...d.equations.keys()]),
    ),
    one('Keys of `Couplings`.', 'parameters', strings(parameters.map((p) => p.name))),
    one('Parameters that are functions of time, to be given by their current value.', 'sources', strings(sources)),
  ].join('\n');
}

const powerText = (n: number): string => (n === 0 ? 'dimensionless' : `mass dimension ${n}`);

function couplings({ parameters }: Writer): string {
  const members = parameters.flatMap((p) => [
    doc([`${p.meaning}; ${powerText(p.dimension)}`], '  '),
    `  readonly ${propertyKey(p.name)}: number;`,
  ]);
  const lead = '/** Everything that is constant in time, and densities: what the theory leaves to be chosen. */';
  return `${lead}\nexport interface Couplings {${['', ...members].join('\n')}\n}`;
}

function jets(d: Derivation, orders: JetOrders): string {
  const members = d.fields.flatMap(({ name, meaning, dimension }) => [
    doc([`${meaning} and its time derivatives; ${powerText(dimension)}, one more for each derivative`], '  '),
    `  readonly ${propertyKey(name)}: ${tupleType(orders.get(name) ?? 0)};`,
  ]);
  const lead = '/** Fields at one time: value, first derivative, second derivative, … as far as they are needed. */';
  return `${lead}\nexport interface Jets {\n${members.join('\n')}\n}`;
}

interface FunctionText {
  readonly name: string;
  readonly doc: readonly string[];
  /** A type; `number` when there is one unnamed output. */
  readonly type: string;
  readonly outputs: readonly Output[];
}

function signature(name: string, type: string, body: Pick<Body, 'usesCouplings' | 'usesJets'>): string {
  const first = body.usesCouplings ? 'couplings' : '_couplings';
  const second = body.usesJets ? 'jets' : '_jets';
  return `function ${name}(${first}: Couplings, ${second}: Jets): ${type} {`;
}

function writeFunction(d: Derivation, f: FunctionText): string {
  const polynomials = f.outputs.flatMap((o) => [o.numerator, ...(o.denominator ?? []).map((factor) => factor.base)]);
  const sizes = new Map(polynomials.map((p) => [p, p.size < MOST_TERMS ? p.size : planSize([p], couplingTest(d))]));
  if ([...sizes.values()].reduce((a, b) => a + b, 0) > MOST_TERMS) return writeInParts(d, f, sizes);
  const body = functionBody(d, f.outputs);
  return `${doc(f.doc)}\nexport ${signature(f.name, f.type, body)}\n${body.text}\n}`;
}

/** A polynomial as a sum of at most `wanted` polynomials of about equal length; neighbouring terms stay together. */
function pieces(p: Poly, wanted: number): Poly[] {
  const count = Math.min(p.size, wanted);
  const start = (i: number) => Math.floor((i * p.size) / count);
  const rows = (from: number, to: number) => Array.from({ length: to - from }, (_, n) => from + n);
  return Array.from({ length: count }, (_, i) => select(p, rows(start(i), start(i + 1))));
}

/** The same function as a sum over functions of some hundred terms each. */
function writeInParts(d: Derivation, f: FunctionText, sizes: ReadonlyMap<Poly, number>): string {
  const helpers: string[] = [];
  const call = (p: Poly): string => {
    const names = pieces(p, Math.ceil(sizes.get(p)! / PART_TERMS)).map((numerator) => {
      const body = functionBody(d, [{ numerator }]);
      const name = `${f.name}Part${helpers.length + 1}`;
      helpers.push(`${signature(name, 'number', body)}\n${body.text}\n}`);
      return `${name}(couplings, jets)`;
    });
    return names.length === 0 ? '0' : names.join(' +\n    ');
  };
  const value = ({ numerator, denominator = [] }: Output): string => {
    if (denominator.length === 0) return call(numerator);
    const bottom = denominator.flatMap(({ base, power }) => Array<string>(power).fill(`(${call(base)})`));
    return `(${call(numerator)}) /\n    (${bottom.join(' * ')})`;
  };
  const text = f.outputs.map((o) => (o.key === undefined ? value(o) : `    ${propertyKey(o.key)}: ${value(o)},`));
  const result = f.type === 'number' ? `  return ${text[0]};` : `  return {\n${text.join('\n')}\n  };`;
  const uses = { usesCouplings: helpers.length > 0, usesJets: helpers.length > 0 };
  return [...helpers, `${doc(f.doc)}\nexport ${signature(f.name, f.type, uses)}\n${result}\n}`].join('\n\n');
}

const single = (p: Poly): Output[] => [{ numerator: p }];

/** An interface with one number for each key, and the function that fills it. */
function writeRecord(
  w: Writer,
  f: Omit<FunctionText, 'outputs' | 'type'> & { readonly type: string; readonly about: string },
  values: ReadonlyMap<string, Poly>,
  meaning: (key: string) => string,
): string {
  const members = [...values].flatMap(([key, p]) => [
    doc([`${meaning(key)}; ${w.dimension(p)}`], '  '),
    `  readonly ${propertyKey(key)}: number;`,
  ]);
  const outputs = [...values].map(([key, numerator]): Output => ({ key, numerator }));
  const type = `${doc([f.about])}\nexport interface ${f.type} {\n${members.join('\n')}\n}`;
  return `${type}\n\n${writeFunction(w.derivation, { ...f, outputs })}`;
}

function lagrangian(w: Writer): string {
  const { derivation: d } = w;
  return writeFunction(d, {
    name: 'lagrangian',
    type: 'number',
    doc: [
      'Reduced Lagrangian per unit coordinate volume, matter included, before total derivatives are dropped;',
      `${w.dimension(d.lagrangian)}.`,
    ],
    outputs: single(d.lagrangian),
  });
}

function equations(w: Writer): string {
  const { derivation: d } = w;
  return writeRecord(
    w,
    {
      name: 'equations',
      type: 'Equations',
      about: 'Residuals of the field equations, by the variable whose variation gives them.',
      doc: [
        'Euler–Lagrange expressions ∂L/∂q − d/dt ∂L/∂q̇ (+ …) of `lagrangian`, not rescaled; all vanish on a solution.',
      ],
    },
    d.equations,
    (key) => `∂L/∂${key} − d/dt ∂L/∂(d${key}/dt)`,
  );
}

function friedmann(w: Writer, f: FriedmannForm): string[] {
  const { derivation: d } = w;
  const define =
    'Defined by 3M²(H² + k/a²) = ρ + ρ_T and −M²(2Ḣ + 3H² + k/a²) = p + p_T, dots divided by N, H = ȧ/(aN).';
  const one = (name: string, text: string, p: Poly) =>
    writeFunction(d, { name, type: 'number', doc: [`${text}; ${w.dimension(p)}.`, define], outputs: single(p) });
  const ratio = f.wT;
  return [
    one('rhoT', 'Effective energy density ρ_T of torsion', f.rhoT),
    one('pT', 'Effective pressure p_T of torsion', f.pT),
    ...(ratio ? [equationOfState(w, ratio)] : []),
  ];
}

const equationOfState = (w: Writer, { numerator, denominator }: Fraction): string =>
  writeFunction(w.derivation, {
    name: 'wT',
    type: 'number',
    doc: [
      'Effective equation of state p_T/ρ_T, common factors cancelled; dimensionless. Not finite where ρ_T vanishes.',
    ],
    outputs: [{ numerator, denominator }],
  });

/** What spin adds, and the connection that it makes. */
function spin(w: Writer, { solution, rho, p }: SpinElimination): string[] {
  const one = (name: string, text: string, { numerator, denominator }: Fraction) =>
    writeFunction(w.derivation, {
      name,
      type: 'number',
      doc: [`${text}, the connection eliminated by its equations.`],
      outputs: [{ numerator, denominator }],
    });
  const members = [...solution.keys()].flatMap((q) => [
    doc([`value of ${q} on the equations of the connection`], '  '),
    `  readonly ${propertyKey(q)}: number;`,
  ]);
  const type = `${doc(['The connection that the metric and the spin make.'])}\nexport interface Connection {\n${members.join('\n')}\n}`;
  const values = writeFunction(w.derivation, {
    name: 'connection',
    type: 'Connection',
    doc: ['The solution of the equations of the connection, which are linear in it.'],
    outputs: [...solution].map(([key, f]): Output => ({ key, ...f })),
  });
  return [
    `${type}\n\n${values}`,
    one('rhoSpin', 'What spin adds to the energy density; mass dimension 4', rho),
    ...(p ? [one('pSpin', 'What spin adds to the pressure; mass dimension 4', p)] : []),
  ];
}

/** The current and its singular surfaces, and the conformal frames that were asked for. */
const frames = (w: Writer): string[] =>
  [...currentFunctions(w.derivation), ...frameFunctions(w.derivation)].map(({ name, doc: lines, result, outputs }) => {
    if (result.kind === 'number')
      return writeFunction(w.derivation, {
        name,
        type: 'number',
        doc: lines,
        outputs: outputs.map(({ numerator, denominator }) => ({ numerator, denominator })),
      });
    const members = outputs.flatMap((o) => [doc([o.meaning], '  '), `  readonly ${propertyKey(o.key)}: number;`]);
    const type = `${doc([result.about])}\nexport interface ${result.type} {\n${members.join('\n')}\n}`;
    return `${type}\n\n${writeFunction(w.derivation, { name, type: result.type, doc: lines, outputs })}`;
  });

const BACKGROUND = 'Equivalent to the torsion theory on the homogeneous, isotropic background';

function scalarTensor(w: Writer, s: BiScalarForm): string[] {
  const valid = s.validFor === 'every k' ? `${BACKGROUND}, for every k.` : `${BACKGROUND} with k = 0.`;
  const action = 'Part of √−g [ G4 R + Σ K_AB X^AB + √|J_μ J^μ| − V ], X^AB = −½ ∂A·∂B once per unordered pair.';
  const one = (name: string, text: string, p: Poly) =>
    writeFunction(w.derivation, {
      name,
      type: 'number',
      doc: [`${text}; ${w.dimension(p)}.`, action, valid],
      outputs: single(p),
    });
  return [
    one('g4', 'Coefficient G4 of the metric curvature scalar', s.g4),
    writeRecord(
      w,
      {
        name: 'kinetic',
        type: 'Kinetic',
        about: 'Kinetic coefficients K_AB, by unordered pair of scalars.',
        doc: [
          'Kinetic coefficients; +½ K_AB Ȧ Ḃ for each pair in the reduced Lagrangian.',
          action,
          valid,
          'Their signs are no statement about the particle spectrum of the torsion theory.',
        ],
      },
      s.kinetic,
      (key) => `multiplies X^(${key})`,
    ),
    writeRecord(
      w,
      {
        name: 'current',
        type: 'Current',
        about: 'Components J_A of the current J_μ = Σ J_A ∂_μ A, by scalar.',
        doc: ['Components of the current; +J_A Ȧ in the reduced Lagrangian.', action, valid],
      },
      s.current,
      (key) => `multiplies ∂_μ ${key}`,
    ),
    one('potential', 'Potential V', s.potential),
    writeFunction(w.derivation, {
      name: 'curvatureObstruction',
      type: 'number',
      doc: [
        `Torsion theory minus its scalar-tensor form at k ≠ 0, up to total derivatives; ${w.dimension(s.obstruction)}.`,
        'Per a³N; a first derivative stands for itself divided by N.',
      ],
      outputs: single(s.obstruction),
    }),
  ];
}
