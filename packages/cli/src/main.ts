/**
 * Puts the commands together, runs one, and turns whatever goes wrong into one line and an exit code.
 * @module
 */
import { Command, CommanderError } from 'commander';
import { addCheck } from './commands/check.js';
import { addCompare } from './commands/compare.js';
import { addCurrents } from './commands/currents.js';
import { addFit } from './commands/fit.js';
import { addLevels } from './commands/levels.js';
import { addPredict } from './commands/predict.js';
import { addReport } from './commands/report.js';
import { addTable } from './commands/table.js';
import { addWindows } from './commands/windows.js';
import { failureOf } from './failure.js';
import { overview } from './help.js';
import { jsonText } from './printable.js';
import { print, remark } from './terminal.js';
import { ownVersion } from './version.js';

function makeProgram(settle: (exit: number) => void): Command {
  const program = new Command('staithe');
  program
    .exitOverride()
    .configureOutput({ writeErr: () => undefined, writeOut: (text) => process.stdout.write(text) })
    .version(ownVersion(), '--version')
    .helpCommand(false)
    .configureHelp({ formatHelp: () => overview(program) });
  for (const add of [
    addCheck,
    addFit,
    addCurrents,
    addPredict,
    addTable,
    addLevels,
    addWindows,
    addCompare,
    addReport,
  ]) {
    add(program, settle);
  }
  return program;
}

/** Help and version are no failures. */
function isAnswer(error: unknown): boolean {
  return error instanceof CommanderError && error.exitCode === 0;
}

/**
 * Runs the command line.
 *
 * @param args - What stands after the command's name.
 * @returns The exit code: 0 done, 1 the data say no, 2 wrong call.
 */
export async function main(args: readonly string[]): Promise<number> {
  let exit = 0;
  // A reader that has seen enough (`| head`) closes the pipe; that ends the work and is no failure.
  process.stdout.on('error', (error: NodeJS.ErrnoException) => {
    process.exit(error.code === 'EPIPE' ? exit : 1);
  });
  try {
    const program = makeProgram((code) => {
      exit = code;
    });
    if (args.length === 0) {
      remark(overview(program).trimEnd());
      return 2;
    }
    await program.parseAsync(args, { from: 'user' });
    return exit;
  } catch (error) {
    if (isAnswer(error)) return 0;
    const { exit: code, ...failure } = failureOf(error);
    if (args.includes('--json')) await print(jsonText({ error: failure }));
    remark(failure.message);
    return code;
  }
}
