/** The commands that work on Lagrangians without components: simplify, translate, invariants. */
import { type Command, Option } from 'commander';
import type { Io } from './io.js';

const collect = (value: string, previous: string[]): string[] => [...previous, value];
const THEORY = ['<theory>', 'theory file (YAML), or - for standard input'] as const;
const SET = ['--set <relation>', 'impose one more relation; may be repeated', collect, [] as string[]] as const;
const noColor = (): Option => new Option('--no-color', 'no terminal colours');

/** Adds the commands to the program; `finished` is told the exit code of the one that ran. */
export function addLagrangianCommands(program: Command, io: Io, finished: (code: number) => void): void {
  program
    .command('simplify')
    .description('a Lagrangian in its simplest form: canonical products, identities special to four dimensions')
    .argument(...THEORY)
    .option(...SET)
    .option('--modulo-boundary', 'drop total derivatives: Gauss-Bonnet, Pontryagin, Nieh-Yan')
    .option('--torsion-free', 'use what holds when the torsion vanishes')
    .option('--rules <file>', 'apply the rules of this file first (docs/rules.md)')
    .option('--explain', 'print every step with its rule and reason')
    .option('--latex', 'print LaTeX')
    .option('--json', 'print JSON, with the steps')
    .addOption(noColor())
    .action(async (theory: string, options) => {
      const { simplifyCommand } = await import('./simplify-command.js');
      finished(await simplifyCommand(theory, options, io));
    });
  program
    .command('translate')
    .description('the couplings of a theory in another basis of invariants, and the theory rewritten')
    .argument(...THEORY)
    .requiredOption('--to <basis>', 'a coupling basis: its name, or a file (docs/rules.md)')
    .option('--modulo-boundary', 'drop total derivatives')
    .option('--write <file>', 'write the theory rewritten in the basis to this file, or - for standard output')
    .option('--latex', 'print the dictionary as a LaTeX array')
    .option('--json', 'print the dictionary as JSON')
    .option('--force', 'replace a file that exists')
    .addOption(noColor())
    .action(async (theory: string, options) => {
      const { translateCommand } = await import('./translate-command.js');
      finished(await translateCommand(theory, options, io));
    });
  program
    .command('invariants')
    .description('all independent scalars of a given content of torsion and curvature')
    .option('--torsion <n>', 'number of torsions', '0')
    .option('--curvature <n>', 'number of curvatures', '0')
    .option('--parity <parity>', 'even, odd or both', 'both')
    .option('--relations', 'also print how the other products depend on them')
    .option('--json', 'print JSON')
    .addOption(noColor())
    .action(async (options) => {
      const { invariantsCommand } = await import('./invariants-command.js');
      finished(invariantsCommand(options, io));
    });
}
