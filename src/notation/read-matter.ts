/**
 * The `matter` list of a theory file: dust, radiation, { vacuum: X }, { fluid: name, w: "1/5" }. A vacuum density that
 * is not declared is declared here, with mass dimension 4. Matter with spin is left to read-spins.ts.
 */
import { type Rational, rational } from '../algebra/rational.js';
import { type Diagnostic, errorAt } from './diagnostics.js';
import { MAX_DIGITS } from './limits.js';
import { isNameText, nameFault } from './names.js';
import { isSpin } from './read-spins.js';
import { type Declarations, declare, type MatterDeclaration } from './read-symbols.js';
import { nearest } from './suggest.js';
import { asList, asRecord, asText } from './yaml-shape.js';
import type { YamlNode, YamlText } from './yaml-source.js';

const KNOWN = ['dust', 'radiation', 'vacuum', 'fluid', 'spin'];
const FORMS = 'matter is dust, radiation, { vacuum: X }, { fluid: name, w: "1/5" } or { spin: sigma, axial: q }';

/** The components in the order of the file; faults are added to the problems. */
export function readMatter(
  node: YamlNode,
  declarations: Declarations,
  problems: Diagnostic[],
): readonly MatterDeclaration[] {
  const components: MatterDeclaration[] = [];
  const densities = new Set<string>();
  for (const item of asList(node, 'matter', problems)?.items ?? []) {
    if (isSpin(item)) continue;
    const component = readComponent(item, declarations, problems);
    if (component === undefined) continue;
    if (densities.has(component.density)) {
      const message = `the matter component ${component.name} occurs twice`;
      problems.push(errorAt(item.origin, 'matter-twice', message, 'keep one of them, or give the fluid another name'));
      continue;
    }
    densities.add(component.density);
    components.push(component);
  }
  return components;
}

function readComponent(
  node: YamlNode,
  declarations: Declarations,
  problems: Diagnostic[],
): MatterDeclaration | undefined {
  if (node.kind === 'map') {
    if (node.entries.has('vacuum')) return readVacuum(node, declarations, problems);
    if (node.entries.has('fluid')) return readFluid(node, problems);
    const first = [...node.entries.values()][0];
    if (first === undefined) return unknown(node, '{}', undefined, problems);
    return unknown(first.key, first.key.text, nearest(first.key.text, KNOWN), problems);
  }
  const text = asText(node, 'a matter component', problems);
  if (text === undefined) return undefined;
  const kind = text.text.trim();
  if (kind === 'dust') return { kind, name: kind, density: 'rho_dust', w: rational(0) };
  if (kind === 'radiation') return { kind, name: kind, density: 'rho_radiation', w: rational(1, 3) };
  if (kind === 'vacuum' || kind === 'fluid') {
    const form = kind === 'vacuum' ? '{ vacuum: Lambda }' : '{ fluid: chi, w: "1/5" }';
    problems.push(errorAt(node.origin, 'unknown-matter', `${kind} needs a name`, `write ${form}`));
    return undefined;
  }
  return unknown(node, kind, nearest(kind, KNOWN), problems);
}

function unknown(node: YamlNode, name: string, near: string | undefined, problems: Diagnostic[]): undefined {
  const hint = near === undefined ? FORMS : `did you mean ${near}?`;
  problems.push(errorAt(node.origin, 'unknown-matter', `unknown matter ${name.slice(0, 40)}`, hint));
  return undefined;
}

function readVacuum(node: YamlNode, declarations: Declarations, problems: Diagnostic[]): MatterDeclaration | undefined {
  const value = asRecord(node, 'a vacuum component', { required: ['vacuum'] }, problems).get('vacuum');
  const text = value === undefined ? undefined : asText(value, 'the vacuum density', problems);
  if (text === undefined) return undefined;
  const name = text.text.trim();
  if (!declarations.has(name)) declare(text, 'vacuum', 4, declarations, problems);
  return { kind: 'vacuum', name, density: name, w: rational(-1) };
}

function readFluid(node: YamlNode, problems: Diagnostic[]): MatterDeclaration | undefined {
  const values = asRecord(node, 'a fluid component', { required: ['fluid', 'w'] }, problems);
  const nameNode = values.get('fluid');
  const wNode = values.get('w');
  const nameText = nameNode === undefined ? undefined : asText(nameNode, 'the name of a fluid', problems);
  const wText = wNode === undefined ? undefined : asText(wNode, 'w of a fluid', problems);
  const name = nameText?.text.trim() ?? '';
  if (nameText !== undefined && !isNameText(name)) {
    const fault = nameFault(name)!;
    problems.push(errorAt(nameText.origin, fault.code, fault.message, fault.hint));
    return undefined;
  }
  const w = wText === undefined ? undefined : readRational(wText, problems);
  return w === undefined || nameText === undefined ? undefined : { kind: 'fluid', name, density: `rho_${name}`, w };
}

/** An integer or p/q. */
function readRational(node: YamlText, problems: Diagnostic[]): Rational | undefined {
  const typed = node.text.trim().replace('−', '-');
  const match = /^([+-]?[0-9]+)(?:\s*\/\s*([0-9]+))?$/.exec(typed);
  const fault = (code: string, message: string, hint: string): undefined => {
    problems.push(errorAt(node.origin, code, message, hint));
    return undefined;
  };
  if (match === null) {
    if (/^[+-]?[0-9]*\.[0-9]+$/.test(typed))
      return fault(
        'decimal-point',
        `w = ${typed.slice(0, 40)} has a decimal point`,
        'write a fraction in quotes, such as "1/5"',
      );
    return fault(
      'bad-rational',
      `w = ${typed.slice(0, 40)} is not a rational number`,
      'write an integer or a fraction in quotes, such as "1/5"',
    );
  }
  if (typed.length > MAX_DIGITS)
    return fault('digits-limit', `w has more than ${MAX_DIGITS} digits`, 'write a shorter fraction');
  const den = BigInt(match[2] ?? '1');
  if (den === 0n) return fault('division-by-zero', `w = ${typed} divides by zero`, 'write a fraction such as "1/5"');
  return rational(BigInt(match[1]!.replace('+', '')), den);
}
