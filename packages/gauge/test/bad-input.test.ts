/**
 * What is refused: code, path and message.
 */
import { type InputErrorCode, isStaitheError } from '@staithe/core';
import { describe, expect, it } from 'vitest';
import { parseGaugeCsv, type ReadOptions } from '../src/index.js';

function refusal(text: string, options: ReadOptions = {}): Record<string, unknown> {
  try {
    parseGaugeCsv(text, options);
  } catch (error) {
    if (isStaitheError(error)) return { ...error, message: error.message };
    throw error;
  }
  throw new Error('nothing was refused');
}

const HEAD = 'time_utc,height_m';
const day = `date,${Array.from({ length: 24 }, (_, h) => h)}`;

type Case = readonly [
  title: string,
  text: string,
  code: InputErrorCode,
  path: string,
  message: RegExp,
  options?: ReadOptions,
];

const cases: readonly Case[] = [
  ['an empty file', '', 'EMPTY_INPUT', 'text', /got nothing$/],
  ['blank lines alone', '\n\n \n', 'EMPTY_INPUT', 'text', /got nothing$/],
  ['a header alone', `${HEAD}\n`, 'EMPTY_INPUT', 'line 1', /got a header and nothing below it$/],
  [
    'no zone, the first line quoted',
    'time,height_m\n2031-06-01 00:00,1.5\n',
    'NO_TIME_ZONE',
    'line 2, column "time"',
    /got "2031-06-01 00:00,1\.5"$/,
  ],
  [
    'no zone in the daily layout',
    `${day}\n2031-06-01${',1'.repeat(24)}\n`,
    'NO_TIME_ZONE',
    'line 2, column "date"',
    /options\.timeZone/,
    { unit: 'm' },
  ],
  [
    'a zone in the first line only',
    'time,height_m\n2031-06-01 00:00Z,1\n2031-06-01 01:00,1\n',
    'TWO_TIME_ZONES',
    'line 3, column "time"',
    /got "2031-06-01 01:00"$/,
  ],
  [
    'a zone unlike the header',
    'time_utc,height_m\n2031-06-01 00:00+02:00,1\n',
    'TWO_TIME_ZONES',
    'line 2, column "time_utc"',
    /expected a time in UTC/,
  ],
  [
    'a caller unlike the header',
    `${HEAD}\n2031-06-01 00:00,1\n`,
    'TWO_TIME_ZONES',
    'options.timeZone',
    /expected UTC as the header says, got \+02:00$/,
    { timeZone: '+02:00' },
  ],
  [
    'a time that occurs twice',
    'time,height_m\n2031-10-26 02:30,1\n',
    'AMBIGUOUS_TIME',
    'line 2, column "time"',
    /2031-10-26T00:30Z and 2031-10-26T01:30Z\), got "2031-10-26 02:30"$/,
    { timeZone: 'Europe/Madrid' },
  ],
  [
    'a time that was skipped',
    'time,height_m\n2031-03-30 02:30,1\n',
    'SKIPPED_TIME',
    'line 2, column "time"',
    /expected a time that Europe\/Madrid has/,
    { timeZone: 'Europe/Madrid' },
  ],
  [
    'a zone that is none',
    `time,height_m\n2031-03-30 02:30,1\n`,
    'UNKNOWN_CHOICE',
    'options.timeZone',
    /got "Mars\/North"$/,
    { timeZone: 'Mars/North' },
  ],
  [
    'an unknown choice',
    HEAD,
    'UNKNOWN_CHOICE',
    'options.onConflict',
    /expected refuse, first, got "mean"$/,
    { onConflict: 'mean' as 'first' },
  ],
  [
    'a decimal comma between commas',
    `${HEAD}\n2031-06-01T00:00,1,52\n`,
    'UNKNOWN_LAYOUT',
    'line 2',
    /got 3 \(decimal commas need ; or tab between columns\)$/,
  ],
  [
    'a quoted decimal comma between commas',
    `${HEAD}\n2031-06-01T00:00,"1,52"\n`,
    'BAD_NUMBER',
    'line 2, column "height_m"',
    /got "1,52"$/,
  ],
  [
    'both decimal marks',
    'time_utc;height_m\n2031-06-01T00:00;1,5\n2031-06-01T01:00;1.5\n',
    'BAD_NUMBER',
    'line 3, column "height_m"',
    /expected a decimal comma as before, got "1\.5"$/,
  ],
  [
    'a quote left open',
    `${HEAD}\n"2031-06-01T00:00,1\n2031-06-01T01:00,1\n`,
    'UNKNOWN_LAYOUT',
    'line 2',
    /quotes closed/,
  ],
  [
    'one column',
    `time_utc\n2031-06-01T00:00\n`,
    'UNKNOWN_COLUMN',
    'line 1',
    /expected one column of heights/,
  ],
  [
    'no header and one column',
    '2031-06-01T00:00Z 1.5\n',
    'UNKNOWN_LAYOUT',
    'line 1',
    /got "2031-06-01T00:00Z 1\.5"$/,
  ],
  [
    'no column of times',
    'station,height_m\n7,1\n',
    'UNKNOWN_COLUMN',
    'line 1',
    /expected one column of times.*got "station", "height_m"$/,
  ],
  [
    'two columns of heights',
    'time_utc,level (m),height (m)\n2031-06-01T00:00,1,1\n',
    'UNKNOWN_COLUMN',
    'line 1',
    /got 2: "level \(m\)", "height \(m\)"$/,
  ],
  [
    'a column named that is not there',
    `${HEAD}\n2031-06-01T00:00,1\n`,
    'UNKNOWN_COLUMN',
    'options.columns.value',
    /expected one of the columns "time_utc", "height_m", got "tide"$/,
    { columns: { value: 'tide' } },
  ],
  [
    'a line cut short',
    `${HEAD}\n2031-06-01T00:00\n`,
    'MISSING',
    'line 2, column "height_m"',
    /expected 2 columns or more, got 1$/,
  ],
  [
    'no unit',
    'time_utc,height\n2031-06-01T00:00,1\n',
    'MISSING',
    'options.unit',
    /line 1, column "height" names no unit/,
  ],
  [
    'an unknown unit',
    'time_utc,height (fathoms)\n2031-06-01T00:00,1\n',
    'UNKNOWN_UNIT',
    'line 1, column "height (fathoms)"',
    /got "fathoms"$/,
  ],
  [
    'an unknown unit of the caller',
    `time_utc,height\n2031-06-01T00:00,1\n`,
    'UNKNOWN_UNIT',
    'options.unit',
    /got "yards"$/,
    { unit: 'yards' as 'm' },
  ],
  [
    'a unit unlike the header',
    `${HEAD}\n2031-06-01T00:00,1\n`,
    'CONFLICT',
    'options.unit',
    /expected m as the header says, got ft$/,
    { unit: 'ft' },
  ],
  [
    'text in a number',
    `${HEAD}\n2031-06-01T00:00,1\n2031-06-01T01:00,1.2 m\n`,
    'BAD_NUMBER',
    'line 3, column "height_m"',
    /expected a number or a gap, got "1\.2 m"$/,
  ],
  [
    'an infinite height',
    `${HEAD}\n2031-06-01T00:00,Infinity\n`,
    'BAD_NUMBER',
    'line 2, column "height_m"',
    /got "Infinity"$/,
  ],
  [
    'time going backwards',
    `${HEAD}\n2031-06-01T01:00,1\n2031-06-01T00:00,1\n`,
    'NOT_RISING',
    'line 3',
    /expected a time after 2031-06-01T01:00Z, got 2031-06-01T00:00Z$/,
  ],
  [
    'two heights at one time',
    `${HEAD}\n2031-06-01T01:00,1\n2031-06-01T01:00,1.5\n`,
    'CONFLICT',
    'line 3',
    /expected 1 m at 2031-06-01T01:00Z as on line 2, got 1\.5 m$/,
  ],
  [
    'two heights at one time, sorted',
    `${HEAD}\n2031-06-01T01:00,1\n2031-06-01T00:00,2\n2031-06-01T01:00,1.5\n`,
    'CONFLICT',
    'line 4',
    /as on line 2/,
    { onDisorder: 'sort' },
  ],
  [
    'the year 1066',
    `${HEAD}\n1066-10-14T09:00,1\n`,
    'OUT_OF_RANGE',
    'line 2, column "time_utc"',
    /expected a year from 1700 to 2200/,
  ],
  ['a time that is NaN', `${HEAD}\nNaN,1\n`, 'BAD_TIME', 'line 2, column "time_utc"', /got "NaN"$/],
  [
    'a date that does not exist',
    `${HEAD}\n2031-02-29T00:00,1\n`,
    'BAD_TIME',
    'line 2, column "time_utc"',
    /expected a date that exists/,
  ],
  [
    'a date in doubtful order',
    `${HEAD}\n03/04/2012 00:00,1\n`,
    'BAD_TIME',
    'line 2, column "time_utc"',
    /options\.dateOrder, got "03\/04\/2012"$/,
  ],
  [
    'a date without time',
    `${HEAD}\n2031-06-01,1\n`,
    'BAD_TIME',
    'line 2, column "time_utc"',
    /expected a date and a time/,
  ],
  [
    'an hour too many',
    `${HEAD}\n2031-06-01 24:01,1\n`,
    'BAD_TIME',
    'line 2, column "time_utc"',
    /from 00:00 to 24:00/,
  ],
  [
    'a leap second',
    `${HEAD}\n2016-12-31 23:59:60,1\n`,
    'LEAP_SECOND',
    'line 2, column "time_utc"',
    /seconds from 00 to 59/,
  ],
  [
    'a line of 2 MB',
    `${HEAD}\n${'1'.repeat(2000000)}`,
    'LINE_TOO_LONG',
    'line 2',
    /at most 1000000 characters/,
  ],
];

describe('parseGaugeCsv refuses', () => {
  it.each(cases.map((own) => [own[0], own] as const))('%s', (_title, own) => {
    const [, text, code, path, message, options] = own;
    const found = refusal(text, options);
    expect(found['code']).toBe(code);
    expect(found['path']).toBe(path);
    expect(found['message']).toMatch(message);
  });

  it('anything that is no text', () => {
    const wrong = { code: 'WRONG_TYPE', path: 'text' };
    expect(() => parseGaugeCsv(7 as unknown as string)).toThrow(expect.objectContaining(wrong));
  });

  it('with control characters shown as escapes', () => {
    const found = refusal(`${HEAD}\n2031-06-01T00:00,\u001b[31m9\n`);
    expect(found['message']).toContain('\\u001b[31m9');
    expect(found['message']).not.toContain('\u001b');
  });
});
