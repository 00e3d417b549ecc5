/**
 * Help says what you have, what you ask, what you get, and one line to try.
 * @module
 */
import { type Command, Option } from 'commander';

/** The help of one command. */
export interface HelpText {
  /** The question it answers. */
  readonly question: string;
  readonly have: string;
  readonly ask: string;
  readonly get: string;
  readonly example: string;
}

const TERM = 30; // characters

function optionLines(command: Command): string[] {
  return command.options.map((option) => {
    const flags = option.flags.replace(/[<>]/g, '').padEnd(TERM);
    const gap = flags.endsWith(' ') ? '' : `\n${' '.repeat(TERM + 2)}`;
    return `  ${flags}${gap}${option.description}`;
  });
}

/** Gives a command its help. */
export function withHelp(command: Command, text: HelpText): Command {
  const help = new Option('-h, --help', 'this text');
  return command
    .description(text.question)
    .addHelpOption(help)
    .configureHelp({
      formatHelp: () =>
        [
          `staithe ${command.name()}: ${text.question}`,
          `  you have   ${text.have}`,
          `  you ask    ${text.ask}`,
          `  you get    ${text.get}`,
          `  try        ${text.example}`,
          '',
          ...optionLines(command),
          `  ${help.flags.padEnd(TERM)}${help.description}`,
          '',
        ].join('\n'),
    });
}

/** The help of the whole: a question for each command. */
export function overview(program: Command): string {
  const commands = program.commands.map(
    (command) => `  ${command.name().padEnd(10)} ${command.description()}`,
  );
  return [
    'staithe: from a record of water levels to numbers a person can stand behind',
    '  you have   a record of heights or currents as CSV, or constants.json',
    '  you ask    one of the questions below; - instead of a file reads standard input',
    '  you get    rows for people, --json for programs; exit code 0 done, 1 the data say no, 2 wrong call',
    '  try        staithe fit quenby.csv --place "Quenby Haven" --write quenby.constants.json',
    '',
    ...commands,
    '',
    '  staithe COMMAND --help        what a command takes',
    '  staithe --version             the version',
    '',
  ].join('\n');
}
