/**
 * A month of local days with their turning points: shared by the table and the picture.
 * @module
 */
import { DAY, describe, InputError, type Instant, MINUTE } from '@staithe/core';
import type { TurningPoint } from '@staithe/predict';
import { mean, pairs } from 'd3-array';
import { utcMonth } from 'd3-time';
import type { SkyDay } from '../types.js';
import { cleanText, requiredText } from './text.js';
import { localDays, type LocalDay, readZone, wallText, type Zone, zoneText } from './zone.js';

/** A month of tides. @public */
export interface MonthInput {
  readonly place: string;
  /** All of the month; others are passed over. Metres above the datum. */
  readonly turningPoints: readonly TurningPoint[];
  /** `2031-06`, a month of the zone. */
  readonly month: string;
  /** IANA zone, `UTC` or an offset: never the host's. */
  readonly timeZone: string;
  readonly datum: string;
  readonly sky?: readonly SkyDay[] | undefined;
  /** Print the mean range of each day. Default false. */
  readonly range?: boolean | undefined;
}

export interface MonthDay extends LocalDay {
  /** `Sat 1`. */
  readonly name: string;
  /** In order of time, by the minute that is printed. */
  readonly points: readonly TurningPoint[];
  /** The one before the first, for the range. */
  readonly before: TurningPoint | undefined;
  readonly sky: SkyDay | undefined;
}

export interface Month {
  readonly place: string;
  readonly datum: string;
  /** `June 2031`. */
  readonly title: string;
  readonly zone: Zone;
  readonly zoneWords: string;
  readonly from: Instant;
  readonly to: Instant;
  readonly days: readonly MonthDay[];
}

/** First and last instant of a local month. */
export function monthSpan(month: string, zone: Zone): { from: Instant; to: Instant; wall: number } {
  const match = typeof month === 'string' ? /^(\d{4})-(\d\d)$/.exec(month) : null;
  const number = match ? +(match[2] as string) : 0;
  if (
    !match ||
    number < 1 ||
    number > 12 ||
    +(match[1] as string) < 1700 ||
    +(match[1] as string) > 2200
  ) {
    throw new InputError(
      'BAD_TIME',
      'month',
      `expected a month like 2031-06, got ${describe(month)}`,
    );
  }
  const wall = Date.UTC(+(match[1] as string), number - 1, 1);
  const next = utcMonth.offset(new Date(wall), 1).getTime();
  return { from: zone.instantOf(wall), to: zone.instantOf(next), wall };
}

/** A time is printed to the minute, so it belongs to the day that the printed minute lies in. */
const printed = (t: Instant): Instant => Math.round(t / MINUTE) * MINUTE;

export function readMonth(input: MonthInput): Month {
  const zone = readZone(input.timeZone);
  const place = requiredText(input.place, 'place');
  const datum = requiredText(input.datum, 'datum');
  const { from, to, wall } = monthSpan(input.month, zone);
  const points = [...input.turningPoints].sort((a, b) => a.time - b.time);
  const skies = new Map(
    (input.sky ?? []).map((sky) => [
      sky.date,
      { ...sky, note: sky.note === undefined ? undefined : cleanText(sky.note, 100) },
    ]),
  );
  const days = localDays(zone, from, to).map((day): MonthDay => {
    const here = points.filter(({ time }) => printed(time) >= day.from && printed(time) < day.to);
    const first = here[0];
    return {
      ...day,
      name: wallText('%a %-d', day.wall),
      points: here,
      before: first ? points[points.indexOf(first) - 1] : undefined,
      sky: skies.get(wallText('%Y-%m-%d', day.wall)),
    };
  });
  const zoneWords = zoneText(zone, from, to);
  return { place, datum, title: wallText('%B %Y', wall), zone, zoneWords, from, to, days };
}

/** Mean of the rises and falls that end on the day; undefined where there is none. */
export function dayRange({ points, before }: MonthDay): number | undefined {
  const near = before && points[0] && points[0].time - before.time < 1.5 * DAY ? [before] : [];
  return mean(pairs([...near, ...points], (a, b) => Math.abs(b.height - a.height)));
}

const MOONS = { new: '●', 'first-quarter': '◐', full: '○', 'last-quarter': '◑' } as const;

/** The phase of the Moon as a sign, or a space. */
export function moonMark(moon: SkyDay['moon']): string {
  return moon === undefined ? ' ' : MOONS[moon];
}
