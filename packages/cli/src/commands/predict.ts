/**
 * staithe predict: how high is the water, and when does it turn?
 * @module
 */
import { DAY, formatInstant, MINUTE } from '@staithe/core';
import { type TideCurve, tideCurve } from '@staithe/predict';
import { caution, heightsCsv, turningPointsCsv } from '@staithe/report';
import { type Command, Option } from 'commander';
import { checkOutput, deliver } from '../deliver.js';
import { inFile } from '../failure.js';
import { withHelp } from '../help.js';
import { readConstants } from '../input.js';
import {
  type CommonOptions,
  durationOf,
  type ReadSpan,
  readSpan,
  type SpanOptions,
  withOutput,
  withSpan,
} from '../options.js';
import { placeJson, sayOf } from '../place.js';
import { remark, row } from '../terminal.js';

interface Options extends CommonOptions, SpanOptions {
  readonly every: number;
  readonly waters?: true;
}

const PIECE = 4096; // heights
const WATERS_PIECE = 366 * DAY;

/** Samples of [from, to). */
const samplesIn = ({ from, to }: ReadSpan, step: number): number => Math.ceil((to - from) / step);

function* heightRows(
  curve: TideCurve,
  span: ReadSpan,
  step: number,
): Generator<string, void, void> {
  const samples = samplesIn(span, step);
  for (let done = 0; done < samples; done += PIECE) {
    const count = Math.min(PIECE, samples - done);
    const csv = heightsCsv(curve.heights({ start: span.from + done * step, step, count }));
    yield done === 0 ? csv : csv.slice(csv.indexOf('\n') + 1);
  }
}

function* waterRows(curve: TideCurve, { from, to }: ReadSpan): Generator<string, void, void> {
  for (let start = from; start < to; start += WATERS_PIECE) {
    const csv = turningPointsCsv(
      curve.turningPoints({ from: start, to: Math.min(to, start + WATERS_PIECE) }),
    );
    yield start === from ? csv : csv.slice(csv.indexOf('\n') + 1);
  }
}

async function run(file: string, options: Options): Promise<number> {
  const span = readSpan(options, 7);
  const rules = await checkOutput(options, [file]);
  const constants = await readConstants(file);
  const curve = await inFile(file, () => tideCurve(constants));
  const { every, waters } = options;
  for (const { name, reason } of curve.plan.leftOut)
    remark(row('left out', `${name} (${reason})`).trimEnd());
  if (!options.json) remark(row('predicted', sayOf(constants, span)).trimEnd());
  await deliver(
    {
      caution: caution('heights'),
      file: () => (waters ? waterRows(curve, span) : heightRows(curve, span, every)),
      json: () => ({
        ...placeJson(constants, span),
        ...(waters
          ? {
              turningPoints: curve
                .turningPoints(span)
                .map(({ kind, time, height }) => ({ kind, time: formatInstant(time), height })),
            }
          : {
              everySeconds: every / 1000,
              heights: Array.from(
                curve.heights({ start: span.from, step: every, count: samplesIn(span, every) })
                  .values,
              ),
            }),
        leftOut: curve.plan.leftOut,
        caution: caution('heights'),
      }),
    },
    options,
    rules,
  );
  return 0;
}

/** Adds the command. */
export function addPredict(program: Command, settle: (exit: number) => void): void {
  const command = program
    .command('predict')
    .argument('<CONSTANTS>', 'a constants document, or -')
    .option(
      '--every <STEP>',
      'time between heights: 6min, 1h; 10min if absent',
      durationOf('--every'),
      10 * MINUTE,
    )
    .addOption(
      new Option('--waters', 'high and low waters in place of heights at a step').conflicts(
        'every',
      ),
    );
  withOutput(withSpan(command, '7 days'), 'write the CSV to FILE in place of standard output');
  withHelp(command, {
    question: 'how high is the water, and when does it turn?',
    have: 'constants.json',
    ask: '--from 2031-06-01 --until 2031-07-01 --every 6min, or --waters',
    get: 'CSV: instant and height, or each high and low water; instants in UTC',
    example: 'staithe predict quenby.constants.json --from 2031-06-01 --waters',
  });
  command.action(async (file: string, options: Options) => settle(await run(file, options)));
}
