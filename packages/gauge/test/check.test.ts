/**
 * Faults put into real records, and real records left alone. Hourly heights of NOAA/NOS/CO-OPS.
 */
import { DAY, HOUR, MINUTE, toInstant, type UniformSeries, uniformSeries } from '@staithe/core';
import { hourlySeries } from '@staithe/test-vectors';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  type CheckLimits,
  checkRecord,
  type QualityReason,
  type RecordCheck,
} from '../src/index.js';

const OFF: CheckLimits = {
  instrument: false,
  season: false,
  jump: false,
  slope: false,
  stuckFor: false,
  tooCalm: false,
  besides: false,
};

const counts = (check: RecordCheck, flag: number): number =>
  check.flags.reduce((sum, own) => sum + (own === flag ? 1 : 0), 0);
const runsOf = (check: RecordCheck, reason: QualityReason): RecordCheck['reasons'] =>
  check.reasons.filter((run) => run.reason === reason);

function cut(series: UniformSeries, from: string, to: string): UniformSeries {
  const first = (toInstant(from) - series.start) / series.step;
  const end = (toInstant(to) - series.start) / series.step;
  return { ...series, start: toInstant(from), values: series.values.slice(first, end) };
}

/** The curve through hourly heights by cubic interpolation, good to a few millimetres. */
function curveThrough({ start, step, values }: UniformSeries): (t: Float64Array) => Float64Array {
  const at = (k: number): number => values[Math.min(Math.max(k, 0), values.length - 1)] as number;
  return (times) =>
    times.map((time) => {
      const i = Math.floor((time - start) / step);
      const u = (time - start) / step - i;
      return (
        ((-u * (u - 1) * (u - 2)) / 6) * at(i - 1) +
        (((u + 1) * (u - 1) * (u - 2)) / 2) * at(i) -
        (((u + 1) * u * (u - 2)) / 2) * at(i + 1) +
        (((u + 1) * u * (u - 1)) / 6) * at(i + 2)
      );
    });
}

const predicted = hourlySeries('la-jolla-predicted-2010-2020');
const expected = curveThrough(predicted);
const observed = cut(hourlySeries('la-jolla-observed'), '2012-01-01T00:00Z', '2014-01-01T00:00Z');

describe('real records left as they are', () => {
  it.each([
    ['la-jolla-observed', 5, 0],
    ['eastport-observed-2019', 3, 0],
    ['grand-isle-observed-2010', 60, 1],
  ] as const)('%s', (id, doubtful, rejected) => {
    const check = checkRecord(hourlySeries(id));
    expect(counts(check, 3)).toBeLessThanOrEqual(doubtful);
    expect(counts(check, 4)).toBeLessThanOrEqual(rejected);
  });
  it('finds neither moved zero nor clock fault in two years of La Jolla', () => {
    expect(checkRecord(observed, { expected }).findings).toEqual([]);
  });
});

describe('faults put into the hourly record of La Jolla', () => {
  const changed = (change: (values: Float64Array) => void): UniformSeries => {
    const values = observed.values.slice();
    change(values);
    return { ...observed, values };
  };
  const time = (i: number): number => observed.start + i * observed.step;

  it('spikes, without blaming their neighbours', () => {
    const spikes = [500, 1501, 2502, 2504, 6001, 6002, 9000];
    const series = changed((values) => {
      spikes.forEach((i, k) => {
        values[i] = (values[i] as number) + (k % 2 ? -1 : 1) * (0.6 + k / 5);
      });
    });
    const { tests } = checkRecord(series);
    const found = [...tests.jump].flatMap((flag, i) => (flag === 4 ? [i] : []));
    expect(found).toEqual(spikes);
  });

  it('a sensor stuck for two days, from its first hour', () => {
    const series = changed((values) => values.fill(values[4000] as number, 4000, 4048));
    const check = checkRecord(series);
    expect(runsOf(check, 'flat line')).toEqual([
      {
        from: time(4000),
        to: time(4047),
        samples: 48,
        flag: 4,
        reason: 'flat line',
        measured: 48 * HOUR,
        allowed: check.limits.stuckFor?.reject,
      },
    ]);
  });

  it('a gauge that hardly moves any more', () => {
    const series = changed((values) => {
      for (let i = 3000; i < 3072; i++) values[i] = 0.01 * (values[i] as number);
    });
    const runs = runsOf(checkRecord(series), 'attenuated signal');
    const run = runs.find((one) => one.flag === 4);
    // Heights on the way to the calm may lie inside its range.
    expect(runs[0]?.from).toBeGreaterThan(time(3000 - 4));
    expect(run?.from).toBeLessThanOrEqual(time(3000));
    expect(runs[runs.length - 1]?.to).toBe(time(3071));
    expect(run?.measured).toBeLessThan(0.05);
  });

  it('heights no gauge sees', () => {
    const series = changed((values) => values.fill(30, 100, 103));
    const [run] = runsOf(checkRecord(series), 'gross range');
    expect(run).toMatchObject({
      from: time(100),
      to: time(102),
      samples: 3,
      flag: 4,
      measured: 30,
    });
  });

  it('a zero that moved by 20 cm', () => {
    const series = changed((values) => {
      for (let i = 8000; i < values.length; i++) values[i] = (values[i] as number) + 0.2;
    });
    const { findings } = checkRecord(series, { expected });
    expect(findings.map(({ kind }) => kind)).toEqual(['zero-moved']);
    const [moved] = findings;
    if (moved?.kind !== 'zero-moved') throw new Error('no moved zero');
    expect(moved.at).toBe(time(8000));
    expect(Math.abs(moved.change - 0.2)).toBeLessThan(3 * moved.sigma);
    expect(moved.sigma).toBeLessThan(0.025);
  });

  it('a zero that moved while the gauge was away for a day', () => {
    const series = changed((values) => {
      values.fill(Number.NaN, 8000, 8024);
      for (let i = 8024; i < values.length; i++) values[i] = (values[i] as number) + 0.4;
    });
    const { findings } = checkRecord(series, { expected });
    expect(findings).toMatchObject([{ kind: 'zero-moved', at: time(8024) }]);
  });

  it('a clock an hour late for three weeks, and no moved zero at its ends', () => {
    const series = changed((values) => {
      for (let i = 5000 + 21 * 24; i >= 5000; i--) values[i] = observed.values[i - 1] as number;
    });
    const { findings } = checkRecord(series, { expected });
    expect(findings.map(({ kind }) => kind)).toEqual(['clock-off']);
    const [off] = findings;
    if (off?.kind !== 'clock-off') throw new Error('no clock fault');
    expect(Math.abs(off.from - time(5000))).toBeLessThanOrEqual(2 * DAY);
    expect(Math.abs(off.to - time(5000 + 21 * 24))).toBeLessThanOrEqual(2 * DAY);
    expect(Math.abs(off.minutes - 60)).toBeLessThan(3);
  });

  it('heights far from the expected curve', () => {
    const series = changed((values) => {
      for (let i = 700; i < 720; i++) values[i] = (values[i] as number) + 3.5;
    });
    const { tests } = checkRecord(series, { expected });
    expect([...tests.besides.slice(700, 720)]).toEqual(new Array(20).fill(4));
    expect(checkRecord(series).tests.besides[700]).toBe(2);
  });
});

describe('a record every 6 minutes', () => {
  // Two constituents, a storm of a metre with its waves; noise from a fixed linear congruence.
  let seed = 3;
  const noise = (): number => {
    seed = (seed * 1664525 + 1013904223) % 4294967296;
    return seed / 4294967296 - 0.5;
  };
  const tide = (hours: number): number =>
    1.4 * Math.cos(0.505868 * hours) + 0.5 * Math.cos(0.5235988 * hours + 1);
  const count = 60 * 240;
  const values = Float64Array.from({ length: count }, (_, i) => {
    const storm = Math.exp(-(((i - 7000) / 200) ** 2));
    const level = tide(i / 10) + storm + (0.01 + 0.12 * storm) * noise();
    return Math.round(level * 1000) / 1000;
  });
  const start = Date.UTC(2031, 0, 1);
  const series = uniformSeries({ start, step: 6 * MINUTE, values });

  it('passes the storm', () => {
    const check = checkRecord(series);
    expect([counts(check, 3), counts(check, 4)]).toEqual([0, 0]);
    expect(counts(check, 1)).toBe(count);
  });
  it('finds a spike of 25 cm and a step of the zero by 8 cm', () => {
    const faulty = { ...series, values: values.slice() };
    faulty.values[2000] = (values[2000] as number) + 0.25;
    for (let i = 10000; i < count; i++) faulty.values[i] = (values[i] as number) + 0.08;
    const curve = (times: Float64Array): Float64Array => times.map((t) => tide((t - start) / HOUR));
    const check = checkRecord(faulty, { expected: curve });
    expect(check.tests.jump[2000]).toBe(4);
    expect(counts(check, 4)).toBe(1);
    expect(check.findings).toHaveLength(1);
    expect(check.findings[0]).toMatchObject({ kind: 'zero-moved', at: start + 10000 * 6 * MINUTE });
  });
});

describe('limits and answers', () => {
  const series = uniformSeries({ start: 0, step: HOUR, values: [0, 1, null, 9, 0] });

  it('season: the ends of the month', () => {
    const low = Array.from({ length: 12 }, () => [-1, 1] as const);
    const wide = Array.from({ length: 12 }, () => [-5, 5] as const);
    const season = { doubt: low, reject: wide };
    const { tests, reasons } = checkRecord(series, { limits: { ...OFF, season } });
    expect([...tests.season]).toEqual([1, 1, 9, 4, 1]);
    expect(reasons.map((run) => run.reason)).toEqual(['gap', 'climatology']);
  });

  it('takes the worst flag, and 2 where nothing was tested', () => {
    const instrument = { doubt: [0, 0.5], reject: [-5, 20] } as const;
    const slope = { doubt: 3, reject: 5 };
    expect([...checkRecord(series, { limits: { ...OFF, instrument, slope } }).flags]).toEqual([
      1, 3, 9, 3, 4,
    ]);
    expect([...checkRecord(series, { limits: OFF }).flags]).toEqual([2, 2, 9, 2, 2]);
  });

  it('does not judge a record of a few heights by itself', () => {
    const { flags, warnings } = checkRecord(series);
    expect([...flags]).toEqual([2, 2, 9, 2, 2]);
    expect(warnings).toMatchObject([{ code: 'TOO_FEW_TO_JUDGE', count: 4 }]);
  });

  it('holes between samples at their own times are gaps', () => {
    const times = Float64Array.of(0, HOUR, 2 * HOUR, 9 * HOUR);
    const { reasons } = checkRecord({ times, values: Float64Array.of(1, 2, 3, 4) });
    expect(reasons).toEqual([
      { from: 2 * HOUR, to: 9 * HOUR, samples: 0, flag: 9, reason: 'gap', measured: 7 * HOUR },
    ]);
  });

  it('flags constant heights as a flat line, from the first to the last', () => {
    const flat = uniformSeries({ start: 0, step: HOUR, values: new Float64Array(100).fill(2) });
    const check = checkRecord(flat, { expected: (times) => new Float64Array(times.length) });
    expect(counts(check, 4)).toBe(100);
    expect(runsOf(check, 'flat line')).toMatchObject([{ samples: 100, flag: 4, from: 0 }]);
  });

  it.each([
    ['all gaps', new Float64Array(60).fill(Number.NaN)],
    ['no sample', new Float64Array(0)],
    ['one sample', Float64Array.of(1)],
  ])('takes a series of %s', (_title, values) => {
    const check = checkRecord({ start: 0, step: HOUR, values });
    expect(counts(check, 9)).toBe(values.filter(Number.isNaN).length);
    expect(counts(check, 3) + counts(check, 4)).toBe(0);
    expect(check.warnings.map((warning) => warning.code)).toEqual(['TOO_FEW_TO_JUDGE']);
  });

  it('survives structuredClone', () => {
    const check = checkRecord(observed, { expected });
    expect(structuredClone(check)).toEqual(check);
  });

  it.each([
    ['limits.instrument.doubt', { instrument: { doubt: [2, 1], reject: [0, 3] } }],
    ['limits.season.doubt', { season: { doubt: [[0, 1]], reject: [[0, 1]] } }],
    ['limits.jump.doubt', { jump: { doubt: -1, reject: 1 } }],
    ['limits.jump.reject', { jump: { doubt: 2, reject: 1 } }],
    ['limits.jump.reach', { jump: { doubt: 1, reject: 2, reach: 4 } }],
    ['limits.slope.doubt', { slope: { doubt: Number.NaN } }],
    ['limits.stuckFor.within', { stuckFor: { doubt: 1, reject: 2, within: 0 } }],
    ['limits.tooCalm.doubt', { tooCalm: { doubt: 1, reject: 2, over: HOUR } }],
    ['limits.tooCalm.over', { tooCalm: { doubt: 2, reject: 1, over: 0 } }],
    ['limits.besides.reject', { besides: { doubt: 2, reject: 1 } }],
  ] as const)('refuses %s', (path, limits) => {
    const wrong = expect.objectContaining({ code: 'OUT_OF_RANGE', path }) as Error;
    expect(() => checkRecord(series, { limits: limits as unknown as CheckLimits })).toThrow(wrong);
  });

  it.each([
    ['WRONG_TYPE', 'expected', () => [1, 2, 3, 4]],
    ['LENGTH_MISMATCH', 'expected', () => new Float64Array(3)],
    ['NOT_FINITE', 'expected[1]', () => Float64Array.of(1, Number.NaN, 1, 1)],
  ] as const)('refuses a curve with %s', (code, path, curve) => {
    const wrong = expect.objectContaining({ code, path }) as Error;
    const answer = curve as unknown as (times: Float64Array) => Float64Array;
    expect(() => checkRecord(series, { expected: answer })).toThrow(wrong);
  });
});

describe('properties', () => {
  const base = cut(observed, '2012-01-01T00:00Z', '2012-03-01T00:00Z');
  it('a level added changes no flag', () => {
    fc.assert(
      fc.property(fc.integer({ min: -64, max: 64 }), (level) => {
        const values = base.values.map((v) => Math.fround(v) + level);
        const plain = base.values.map((v) => Math.fround(v));
        const moved = checkRecord({ ...base, values });
        expect(moved.flags).toEqual(checkRecord({ ...base, values: plain }).flags);
      }),
      { numRuns: 10 },
    );
  });
  it('a spike alone in calm water is found wherever it stands', () => {
    fc.assert(
      fc.property(fc.integer({ min: 3, max: base.values.length - 4 }), fc.boolean(), (i, up) => {
        const values = base.values.slice();
        values[i] = (values[i] as number) + (up ? 1 : -1);
        expect(checkRecord({ ...base, values }).tests.jump[i]).toBe(4);
      }),
      { numRuns: 40 },
    );
  });
});
