/**
 * The `tensors` of a theory file: a name, a number of indices, the symmetry as equalities between permuted copies
 * (`S_{abc} = -S_{acb}`), LaTeX, dimension. Faulty declarations are reported and, where the number of indices is known, still
 * returned, so that their use in the Lagrangian is not reported a second time.
 */
import { type Diagnostic, errorAt, InputError } from './diagnostics.js';
import { latexFault, latexName } from './latex-symbol.js';
import { MAX_SLOTS, MAX_SYMBOLS } from './limits.js';
import { nameFault } from './names.js';
import { type Declarations, readDimension } from './read-symbols.js';
import { vanishes } from './slot-symmetry.js';
import { readTensorEquation, type TensorReading } from './tensor-expression.js';
import type { DeclaredTensor, LagrangianTerm, SlotSymmetry, Theory } from './theory.js';
import { MACRO_HEADS } from './vocabulary.js';
import { asMap, asRecord, asText } from './yaml-shape.js';
import type { YamlNode, YamlText } from './yaml-source.js';
import { passageOf } from './yaml-text.js';

const KEYS = { required: ['indices'], optional: ['symmetry', 'latex', 'dimension'] };

/** The tensors in the order of the file; faults are added to the problems. */
export function readTensors(
  node: YamlNode,
  declarations: Declarations,
  problems: Diagnostic[],
): readonly DeclaredTensor[] {
  const tensors: DeclaredTensor[] = [];
  for (const { key, value } of asMap(node, 'tensors', problems)?.entries.values() ?? []) {
    if (declarations.size + tensors.length === MAX_SYMBOLS) {
      const message = `more than ${MAX_SYMBOLS} constants, scales and tensors`;
      problems.push(errorAt(key.origin, 'symbols-limit', message, 'declare only what the Lagrangian uses'));
    }
    const free = checkName(key, declarations, problems);
    const tensor = readTensor(key, value, problems);
    if (tensor !== undefined && free) tensors.push(tensor);
  }
  return tensors;
}

/** Whether no constant stands in the way. */
function checkName(key: YamlText, declarations: Declarations, problems: Diagnostic[]): boolean {
  const name = key.text.trim();
  let free = true;
  const report = (code: string, message: string, hint: string): void => {
    problems.push(errorAt(key.origin, code, message, hint));
  };
  const fault = nameFault(name);
  if (fault !== undefined) report(fault.code, fault.message, fault.hint);
  else if (name.includes('_')) {
    const hint = `leave the underscore out: ${name.replaceAll('_', '')}`;
    report('bad-name', `${name} is not the name of a tensor, whose indices begin at the first underscore`, hint);
  } else if (MACRO_HEADS.has(name)) {
    report('reserved-name', `the tensor ${name} exists already`, 'choose another name');
  }
  const before = declarations.get(name);
  if (before !== undefined) {
    free = false;
    report('declared-twice', `${name} is declared twice`, `it is a ${before.role} already; keep one of them`);
  }
  for (const other of declarations.keys()) {
    if (!other.startsWith(`${name}_`) || /[0-9]/.test(other.slice(name.length))) continue;
    free = false;
    report('reserved-name', `${other} reads as the tensor ${name} with indices`, 'rename one of the two');
  }
  return free;
}

function readTensor(key: YamlText, node: YamlNode, problems: Diagnostic[]): DeclaredTensor | undefined {
  const name = key.text.trim();
  const values = asRecord(node, `the tensor ${name}`, KEYS, problems);
  const slots = readSlots(values.get('indices'), name, problems);
  const latex = readLatex(values.get('latex'), name, problems) ?? latexName(name);
  const dimensionNode = values.get('dimension');
  const dimension = dimensionNode === undefined ? 0 : readDimension(dimensionNode, name, problems);
  if (slots === undefined) return undefined;
  const plain = { name, slots, generators: [], latex, dimension, origin: key.origin };
  const symmetry = values.get('symmetry');
  return symmetry === undefined ? plain : { ...plain, generators: readSymmetry(symmetry, plain, problems) };
}

function readSlots(node: YamlNode | undefined, name: string, problems: Diagnostic[]): number | undefined {
  const text = node === undefined ? undefined : asText(node, `the number of indices of ${name}`, problems);
  if (text === undefined) return undefined;
  const typed = text.text.trim();
  const slots = /^[0-9]{1,3}$/.test(typed) ? Number(typed) : Number.NaN;
  if (slots >= 1 && slots <= MAX_SLOTS) return slots;
  const message = `${JSON.stringify(typed.slice(0, 40))} is not a number of indices`;
  problems.push(errorAt(text.origin, 'bad-slots', message, `write a number from 1 to ${MAX_SLOTS}`));
  return undefined;
}

function readLatex(node: YamlNode | undefined, name: string, problems: Diagnostic[]): string | undefined {
  const text = node === undefined ? undefined : asText(node, `the LaTeX of ${name}`, problems);
  if (text === undefined) return undefined;
  const fault = latexFault(passageOf(text));
  if (fault === undefined) return text.text.trim();
  problems.push(fault);
  return undefined;
}

const FORM = 'a symmetry says that the tensor is equal to a permuted copy of itself, up to a sign: S_{abc} = -S_{acb}';

function readSymmetry(node: YamlNode, tensor: DeclaredTensor, problems: Diagnostic[]): readonly SlotSymmetry[] {
  const generators: SlotSymmetry[] = [];
  for (const item of node.kind === 'list' ? node.items : [node]) {
    const text = asText(item, `a symmetry of ${tensor.name}`, problems);
    if (text === undefined) continue;
    const fault = (message: string, hint = FORM): void => {
      problems.push(errorAt(item.origin, 'bad-symmetry', message, hint));
    };
    try {
      const options = { tensors: [tensor], allowFree: true };
      const { left, right } = readTensorEquation(passageOf(text), options);
      const symmetry = symmetryOf(left, right, tensor);
      if (typeof symmetry === 'string') fault(symmetry);
      else if (vanishes(tensor.slots, [...generators, symmetry])) {
        const together = generators.length === 0 ? '' : ' together with those before it';
        fault(`this symmetry${together} makes ${tensor.name} vanish`, 'check the signs');
      } else if (symmetry.places.some((from, to) => from !== to)) generators.push(symmetry);
    } catch (error) {
      if (!(error instanceof InputError)) throw error;
      problems.push(...error.diagnostics);
    }
  }
  return generators;
}

/** left = right as a permutation, or what is wrong with it. */
function symmetryOf(left: TensorReading, right: TensorReading, tensor: DeclaredTensor): SlotSymmetry | string {
  const a = copyOf(left.terms, tensor);
  const b = copyOf(right.terms, tensor);
  if (typeof a === 'string') return a;
  if (typeof b === 'string') return b;
  const places = b.slots.map(({ name }) => a.slots.findIndex((slot) => slot.name === name));
  if (places.includes(-1)) return 'the two sides carry different indices';
  if (b.slots.some(({ up }, i) => a.slots[places[i]!]!.up !== up)) return 'an index changes its height';
  return { places, sign: (a.sign * b.sign) as 1 | -1 };
}

function copyOf(
  terms: readonly LagrangianTerm[],
  { name }: DeclaredTensor,
): { readonly sign: number; readonly slots: LagrangianTerm['factors'][number]['slots'] } | string {
  const [term, second] = terms;
  if (term === undefined) return 'one side is zero';
  if (second !== undefined) return 'one side is a sum';
  const { scalar, factors } = term;
  const [factor, more] = factors;
  if (factor?.head !== name || more !== undefined) return `each side is ${name} alone with indices`;
  const { num, den } = scalar.coefficient;
  if (den !== 1n || (num !== 1n && num !== -1n)) return 'the coefficient is not 1 or −1';
  if (new Set(factor.slots.map((slot) => slot.name)).size < factor.slots.length) return 'two indices are contracted';
  return { sign: Number(num), slots: factor.slots };
}

/**
 * For stages that work with components: declared tensors have none.
 * @throws InputError `tensor-without-components` for each declared tensor that occurs in the Lagrangian.
 */
export function refuseDeclaredTensors({ tensors, lagrangian }: Pick<Theory, 'tensors' | 'lagrangian'>): void {
  const heads = new Set(lagrangian.flatMap(({ factors }) => factors.map((f) => f.head)));
  const used = tensors.filter(({ name }) => heads.has(name));
  if (used.length === 0) return;
  throw new InputError(
    used.map(({ name, origin }) => ({
      code: 'tensor-without-components',
      severity: 'error',
      message: `no geometry gives components to the declared tensor ${name}`,
      hint: 'declared tensors can be simplified but not reduced: leave it out of the Lagrangian',
      ...origin,
    })),
  );
}
