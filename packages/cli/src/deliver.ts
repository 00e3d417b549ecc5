/**
 * How a command gives its result: JSON or text on standard output, a file where one was asked for.
 * @module
 */
import type { CommonOptions } from './options.js';
import { jsonText } from './printable.js';
import { print, remark, row } from './terminal.js';
import { checkTarget, writeWhole, type WriteRules } from './write-whole.js';

/** What a command has to give. */
export interface Result {
  /** Rows for people. */
  readonly text?: string;
  /** Said after the result, on standard error. */
  readonly caution?: string;
  /** The same for programs; made only when asked for. */
  readonly json: () => object;
  /** What `--write` writes, in pieces. */
  readonly file?: () => Iterable<string>;
}

/** Refuses a bad target before the long work begins. */
export async function checkOutput(
  options: CommonOptions,
  inputs: readonly (string | undefined)[],
): Promise<WriteRules> {
  const rules = {
    replace: options.replace === true,
    inputs: inputs.filter((input) => input !== undefined),
  };
  if (options.write !== undefined) await checkTarget(options.write, rules);
  return rules;
}

/** Gives a result. */
export async function deliver(
  result: Result,
  options: CommonOptions,
  rules: WriteRules,
): Promise<void> {
  const { write } = options;
  if (write !== undefined && result.file) await writeWhole(write, result.file(), rules);
  if (options.json) {
    await print(jsonText(result.json()));
    return;
  }
  if (result.text !== undefined) await print(result.text);
  else if (write === undefined && result.file) {
    for (const piece of result.file()) await print(piece);
  }
  if (write !== undefined) await print(row('wrote', write));
  if (result.caution !== undefined) remark(result.caution);
}
