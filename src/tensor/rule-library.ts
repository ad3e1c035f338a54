/**
 * The bundled rule files: `rules/manifest.yaml` lists them in order, and order is priority. A file of these folders that the
 * manifest does not list is a fault, so that no rule is forgotten.
 */
import { readdirSync, readFileSync } from 'node:fs';
import { type Diagnostic, errorAt, InputError } from '../notation/diagnostics.js';
import { asList, asRecord, asText } from '../notation/yaml-shape.js';
import { readYaml } from '../notation/yaml-source.js';
import type { Rule, RuleFile } from './rule.js';
import { readRuleFile } from './rule-file.js';

const RULES_FOLDER = new URL('../../rules/', import.meta.url);
const KEYS = { required: ['untwist-manifest', 'parts', 'identities', 'bases'] };
export type RuleFolder = 'parts' | 'identities' | 'bases';
const FOLDERS: readonly RuleFolder[] = ['parts', 'identities', 'bases'];

export type Manifest = ReadonlyMap<RuleFolder, readonly string[]>;

/**
 * The names in a manifest, by folder.
 * @param files what lies in each folder.
 * @throws InputError for a file that is missing, not listed, or listed twice.
 */
export function readManifest(text: string, file: string, files: ReadonlyMap<RuleFolder, readonly string[]>): Manifest {
  const problems: Diagnostic[] = [];
  const root = readYaml(text, file);
  const values = asRecord(root, 'the manifest of rules', KEYS, problems);
  const version = values.get('untwist-manifest');
  if (version && asText(version, 'untwist-manifest', problems)?.text.trim() !== '1')
    problems.push(
      errorAt(version.origin, 'bad-version', 'this is not a version of manifests', 'write untwist-manifest: 1'),
    );
  const manifest = new Map<RuleFolder, string[]>();
  for (const folder of FOLDERS) {
    const node = values.get(folder);
    const listed = (node && asList(node, folder, problems)?.items) ?? [];
    const texts = listed.map((item) => asText(item, 'a file name', problems)).filter((t) => t !== undefined);
    const names = texts.map((t) => t.text.trim());
    const there = files.get(folder) ?? [];
    texts.forEach((t, i) => {
      if (names.indexOf(names[i]!) < i)
        problems.push(errorAt(t.origin, 'manifest-twice', `${names[i]} is listed twice`, 'keep one'));
      else if (!there.includes(names[i]!))
        problems.push(
          errorAt(t.origin, 'manifest-missing', `there is no file ${folder}/${names[i]}`, 'remove the line'),
        );
    });
    for (const name of there.filter((n) => !names.includes(n)))
      problems.push(
        errorAt((node ?? root).origin, 'manifest-orphan', `${folder}/${name} is not listed`, 'list it, or remove it'),
      );
    manifest.set(folder, names);
  }
  if (problems.length > 0) throw new InputError(problems);
  return manifest;
}

let manifest: Manifest | undefined;
function bundledManifest(): Manifest {
  if (manifest) return manifest;
  const files = new Map(
    FOLDERS.map((folder) => [
      folder,
      readdirSync(new URL(`${folder}/`, RULES_FOLDER)).filter((name) => name.endsWith('.yaml')),
    ]),
  );
  manifest = readManifest(readFileSync(new URL('manifest.yaml', RULES_FOLDER), 'utf8'), 'rules/manifest.yaml', files);
  return manifest;
}

/** Path and text of every bundled file of a folder, in the order of the manifest. */
export const bundledTexts = (folder: RuleFolder): { readonly file: string; readonly text: string }[] =>
  bundledManifest()
    .get(folder)!
    .map((name) => ({
      file: `rules/${folder}/${name}`,
      text: readFileSync(new URL(`${folder}/${name}`, RULES_FOLDER), 'utf8'),
    }));

let loaded: ReadonlyMap<'parts' | 'identities', readonly RuleFile[]> | undefined;

/** The bundled rule files of a folder. Ids are unique over all of them. */
export function bundledRuleFiles(folder: 'parts' | 'identities'): readonly RuleFile[] {
  if (!loaded) {
    const ids = new Map<string, string>();
    const read = (of: 'parts' | 'identities'): RuleFile[] =>
      bundledTexts(of).map(({ file, text }) => {
        const rules = readRuleFile(text, file, ids);
        for (const rule of rules.rules) ids.set(rule.id, file);
        return rules;
      });
    loaded = new Map([
      ['parts', read('parts')],
      ['identities', read('identities')],
    ]);
  }
  return loaded.get(folder)!;
}

/** The bundled rules of a folder, in order of priority. */
export const bundledRules = (folder: 'parts' | 'identities'): readonly Rule[] =>
  bundledRuleFiles(folder).flatMap((f) => f.rules);

/** Ids of all bundled rules with their files: a user's rules must have others. */
export const bundledIds = (): ReadonlyMap<string, string> =>
  new Map(
    (['parts', 'identities'] as const).flatMap((folder) =>
      bundledRules(folder).map((r) => [r.id, r.origin.file] as const),
    ),
  );
