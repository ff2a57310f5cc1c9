/** The command line. Verbs load on demand, so that each starts as fast as what it needs. */
import { Command, CommanderError, Option, type OptionValues } from 'commander';
import { version } from '../../package.json';
import { EXIT, type ExitCode, UsageError } from './exit.ts';
import { angleList, notNegative, positive, shareBelowOne, wholeNumber } from './optionValues.ts';

const FILE_HELP = 'arm file (*.arm.json), or - for standard input';

const STRICT_HELP = 'exit code 1 also where something could not be assessed against a limit';

const BEARINGS_HELP = "CSV table of your own bearings: those that the arm names are taken from it, before the file's";

const collect = (name: string, before: readonly string[] = []): readonly string[] => [...before, name];

function buildProgram(end: (code: ExitCode) => void): Command {
  const program = new Command('armload')
    .description(
      'What the bearings of a serial arm must carry, in which pose. Reads an arm file: joints with their bearings, links, load cases.',
    )
    .version(version)
    .helpCommand(false)
    .configureHelp({ showGlobalOptions: false })
    .exitOverride()
    .configureOutput({
      outputError: (text, write) =>
        write(
          `armload: ${text
            .replace(/^error: /, '')
            .trim()
            .replaceAll(/\s*\n\s*/g, ' ')}\n`,
        ),
    })
    .addHelpText(
      'after',
      `
Examples:
  armload check models/picking-arm.arm.json
  armload pose models/picking-arm.arm.json --at=0,30,-60,0,45
  armload sweep models/picking-arm.arm.json --samples 5
  armload worst models/swing-joint.arm.json
  armload compare models/picking-arm.arm.json --joint elbow --step 30

Angles are degrees, one for each revolute joint from the ground to the tip. "armload <verb> --help" tells more.
Exit codes: 0 all well; 1 a check is over its limit (with --strict also: not assessed); 2 the file is not valid;
3 wrong usage or internal error; 130 interrupted.

A design aid: results are to be checked by a competent engineer.`,
    );
  const verb = (
    name: string,
    about: string,
    run: (file: string, options: OptionValues) => Promise<ExitCode>,
    example: string,
  ) =>
    program
      .command(name)
      .description(about)
      .argument('<file>', FILE_HELP)
      .option('--json', 'one JSON document on standard output instead of tables')
      .action(async (file: string, options: OptionValues) => end(await run(file, options)))
      .addHelpText('after', `\nExample:\n  ${example}`);

  verb(
    'pose',
    'Joint loads and bearing loads at one pose.',
    async (file, options) => (await import('./pose.ts')).pose(file, options as never),
    'armload pose models/picking-arm.arm.json --at=0,30,-60,0,45 --case "carry a crate"',
  )
    .requiredOption('--at <angles>', 'joint angles in degrees, from the ground to the tip, such as -10,20', angleList)
    .option('--case <name>', 'only this load case; may be given again', collect)
    .option('--bearings <file>', BEARINGS_HELP)
    .option('--strict', STRICT_HELP);

  const overGrid = (command: Command, otherwise: string) =>
    command
      .option(
        '--step <degrees>',
        'largest step of the grid; each travel is divided evenly, both ends included',
        positive,
      )
      .option(
        '--samples <count>',
        `samples of each joint in place of a step (default: ${otherwise})`,
        wholeNumber(2, 1e6),
      )
      .option('--case <name>', 'only this load case; may be given again', collect)
      .option('--bearings <file>', BEARINGS_HELP)
      .option('--workers <count>', 'threads; the result is the same for any number', wholeNumber(1, 64));
  const withProof = (command: Command) =>
    command
      .option(
        '--gap <share>',
        'gap between bound and found to be closed, a share of the bound (default: 0.001)',
        shareBelowOne,
      )
      .option(
        '--seconds <time>',
        'time for the search, s; the best so far is kept (default: 30). Life, fatigue and play take their own',
        positive,
      );

  overGrid(
    verb(
      'sweep',
      'The worst load of every bearing over a grid of poses, with its pose and case.',
      async (file, options) => (await import('./sweep.ts')).sweep(file, options),
      'armload sweep models/picking-arm.arm.json --step 45\n  armload sweep models/two-link.arm.json --samples 20 --each-case --json',
    ),
    '9',
  )
    .option('--each-case', 'the worst case by case instead of over all cases')
    .option('--strict', STRICT_HELP);

  withProof(
    verb(
      'worst',
      'The certified worst pose of every check: attained values, and bounds that nothing within travel exceeds.',
      async (file, options) => (await import('./worst.ts')).worst(file, options),
      'armload worst models/swing-joint.arm.json\n  armload worst models/two-link.arm.json --gap 0.01 --seconds 3',
    ),
  )
    .option('--case <name>', 'only this load case; may be given again', collect)
    .option('--bearings <file>', BEARINGS_HELP)
    .option('--each-case', 'the worst case by case instead of over all cases')
    .option('--strict', STRICT_HELP)
    .option('--workers <count>', 'threads', wholeNumber(1, 64));

  overGrid(
    withProof(
      verb(
        'compare',
        'One joint on a clevis and on a cantilever, its link and hub plane as they are.',
        async (file, options) => (await import('./compare.ts')).compare(file, options as never),
        'armload compare models/picking-arm.arm.json --joint elbow --step 30\n  armload compare models/two-link.arm.json --joint elbow --overhang 20 --seconds 3',
      ),
    ),
    'no grid; the whole travel by proof',
  )
    .requiredOption('--joint <name>', 'the joint to compare')
    .option('--clevis-span <mm>', 'distance between the bearings of the clevis (default: as in the file)', positive)
    .option('--cantilever-span <mm>', 'the same of the cantilever', positive)
    .option('--overhang <mm>', 'from the hub plane to the near bearing of the cantilever', notNegative)
    .addOption(new Option('--side <side>', 'side of the cantilever, along the axis or against it').choices(['+', '-']));

  verb(
    'check',
    'Reads the file and lists its problems, or says it is sound.',
    async (file, options) => (await import('./check.ts')).check(file, options),
    'armload check models/picking-arm.arm.json',
  );
  return program;
}

function fail(error: unknown): ExitCode {
  if (error instanceof CommanderError) return error.exitCode === 0 ? EXIT.pass : EXIT.usage;
  const { name, message } = error instanceof Error ? error : { name: '', message: String(error) };
  if (name === 'FileProblems') return EXIT.invalidFile;
  const text = message.replaceAll(/\s*\n\s*/g, ' ');
  process.stderr.write(error instanceof UsageError ? `armload: ${text}\n` : `armload: internal error: ${text}\n`);
  return EXIT.usage;
}

/** A reader that has seen enough (`| head`) closes the pipe: that is no error. */
function endQuietlyOnClosedPipe(): void {
  for (const stream of [process.stdout, process.stderr]) {
    stream.on('error', (error: NodeJS.ErrnoException) => {
      process.exit(error.code === 'EPIPE' ? (process.exitCode ?? EXIT.pass) : EXIT.usage);
    });
  }
}

async function main(): Promise<void> {
  endQuietlyOnClosedPipe();
  try {
    await buildProgram((code) => {
      process.exitCode = code;
    }).parseAsync();
  } catch (error) {
    process.exitCode = fail(error);
  }
}

void main();
