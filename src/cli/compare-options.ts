/** The command `compare` and its options. */
import { type Command, Option } from 'commander';
import type { Io } from './io.js';

const collect = (value: string, previous: string[]): string[] => [...previous, value];

/** Adds the command to the program; `finished` is told its exit code. */
export function addCompareCommand(program: Command, io: Io, finished: (code: number) => void): void {
  program
    .command('compare')
    .description(
      'whether two theories have the same background equations, or whether printed equations follow from one',
    )
    .argument('<theory>', 'theory file (YAML), or - for standard input')
    .argument('[other]', 'a second theory on the same geometry')
    .option('--claim <equation>', 'test an equation, for instance "3 M^2 H^2 = rho"; may be repeated', collect, [])
    .option(
      '--where <definition>',
      'define a symbol of the claims, for instance "x = phi/H"; may be repeated',
      collect,
      [],
    )
    .option('--branch <relation>', 'look at these solutions only: "psi = 0" or "u != 0"; may be repeated', collect, [])
    .option('--any-matter', 'matter of any pressure instead of the fluids of the theory')
    .option(
      '--redefine <replacement>',
      'replace a field or constant of the first theory, for instance "phi = phi + psi"; may be repeated',
      collect,
      [],
    )
    .option('--set <relation>', 'impose a relation on the first theory; may be repeated', collect, [])
    .option('--json', 'print JSON, with the certificates')
    .addOption(new Option('--no-color', 'no terminal colours'))
    .action(async (theory: string, other: string | undefined, options) => {
      const { compareCommand } = await import('./compare-command.js');
      finished(await compareCommand(other === undefined ? [theory] : [theory, other], options, io));
    });
}
