/**
 * Conventions as a user declares them: the name of a preset, or a mapping from keys to choices, on top of a preset if it names
 * one. A file of conventions (rules/conventions, or the user's own) has a title and such a mapping.
 */
import { readdirSync, readFileSync } from 'node:fs';
import { CHOICES, CONVENTION_KEYS, type ConventionKey, type Conventions, INTERNAL } from './conventions.js';
import { type Diagnostic, errorAt, InputError } from './diagnostics.js';
import type { Passage } from './passage.js';
import { nearest } from './suggest.js';
import { ricciOf, torsionTraceOf } from './trace-formula.js';
import { asRecord, asText } from './yaml-shape.js';
import { readYaml, type YamlNode, type YamlText } from './yaml-source.js';
import { passageOf } from './yaml-text.js';

const FOLDER = new URL('../../rules/conventions/', import.meta.url);
const FILE_KEYS = { required: ['untwist-conventions', 'title', 'why', 'conventions'] };
const FORMULAS: Partial<Record<ConventionKey, (passage: Passage, so: Conventions) => string | undefined>> = {
  ricci: ricciOf,
  'torsion-trace': torsionTraceOf,
};
const FORMULA_HINTS: Partial<Record<ConventionKey, string>> = {
  ricci: 'write the trace with the indices in your order: "R^c_{acb}"; a, b are then the indices of R_{ab}',
  'torsion-trace': 'write the trace with the indices in your order: "T^b_{ab}"',
};

/** Names of the presets, in alphabetical order. */
export const conventionPresets = (): readonly string[] =>
  readdirSync(FOLDER)
    .filter((file) => file.endsWith('.yaml'))
    .map((file) => file.slice(0, -'.yaml'.length))
    .sort();

/** A preset; undefined when there is none of that name. @throws InputError when its file is at fault. */
export function presetConventions(name: string): Conventions | undefined {
  if (!conventionPresets().includes(name)) return undefined;
  return readConventionsFile(readFileSync(new URL(`${name}.yaml`, FOLDER), 'utf8'), `rules/conventions/${name}.yaml`);
}

/** The error of a preset that does not exist, `unknown-preset`, with what there is. */
export function unknownPreset(name: string): Pick<Diagnostic, 'code' | 'severity' | 'message' | 'hint'> {
  const presets = conventionPresets();
  const near = nearest(name, presets);
  const hint = near === undefined ? `the presets are ${presets.join(', ')}` : `did you mean ${near}?`;
  const message = `${JSON.stringify(name.slice(0, 40))} is not the name of a set of conventions`;
  return { code: 'unknown-preset', severity: 'error', message, hint };
}

/**
 * The conventions that a file describes: `untwist-conventions: 1`, a title, why they are used, and `conventions`.
 * @throws InputError with every fault found.
 */
export function readConventionsFile(text: string, file: string): Conventions {
  const problems: Diagnostic[] = [];
  const values = asRecord(readYaml(text, file), 'a file of conventions', FILE_KEYS, problems);
  for (const key of ['title', 'why']) {
    const node = values.get(key);
    if (node !== undefined) asText(node, key, problems);
  }
  const version = values.get('untwist-conventions');
  if (version !== undefined && asText(version, 'untwist-conventions', problems)?.text.trim() !== '1') {
    problems.push(
      errorAt(version.origin, 'bad-version', 'not a version of the file format', 'write untwist-conventions: 1'),
    );
  }
  const node = values.get('conventions');
  const conventions = node === undefined ? INTERNAL : readConventions(node, problems);
  if (problems.length > 0) throw new InputError(problems);
  return conventions;
}

/** The value of `conventions` in a file; faults are added to the problems and leave the internal choice. */
export function readConventions(node: YamlNode, problems: Diagnostic[]): Conventions {
  if (node.kind === 'text') return readPreset(node, problems);
  const keys = ['preset', ...CONVENTION_KEYS];
  const values = asRecord(node, 'conventions', { required: [], optional: keys }, problems);
  const preset = values.get('preset');
  let result = preset === undefined ? INTERNAL : readPreset(preset, problems);
  // The formulas come last: they are written in the index order that the other keys set.
  const inOrder = [...CONVENTION_KEYS].sort((a, b) => Number(a in FORMULAS) - Number(b in FORMULAS));
  for (const key of inOrder) {
    const value = values.get(key);
    const text = value === undefined ? undefined : asText(value, key, problems);
    if (text === undefined) continue;
    const choice = readChoice(key, text, result, problems);
    if (choice !== undefined) result = { ...result, [key]: choice };
  }
  return result;
}

function readPreset(node: YamlNode, problems: Diagnostic[]): Conventions {
  const name = asText(node, 'conventions', problems)?.text.trim();
  if (name === undefined) return INTERNAL;
  const preset = presetConventions(name);
  if (preset === undefined) {
    const { code, message, hint } = unknownPreset(name);
    problems.push(errorAt(node.origin, code, message, hint));
  }
  return preset ?? INTERNAL;
}

/** `+ - - -`, `(+,-,-,-)`, `+1`, `1`, `−1`, `8 pi G` in one spelling. */
function normalised(key: ConventionKey, typed: string): string {
  const text = typed.replace(/[−–]/g, '-').replace(/[\s,()]/g, '');
  if (CHOICES[key][1] === '-1') return /^(?:1|\+)$/.test(text) ? '+1' : text === '-' ? '-1' : text;
  return key === 'units' && /^8\\?piG$/.test(text) ? '8piG' : text;
}

function readChoice(key: ConventionKey, node: YamlText, so: Conventions, problems: Diagnostic[]): string | undefined {
  const formula = FORMULAS[key];
  let choice: string | undefined;
  if (formula === undefined) {
    const typed = normalised(key, node.text);
    choice = (CHOICES[key] as readonly string[]).find((known) => known === typed);
  } else {
    try {
      choice = formula(passageOf(node), so);
    } catch (error) {
      if (!(error instanceof InputError)) throw error;
      problems.push(...error.diagnostics);
      return undefined;
    }
  }
  if (choice === undefined) problems.push(fault(key, node));
  return choice;
}

function fault(key: ConventionKey, node: YamlText): Diagnostic {
  const typed = JSON.stringify(node.text.trim().slice(0, 40));
  if (key === 'signature') {
    return errorAt(node.origin, 'bad-signature', `${typed} is not a signature`, 'write "-+++" or "+---"');
  }
  const hint = FORMULA_HINTS[key] ?? `the choices are ${CHOICES[key].join(', ')}`;
  return errorAt(node.origin, 'bad-convention', `${typed} is not a choice for ${key}`, hint);
}
