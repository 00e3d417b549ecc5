/**
 * A month of tides for the terminal: one ruler a day carries the heights, the times stand right in order.
 * @module
 */
import { HOUR } from '@staithe/core';
import type { TurningPoint } from '@staithe/predict';
import { caution } from './caution.js';
import { dayRange, type MonthDay, type MonthInput, moonMark, readMonth } from './internal/month.js';
import { metres } from './internal/numbers.js';
import { padLeft, padRight } from './internal/text.js';
import { type ClockChange, clockText, offsetName, type Zone } from './internal/zone.js';

const PER_HOUR = 2; // characters
const NAME = 10; // characters before the ruler
const SPILL = 5; // a mark late in the day may run over the end of the ruler

/** The ruler of a day: as long as the day is, a mark at each high and low water. */
function ruler(day: MonthDay): string {
  const long = Math.round(((day.to - day.from) / HOUR) * PER_HOUR);
  const cells = [...'.'.repeat(long)];
  let free = 0;
  for (const point of day.points) {
    const text = markText(point);
    const at = Math.max(free, Math.floor(((point.time - day.from) / HOUR) * PER_HOUR));
    [...text].forEach((character, i) => {
      cells[at + i] = character;
    });
    free = at + [...text].length;
  }
  return padRight(cells.join(''), 24 * PER_HOUR + SPILL);
}

const markText = ({ kind, height }: TurningPoint): string =>
  `${kind === 'high' ? '▲' : '▼'}${metres(height, 1)}`;

/** `02:14`; on a day whose clocks change, with its offset. */
function timeText(zone: Zone, { time }: TurningPoint, change: ClockChange | undefined): string {
  const clock = clockText(zone, time);
  return change ? `${clock}${offsetName(zone.offsetAt(time)).slice(3)}` : clock;
}

/** What the clocks do on a day. */
function changeText(day: MonthDay): string {
  const change = day.change as ClockChange;
  const hours = (day.to - day.from) / HOUR;
  const way = change.after > change.before ? 'forward' : 'back';
  return `clocks go ${way} at ${offsetClock(change)}: ${offsetName(change.after)} from then on, this day has ${hours} h`;
}

function offsetClock({ at, before }: ClockChange): string {
  return new Date(at + before).toISOString().slice(11, 16);
}

function hoursLine(): string {
  let line = ' '.repeat(NAME);
  for (let hour = 0; hour <= 24; hour += 6) {
    line = padRight(line, NAME + hour * PER_HOUR) + `${hour}h`;
  }
  return line;
}

function dayLines(day: MonthDay, zone: Zone, range: boolean): string[] {
  const name = padRight(`${padLeft(day.name, 6)}  ${moonMark(day.sky?.moon)}`, NAME);
  const times = day.points.map((point) => timeText(zone, point, day.change)).join('  ');
  const lines = [`${name}${ruler(day)}  ${times}`.trimEnd()];
  const mean = range ? dayRange(day) : undefined;
  const notes = [
    ...(day.sky?.note ? [`sky: ${day.sky.note}`] : []),
    ...(mean === undefined ? [] : [`mean range today ${metres(mean, 1)}`]),
  ];
  if (notes.length > 0) lines.push(`   ${notes.join('        ')}`);
  if (day.change) lines.push(`   ${changeText(day)}`);
  return lines;
}

/**
 * Writes a month of tides in local time. Each day has one ruler with its highs (▲) and lows (▼) in metres, and the times in
 * order; the sky has a line of its own. A day on which clocks change has a ruler of 23 or 25 hours, says so, and its times
 * carry their offset. A mark that would cover the one before it moves right; the times are not moved.
 *
 * @param input - Place, all turning points of the month, month (`2031-06`), zone, datum, and the sky if wanted.
 * @returns Lines joined by `\n`, closed by the caution.
 * @throws InputError `BAD_TIME` path `month`, `MISSING` or `UNKNOWN_CHOICE` path `timeZone`, `MISSING` paths `place`, `datum`.
 * @example
 * const turningPoints = [{ kind: 'high' as const, time: Date.UTC(2031, 5, 1, 6, 31), height: 3.1 }];
 * monthText({ place: 'Quenby Haven', turningPoints, month: '2031-06', timeZone: '+02:00', datum: 'chart datum' }).includes('▲3.1'); // true
 * @public
 */
export function monthText(input: MonthInput): string {
  const month = readMonth(input);
  const head = [
    month.place,
    month.title,
    `heights in m above ${month.datum}`,
    month.zoneWords,
  ].join('   ');
  const days = month.days.flatMap((day) => dayLines(day, month.zone, input.range === true));
  const basis =
    input.range === true ? ['Range: mean of the falls and rises that end on the day.'] : [];
  return [head, hoursLine(), ...days, ...basis, caution('heights')].join('\n');
}
