/**
 * The `constrain` of a theory file: tensor expressions, with free indices or none, that multipliers set to zero.
 */
import { type Diagnostic, errorAt, InputError } from './diagnostics.js';
import { MAX_SLOTS } from './limits.js';
import { freeSlots, readTensorExpression } from './tensor-expression.js';
import type { DeclaredTensor, TensorConstraint, TheorySymbol } from './theory.js';
import { asText } from './yaml-shape.js';
import type { YamlNode } from './yaml-source.js';
import { passageOf } from './yaml-text.js';

/**
 * The constraints in the order of the file, in the conventions of the file.
 * Reports faults of the expressions and `empty-constraint`, `constraint-indices`, `tensor-without-components`.
 */
export function readConstraints(
  node: YamlNode | undefined,
  symbols: readonly TheorySymbol[],
  tensors: readonly DeclaredTensor[],
  keep: (found: readonly Diagnostic[]) => void,
): readonly TensorConstraint[] {
  const problems: Diagnostic[] = [];
  const constraints: TensorConstraint[] = [];
  for (const item of node?.kind === 'list' ? node.items : node === undefined ? [] : [node]) {
    const text = asText(item, 'a constraint', problems);
    if (text === undefined) continue;
    const passage = passageOf(text);
    const origin = passage.locate(0, passage.text.length);
    const fault = (code: string, message: string, hint: string): void => {
      problems.push(errorAt(origin, code, message, hint));
    };
    try {
      const { terms } = readTensorExpression(passage, { symbols, tensors, allowFree: true });
      const [first] = terms;
      const declared = terms.flatMap((t) => t.factors).find((f) => tensors.some((d) => d.name === f.head));
      if (first === undefined) {
        fault('empty-constraint', 'the constraint is zero already', 'its terms cancel; leave it out');
        continue;
      }
      const free = freeSlots(first);
      if (declared !== undefined)
        fault(
          'tensor-without-components',
          `no geometry gives components to the declared tensor ${declared.head}`,
          'constrain torsion and curvature',
        );
      else if (free.length > MAX_SLOTS)
        fault(
          'constraint-indices',
          `the constraint has ${free.length} free indices; at most ${MAX_SLOTS} are read`,
          'contract some of them',
        );
      else constraints.push({ text: text.text.trim().replace(/\s+/g, ' '), terms, free, origin });
    } catch (error) {
      if (!(error instanceof InputError)) throw error;
      problems.push(...error.diagnostics);
    }
  }
  keep(problems);
  return constraints;
}
