/**
 * Shape checks on YAML nodes: the wanted kind of node, known and required keys. A fault is added to a list, with the place
 * of the node, and undefined returned, so that a reader can go on and report several faults at once.
 * Written by hand because a schema validator speaks of paths, not places, and drops keys such as `constructor`.
 */
import { type Diagnostic, errorAt } from './diagnostics.js';
import { nearest } from './suggest.js';
import type { YamlList, YamlMap, YamlNode, YamlText } from './yaml-source.js';

const KINDS = { text: 'a text', list: 'a list', map: 'a mapping' } as const;
const HINTS = { text: 'write one text', list: 'write a list: [x, y]', map: 'write key: value' } as const;

function wrongKind(node: YamlNode, what: string, wanted: keyof typeof KINDS, problems: Diagnostic[]): undefined {
  const empty = node.kind === 'text' && node.text.trim() === '';
  const is = empty ? 'is empty' : `is ${KINDS[node.kind]}`;
  const message = `${what} must be ${KINDS[wanted]} but ${is}`;
  problems.push(errorAt(node.origin, 'wrong-kind', message, HINTS[wanted]));
  return undefined;
}

/** The node as a text that is not blank; `what` names it in the error `wrong-kind`. */
export function asText(node: YamlNode, what: string, problems: Diagnostic[]): YamlText | undefined {
  if (node.kind !== 'text' || node.text.trim() === '') return wrongKind(node, what, 'text', problems);
  return node;
}

/** The node as a list. */
export function asList(node: YamlNode, what: string, problems: Diagnostic[]): YamlList | undefined {
  return node.kind === 'list' ? node : wrongKind(node, what, 'list', problems);
}

/** The node as a mapping with any keys. */
export function asMap(node: YamlNode, what: string, problems: Diagnostic[]): YamlMap | undefined {
  return node.kind === 'map' ? node : wrongKind(node, what, 'map', problems);
}

export interface KeySpec {
  readonly required: readonly string[];
  readonly optional?: readonly string[];
}

/**
 * The values of a mapping with a fixed set of keys. Adds `unknown-key` (with a suggestion) and `missing-key` to the
 * problems; the known keys that are there are returned all the same.
 */
export function asRecord(
  node: YamlNode,
  what: string,
  keys: KeySpec,
  problems: Diagnostic[],
): ReadonlyMap<string, YamlNode> {
  const values = new Map<string, YamlNode>();
  const map = asMap(node, what, problems);
  if (map === undefined) return values;
  const misspelt = new Set<string>();
  const known = [...keys.required, ...(keys.optional ?? [])];
  for (const [name, { key, value }] of map.entries) {
    if (known.includes(name)) {
      values.set(name, value);
      continue;
    }
    const near = nearest(name, known);
    if (near !== undefined) misspelt.add(near);
    const hint = near === undefined ? `the keys are ${known.join(', ')}` : `did you mean ${near}?`;
    problems.push(errorAt(key.origin, 'unknown-key', `${what} has no key ${name}`, hint));
  }
  for (const name of keys.required) {
    if (values.has(name) || misspelt.has(name)) continue;
    const start = map.origin.start;
    const place = { ...map.origin, end: Math.min(start + 1, map.origin.end) };
    problems.push(errorAt(place, 'missing-key', `${what} lacks the key ${name}`, `add a line ${name}: …`));
  }
  return values;
}
