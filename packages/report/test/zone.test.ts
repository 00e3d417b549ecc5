/**
 * Local days: the changes of the clocks are those of the IANA time zone database for Europe/Lisbon (EU rule: last Sundays of
 * March and October, 01:00 UTC) and Australia/Lord_Howe (LH rule: first Sundays of April and October, 02:00, half an hour).
 */
import { DAY, HOUR, MINUTE } from '@staithe/core';
import { afterEach, describe, expect, test, vi } from 'vitest';
import { monthText, weekSvg, windowsText } from '../src/index.js';
import { localDays, readZone, zoneText } from '../src/internal/zone.js';
import { all, parse } from './parse.js';

const pointsAt = (...times: string[]): { kind: 'high' | 'low'; time: number; height: number }[] =>
  times.map((time, i) => ({
    kind: i % 2 ? 'low' : 'high',
    time: Date.parse(time),
    height: i % 2 ? 0.6 : 3.1,
  }));

const base = { place: 'Quenby Haven', datum: 'chart datum' };
const dayLine = (text: string, day: string): string =>
  text.split('\n').find((line) => line.trimStart().startsWith(day)) as string;
const rulerOf = (line: string): string => line.slice(10).split(/ {2,}/)[0] as string;

afterEach(() => vi.unstubAllEnvs());

describe('days on which clocks change', () => {
  const lengths = (name: string, from: string, to: string): number[] =>
    localDays(readZone(name), Date.parse(from), Date.parse(to)).map(
      (day) => (day.to - day.from) / HOUR,
    );

  test('Lisbon has days of 23 and 25 hours', () => {
    expect(lengths('Europe/Lisbon', '2031-03-29T00:00Z', '2031-03-31T20:00Z')).toEqual([
      24, 23, 24,
    ]);
    expect(lengths('Europe/Lisbon', '2031-10-25T00:00Z', '2031-10-27T20:00Z')).toEqual([
      24, 25, 24,
    ]);
  });
  test('Lord Howe has days of 24.5 and 23.5 hours', () => {
    expect(lengths('Australia/Lord_Howe', '2031-04-05T14:00Z', '2031-04-06T12:00Z')).toEqual([
      24.5,
    ]);
    expect(lengths('Australia/Lord_Howe', '2031-10-04T14:00Z', '2031-10-05T12:00Z')).toEqual([
      23.5,
    ]);
  });
  test('a midnight that is skipped begins the day at its first instant', () => {
    // Asia/Beirut: clocks go forward at 00:00 on the last Sunday of March (database rule), so the day begins at 01:00.
    const [day] = localDays(
      readZone('Asia/Beirut'),
      Date.parse('2031-03-30T10:00Z'),
      Date.parse('2031-03-30T11:00Z'),
    );
    expect(day?.from).toBe(Date.parse('2031-03-29T22:00Z'));
    expect(((day?.to ?? 0) - (day?.from ?? 0)) / HOUR).toBe(23);
  });
});

describe('monthText', () => {
  test('a day of 23 hours has a shorter ruler, says so, and gives offsets', () => {
    const turningPoints = pointsAt('2031-03-30T00:30Z', '2031-03-30T01:30Z', '2031-03-30T19:30Z');
    const text = monthText({ ...base, turningPoints, month: '2031-03', timeZone: 'Europe/Lisbon' });
    const line = dayLine(text, 'Sun 30');
    expect(rulerOf(line)).toHaveLength(46);
    expect(line).toContain('00:30+00:00  02:30+01:00  20:30+01:00');
    expect(text).toContain('clocks go forward at 01:00: UTC+01:00 from then on, this day has 23 h');
    expect(text.split('\n')[0]).toContain(
      'Europe/Lisbon, UTC+00:00, from Sun 30 Mar 02:00 UTC+01:00',
    );
    expect(rulerOf(dayLine(text, 'Sat 29'))).toHaveLength(48);
  });
  test('a time that occurs twice is told apart by its offset', () => {
    const turningPoints = pointsAt('2031-10-26T00:30Z', '2031-10-26T01:30Z');
    const text = monthText({ ...base, turningPoints, month: '2031-10', timeZone: 'Europe/Lisbon' });
    expect(dayLine(text, 'Sun 26')).toContain('01:30+01:00  01:30+00:00');
    expect(text).toContain('clocks go back at 02:00: UTC+00:00 from then on, this day has 25 h');
  });
  test('Lord Howe moves by half an hour', () => {
    const turningPoints = pointsAt('2031-04-05T14:45Z', '2031-04-05T15:15Z');
    const text = monthText({
      ...base,
      turningPoints,
      month: '2031-04',
      timeZone: 'Australia/Lord_Howe',
    });
    const line = dayLine(text, 'Sun 6');
    expect(line).toContain('01:45+11:00  01:45+10:30');
    expect(text).toContain('this day has 24.5 h');
  });
  test('each turning point of a month stands on one day only', () => {
    const times = Array.from({ length: 120 }, (_, i) => Date.UTC(2031, 2, 1) + i * 6.21 * HOUR);
    const turningPoints = times.map((time, i) => ({
      kind: i % 2 ? ('low' as const) : ('high' as const),
      time,
      height: 1,
    }));
    const text = monthText({ ...base, turningPoints, month: '2031-03', timeZone: 'Europe/Lisbon' });
    const shown = text.match(/\d\d:\d\d(?=\+| {2}|$)/gm) ?? [];
    const end = Date.parse('2031-03-31T23:00Z');
    expect(text.match(/[▲▼]/g)).toHaveLength(
      times.filter((t) => Math.round(t / MINUTE) * MINUTE < end).length,
    );
    expect(shown.length).toBeGreaterThan(100);
  });
  test('a time that rounds to midnight stands on the day of the printed minute', () => {
    const turningPoints = pointsAt('2031-06-01T23:59:40Z');
    const text = monthText({ ...base, turningPoints, month: '2031-06', timeZone: 'UTC' });
    expect(dayLine(text, 'Mon 2')).toContain('▲3.1');
    expect(dayLine(text, 'Mon 2').endsWith('00:00')).toBe(true);
    expect(dayLine(text, 'Sun 1')).not.toContain('▲');
  });
});

test('windows over a change of clocks give both offsets', () => {
  const windows = [
    {
      from: Date.parse('2031-10-26T00:30Z'),
      to: Date.parse('2031-10-26T01:45Z'),
      openStart: false,
      openEnd: false,
    },
  ];
  const text = windowsText({ ...base, windows, above: 2, timeZone: 'Europe/Lisbon' });
  expect(text).toContain('01:30+01:00 to 01:45+00:00, 1 h 15 min');
});

test('a fixed offset is a zone, with its sign as for people', () => {
  expect(readZone('-03:30').name).toBe('UTC−03:30');
  expect(readZone('+02:00').wallAt(0)).toBe(2 * HOUR);
  expect(zoneText(readZone('UTC'), 0, DAY)).toBe('UTC');
});

test.each([
  ['MISSING', ''],
  ['UNKNOWN_CHOICE', 'Nowhere/At_All'],
  ['UNKNOWN_CHOICE', '+25:00'],
])('%s: zone "%s" is refused', (code, timeZone) => {
  expect(() => monthText({ ...base, turningPoints: [], month: '2031-06', timeZone })).toThrow(
    expect.objectContaining({ code, path: 'timeZone' }),
  );
});

test("the host's zone does not matter", () => {
  const heights = { start: Date.UTC(2031, 5, 1), step: HOUR, values: new Float64Array(48) };
  const draw = (): string =>
    weekSvg({
      heights,
      turningPoints: pointsAt('2031-06-01T06:31Z'),
      timeZone: 'Europe/Lisbon',
      datum: 'LAT',
    }) +
    monthText({
      ...base,
      turningPoints: pointsAt('2031-06-01T06:31Z'),
      month: '2031-06',
      timeZone: 'Europe/Lisbon',
    });
  vi.stubEnv('TZ', 'UTC');
  const here = draw();
  vi.stubEnv('TZ', 'Pacific/Kiritimati');
  // The setting must reach the host's clock, else this test would say nothing.
  expect(new Date(0).getTimezoneOffset()).toBe(640);
  expect(draw()).toBe(here);
  expect(
    all(parse(here.slice(0, here.indexOf('</svg>') + 6)), 'text').some(
      ({ text }) => text === '07:31',
    ),
  ).toBe(true);
});
