/** The `isotropy` of a geometry file: planes of rotations and sets of reversed axes, as digits of frame indices. */
import { type Diagnostic, errorAt } from '../notation/diagnostics.js';
import { asList, asRecord, asText } from '../notation/yaml-shape.js';
import type { YamlNode } from '../notation/yaml-source.js';
import type { Isotropy } from './invariant-components.js';

/** Without the key nothing but the identity is known to leave the geometry unchanged. */
export const NO_ISOTROPY: Isotropy = { rotations: [], reversals: [] };

/** Reports `geometry-isotropy`. */
export function readIsotropy(node: YamlNode | undefined, problems: Diagnostic[]): Isotropy {
  if (!node) return NO_ISOTROPY;
  const record = asRecord(node, 'isotropy', { required: [], optional: ['rotations', 'reversals'] }, problems);
  const axesOf = (item: YamlNode, least: number, most: number): number[] => {
    const words = (asText(item, 'axes', problems)?.text.trim() ?? '').split(/\s+/);
    const axes = words.map(Number);
    if (words.length < least || words.length > most || words.some((w) => !/^[0-3]$/.test(w)) || hasTwins(axes))
      problems.push(
        errorAt(
          item.origin,
          'geometry-isotropy',
          `"${words.join(' ')}" are no frame axes`,
          'write "1 2", each axis once',
        ),
      );
    return axes;
  };
  const items = (key: string): readonly YamlNode[] => {
    const list = record.get(key);
    return list === undefined ? [] : (asList(list, key, problems)?.items ?? []);
  };
  return {
    rotations: items('rotations').map((item) => axesOf(item, 2, 2) as unknown as readonly [number, number]),
    reversals: items('reversals').map((item) => axesOf(item, 1, 4)),
  };
}

const hasTwins = (axes: readonly number[]): boolean => new Set(axes).size < axes.length;
