/**
 * The command line: parses arguments, runs one command, renders whatever went wrong. Thin on purpose.
 */
import { Command, CommanderError, Option } from 'commander';
import { InputError, renderDiagnostic } from '../notation/diagnostics.js';
import { addCodeCommands } from './code-commands.js';
import { addCompareCommand } from './compare-options.js';
import { EXIT, type Io } from './io.js';
import { addLagrangianCommands } from './lagrangian-commands.js';

const collect = (value: string, previous: string[]): string[] => [...previous, value];

/** Runs the program with the words after its name. @returns the exit code. */
export async function main(args: readonly string[], world: Io): Promise<number> {
  const io = { ...world, color: world.color && !args.includes('--no-color') };
  let code: number = EXIT.done;
  const program = new Command('untwist')
    .description('Derives the cosmology of gravity with torsion from a Lagrangian in index notation.')
    .version('0.1.0')
    .exitOverride()
    .configureOutput({ writeOut: io.stdout, writeErr: io.stderr })
    .showHelpAfterError('(untwist --help lists the commands)');
  program
    .command('derive')
    .description('reduce a theory: field equations, scalar-tensor Lagrangian, LaTeX, TypeScript, JSON and a report')
    .argument('<theory>', 'theory file (YAML), or - for standard input')
    .option('--out <folder>', 'folder for the results (default: out/<name of the theory>)')
    .option(
      '--set <relation>',
      'impose one more relation, for instance b1=0 or "b1=-2*b3"; may be repeated',
      collect,
      [],
    )
    .option(
      '--assume <inequality>',
      'take an inequality between constants for true, for instance "a4 > 0"',
      collect,
      [],
    )
    .option('--variables <pair>', 'variables of the printed equations: phi,psi (default), u,v (torsion) or h,f')
    .option('--factor', 'also print the functions of the scalar-tensor form in factors')
    .addOption(
      new Option('--frame <name>', 'also put the scalar-tensor form into another conformal frame').choices([
        'einstein',
      ]),
    )
    .option('--omega <Omega^2>', 'the same with a conformal factor of your own, for instance "1 + phi^2/M^2"')
    .option('--canonical', 'also look for canonical fields, where a kinetic term decouples')
    .option('--order <n>', 'order in the field of series where a canonical field has no closed form (default: 6)')
    .option(
      '--linearise <scalar>',
      'make powers of a scalar linear by an auxiliary field and integrate the connection out: R, or curvature for every component',
      collect,
      [],
    )
    .option('--integrate <fields>', 'fields to integrate out, in order, for instance psi,phi (default: the connection)')
    .option('--covariant', 'also derive the field equations in index notation')
    .option('--momenta', 'the same with the field momenta kept as symbols')
    .option('--every-k', 'the form for every spatial curvature in the JSON too')
    .option('--explain', 'also print which rules were applied and why each step is allowed')
    .option('--conventions <name>', 'also write the Lagrangian in these conventions: a preset or a file')
    .option('--json', 'print the JSON alone and write no file')
    .option('--force', 'replace files that exist')
    .addOption(new Option('--no-color', 'no terminal colours'))
    .action(async (theory: string, options) => {
      const { deriveCommand } = await import('./derive-command.js');
      code = await deriveCommand(theory, options, io);
    });
  const finished = (exit: number): void => {
    code = exit;
  };
  addLagrangianCommands(program, io, finished);
  addCodeCommands(program, io, finished);
  addCompareCommand(program, io, finished);
  try {
    await program.parseAsync([...args], { from: 'user' });
    return code;
  } catch (error) {
    if (error instanceof CommanderError) return error.exitCode === 0 ? EXIT.done : EXIT.input;
    if (error instanceof InputError) {
      for (const d of error.diagnostics) io.stderr(`${renderDiagnostic(d, { color: io.color })}\n`);
      return EXIT.input;
    }
    const detail = error instanceof Error ? (error.stack ?? error.message) : String(error);
    io.stderr(`error: untwist itself is at fault; no result was written\n${detail}\n`);
    return EXIT.fault;
  }
}
