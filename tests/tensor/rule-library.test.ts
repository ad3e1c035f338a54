import { describe, expect, it } from 'vitest';
import { freeSlots } from '../../src/notation/tensor-expression.js';
import { kindTable } from '../../src/tensor/kinds.js';
import { namesIn, ringOfNames, tensorTerms } from '../../src/tensor/lagrangian-sum.js';
import { neverFired } from '../../src/tensor/rewrite.js';
import {
  bundledIds,
  bundledRules,
  bundledTexts,
  type RuleFolder,
  readManifest,
} from '../../src/tensor/rule-library.js';
import { simplify } from '../../src/tensor/simplify.js';
import { errorText } from '../notation/rendered.js';
import { PRIME, RandomTensors } from '../oracle/tensors.js';

const FILES: ReadonlyMap<RuleFolder, readonly string[]> = new Map([
  ['parts', ['a.yaml', 'b.yaml']],
  ['identities', ['c.yaml']],
  ['bases', []],
]);
const manifest = (parts: string, identities = '[c.yaml]', head = '1'): string =>
  `untwist-manifest: ${head}\nparts: ${parts}\nidentities: ${identities}\nbases: []\n`;
const errors = (text: string): string => errorText(() => readManifest(text, 'manifest.yaml', FILES));

describe('the manifest', () => {
  it('keeps the order of the files', () => {
    expect(readManifest(manifest('[b.yaml, a.yaml]'), 'm', FILES).get('parts')).toEqual(['b.yaml', 'a.yaml']);
  });

  it.each([
    ['an orphan file', manifest('[a.yaml]'), /manifest\.yaml:2:8: error: parts\/b\.yaml is not listed/],
    ['a missing file', manifest('[a.yaml, b.yaml, z.yaml]'), /there is no file parts\/z\.yaml/],
    ['a file twice', manifest('[a.yaml, b.yaml, a.yaml]'), /a\.yaml is listed twice/],
    ['another version', manifest('[a.yaml, b.yaml]', '[c.yaml]', '2'), /not a version of manifests/],
    ['an unknown key', `${manifest('[a.yaml, b.yaml]')}more: []\n`, /the manifest of rules has no key more/],
    [
      'a missing folder',
      'untwist-manifest: 1\nparts: [a.yaml, b.yaml]\nbases: []\n',
      /lacks the key identities[\s\S]*c\.yaml is not listed/,
    ],
  ])('refuses %s', (_, text, message) => {
    expect(errors(text)).toMatch(message);
  });
});

describe('the bundled rules', () => {
  it('have one id each, which names its file', () => {
    const all = [...bundledRules('parts'), ...bundledRules('identities')];
    expect(bundledIds().size).toBe(all.length);
    for (const rule of all) expect(bundledIds().get(rule.id)).toMatch(/^rules\/(parts|identities)\/[a-z-]+\.yaml$/);
  });

  it('all apply in the whole pipeline: none is hidden by another', () => {
    const all = [...bundledRules('parts'), ...bundledRules('identities')];
    const kinds = kindTable();
    const steps = all.flatMap((rule) =>
      rule.yes
        .filter((e) => e.input.every((t) => freeSlots(t).length === 0))
        .flatMap((e) => {
          const terms = tensorTerms(ringOfNames(namesIn(e.input)), e.input);
          return simplify(terms, { kinds, given: new Set(e.given) }).steps;
        }),
    );
    expect(neverFired(all, steps).map((r) => r.id)).toEqual([]);
  });

  it('without torsion hold on random curvatures with exchange of pairs and cyclic identity', () => {
    /** ½(R_abcd + R_cdab) without its totally antisymmetric part, and no torsion. */
    class Metric extends RandomTensors {
      override component(head: string, at: readonly number[]): number {
        if (head === 'T') return 0;
        if (head !== 'R' || at.length !== 4) return super.component(head, at);
        const [a, b, c, d] = at as [number, number, number, number];
        const pairs = (...i: number[]): number =>
          super.component('R', i) +
          super.component(
            'R',
            [2, 3, 0, 1].map((n) => i[n]!),
          );
        // Six times the tensor, so that there is no division.
        return (((2 * pairs(a, b, c, d) - pairs(a, c, d, b) - pairs(a, d, b, c)) % PRIME) + PRIME) % PRIME;
      }
    }
    const rules = bundledRules('identities').filter((r) => r.when.some((c) => c.predicate === 'torsion-free'));
    expect(rules.length).toBeGreaterThan(4);
    for (const { id, left, right } of rules) {
      if (left.some((f) => f.slots.some((s) => s.name.startsWith('?')))) continue;
      const tensors = new Metric(17, 4);
      const total = right.reduce(
        (sum, { coefficient, factors }) =>
          sum - (2 * Number(coefficient.num) * tensors.value(factors)) / Number(coefficient.den),
        2 * tensors.value(left),
      );
      expect(Math.abs(total) % PRIME, id).toBe(0);
    }
  });

  it('are read from the files of the manifest', () => {
    expect(bundledTexts('parts').map((t) => t.file)).toEqual([
      'rules/parts/torsion.yaml',
      'rules/parts/curvature.yaml',
    ]);
  });
});
