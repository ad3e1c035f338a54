import { describe, expect, it } from 'vitest';
import { moveTo, symbolsOf } from '../../src/algebra/collect.js';
import { type Fraction, fraction } from '../../src/algebra/fraction.js';
import { infix } from '../../src/algebra/infix.js';
import { InputError } from '../../src/notation/diagnostics.js';
import { applyRule, type EliminationStep, integrateOut } from '../../src/scalartensor/auxiliary.js';
import {
  bundledAuxiliaryFiles,
  fieldRules,
  readAuxiliaryFile,
  ruleById,
} from '../../src/scalartensor/auxiliary-file.js';
import type { AuxiliaryExample, AuxiliaryRule } from '../../src/scalartensor/auxiliary-rule.js';
import { withoutCurvature } from '../../src/scalartensor/form-rules.js';
import { linearised } from '../../src/scalartensor/linearise.js';
import { FORM_RULES } from '../../src/scalartensor/metric-form.js';
import { exampleRing, formOf, type Names } from './auxiliary-examples.js';

const shown = (f: Fraction): string =>
  f.denominator.length === 0
    ? infix(f.numerator)
    : `(${infix(f.numerator)})/${f.denominator.map((d) => `(${infix(d.base)})^${d.power}`).join('')}`;

/** Every user symbol of an example renamed to the letters that rules use themselves: they are different kinds of names. */
const MASKED = new Map([
  ['m', 'a'],
  ['f', 'b'],
  ['g', 'c'],
]);
const rename = (text: string): string => text.replace(/[A-Za-z][A-Za-z0-9_]*/g, (word) => MASKED.get(word) ?? word);
const masked = (names: Names): Names => ({ ...names, constants: names.constants.map((n) => MASKED.get(n) ?? n) });

async function fieldExample(rule: AuxiliaryRule, example: AuxiliaryExample, names: Names, text: (t: string) => string) {
  const ring = exampleRing(names);
  const outcome = await applyRule(rule, formOf(text(example.input), names, ring), example.field!);
  if (example.output === undefined) {
    expect(outcome, example.input).toBeTypeOf('string');
    return;
  }
  if (typeof outcome === 'string') throw new Error(`${rule.id} does not apply to ${example.input}: ${outcome}`);
  const wide = exampleRing(names, true);
  const lifted = (f: Fraction): Fraction =>
    fraction(
      moveTo(f.numerator, wide),
      f.denominator.map(({ base, power }) => ({ base: moveTo(base, wide), power })),
    );
  expect(outcome.map((s) => shown(lifted(s.after.value)))).toEqual(
    example.output.map((t) => shown(formOf(text(t), names, wide).value)),
  );
  const [first] = outcome as readonly [EliminationStep, ...EliminationStep[]];
  const [kind, wanted] = example.charge ? ['conserved', example.charge] : ['zero', example.constraint];
  expect(first.constraint && [first.constraint.kind, shown(first.constraint.value)]).toEqual(
    wanted && [kind, shown(formOf(text(wanted), names, ring).value)],
  );
}

function formExample(rule: AuxiliaryRule, example: AuxiliaryExample, names: Names, text: (t: string) => string): void {
  const ring = exampleRing(names);
  const form = formOf(text(example.input), names, ring);
  const outcome = FORM_RULES.get(rule.id)!(form);
  if (example.output === undefined) {
    expect(outcome.kind, example.input).not.toBe('applied');
    return;
  }
  // What is left of the spatial curvature is given up, which is the loss that the rule states.
  const isGivenUp = rule.id === 'spatial-curvature';
  expect(outcome.kind, example.input).toBe(isGivenUp ? 'stopped' : 'applied');
  const after = outcome.kind === 'applied' ? outcome.after : withoutCurvature(form);
  expect(shown(after.value)).toBe(shown(formOf(text(example.output[0]!), names, ring).value));
}

function lineariseExample(example: AuxiliaryExample, names: Names, text: (t: string) => string): void {
  const ring = exampleRing(names);
  const outcome = linearised(formOf(text(example.input), names, ring).value.numerator, [[example.field!, 'c1']]);
  expect(outcome && infix(outcome.value), example.input).toBe(
    example.output && infix(formOf(text(example.output[0]!), names, ring).value.numerator),
  );
}

describe('every bundled rule does what its examples say', () => {
  for (const file of bundledAuxiliaryFiles())
    for (const rule of file.rules)
      for (const [kind, names, text] of [
        ['as written', file, (t: string) => t],
        ['with symbols named like letters', masked(file), rename],
      ] as const)
        it(`${rule.id}, ${kind}`, async () => {
          for (const example of [...rule.yes, ...rule.no]) {
            if (rule.does === 'form') formExample(rule, example, names, text);
            else if (rule.does === 'linearise') lineariseExample(example, names, text);
            else await fieldExample(rule, example, names, text);
          }
        });

  it('has examples of both kinds, a reason and a source', () => {
    for (const rule of bundledAuxiliaryFiles().flatMap((f) => f.rules)) {
      expect(rule.yes.length, rule.id).toBeGreaterThan(0);
      expect(rule.no.length, rule.id).toBeGreaterThan(0);
      expect(
        [rule.why, rule.source].every((t) => t.length > 5),
        rule.id,
      ).toBe(true);
    }
  });

  it('form rules are those that the program applies, in the same order', () => {
    const ids = bundledAuxiliaryFiles().flatMap((f) => f.rules.filter((r) => r.does === 'form').map((r) => r.id));
    expect(ids).toEqual([...FORM_RULES.keys()]);
  });

  it('a form without the field is left as it is', async () => {
    const names = { constants: ['m'], scalars: ['q', 'r'] };
    const ring = exampleRing(names);
    const [branch] = await integrateOut(formOf('m r^2', names, ring), ['q'], fieldRules());
    expect([branch!.steps.length, branch!.form.scalars]).toEqual([0, ['r']]);
  });
});

const RULE = `  - id: one
    does: replace
    enters: ?a ?q^2 + ?b ?q + ?c
    when: [nonzero ?a]
    field: -?b/(2 ?a)
    becomes: ?c - ?b^2/(4 ?a)
    loses: [{ where: ?a, what: something }]
    why: because of it
    source: derived here
    yes: [{ field: q, in: m q^2, out: "0" }]
    no: [{ field: q, in: m q^3 }]
`;
const file = (rules: string): string =>
  `untwist-auxiliary: 1\ntitle: t\nconstants: [m]\nscalars: [q]\nrules:\n${rules}`;

/** code and the text that is pointed at. */
function faults(text: string): string[] {
  try {
    readAuxiliaryFile(text, 'x.yaml');
    return [];
  } catch (error) {
    if (!(error instanceof InputError)) throw error;
    return error.diagnostics.map((d) => `${d.code} ${d.source!.slice(d.start, d.end).split('\n')[0]}`);
  }
}

describe('readAuxiliaryFile', () => {
  it('reads a rule', () => {
    const { rules } = readAuxiliaryFile(file(RULE), 'x.yaml');
    expect(rules.map((r) => [r.id, symbolsOf(r.enters!)])).toEqual([['one', ['?q', '?a', '?b', '?c']]]);
  });

  it.each([
    ['an unknown key', RULE.replace('why:', 'whi:'), ['unknown-key whi']],
    [
      'a key that belongs to another kind of rule',
      RULE.replace('field:', 'charge:'),
      ['unknown-key charge', 'missing-key -'],
    ],
    ['an unknown executor', RULE.replace('does: replace', 'does: replce'), ['unknown-executor replce']],
    ['an unbound letter', RULE.replace('becomes: ?c', 'becomes: ?e'), ['rule-unbound ?e - ?b^2/(4 ?a)']],
    ['a letter without its mark', RULE.replace('becomes: ?c', 'becomes: c'), ['rule-variable c - ?b^2/(4 ?a)']],
    ['the field in a result', RULE.replace('becomes: ?c', 'becomes: ?q'), ['rule-unbound ?q - ?b^2/(4 ?a)']],
    [
      'one letter twice',
      RULE.replace('?b ?q', '?a ?q'),
      ['rule-pattern ?a ?q^2 + ?a ?q + ?c', 'rule-unbound -?b/(2 ?a)', 'rule-unbound ?c - ?b^2/(4 ?a)'],
    ],
    ['an unknown condition', RULE.replace('nonzero ?a', 'nonzer ?a'), ['unknown-condition nonzer ?a']],
    ['a condition without its letter', RULE.replace('nonzero ?a', 'nonzero'), ['condition-arity nonzero']],
    ['a condition on an unbound letter', RULE.replace('nonzero ?a', 'nonzero ?d'), ['rule-unbound nonzero ?d']],
    ['a loss at an unbound letter', RULE.replace('where: ?a', 'where: ?d'), ['rule-unbound ?d']],
    ['no example', RULE.replace(/yes: .*/, 'yes: []'), ['missing-key []']],
    ['an example without its result', RULE.replace(', out: "0"', ''), ['missing-key {']],
    ['a bad id', RULE.replace('id: one', 'id: One'), ['bad-rule-id One']],
    ['an id twice', RULE + RULE, ['duplicate-rule one']],
  ])('refuses %s', (_, rules, wanted) => {
    expect(faults(file(rules)).map((f) => f.trim())).toEqual(expect.arrayContaining(wanted.slice(0, 1)));
  });

  it('refuses another version', () => {
    expect(faults(file(RULE).replace('auxiliary: 1', 'auxiliary: 2'))).toEqual(['bad-version 2']);
  });
});

describe('ruleById', () => {
  it('finds a bundled rule, and names one that is not there', () => {
    expect(ruleById('gaussian-field').does).toBe('replace');
    expect(() => ruleById('gauss')).toThrow('there is no rule gauss');
  });
});
