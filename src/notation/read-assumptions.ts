/**
 * Assumptions of a theory file: polynomial inequalities between constants, such as `a4 > 0` or `3 b1 <= b2`. They are never
 * used for rewriting, only to decide signs.
 */
import { type Diagnostic, errorAt, InputError } from './diagnostics.js';
import { MAX_TEXT } from './limits.js';
import { reservedMeaning } from './names.js';
import { type Passage, plainPassage } from './passage.js';
import { parseScalar, type ScalarOptions } from './scalar.js';
import { collectScalars } from './scalar-term.js';
import type { AssumedInequality, MatterComponent, ScalarSum, TheorySymbol } from './theory.js';
import { toMass, type Units } from './units.js';
import { asText } from './yaml-shape.js';
import type { YamlNode } from './yaml-source.js';
import { passageOf } from './yaml-text.js';

const SIGNS: ReadonlyMap<string, AssumedInequality['relation']> = new Map([
  ['>', '>'],
  ['<', '<'],
  ['>=', '>='],
  ['<=', '<='],
  ['≥', '>='],
  ['≤', '<='],
  ['\\geq', '>='],
  ['\\leq', '<='],
  ['\\ge', '>='],
  ['\\le', '<='],
  ['\\gt', '>'],
  ['\\lt', '<'],
  ['!=', '!='],
  ['≠', '!='],
  ['\\neq', '!='],
  ['\\ne', '!='],
]);
/** Longer signs first; a macro ends where its letters end. */
const SIGN = /[<>]=|!=|[<>≥≤≠]|\\(?:geq|leq|neq|ge|le|gt|lt|ne)(?![A-Za-z])/gu;

/** The stretch of a passage from one offset to another. */
const stretch = ({ text, locate }: Passage, from: number, to: number): Passage => ({
  text: text.slice(from, to),
  locate: (start, end) => locate(from + start, from + end),
});

const HINT = 'write one comparison, for example "a4 > 0" or "3 b1 <= b2"';

/** @throws InputError as `parseScalar`, and `no-inequality` for anything but one comparison. */
export function parseAssumption(passage: Passage, options: ScalarOptions): AssumedInequality {
  const found = [...passage.text.matchAll(SIGN)];
  const [sign, second] = found;
  const fault = (start: number, end: number, message: string): InputError =>
    new InputError([errorAt(passage.locate(start, end), 'no-inequality', message, HINT)]);
  if (!sign) throw fault(0, passage.text.length, 'an assumption needs one of the signs > < >= <= !=');
  if (second) throw fault(second.index, second.index + second[0].length, 'a second comparison in one assumption');
  const end = sign.index + sign[0].length;
  const problems: Diagnostic[] = [];
  const side = (from: number, to: number): ScalarSum => {
    if (passage.text.slice(from, to).trim() === '') {
      problems.push(
        errorAt(passage.locate(sign.index, end), 'no-inequality', `nothing stands beside ${sign[0]}`, HINT),
      );
      return [];
    }
    try {
      return parseScalar(stretch(passage, from, to), options);
    } catch (error) {
      if (!(error instanceof InputError)) throw error;
      problems.push(...error.diagnostics);
      return [];
    }
  };
  const left = side(0, sign.index);
  const right = side(end, passage.text.length);
  if (problems.length > 0) throw new InputError(problems);
  return {
    left,
    right,
    relation: SIGNS.get(sign[0])!,
    text: passage.text.trim().replace(/\s+/g, ' '),
    origin: passage.locate(0, passage.text.length),
  };
}

/** The assumption with κ or G replaced by M; its text stays as typed. */
export function assumptionToMass(assumption: AssumedInequality, units: Units): AssumedInequality {
  const translated = (sum: ScalarSum): ScalarSum => collectScalars(sum.map((term) => toMass(term, units)));
  return { ...assumption, left: translated(assumption.left), right: translated(assumption.right) };
}

/**
 * The assumptions of a file and of the command line, in the internal symbols.
 * @param more texts of `--assume`.
 * @param keep takes the faults that were found.
 */
export function readAssumptions(
  node: YamlNode | undefined,
  more: readonly string[],
  symbols: readonly TheorySymbol[],
  matter: readonly MatterComponent[],
  units: Units,
  keep: (found: readonly Diagnostic[]) => void,
): readonly AssumedInequality[] {
  const problems: Diagnostic[] = [];
  const passages: Passage[] = [];
  for (const item of node?.kind === 'list' ? node.items : node === undefined ? [] : [node]) {
    const text = asText(item, 'an assumption', problems);
    if (text !== undefined) passages.push(passageOf(text));
  }
  for (const text of more) {
    if (text.length <= MAX_TEXT) passages.push(plainPassage(text, '--assume'));
    else {
      const message = `an assumption has more than ${MAX_TEXT} characters`;
      problems.push({ code: 'size-limit', severity: 'error', message, file: '--assume' });
    }
  }
  const names = [...symbols.map((s) => s.name), ...matter.map((m) => m.density), 'k'];
  const options: ScalarOptions = {
    isSymbol: (name) => names.includes(name),
    names,
    explain: (name) => {
      const meaning = reservedMeaning(name);
      return meaning && `${name} stands for ${meaning}; an assumption is about constants`;
    },
  };
  const assumptions: AssumedInequality[] = [];
  for (const passage of passages) {
    try {
      assumptions.push(assumptionToMass(parseAssumption(passage, options), units));
    } catch (error) {
      if (!(error instanceof InputError)) throw error;
      problems.push(...error.diagnostics);
    }
  }
  keep(problems);
  return assumptions;
}
