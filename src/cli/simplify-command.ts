/** `untwist simplify`: the Lagrangian of a theory in its simplest form. */
import { renderDiagnostic } from '../notation/diagnostics.js';
import { kindsWith } from '../tensor/lagrangian-sum.js';
import { printSum, sumLines } from '../tensor/print-sum.js';
import { neverFired } from '../tensor/rewrite.js';
import type { RuleFile } from '../tensor/rule.js';
import { readRuleFile } from '../tensor/rule-file.js';
import { bundledIds } from '../tensor/rule-library.js';
import { simplify, simplifyWarnings } from '../tensor/simplify.js';
import { EXIT, type Io } from './io.js';
import { lagrangianInput, userFault } from './lagrangian-input.js';
import { printSteps, stepsJson } from './print-steps.js';
import { readInput } from './read-input.js';

export interface SimplifyOptions {
  readonly set: readonly string[];
  readonly moduloBoundary?: boolean;
  readonly torsionFree?: boolean;
  readonly rules?: string;
  readonly explain?: boolean;
  readonly latex?: boolean;
  readonly json?: boolean;
}

/** @returns the exit code: 0 only when no rule applies any more. @throws InputError. */
export async function simplifyCommand(path: string, options: SimplifyOptions, io: Io): Promise<number> {
  const input = await lagrangianInput(path, options.set, io);
  const own = options.rules === undefined ? undefined : await userRules(options.rules, io);
  const given = new Set(input.facts);
  if (options.moduloBoundary) given.add('modulo-boundary');
  if (options.torsionFree) given.add('torsion-free');
  const tensors = [...input.theory.tensors];
  for (const tensor of own?.tensors ?? []) if (!tensors.some((t) => t.name === tensor.name)) tensors.push(tensor);
  const rules = own?.rules ?? [];
  const result = userFault(input.file, () => simplify(input.terms, { kinds: kindsWith(tensors), given, rules }));
  const style = input.style('unicode');
  for (const warning of simplifyWarnings(result))
    io.stderr(`${renderDiagnostic({ ...warning, file: input.file }, { color: io.color })}\n`);
  if (options.json) {
    const plain = input.style('plain');
    const json = {
      lagrangian: printSum(result.value, plain),
      latex: printSum(result.value, input.style('latex')),
      stop: result.stop,
      steps: stepsJson(result.steps, plain),
    };
    io.stdout(`${JSON.stringify(json, null, 2)}\n`);
  } else if (options.latex) io.stdout(`${sumLines(result.value, input.style('latex')).join('\n')}\n`);
  else {
    if (options.explain) io.stdout(`${printSteps(result.steps, style, io.color)}\n`);
    io.stdout(`${sumLines(result.value, style).join('\n')}\n`);
    const idle = neverFired(rules, result.steps);
    if (idle.length > 0) io.stderr(`rules that did not apply: ${idle.map((r) => r.id).join(', ')}\n`);
  }
  return result.stop === 'fixpoint' ? EXIT.done : EXIT.input;
}

/** A rule file of the user. @throws InputError. */
async function userRules(path: string, io: Io): Promise<RuleFile> {
  const { file, text } = await readInput(path, io);
  return readRuleFile(text, file, bundledIds());
}
