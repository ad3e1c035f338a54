import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { basisNames, bundledBasis, readBasis } from '../../src/tensor/basis-file.js';
import { PREDICATES } from '../../src/tensor/conditions.js';
import { kindsWith, namesIn, ringOfNames, sumOf } from '../../src/tensor/lagrangian-sum.js';
import { applyRule, equalSums } from '../../src/tensor/rewrite.js';
import type { Example, Rule, RuleFile } from '../../src/tensor/rule.js';
import { readRuleFile } from '../../src/tensor/rule-file.js';
import { bundledRuleFiles } from '../../src/tensor/rule-library.js';
import { errorText } from '../notation/rendered.js';

const FILES = [...bundledRuleFiles('parts'), ...bundledRuleFiles('identities')];

/** Renames symbols and indices of an example to letters that the rule itself uses. */
function renamed(example: Example, rule: Rule): Example {
  const own = [...new Set(rule.left.flatMap((f) => f.slots.map((s) => s.name.replace('?', ''))))];
  const letters = [...own, ...'zyxwvutsrqponmlkjihgfedcba'].filter((c, i, all) => all.indexOf(c) === i);
  const indices = new Map<string, string>();
  const symbols = new Map<string, string>();
  const of = (map: Map<string, string>, name: string): string => {
    if (!map.has(name)) map.set(name, letters[map.size]!);
    return map.get(name)!;
  };
  const terms = (list: NonNullable<Example['output']>) =>
    list.map(({ scalar, factors }) => ({
      scalar: { ...scalar, powers: scalar.powers.map(([name, e]) => [of(symbols, name), e] as const) },
      factors: factors.map((f) => ({ ...f, slots: f.slots.map((s) => ({ ...s, name: of(indices, s.name) })) })),
    }));
  const input = terms(example.input);
  return {
    input,
    output: example.output && terms(example.output),
    given: example.given.map((fact) => fact.replace(/constant (.*)/, (_, name) => `constant ${of(symbols, name)}`)),
  };
}

/** What is wrong with an example; undefined when it does as it says. */
function fault(rule: Rule, example: Example, file: RuleFile): string | undefined {
  const kinds = kindsWith(file.tensors);
  const ring = ringOfNames([...namesIn(example.input), ...namesIn(example.output ?? [])]);
  const sum = sumOf(ring, example.input, kinds);
  const given = new Set(example.given);
  const results = sum.map((term) => applyRule(rule, term, kinds, given));
  if (!example.output) return results.some((r) => r) ? 'the rule applies' : undefined;
  if (!results.some((r) => r)) return 'the rule does not apply';
  const value = results.flatMap((r, i) => r ?? [sum[i]!]);
  return equalSums(value, sumOf(ring, example.output, kinds), kinds) ? undefined : 'the rule gives something else';
}

describe('examples of the bundled rules', () => {
  for (const file of FILES)
    for (const rule of file.rules)
      it(`${file.title}: ${rule.id}`, () => {
        expect(rule.yes.length > 0 && rule.no.length > 0).toBe(true);
        for (const example of [...rule.yes, ...rule.no]) {
          expect(
            fault(rule, example, file),
            JSON.stringify(example, (_, x) => (typeof x === 'bigint' ? `${x}` : x)),
          ).toBe(undefined);
          expect(fault(rule, renamed(example, rule), file), 'renamed').toBe(undefined);
        }
      });

  it('a spoiled example is noticed', () => {
    const [rule] = FILES[0]!.rules;
    const [yes] = rule!.yes;
    const [no] = rule!.no;
    expect(fault(rule!, { ...yes!, output: yes!.input }, FILES[0]!)).toBe('the rule gives something else');
    expect(fault(rule!, { ...yes!, output: undefined }, FILES[0]!)).toBe('the rule applies');
    expect(fault(rule!, { ...no!, output: no!.input }, FILES[0]!)).toBe('the rule does not apply');
  });

  it('every conditional rule has a fail-closed example', () => {
    for (const { rules } of FILES)
      for (const rule of rules.filter((r) => r.when.some((c) => c.predicate === 'modulo-boundary')))
        expect(
          rule.no.some((e) => e.given.length === 0),
          rule.id,
        ).toBe(true);
  });
});

describe('docs/rules.md', () => {
  const page = readFileSync(new URL('../../docs/rules.md', import.meta.url), 'utf8');
  const block = (begin: string): string => new RegExp(`\`\`\`yaml\n(${begin}[\\s\\S]*?)\`\`\``).exec(page)![1]!;

  it('shows a rule file whose examples hold', () => {
    const file = readRuleFile(block('untwist-rules: 1'), 'docs/rules.md');
    expect(file.rules).toHaveLength(2);
    for (const rule of file.rules)
      for (const example of [...rule.yes, ...rule.no]) {
        expect(fault(rule, example, file)).toBe(undefined);
        expect(fault(rule, renamed(example, rule), file)).toBe(undefined);
      }
  });

  it('lists the conditions with their meanings', () => {
    const rows = [...page.matchAll(/^\| `([a-z-]+)((?: \?[a-z])*)` \| (.*) \|$/gm)].filter((m) =>
      PREDICATES.has(m[1]!),
    );
    expect(rows.map((m) => [m[1], m[2]!.split('?').length - 1, m[3]])).toEqual(
      [...PREDICATES].map(([name, { arity, meaning }]) => [name, arity, meaning]),
    );
  });

  it('shows a basis, and lists the bundled ones with their sources', () => {
    expect(readBasis(block('untwist-basis: 1'), 'docs/rules.md').entries).toHaveLength(2);
    for (const name of basisNames()) expect(page).toContain(`| \`${name}\` |`);
    for (const name of basisNames()) expect(page).toContain(`| ${bundledBasis(name).source} |`);
  });
});

const HEAD = ['untwist-rules: 1', 'title: test', 'constants: [c1]', 'tensors: { S: { indices: 2 } }', 'rules:'];
const RULE: Readonly<Record<string, string>> = {
  id: 'turn',
  lhs: 'S_{?a?b}',
  rhs: 'S_{?b?a}',
  why: 'a test',
  source: 'none',
  yes: "[{ in: 'S_{ab}', out: 'S_{ba}' }]",
  no: '[{ in: R_ab }]'.replace('R_ab', "'R'"),
};
const withRule = (changes: Readonly<Record<string, string | undefined>>): string => {
  const entries = Object.entries({ ...RULE, ...changes }).filter(([, value]) => value !== undefined);
  return [...HEAD, ...entries.map(([key, value], i) => `${i === 0 ? '  - ' : '    '}${key}: ${value}`), ''].join('\n');
};
const errors = (changes: Readonly<Record<string, string | undefined>>): string =>
  errorText(() => readRuleFile(withRule(changes), 'own.yaml', new Map([['taken', 'rules/x.yaml']])));

describe('readRuleFile', () => {
  it('reads a good file', () => {
    const { title, constants, tensors, rules } = readRuleFile(withRule({}), 'own.yaml');
    expect([title, constants, tensors.map((t) => t.name)]).toEqual(['test', ['c1'], ['S']]);
    expect(rules.map((r) => [r.id, r.why, r.source, r.when])).toEqual([['turn', 'a test', 'none', []]]);
    expect(rules[0]!.left[0]!.slots.map((s) => s.name)).toEqual(['?a', '?b']);
  });

  it('puts the left side in canonical form and carries its coefficient to the right', () => {
    const { rules } = readRuleFile(withRule({ lhs: 'R^c{}_{?acS}'.replace('S', '?b'), rhs: 'S_{?a?b}' }), 'own.yaml');
    expect(rules[0]!.left).toMatchObject([{ head: 'R', slots: [{ name: '?a' }, { name: '?b' }] }]);
    const turned = readRuleFile(withRule({ lhs: 'R^c{}_{?a?bc}', rhs: 'S_{?a?b}' }), 'own.yaml').rules[0]!;
    expect(turned.right[0]!.coefficient).toEqual({ num: -1n, den: 1n });
    expect(turned.left[0]!.slots).toHaveLength(2);
  });

  const CASES: readonly (readonly [what: string, changes: Record<string, string | undefined>, message: RegExp])[] = [
    ['unknown key', { whem: '[]' }, /own\.yaml:13:5: error: a rule has no key whem[\s\S]*did you mean when\?/],
    ['no reason', { why: undefined }, /a rule lacks the key why/],
    ['no source', { source: undefined }, /lacks the key source/],
    ['no examples', { yes: undefined, no: undefined }, /lacks the key yes[\s\S]*lacks the key no/],
    ['empty examples', { yes: '[]' }, /own\.yaml:11:10: error: yes has no example/],
    ['example without result', { yes: "[{ in: 'S_{ab}' }]" }, /an example under yes lacks the key out/],
    ['result where none can be', { no: '[{ in: R, out: R }]' }, /an example under no has no key out/],
    ['bad id', { id: 'Turn it' }, /own\.yaml:6:9: error: "Turn it" is not an id/],
    ['id of another file', { id: 'taken' }, /there is a rule taken in rules\/x\.yaml already/],
    ['unbound variable', { rhs: 'S_{?b?c}' }, /own\.yaml:8:10: error: the variable \?c is not bound by the left side/],
    ['lost variable', { rhs: 'R' }, /a term of the right side lacks the variable \?a/],
    ['variable changes height', { rhs: 'S^{?b}{}_{?a}' }, /the variable \?b changes its height/],
    ['free plain letter', { lhs: 'S_{?a b}' }, /the free index b of a rule is no variable[\s\S]*write \?b/],
    [
      'contracted variable',
      { lhs: 'S_{?a?b} S^{?b}{}_{?c}' },
      /\?b is contracted with itself[\s\S]*write a plain letter: b/,
    ],
    ['sum on the left', { lhs: 'S_{?a?b} + S_{?b?a}' }, /the left side of a rule is one product/],
    ['number on the left', { lhs: '2 S_{?a?b}' }, /the left side of a rule is one product/],
    ['constant on the left', { lhs: 'c1 S_{?a?b}' }, /unknown symbol c1/],
    ['left side that vanishes', { lhs: 'R_{?a?b c}{}^c' }, /the left side vanishes by its symmetries/],
    ['two ε on the left', { lhs: '\\epsilon^{abcd} \\epsilon_{abce}', rhs: '0' }, /is no variable|is a sum/],
    ['wrong number of indices', { lhs: 'S_{?a?b?c}' }, /own\.yaml:7:10: error: S_\{\?a\?b\?c\} has 3 indices, S has 2/],
    ['unknown tensor', { lhs: 'Z_{?a?b}' }, /not a tensor|unknown/],
    ['unknown condition', { when: '[appart ?a ?b]' }, /there is no condition appart[\s\S]*did you mean apart\?/],
    ['condition without its variables', { when: '[apart ?a]' }, /apart takes 2 variables, not 1/],
    ['condition on nothing', { when: '[apart ?a ?c]' }, /\?c is not bound/],
    ['unknown fact', { no: '[{ in: R, given: [flat] }]' }, /"flat" is not a fact/],
    ['variable in an example', { no: "[{ in: 'S_{?a?b}' }]" }, /error/],
  ];
  it.each(CASES)('refuses %s', (_, changes, message) => {
    const text = errors(changes);
    expect(text).toMatch(message);
    expect(text).toMatch(/^own\.yaml:\d+:\d+: error: /);
  });

  it('refuses an id twice, a wrong version and an unknown key of the file', () => {
    const twice = `${withRule({})}${withRule({}).split('\n').slice(HEAD.length).join('\n')}`;
    expect(errorText(() => readRuleFile(twice, 'own.yaml'))).toMatch(/there is a rule turn in this file already/);
    const wrong = withRule({}).replace('untwist-rules: 1', 'untwist-rules: 2\nextra: x');
    const text = errorText(() => readRuleFile(wrong, 'own.yaml'));
    expect(text).toMatch(/not a version of rule files/);
    expect(text).toMatch(/a rule file has no key extra/);
  });
});
