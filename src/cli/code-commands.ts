/** The commands that write programs: emit. */
import { type Command, Option } from 'commander';
import type { Io } from './io.js';

const collect = (value: string, previous: string[]): string[] => [...previous, value];

/** Adds the commands to the program; `finished` is told the exit code of the one that ran. */
export function addCodeCommands(program: Command, io: Io, finished: (code: number) => void): void {
  program
    .command('emit')
    .description('the equations of a theory as functions in a programming language, for solvers')
    .argument('<theory>', 'theory file (YAML), or - for standard input')
    .requiredOption('--to <language>', 'typescript, javascript, c, fortran, python or julia')
    .option('--out <file>', 'write the code to this file, or - for standard output (default)')
    .option('--example', 'also write a program beside the file that calls every function')
    .option('--no-jacobian', 'leave out the derivatives of the residuals')
    .option('--set <relation>', 'impose one more relation; may be repeated', collect, [])
    .option('--force', 'replace files that exist')
    .addOption(new Option('--no-color', 'no terminal colours'))
    .action(async (theory: string, options) => {
      const { emitCommand } = await import('./emit-command.js');
      finished(await emitCommand(theory, options, io));
    });
}
