/**
 * Layouts that files come in. Lines of real files are cut from the open records of NOAA/NOS/CO-OPS.
 */
import { HOUR, MINUTE, metresFromFeet, toInstant } from '@staithe/core';
import { describe, expect, it } from 'vitest';
import { parseGaugeCsv, type ReadOptions } from '../src/index.js';

const at = (text: string): number => toInstant(text);
const lines = (...rows: readonly string[]): string => `${rows.join('\n')}\n`;

describe('real files', () => {
  it('split date and time, zone and unit in the header (Eastport 8410140, 2019)', () => {
    const record = parseGaugeCsv(
      lines(
        'Date,Time (GMT),Verified (m)',
        '2019/01/01,00:00,5.566',
        '2019/01/01,01:00,4.955',
        '2019/01/01,02:00,3.968',
      ),
    );
    expect(record.series).toEqual({
      start: at('2019-01-01T00:00Z'),
      step: HOUR,
      values: Float64Array.of(5.566, 4.955, 3.968),
    });
    expect(record).toMatchObject({ unit: 'm', timeZone: 'UTC', step: HOUR, warnings: [] });
    expect([...record.flags]).toEqual([2, 2, 2]);
  });

  it('a date and 24 columns, gaps left empty (Grand Isle 8761724, 1980)', () => {
    const head = `date,${Array.from({ length: 24 }, (_, h) => `h${String(h).padStart(2, '0')}`)}`;
    const text = lines(
      head,
      '1980-11-11,,,,,,,,,,,,,,,,,-0.586,-0.571,-0.540,-0.537,-0.495,-0.479,-0.446,-0.418',
      '1980-11-12,-0.376,-0.339,-0.235,-0.229,-0.226,-0.187,-0.175,-0.239,-0.251,-0.263,-0.287,-0.382,-0.443,-0.458,-0.461,-0.458,-0.467,-0.458,-0.427,-0.418,-0.406,-0.339,-0.266,-0.202',
    );
    const { series, reasons } = parseGaugeCsv(text, { unit: 'm', timeZone: 'UTC', datum: 'MHHW' });
    expect(series.start).toBe(at('1980-11-11T00:00Z'));
    expect(series.step).toBe(HOUR);
    expect(series.values.length).toBe(48);
    expect(series.values[16]).toBe(-0.586);
    expect(series.values[47]).toBe(-0.202);
    expect(reasons).toEqual([
      {
        from: at('1980-11-11T00:00Z'),
        to: at('1980-11-11T15:00Z'),
        samples: 16,
        flag: 9,
        reason: 'gap',
        measured: 16 * HOUR,
      },
    ]);
  });

  it('feet by the caller (La Jolla 9410230, first hours of 2010-08-01)', () => {
    const text = lines('time_gmt,water level', '2010-08-01T00:00,-0.19', '2010-08-01T01:00,-0.65');
    const { series, unit } = parseGaugeCsv(text, { unit: 'ft' });
    expect([...series.values]).toEqual([metresFromFeet(-0.19), metresFromFeet(-0.65)]);
    expect(unit).toBe('ft');
  });

  it('times of their own (New London 8461490, high and low waters)', () => {
    const text = lines(
      'time_gmt,height_m,type',
      '1939-01-01T03:46,-0.49,L',
      '1939-01-01T10:09,0.28,H',
      '1939-01-01T16:44,-0.55,L',
    );
    const { series, warnings } = parseGaugeCsv(text);
    expect([...(series.times ?? [])]).toEqual(
      ['1939-01-01T03:46Z', '1939-01-01T10:09Z', '1939-01-01T16:44Z'].map(at),
    );
    expect(warnings.map((w) => w.code)).toEqual(['UNEVEN']);
  });
});

describe('ways to write the same', () => {
  const start = at('2031-06-01T00:00Z');
  const plain = { start, step: 6 * MINUTE, values: Float64Array.of(1.5, 1.25) };
  const cases: readonly (readonly [string, string, ReadOptions])[] = [
    [
      'Z in the times',
      lines('time,height_m', '2031-06-01T00:00Z,1.5', '2031-06-01T00:06Z,1.25'),
      {},
    ],
    [
      'offsets in the times',
      lines('time,m', '2031-06-01T02:00+02:00,1.5', '2031-06-01T02:06+0200,1.25'),
      {},
    ],
    [
      'zone by the caller',
      lines('time,cm', '2031-06-01 02:00,150', '2031-06-01 02:06,125'),
      { timeZone: '+02:00' },
    ],
    [
      'IANA zone',
      lines(
        'Time (Europe/Madrid),Level [mm]',
        '2031-06-01 02:00:00,1500',
        '2031-06-01 02:06:00,1250',
      ),
      {},
    ],
    [
      'offset in the header',
      lines('Date Time (UTC+2),level_cm', '2031-06-01 02:00,150', '2031-06-01 02:06,125'),
      {},
    ],
    [
      'decimal comma, semicolons',
      lines('time_utc;height_m', '2031-06-01 00:00;1,5', '2031-06-01 00:06;1,25'),
      {},
    ],
    ['tabs', lines('time_utc\theight_m', '2031-06-01 00:00\t1.5', '2031-06-01 00:06\t1.25'), {}],
    [
      'mark, CR LF, comments, blank lines',
      '\ufeff# a gauge\r\n\r\ntime_utc,height_m\r\n2031-06-01T00:00,1.5\r\n\r\n# half way\r\n2031-06-01T00:06,1.25',
      {},
    ],
    ['CR alone', 'time_utc,height_m\r2031-06-01T00:00,1.5\r2031-06-01T00:06,1.25\r', {}],
    [
      'quotes',
      lines(
        '"time (UTC)","height, observed (m)"',
        '"2031-06-01 00:00","1.5"',
        '"2031-06-01 00:06","1.25"',
      ),
      {},
    ],
    ['24:00', lines('date,time_utc,height_m', '2031-05-31,24:00,1.5', '2031-06-01,00:06,1.25'), {}],
    [
      'day first',
      lines('time_utc,height_m', '01/06/2031 00:00,1.5', '01/06/2031 00:06,1.25'),
      { dateOrder: 'day-first' },
    ],
    [
      'month first',
      lines('time_utc,height_m', '06/01/2031 00:00,1.5', '06/01/2031 00:06,1.25'),
      { dateOrder: 'month-first' },
    ],
    ['no header', lines('2031-06-01T00:00Z,1.5', '2031-06-01T00:06Z,1.25'), { unit: 'm' }],
    [
      'no header, split',
      lines('2031-06-01,00:00,1.5', '2031-06-01,00:06,1.25'),
      { unit: 'm', timeZone: 'UTC' },
    ],
    [
      'columns by name',
      lines('when,raw,best', '2031-06-01T00:00Z,9,1.5', '2031-06-01T00:06Z,9,1.25'),
      { unit: 'm', columns: { time: 'when', value: 'best' } },
    ],
    [
      'columns by position',
      lines('2031-06-01T00:00Z,9,1.5', '2031-06-01T00:06Z,9,1.25'),
      { unit: 'm', columns: { time: 1, value: 3 } },
    ],
    [
      'header further down',
      lines(
        'gauge 7',
        'harbour, east',
        'time_utc,height_m',
        '2031-06-01T00:00,1.5',
        '2031-06-01T00:06,1.25',
      ),
      { headerLine: 3 },
    ],
    [
      'an equal duplicate',
      lines(
        'time_utc,height_m',
        '2031-06-01T00:00,1.5',
        '2031-06-01T00:00,1.50',
        '2031-06-01T00:06,1.25',
      ),
      {},
    ],
    [
      'sorted',
      lines('time_utc,height_m', '2031-06-01T00:06,1.25', '2031-06-01T00:00,1.5'),
      { onDisorder: 'sort' },
    ],
    [
      'first of two',
      lines(
        'time_utc,height_m',
        '2031-06-01T00:00,1.5',
        '2031-06-01T00:00,7',
        '2031-06-01T00:06,1.25',
      ),
      { onConflict: 'first' },
    ],
  ];
  it.each(cases)('%s', (_title, text, options) => {
    expect(parseGaugeCsv(text, options).series).toEqual(plain);
  });
});

it('takes a zone alone for a name of times', () => {
  const { timeZone } = parseGaugeCsv(lines('UTC,Water Level (ft)', '2031-06-01 00:00,1'));
  expect(timeZone).toBe('UTC');
});

describe('gaps', () => {
  const read = (values: readonly string[], options: ReadOptions = {}): number[] => {
    const rows = values.map((v, i) => `2031-06-01T${String(i).padStart(2, '0')}:00Z,${v}`);
    return [...parseGaugeCsv(lines('time,height_m', ...rows), options).series.values];
  };
  it('reads the marks of a gap', () => {
    const gaps = ['', 'NaN', 'null', '-', 'n/a'].map(() => Number.NaN);
    expect(read(['', 'NaN', 'null', '-', 'n/a', '1'])).toEqual([...gaps, 1]);
  });
  it('reads well-known numbers beyond any tide as gaps, and says so', () => {
    const text = lines(
      'time_utc,height_m',
      '2031-06-01T00:00,1',
      '2031-06-01T01:00,9999',
      '2031-06-01T02:00,-99.99',
      '2031-06-01T03:00,9999',
    );
    const { series, flags, warnings } = parseGaugeCsv(text);
    expect([...series.values]).toEqual([1, Number.NaN, Number.NaN, Number.NaN]);
    expect([...flags]).toEqual([2, 9, 9, 9]);
    expect(warnings).toEqual([
      { code: 'SENTINEL', message: '9999 taken as a gap', count: 2, line: 3 },
      { code: 'SENTINEL', message: '-99.99 taken as a gap', count: 1, line: 4 },
    ]);
  });
  it('leaves a height of 9999 mm a height', () => {
    const text = lines('time_utc,height_mm', '2031-06-01T00:00,9999', '2031-06-01T01:00,9998');
    expect([...parseGaugeCsv(text).series.values]).toEqual([9.999, 9.998]);
  });
  it('takes the numbers that the caller names instead', () => {
    expect(read(['-1', '2', '99.99'], { sentinels: [-1] })).toEqual([Number.NaN, 2, 99.99]);
  });
  it('fills missing lines of a regular record', () => {
    const text = lines(
      'time_utc,height_m',
      '2031-06-01T00:00,1',
      '2031-06-01T01:00,2',
      '2031-06-01T02:00,3',
      '2031-06-01T05:00,4',
    );
    const { series, step } = parseGaugeCsv(text);
    expect(step).toBe(HOUR);
    expect([...series.values]).toEqual([1, 2, 3, Number.NaN, Number.NaN, 4]);
  });
  it('does not fill where the step changes', () => {
    const hourly = Array.from({ length: 30 }, (_, i) => new Date(i * HOUR));
    const quick = Array.from({ length: 60 }, (_, i) => new Date(30 * HOUR + i * 6 * MINUTE));
    const rows = [...hourly, ...quick].map((t) => `${t.toISOString()},1.${t.getUTCMinutes()}`);
    const { series, warnings } = parseGaugeCsv(lines('time,height_m', ...rows));
    expect(series.times?.length).toBe(90);
    expect(warnings[0]).toMatchObject({ code: 'STEP_CHANGES', count: 1 });
  });
});

describe('records that hold little', () => {
  const head = 'time_utc,height_m';
  it('one sample', () => {
    const record = parseGaugeCsv(lines(head, '2031-06-01T00:00,1.2'));
    expect([...(record.series.times ?? [])]).toEqual([at('2031-06-01T00:00Z')]);
    expect(record.step).toBeUndefined();
    expect(record.warnings.map((w) => w.code)).toEqual(['ONE_SAMPLE']);
  });
  it('all gaps', () => {
    const record = parseGaugeCsv(lines(head, '2031-06-01T00:00,', '2031-06-01T01:00,NaN'));
    expect([...record.flags]).toEqual([9, 9]);
    expect(record.warnings.map((w) => w.code)).toEqual(['ALL_GAPS']);
  });
  it('constant heights', () => {
    const record = parseGaugeCsv(lines(head, '2031-06-01T00:00,2', '2031-06-01T01:00,2'));
    expect(record.warnings).toEqual([
      { code: 'CONSTANT', message: 'every height is 2 m', count: 1 },
    ]);
  });
  it('an hour at 6 minutes', () => {
    const rows = Array.from(
      { length: 10 },
      (_, i) => `2031-06-01T00:${String(6 * i).padStart(2, '0')},${i}`,
    );
    expect(parseGaugeCsv(lines(head, ...rows)).series.values.length).toBe(10);
  });
  it('names the datum of the header', () => {
    expect(parseGaugeCsv(lines('time_utc,height (m MLLW)', '2031-06-01T00:00,1')).datum).toBe(
      'MLLW',
    );
  });
});

describe('clocks that change', () => {
  // Madrid, 26 October 2031: 03:00 summer time becomes 02:00.
  const autumn = ['01:30', '02:00', '02:30', '02:00', '02:30', '03:00'];
  const text = lines(
    'Time (Europe/Madrid),height_m',
    ...autumn.map((t, i) => `2031-10-26 ${t},1.${i}`),
  );
  const start = at('2031-10-25T23:30Z');
  it('reads an hour that occurs twice by order', () => {
    const { series } = parseGaugeCsv(text, { whenTwice: 'by-order' });
    expect(series).toEqual({
      start,
      step: 30 * MINUTE,
      values: Float64Array.of(1, 1.1, 1.2, 1.3, 1.4, 1.5),
    });
  });
  it.each([
    ['first', '2031-10-26T00:00Z'],
    ['second', '2031-10-26T01:00Z'],
  ] as const)('takes the %s where told', (whenTwice, instant) => {
    const one = lines('time,height_m', '2031-10-26 02:00,1');
    const { series } = parseGaugeCsv(one, { whenTwice, timeZone: 'Europe/Madrid' });
    expect(series.times?.[0]).toBe(at(instant));
  });
  it('keeps local mean time of old records', () => {
    const { series } = parseGaugeCsv(lines('time,height_m', '1880-01-01 12:00:00,1'), {
      timeZone: 'Europe/Amsterdam',
    });
    expect(Math.abs((series.times?.[0] ?? 0) - at('1880-01-01T11:40Z'))).toBeLessThan(5 * MINUTE);
  });
  it('accepts offsets that agree with the zone named', () => {
    const agreed = lines('time,height_m', '2031-10-26 02:00+02:00,1', '2031-10-26 02:00+01:00,2');
    const { series, timeZone } = parseGaugeCsv(agreed, { timeZone: 'Europe/Madrid' });
    expect(timeZone).toBe('Europe/Madrid');
    expect(series.step).toBe(HOUR);
  });
  it('warns of offsets that vary', () => {
    const mixed = lines('time,height_m', '2031-10-26 02:00+02:00,1', '2031-10-26 02:00+01:00,2');
    const { warnings, timeZone } = parseGaugeCsv(mixed);
    expect(timeZone).toBe('+02:00');
    expect(warnings[0]).toMatchObject({ code: 'OFFSETS_VARY', count: 1 });
  });
});
