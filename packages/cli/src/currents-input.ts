/**
 * Reads a record of currents: two columns of one file, east and north or speed and the direction it runs towards, in two
 * passes of the reader of heights. What it reads as metres are metres of each second.
 * @module
 */
import {
  degreesToRadians,
  describe,
  formatInstant,
  InputError,
  isStaitheError,
  type LongWork,
  metresPerSecondFromKnots,
  type Series,
  seriesTimes,
} from '@staithe/core';
import { cos, sin } from '@staithe/core/trig';
import {
  type GaugeRecord,
  type GaugeUnit,
  type GaugeWarning,
  gapRuns,
  readGaugeCsv,
} from '@staithe/gauge';
import type { Command } from 'commander';
import { inFile } from './failure.js';
import { bytesOf, readingOf, type TimeOptions, withTimes } from './input.js';
import { choiceOf, textOf } from './options.js';
import type { RecordSize } from './study.js';

/** Units that a file of currents can have. */
export type CurrentUnit = 'm/s' | 'cm/s' | 'kn';

const UNITS: readonly CurrentUnit[] = ['m/s', 'cm/s', 'kn'];

/** How a record of currents is to be read, as options. */
export interface CurrentOptions extends TimeOptions {
  readonly east?: string;
  readonly north?: string;
  readonly speed?: string;
  readonly towards?: string;
  readonly unit?: CurrentUnit;
}

/** A record of currents, metres per second, and what the file had. */
export interface CurrentsRead {
  readonly record: { readonly east: Series; readonly north: Series };
  readonly size: RecordSize;
  readonly kind: 'east and north' | 'speed and direction';
  readonly unit: CurrentUnit;
  readonly timeZone: string;
  readonly warnings: readonly GaugeWarning[];
}

/** Adds the options that name the columns and say what a file of currents does not. */
export function withCurrents(command: Command): Command {
  const column = (flag: string, text: string): void => {
    command.option(`${flag} <COLUMN>`, text, textOf(flag));
  };
  column('--east', 'column of the component towards true east, with --north');
  column('--north', 'column of the component towards true north');
  column('--speed', 'column of speeds, with --towards');
  column('--towards', 'column of where the stream runs to, degrees clockwise from true north');
  command.option(
    '--unit <UNIT>',
    `unit of the speeds, where the columns' names do not say: ${UNITS.join(', ')}`,
    choiceOf('--unit', UNITS),
  );
  return withTimes(command);
}

interface Column {
  readonly flag: string;
  readonly name: string;
}

/** The two columns, and whether they are components. */
function columnsOf(options: CurrentOptions): { readonly pair: [Column, Column]; apart: boolean } {
  const asked = (['east', 'north', 'speed', 'towards'] as const).flatMap((key) => {
    const name = options[key];
    return name === undefined ? [] : [{ flag: `--${key}`, name }];
  });
  const [first, second] = asked;
  if (first === undefined) {
    const expected = 'expected --east and --north, or --speed and --towards, got none of them';
    throw new InputError('MISSING', '--east', expected);
  }
  const partners: Readonly<Record<string, string>> = {
    '--east': '--north',
    '--north': '--east',
    '--speed': '--towards',
    '--towards': '--speed',
  };
  const partner = partners[first.flag] as string;
  const odd = asked.slice(1).find(({ flag }) => flag !== partner);
  if (odd) {
    throw new InputError('CONFLICT', odd.flag, `expected it without ${first.flag}, got both`);
  }
  if (second === undefined) {
    throw new InputError('MISSING', partner, `expected a column beside ${first.flag}, got none`);
  }
  if (second.name === first.name) {
    const text = `expected another column than ${first.flag}, got the same`;
    throw new InputError('DUPLICATE', second.flag, text);
  }
  return { pair: [first, second], apart: first.flag === '--east' };
}

const PER_SECOND = String.raw`(?:\s*/\s*|[\s_]*per[\s_]*|p|[\s_.·]*)s(?:ec(?:ond)?)?(?![a-z])`;
const SAID: readonly (readonly [CurrentUnit, RegExp])[] = [
  ['cm/s', new RegExp(`(?:^|[^a-z])cm${PER_SECOND}`, 'i')],
  ['m/s', new RegExp(`(?:^|[^a-z])m${PER_SECOND}`, 'i')],
  ['kn', /(?:^|[^a-z])(?:kn|kts?|knots?)(?![a-z])/i],
];

/** The unit, from the names of the columns or `--unit`, which must not differ. */
function unitOf(columns: readonly Column[], asked: CurrentUnit | undefined): CurrentUnit {
  let found = asked;
  for (const { flag, name } of columns) {
    const said = SAID.find(([, pattern]) => pattern.test(name))?.[0];
    if (said !== undefined && found !== undefined && said !== found) {
      const path = asked === undefined ? flag : '--unit';
      const column = `column ${describe(name)}`;
      const text =
        asked === undefined
          ? `expected a column in ${found} as the other one, got ${describe(name)}`
          : `expected ${said} as the ${column} says, got ${asked}`;
      throw new InputError('CONFLICT', path, text);
    }
    found ??= said;
  }
  if (found !== undefined) return found;
  const names = columns.map(({ name }) => describe(name)).join(' and ');
  const say = columns.length === 1 ? 'names' : 'name';
  const text = `expected m/s, cm/s or kn since ${names} ${say} no unit, got nothing`;
  throw new InputError('MISSING', '--unit', text);
}

/** Numbers all of nines, with up to three decimals, either sign, and −32768: "missing" where no value can be one of them. */
function missingMarks(fewest: number): number[] {
  const marks = [-32768];
  for (let digits = fewest; digits <= 6; digits++) {
    for (let decimals = 0; decimals <= 3; decimals++) {
      const mark = Number(`${'9'.repeat(digits)}.${'9'.repeat(decimals)}`);
      marks.push(mark, -mark);
    }
  }
  return marks;
}

// 99 m/s and 99 kn are no currents, but 99 cm/s is one; 99° is a direction, 999° is none.
const MARKS = { fast: missingMarks(2), slow: missingMarks(3) };

/** One column, by the reader of heights; what it says in its own terms is said in those of a current. */
async function readColumn(
  source: () => AsyncIterable<Uint8Array>,
  { flag, name }: Column,
  reading: { readonly unit: GaugeUnit; readonly sentinels: readonly number[] },
  options: TimeOptions,
  work: LongWork,
): Promise<GaugeRecord> {
  try {
    return await readGaugeCsv(source(), {
      ...readingOf(options, name),
      ...reading,
      onProgress: work.onProgress,
    });
  } catch (error) {
    if (!isStaitheError(error) || error.name !== 'InputError') throw error;
    const { code, path, message, details } = error as InputError;
    const text = message.slice(path.length + 2).replace(/(\d) m\b/g, '$1');
    const place = path === 'options.columns.value' ? flag : path;
    throw new InputError(code, place, text, details);
  }
}

/** The pieces of a file as often as they are asked for; standard input is kept, for it comes once. */
async function sourceOf(path: string): Promise<() => AsyncIterable<Uint8Array>> {
  if (path !== '-') return () => bytesOf(path);
  const pieces: Uint8Array[] = [];
  for await (const piece of bytesOf(path)) pieces.push(piece);
  return async function* again() {
    for (const piece of pieces) yield await Promise.resolve(piece);
  };
}

/** Components of speeds and directions; a stream that stands still needs no direction. */
function componentsOf(
  speeds: Series,
  directions: Float64Array,
  [speed, towards]: readonly [Column, Column],
): { readonly east: Float64Array; readonly north: Float64Array } {
  const times = seriesTimes(speeds);
  const refuse = ({ name }: Column, expected: string, value: number, i: number): never => {
    const at = formatInstant(times[i] as number);
    const path = `column ${describe(name)}`;
    throw new InputError('OUT_OF_RANGE', path, `expected ${expected}, got ${value} at ${at}`);
  };
  const [east, north] = [new Float64Array(times.length), new Float64Array(times.length)];
  speeds.values.forEach((size, i) => {
    const angle = directions[i] as number;
    if (size < 0) refuse(speed, 'speeds of 0 or more', size, i);
    if (angle < -180 || angle > 360) refuse(towards, 'degrees from 0 to 360', angle, i);
    if (size === 0) return;
    const known = Number.isFinite(size + angle);
    east[i] = known ? size * sin(degreesToRadians(angle)) : Number.NaN;
    north[i] = known ? size * cos(degreesToRadians(angle)) : Number.NaN;
  });
  return { east, north };
}

/** Reads a record of currents. */
export async function readCurrents(
  path: string,
  options: CurrentOptions,
  work: LongWork,
): Promise<CurrentsRead> {
  const { pair, apart } = columnsOf(options);
  const unit = unitOf(apart ? pair : pair.slice(0, 1), options.unit);
  const source = await sourceOf(path);
  const speeds = {
    unit: unit === 'cm/s' ? ('cm' as const) : ('m' as const),
    sentinels: unit === 'cm/s' ? MARKS.slow : MARKS.fast,
  };
  const angles = { unit: 'm' as const, sentinels: MARKS.slow };
  return inFile(path, async () => {
    const first = await readColumn(source, pair[0], speeds, options, work);
    const second = await readColumn(source, pair[1], apart ? speeds : angles, options, work);
    const inUnit = (values: Float64Array): Float64Array =>
      unit === 'kn' ? values.map(metresPerSecondFromKnots) : values;
    const own = { ...first.series, values: inUnit(first.series.values) };
    const both = apart
      ? { east: own.values, north: inUnit(second.series.values) }
      : componentsOf(own, second.series.values, pair);
    const together = (values: Float64Array, other: Float64Array): Series => ({
      ...own,
      values: values.map((value, i) => (Number.isNaN(other[i]) ? Number.NaN : value)),
    });
    const east = together(both.east, both.north);
    const north = together(both.north, both.east);
    const missing = east.values.filter((value) => Number.isNaN(value)).length;
    const due = east.values.length;
    const gaps = gapRuns(east).length;
    return {
      record: { east, north },
      size: { due, there: due - missing, missing, gaps },
      kind: apart ? 'east and north' : 'speed and direction',
      unit,
      timeZone: first.timeZone,
      warnings: warningsOf([first, second]),
    };
  });
}

/** What both passes found, each once; that a column keeps one value is for the fit to judge. */
function warningsOf(records: readonly GaugeRecord[]): GaugeWarning[] {
  const seen = new Map<string, GaugeWarning>();
  for (const warning of records.flatMap(({ warnings }) => warnings)) {
    if (warning.code !== 'CONSTANT') seen.set(warning.message, warning);
  }
  return [...seen.values()];
}
