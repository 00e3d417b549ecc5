import { createHash } from 'node:crypto';
import { beforeAll, describe, expect, test } from 'vitest';
import { makeDemoRecords, trueTide } from '../generate/records.mjs';

type Demo = ReturnType<typeof makeDemoRecords>;
const MINUTE = 60_000;
const DAY = 1440 * MINUTE;

/** Rows of a record as time and value. */
function rowsOf({ files }: Demo, name: string): Map<number, number> {
  const text = files.find((file) => file.name === name)?.text ?? '';
  const rows = text.trimEnd().split('\n').slice(1);
  return new Map(
    rows.map((row) => {
      const [time, value] = row.split(',');
      return [Date.parse(`${time?.replace(' ', 'T')}Z`), Number(value)];
    }),
  );
}

const digest = ({ files }: Demo): string =>
  createHash('sha256')
    .update(files.map(({ name, text }) => name + text).join('\n'))
    .digest('hex');

let demo: Demo;
let harbour: Map<number, number>;
beforeAll(() => {
  demo = makeDemoRecords();
  harbour = rowsOf(demo, 'quenby-haven.csv');
});

describe('the files', () => {
  test('are the same at every run', () => {
    expect(digest(makeDemoRecords())).toBe(digest(demo));
  });

  test('have a header with zone and unit, and whole rows in order of time', () => {
    const text = demo.files.find(({ name }) => name === 'quenby-haven.csv')?.text ?? '';
    const [header, ...rows] = text.trimEnd().split('\n');
    expect(header).toBe('Time (UTC),Water level (m)');
    expect(rows.filter((row) => !/^\d{4}-\d\d-\d\d \d\d:\d\d,-?\d+\.\d{3}$/.test(row))).toEqual([]);
    const times = [...harbour.keys()];
    expect(times.every((time, i) => i === 0 || time > (times[i - 1] ?? time))).toBe(true);
  });

  test('span thirteen months at six minutes and hourly', () => {
    for (const [id, stepMinutes] of [
      ['quenby-haven', 6],
      ['merrowby-lagoon', 60],
    ] as const) {
      const { record } = demo.truth[id];
      expect(record).toMatchObject({
        from: '2029-11-01T00:00:00Z',
        to: '2030-12-01T00:00:00Z',
        stepMinutes,
      });
      expect(record.samples).toBe((395 * 1440) / stepMinutes);
      expect(rowsOf(demo, `${id}.csv`).size).toBe(record.written);
    }
  });

  test('carry their truth as JSON', () => {
    const text = demo.files.find(({ name }) => name === 'quenby-haven-truth.json')?.text ?? '';
    expect(JSON.parse(text)).toEqual(demo.truth['quenby-haven']);
  });
});

describe('the faults of the harbour', () => {
  const ofKind = <K extends string>(kind: K) =>
    demo.truth['quenby-haven'].faults.filter(
      (fault): fault is Extract<typeof fault, { kind: K }> => fault.kind === kind,
    );

  test('are counted as stated', () => {
    const counts = ['gap', 'spike', 'stuck', 'step'].map((kind) => ofKind(kind).length);
    expect(counts).toEqual([14, 25, 1, 1]);
  });

  test('gaps are rows that are not there, and nothing else is missing', () => {
    const gaps = ofKind('gap');
    for (const { from, to } of gaps) {
      for (let time = Date.parse(from); time < Date.parse(to); time += 6 * MINUTE)
        expect(harbour.has(time)).toBe(false);
      expect(harbour.has(Date.parse(from) - 6 * MINUTE)).toBe(true);
      expect(harbour.has(Date.parse(to))).toBe(true);
    }
    const { samples, written } = demo.truth['quenby-haven'].record;
    expect(gaps.reduce((sum, { missing }) => sum + missing, 0)).toBe(samples - written);
    expect(Math.max(...gaps.map(({ from, to }) => Date.parse(to) - Date.parse(from)))).toBe(
      9 * DAY,
    );
  });

  test('spikes of 0.3 to 3 m stand out of their neighbours', () => {
    for (const { at, change } of ofKind('spike')) {
      const time = Date.parse(at);
      const [before, here, after] = [-6, 0, 6].map(
        (minutes) => harbour.get(time + minutes * MINUTE) ?? Number.NaN,
      );
      expect(Math.abs(change)).toBeGreaterThanOrEqual(0.3);
      expect(Math.abs(change)).toBeLessThanOrEqual(3);
      // 0.12 m: the most that seiche and curvature move a sample off its neighbours' middle
      expect(Math.abs((here ?? 0) - ((before ?? 0) + (after ?? 0)) / 2 - change)).toBeLessThan(
        0.12,
      );
    }
  });

  test('the sensor is stuck for two days', () => {
    const [stuck] = ofKind('stuck');
    const times = [...harbour].filter(
      ([time]) => time >= Date.parse(stuck?.from ?? '') && time < Date.parse(stuck?.to ?? ''),
    );
    expect(times.length).toBe(480);
    expect(new Set(times.map(([, value]) => value)).size).toBe(1);
  });
});

describe('the events', () => {
  test('the storm lifts the sea by about 0.9 m while the pressure falls', () => {
    const storm = demo.truth['quenby-haven'].events.find((event) => event.kind === 'storm');
    const middle = (Date.parse(storm?.from ?? '') + Date.parse(storm?.to ?? '')) / 2;
    const [tide] = trueTide('quenby-haven', { start: middle, step: 6 * MINUTE, count: 1 });
    // 0.3 m: three times the standard deviation of everyday weather
    expect(Math.abs((harbour.get(middle) ?? Number.NaN) - (tide ?? 0) - 0.9)).toBeLessThan(0.3);
    const pressure = rowsOf(demo, 'quenby-haven-pressure.csv');
    expect(Math.min(...pressure.values())).toBe(
      Math.min(
        ...[...pressure]
          .filter(([time]) => Math.abs(time - middle) < DAY)
          .map(([, value]) => value),
      ),
    );
  });

  test('the level follows the air pressure by about a centimetre a hectopascal', () => {
    const pressure = [...rowsOf(demo, 'quenby-haven-pressure.csv')].filter(
      ([time]) => time < Date.UTC(2030, 1, 1),
    );
    const tide = trueTide('quenby-haven', {
      start: Date.UTC(2029, 10, 1),
      step: 60 * MINUTE,
      count: pressure.length,
    });
    const pairs = pressure.flatMap(([time, value], i) => {
      const level = harbour.get(time);
      return level === undefined ? [] : [[value, level - (tide[i] ?? 0)] as const];
    });
    const mean = (pick: 0 | 1): number =>
      pairs.reduce((sum, pair) => sum + pair[pick], 0) / pairs.length;
    const [x, y] = [mean(0), mean(1)];
    const slope =
      pairs.reduce((sum, [a, b]) => sum + (a - x) * (b - y), 0) /
      pairs.reduce((sum, [a]) => sum + (a - x) ** 2, 0);
    expect(slope).toBeGreaterThan(-0.013);
    expect(slope).toBeLessThan(-0.007);
  });
});
