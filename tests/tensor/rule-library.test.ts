import { describe, expect, it } from 'vitest';
import {
  bundledIds,
  bundledRules,
  bundledTexts,
  type RuleFolder,
  readManifest,
} from '../../src/tensor/rule-library.js';
import { errorText } from '../notation/rendered.js';

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

  it('are read from the files of the manifest', () => {
    expect(bundledTexts('parts').map((t) => t.file)).toEqual([
      'rules/parts/torsion.yaml',
      'rules/parts/curvature.yaml',
    ]);
  });
});
