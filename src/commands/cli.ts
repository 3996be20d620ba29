import { Command, CommanderError, InvalidArgumentError, Option } from 'commander';
import { printable, printableJson } from '../units/printable.ts';
import { VERSION } from '../version.ts';
import { EXIT } from './exit-codes.ts';
import { Failure, problemWithoutPlace } from './failure.ts';
import type { GasOptions } from './gas.ts';
import { wrap } from './layout.ts';
import type { ReportOptions } from './report.ts';
import type { SwarmOptions } from './swarm-request.ts';
import { processTerminal, type Terminal } from './terminal.ts';

/** The command line: arguments -> a command -> an exit code. What a command needs is loaded when it is called, so that `--help` answers at once. */
export async function start(argv: readonly string[]): Promise<void> {
  let outputFailed = false;
  for (const stream of [process.stdout, process.stderr]) {
    stream.on('error', (error: NodeJS.ErrnoException) => {
      // whoever reads the pipe has seen enough
      if (error.code === 'EPIPE' || outputFailed) return;
      outputFailed = true;
      process.exitCode = EXIT.file;
      if (stream === process.stdout) process.stderr.write(`gapwake: the output could not be written: ${error.code ?? 'unknown reason'}\n`);
    });
  }
  const code = await exitCodeOf(argv, processTerminal());
  if (!outputFailed) process.exitCode = code;
}

/** Runs the command that the arguments name, whatever it throws. */
export async function exitCodeOf(argv: readonly string[], terminal: Terminal): Promise<number> {
  try {
    return await dispatch(argv, terminal);
  } catch (thrown) {
    if (thrown instanceof Failure) return reportFailure(thrown, argv.includes('--json'), terminal);
    const message = thrown instanceof Error ? thrown.message : String(thrown);
    const trace = process.env.GAPWAKE_TRACE === '1' && thrown instanceof Error ? `\n${thrown.stack}` : '; GAPWAKE_TRACE=1 shows where';
    terminal.err(`gapwake: internal fault: ${printable(message.split('\n', 1)[0].slice(0, 200))}${trace}\n`);
    return EXIT.fault;
  }
}

function reportFailure(failure: Failure, json: boolean, terminal: Terminal): number {
  if (json) terminal.out(printableJson({ format: 'gapwake.problems/1', problems: failure.problems }));
  for (const line of failure.lines) terminal.err(`${wrap(line, terminal.errWidth, '', '    ').join('\n')}\n`);
  return failure.exitCode;
}

async function dispatch(argv: readonly string[], terminal: Terminal): Promise<number> {
  let exitCode: number = EXIT.done;
  const program = programOf(terminal, (code) => {
    exitCode = code;
  });
  if (argv.length === 0) {
    program.outputHelp();
    return EXIT.done;
  }
  try {
    await program.parseAsync(argv, { from: 'user' });
  } catch (thrown) {
    if (!(thrown instanceof CommanderError)) throw thrown;
    if (thrown.exitCode === 0) return EXIT.done; // help and version
    // `help` with a name that is no command
    const message = thrown.code === 'commander.help' ? `unknown command '${argv[argv.length - 1]}'` : thrown.message;
    throw usageFailure(message, helpFor(program, argv));
  }
  return exitCode;
}

function programOf(terminal: Terminal, done: (exitCode: number) => void): Command {
  const program = new Command('gapwake');
  // before the sub-commands, which take these settings over
  program
    .exitOverride()
    .showSuggestionAfterError(true)
    .configureOutput({
      writeOut: (text) => terminal.out(text),
      writeErr: () => undefined, // problems are reported in one place, as text or JSON
      getOutHelpWidth: () => terminal.width,
      getErrHelpWidth: () => terminal.width,
      getOutHasColors: () => false,
    });
  program
    .description('Does a gas gap hold this voltage, and if not, how long until it breaks down and\nwhat does the supply then feed into it?')
    .version(VERSION, '-V, --version', 'print the version')
    .helpOption('-h, --help', 'print this help')
    .helpCommand('help [command]', 'print help on a command')
    .addHelpText('after', EXAMPLES);

  program
    .command('check')
    .argument('[case]', 'case file (YAML)')
    .description('say what a case means, with every default used, and what theory predicts; simulate nothing')
    .addOption(setOption())
    .option('--json', 'one JSON object on stdout')
    .option('--quiet', 'print problems only')
    .option('--curve', 'with kinetic electrons: the breakdown curve by particles around the pressure of the case')
    .addOption(new Option('--template', 'print a commented case to start from').conflicts(['schema']))
    .option('--schema', 'print the JSON Schema of case files')
    .helpOption('-h, --help', 'print this help')
    .action(async (path: string | undefined, options: CheckOptions) => {
      if (path !== undefined && (options.template || options.schema))
        throw usageFailure('a case is not read with --template or --schema', 'check');
      if (path === undefined && !options.template && !options.schema) throw usageFailure("missing required argument 'case'", 'check');
      const { check, printSchema, printTemplate } = await import('./check.ts');
      if (options.template) printTemplate(terminal);
      else if (options.schema) printSchema(terminal);
      else await check(path ?? '', options, terminal);
      done(EXIT.done);
    });

  program
    .command('run')
    .argument('<case>', 'case file (YAML)')
    .description('simulate a case in time: does the gap hold, and what happens if it does not')
    .option('-o, --output <file.h5>', 'write the result; replaces an older result, nothing else')
    .addOption(setOption())
    .option('--json', 'one JSON object on stdout')
    .option('--quiet', 'print problems only')
    .addOption(new Option('--expect <verdict>', 'exit with 1 when the verdict differs').choices(['holds', 'breaks-down']))
    .helpOption('-h, --help', 'print this help')
    .action(async (path: string, options: RunOptions) => {
      const { run } = await import('./run.ts');
      done(await run(path, options, terminal));
    });

  program
    .command('scan')
    .argument('<case>', 'case file (YAML) with a scan')
    .description('every point of a scan, in parallel; goes on where it stopped')
    .option('-o, --output <file.h5>', 'the result (default: <case>.scan.h5 beside the case); replaces an older result, nothing else')
    .addOption(setOption())
    .option('--csv <file.csv>', 'also write the table of headlines; replaces an older such table, nothing else')
    .option('--json', 'one JSON object on stdout')
    .option('--quiet', 'print problems only')
    .addOption(new Option('--expect <verdict>', 'exit with 1 when a point has another verdict').choices(['holds', 'breaks-down']))
    .addOption(workersOption())
    .addOption(
      new Option('--plan', 'count the points, show the first, estimate the time; write nothing').conflicts([
        'restart',
        'expect',
        'csv',
        'output',
      ]),
    )
    .addOption(shardOption().conflicts(['gather']))
    .addOption(new Option('--gather <files.h5...>', 'join the files of all shards into the result').conflicts(['plan']))
    .option('--restart', 'forget what was computed, finished or not, and start anew')
    .helpOption('-h, --help', 'print this help')
    .action(async (path: string, options: ScanOptions) => {
      const { scan } = await import('./scan.ts');
      done(await scan(path, options, terminal));
    });

  program
    .command('window')
    .argument('<case>', 'case file (YAML) with a history')
    .description('follow the pressure in time: when the gap breaks down, what it holds, when turn-on holds')
    .option('-o, --output <file.h5>', 'the result (default: <case>.window.h5 beside the case); replaces an older result, nothing else')
    .addOption(setOption())
    .option('--csv <file.csv>', 'also write the table of the history; replaces an older such table, nothing else')
    .option('--json', 'one JSON object on stdout')
    .option('--quiet', 'print problems only')
    .addOption(
      new Option('--expect <verdict>', 'exit with 1 unless there is no window of breakdown, or is one').choices(['holds', 'breaks-down']),
    )
    .addOption(workersOption())
    .option('--restart', 'forget what was computed, finished or not, and start anew')
    .helpOption('-h, --help', 'print this help')
    .action(async (path: string, options: WindowOptions) => {
      const { window } = await import('./window.ts');
      done(await window(path, options, terminal));
    });

  program
    .command('report')
    .argument('<file.h5>', 'result of a run, a scan or a window')
    .description('one self-contained page with figures from a result file; needs no network')
    .option('-o, --output <file.html>', 'the page (default: beside the result); replaces an older page, nothing else')
    .option('--figures <folder>', 'also write every figure as SVG, and as PNG where rsvg-convert is installed')
    .option('--quiet', 'print problems only')
    .helpOption('-h, --help', 'print this help')
    .action(async (path: string, options: ReportOptions) => {
      const { report } = await import('./report.ts');
      await report(path, options, terminal);
      done(EXIT.done);
    });

  program
    .command('gas')
    .argument('[name...]', 'a built-in gas or cathode material')
    .description('the built-in data of gases and cathode materials: source, range, uncertainty')
    .option('--data <set>', 'another set of data of the gas')
    .addOption(new Option('--at <fields>', 'values at reduced fields, as in "10 Td, 100 Td"').conflicts(['csv']))
    .addOption(new Option('--csv', 'the curves as a table that gas.coefficients of a case reads').conflicts(['json']))
    .addOption(
      new Option('--figures <folder>', 'write the curves as SVG, and as PNG where rsvg-convert\nis installed').conflicts([
        'at',
        'csv',
        'json',
      ]),
    )
    .option('--json', 'one JSON object on stdout')
    .helpOption('-h, --help', 'print this help')
    .action(async (words: string[], options: GasOptions) => {
      const { gas } = await import('./gas.ts');
      await gas(words, options, terminal);
      done(EXIT.done);
    });

  program
    .command('swarm')
    .argument('[gas]', 'a gas with built-in cross-sections')
    .description('electrons as particles in a uniform field: drift, diffusion, ionisation, each\nwith its error, for a fluid model')
    .option('--at <fields>', 'reduced fields, as in "10 Td, 100 Td"')
    .option('--from <field>', 'the first of several, equally spaced in the logarithm')
    .option('--to <field>', 'the last of them')
    .addOption(countOption('--points <n>', 'how many', 2, 200).default(undefined, '10'))
    .option(
      '--cross-sections <file.csv>',
      'your own set, columns process, threshold [eV], energy [eV], cross_section [m^2], and name where kinds repeat',
    )
    .option('--mass <mass>', 'of a molecule of your own set, as in "4 u"')
    .option('--ejected-width <energy>', 'of ejected electrons of your own set (default: the threshold)')
    .addOption(new Option('--scattering <law>', 'directions after collisions').choices(['isotropic', 'screened-coulomb']))
    .option('--temperature <T>', 'of the gas (default: 293.15 K; models at rest)')
    .option('--accuracy <share>', 'standard error of energy and drift (default: 0.5 %)')
    .addOption(countOption('--seed <n>', 'of the random numbers', 0, Number.MAX_SAFE_INTEGER).default(undefined, '1'))
    .addOption(workersOption('batches'))
    .option('--csv <file.csv>', 'also write a table that gas.coefficients of a case reads')
    .option('--json', 'one JSON object on stdout')
    .option('--quiet', 'print problems only')
    .helpOption('-h, --help', 'print this help')
    .action(async (gas: string | undefined, options: SwarmOptions) => {
      const { swarm } = await import('./swarm.ts');
      done(await swarm(gas, options, terminal));
    });

  return program;
}

export interface CheckOptions {
  readonly set: readonly string[];
  readonly json?: boolean;
  readonly quiet?: boolean;
  readonly curve?: boolean;
  readonly template?: boolean;
  readonly schema?: boolean;
}

export interface RunOptions {
  readonly output?: string;
  readonly set: readonly string[];
  readonly json?: boolean;
  readonly quiet?: boolean;
  readonly expect?: 'holds' | 'breaks-down';
}

export interface ScanOptions {
  readonly output?: string;
  readonly set: readonly string[];
  readonly csv?: string;
  readonly json?: boolean;
  readonly quiet?: boolean;
  readonly expect?: 'holds' | 'breaks-down';
  readonly workers?: number;
  readonly plan?: boolean;
  readonly shard?: { readonly k: number; readonly n: number };
  readonly gather?: readonly string[];
  readonly restart?: boolean;
}

export interface WindowOptions {
  readonly output?: string;
  readonly set: readonly string[];
  readonly csv?: string;
  readonly json?: boolean;
  readonly quiet?: boolean;
  readonly expect?: 'holds' | 'breaks-down';
  readonly workers?: number;
  readonly restart?: boolean;
}

const MOST_WORKERS = 1024;
const MOST_SHARDS = 1_000_000;

function workersOption(what = 'points'): Option {
  return new Option('--workers <n>', `${what} computed at the same time`)
    .default(undefined, 'all cores')
    .argParser((text: string): number => {
      const workers = /^[0-9]{1,4}$/.test(text) ? Number(text) : 0;
      if (workers < 1 || workers > MOST_WORKERS) throw new InvalidArgumentError(`Expected a whole number from 1 to ${MOST_WORKERS}.`);
      return workers;
    });
}

function countOption(flags: string, description: string, least: number, most: number): Option {
  return new Option(flags, description).argParser((text: string): number => {
    const count = /^[0-9]{1,16}$/.test(text) ? Number(text) : Number.NaN;
    if (!(count >= least && count <= most)) throw new InvalidArgumentError(`Expected a whole number from ${least} to ${most}.`);
    return count;
  });
}

function shardOption(): Option {
  return new Option('--shard <k/n>', 'only the k-th of n equal shares, into <case>.scan.shard-k-of-n.h5').argParser((text: string) => {
    const [, k, n] = (/^([0-9]{1,7})\/([0-9]{1,7})$/.exec(text) ?? []).map(Number);
    if (k === undefined || n === undefined || k < 1 || k > n || n > MOST_SHARDS) {
      throw new InvalidArgumentError('Expected k/n with k from 1 to n, as in 3/8.');
    }
    return { k, n };
  });
}

function setOption(): Option {
  return new Option('--set <path=value>', 'change an entry, as in gas.pressure="2 Torr"; an empty value or null removes it; repeatable')
    .argParser((value: string, before: string[]) => [...before, value])
    .default([], 'none');
}

const EXAMPLES = `
Examples:
  gapwake check --template > gap.yaml     a case to start from
  gapwake check gap.yaml                  what it means and what theory expects
  gapwake run gap.yaml -o gap.h5          whether it holds, and what if not
  gapwake run gap.yaml --set supply.voltage.step="500 V" --expect holds
  gapwake scan gap.yaml --plan            how many points, how much time
  gapwake scan gap.yaml --csv gap.csv     all points; goes on after Ctrl-C
  gapwake window bay.yaml                 when it breaks down as the bay vents
  gapwake gas argon                       where the numbers for argon come from
  gapwake swarm argon --at "100 Td"       what its cross-sections lead to

Exit codes: 0 done, 1 --expect not met, 2 wrong input, 3 a simulation could not
be completed, 4 a file could not be read or written, 70 internal fault,
130 and 143 interrupted.`;

function usageFailure(message: string, command: string): Failure {
  const text = printable(message.replace(/^error: /, '').replace(/\s*\n\s*/g, ' ')).trim();
  const help = `gapwake ${command}`.trim();
  const nearest = /\(Did you mean (?:one of )?(.+)\?\)/.exec(text)?.[1] ?? null;
  return new Failure(
    EXIT.wrongInput,
    [`gapwake: ${text}`, `${help} --help shows what it takes.`],
    [problemWithoutPlace('usage', 'arguments', `what ${help} --help shows`, text, nearest)],
  );
}

/** the command whose help explains a usage error */
function helpFor(program: Command, argv: readonly string[]): string {
  const word = argv.find((argument) => !argument.startsWith('-'));
  return program.commands.some((command) => command.name() === word) ? (word ?? '') : '';
}
