/**
 * Access windows for the terminal: a line a day, each window with start, end and length.
 * @module
 */
import { DAY, MINUTE, type Metres } from '@staithe/core';
import type { TideWindow } from '@staithe/predict';
import { groups, sum } from 'd3-array';
import { caution } from './caution.js';
import { counted, duration, metres } from './internal/numbers.js';
import { padRight, requiredText } from './internal/text.js';
import {
  clockText,
  momentText,
  offsetName,
  readZone,
  wallText,
  type Zone,
  zoneText,
} from './internal/zone.js';

/** Windows and what they are windows of. @public */
export interface WindowsInput {
  readonly place: string;
  readonly windows: readonly TideWindow[];
  /** Metres above the datum. */
  readonly above?: Metres | undefined;
  readonly below?: Metres | undefined;
  /** IANA zone, `UTC` or an offset: never the host's. */
  readonly timeZone: string;
  readonly datum: string;
}

/** `higher than 4.20 m`, `lower than 1.00 m`, or both. */
export function conditionText({ above, below }: Pick<WindowsInput, 'above' | 'below'>): string {
  const parts = [
    ...(above === undefined ? [] : [`higher than ${metres(above)} m`]),
    ...(below === undefined ? [] : [`lower than ${metres(below)} m`]),
  ];
  return parts.length > 0 ? parts.join(' and ') : 'as asked for';
}

/** `05:10 to 09:40, 4 h 30 min`; an end on another day carries its day, a change of clocks its offsets. */
export function windowText(window: TideWindow, zone: Zone): string {
  const { from, to } = window;
  const moved = zone.offsetAt(from) !== zone.offsetAt(to);
  const offset = (t: number): string => (moved ? offsetName(zone.offsetAt(t)).slice(3) : '');
  const sameDay = momentText(zone, from, '%Y%j') === momentText(zone, to, '%Y%j');
  const end = sameDay ? clockText(zone, to) : momentText(zone, to, '%a %-d %H:%M');
  const start = window.openStart ? `before ${clockText(zone, from)}` : clockText(zone, from);
  const close = window.openEnd ? `beyond ${end}` : end;
  const join = window.join ? ' (ends or begins in a jump of the curve)' : '';
  // The length is that of the times as they are printed.
  const long = Math.round(to / MINUTE) - Math.round(from / MINUTE);
  return `${start}${offset(from)} to ${close}${offset(to)}, ${duration(long * MINUTE)}${join}`;
}

/** Windows by the local day that they begin on. */
export function windowsByDay(
  windows: readonly TideWindow[],
  zone: Zone,
): [day: string, windows: TideWindow[]][] {
  const dayOf = ({ from }: TideWindow): number =>
    Math.floor(zone.wallAt(Math.round(from / MINUTE) * MINUTE) / DAY) * DAY;
  return groups(windows, dayOf).map(([wall, members]) => [wallText('%a %-d %b', wall), members]);
}

/**
 * Writes windows in local time: a line for each day on which one begins, with start, end and length.
 *
 * @param input - Place, windows, condition, zone, datum.
 * @returns Lines joined by `\n`, closed by the caution.
 * @throws InputError `MISSING` or `UNKNOWN_CHOICE` path `timeZone`, `MISSING` paths `place`, `datum`.
 * @example
 * const windows = [{ from: 0, to: 90 * MINUTE, openStart: false, openEnd: false }];
 * windowsText({ place: 'Quenby Haven', windows, above: 4.2, timeZone: 'UTC', datum: 'chart datum' }).includes('00:00 to 01:30, 1 h 30 min'); // true
 * @public
 */
export function windowsText(input: WindowsInput): string {
  const zone = readZone(input.timeZone);
  const place = requiredText(input.place, 'place');
  const datum = requiredText(input.datum, 'datum');
  const { windows } = input;
  const first = windows[0];
  const last = windows[windows.length - 1];
  const zoneWords = first && last ? zoneText(zone, first.from, last.to) : zone.name;
  const head = `${place}   water ${conditionText(input)} above ${datum}   ${zoneWords}`;
  const lines = windowsByDay(windows, zone).map(
    ([day, here]) =>
      `${padRight(day, 10)}  ${here.map((window) => windowText(window, zone)).join('   ')}`,
  );
  const open = sum(windows, ({ from, to }) => to - from);
  const end =
    windows.length === 0
      ? 'no window'
      : `${counted(windows.length, 'window')}, ${duration(open)} open together`;
  return [head, ...lines, end, caution('windows')].join('\n');
}
