import { DAY, HOUR, MINUTE } from '@staithe/core';
import { expectWithin, refusal } from '@staithe/test-vectors';
import { describe, expect, it } from 'vitest';
import {
  findTurningPoints,
  heightAt,
  heightsAtTimes,
  heightsOnGrid,
  makePlan,
  rateAt,
  tideCurve,
} from '../src/index.js';
import { officialConstants, place } from './reference/places.js';

const quay = place(
  [
    { name: 'M2', amplitude: 1.5, phaseLag: 140 },
    { name: 'S2', amplitude: 0.5, phaseLag: 185 },
    { name: 'O1', amplitude: 0.1, phaseLag: 20 },
  ],
  { meanLevel: 2.5, secularRate: { metresPerYear: 0.01, at: '2030-01-01T00:00Z' } },
);

describe('tideCurve', () => {
  const curve = tideCurve(quay);
  const start = Date.UTC(2031, 5, 1);

  it('gives one height by every way', () => {
    const grid = curve.heights({ start, step: 6 * MINUTE, count: 500 });
    const times = Float64Array.from({ length: 500 }, (_, i) => start + i * 6 * MINUTE);
    expectWithin(curve.heightsAt(times), grid.values, { abs: 1e-12 });
    expectWithin(
      Array.from(times, (t) => curve.height(t)),
      grid.values,
      { abs: 1e-12 },
    );
    expect(heightAt(curve.plan, start)).toBe(curve.height(start));
    expectWithin(heightsAtTimes(curve.plan, [start]), curve.height(start), { abs: 1e-14 });
    // Times in any order give what they give in order.
    const back = times.slice().reverse();
    expectWithin(curve.heightsAt(back), curve.heightsAt(times).reverse(), { abs: 1e-14 });
  });

  it('has the rate that is the slope of the height', () => {
    for (let t = start; t < start + 5 * DAY; t += 5 * HOUR) {
      const slope = (curve.height(t + 1000) - curve.height(t - 1000)) / (2000 / HOUR);
      expectWithin(curve.rate(t), slope, { abs: 1e-8 });
      expect(rateAt(curve.plan, t)).toBe(curve.rate(t));
    }
  });

  it('is stationary at each high and low water', () => {
    const found = curve.turningPoints({ from: start, to: start + 30 * DAY });
    expect(found.length).toBeGreaterThan(110);
    for (const { time } of found) expect(Math.abs(curve.rate(time))).toBeLessThan(1e-6);
  });

  it('adds secular rate and steps', () => {
    const flat = place([], {
      meanLevel: 1,
      secularRate: { metresPerYear: 0.02, at: '2030-01-01T00:00Z' },
      steps: [{ at: '2031-01-01T00:00Z', change: 0.5 }],
    });
    const level = tideCurve(flat);
    expectWithin(level.height('2030-01-01T00:00Z'), 1, { abs: 1e-12 });
    expectWithin(level.height(Date.UTC(2030, 0, 1) + 365.25 * DAY), 1.52, { abs: 1e-12 });
    expectWithin(
      level.heights({ start: '2031-01-01T00:00Z', step: HOUR, count: 1 }).values,
      1 + (0.02 * 365) / 365.25 + 0.5,
      { abs: 1e-12 },
    );
  });

  it('takes a mean instead of an instant when asked', () => {
    const means = tideCurve(place([{ name: 'M2', amplitude: 1, phaseLag: 0 }]), {
      sampling: { meanOver: HOUR, stamp: 'middle' },
    });
    const high = means.turningPoints({ from: start, to: start + DAY })[0];
    const sharp = tideCurve(place([{ name: 'M2', amplitude: 1, phaseLag: 0 }])).turningPoints({
      from: start,
      to: start + DAY,
    })[0];
    expectWithin((high?.height as number) / (sharp?.height as number), 1 - 0.0106, { abs: 1e-4 });
  });

  it('leaves published zeros out with a reason', () => {
    const zero = tideCurve(
      place([
        { name: 'M2', amplitude: 1, phaseLag: 0 },
        { name: 'Mm', amplitude: 0, phaseLag: 0 },
      ]),
    );
    expect(zero.plan.leftOut).toEqual([{ name: 'Mm', reason: 'amplitude 0: not resolved' }]);
    expect(zero.plan.basis.names).toEqual(['M2']);
  });

  it('is linear in the constants', () => {
    const [one, two] = [
      quay,
      {
        ...quay,
        constituents: quay.constituents.map((c) => ({ ...c, amplitude: 2 * c.amplitude })),
      },
    ];
    const level = (c: typeof quay): number => tideCurve({ ...c, constituents: [] }).height(start);
    expectWithin(
      tideCurve(two).height(start) - level(two),
      2 * (tideCurve(one).height(start) - level(one)),
      { abs: 1e-12 },
    );
  });

  it('ends on a flat curve and tells', () => {
    const flat = tideCurve(place([]));
    expect(flat.turningPoints({ from: start, to: start + 400 * DAY })).toEqual([]);
    expect(flat.crossings(0, { from: start, to: start + 400 * DAY })).toEqual([]);
    expect(flat.windows({ above: 0 }, { from: start, to: start + DAY })).toEqual([
      { from: start, to: start + DAY, openStart: true, openEnd: true },
    ]);
  });

  it('travels as a plan', () => {
    const plan = structuredClone(makePlan(quay));
    const span = { from: start, to: start + DAY };
    expect(findTurningPoints(plan, span)).toEqual(curve.turningPoints(span));
  });
});

describe('bad input', () => {
  const span = { from: 0, to: DAY };
  const curve = tideCurve(quay);
  it.each<[string, () => unknown]>([
    [
      'UNKNOWN_CONSTITUENT constituents[0].name',
      () => tideCurve(place([{ name: 'M22x', amplitude: 1, phaseLag: 0 }])),
    ],
    [
      'AMBIGUOUS_CONSTITUENT constituents[0].name',
      () => tideCurve(place([{ name: 'K4', amplitude: 1, phaseLag: 0 }])),
    ],
    [
      'OUT_OF_RANGE constituents[0].amplitude',
      () => tideCurve(place([{ name: 'M2', amplitude: -1, phaseLag: 0 }])),
    ],
    [
      'NOT_FINITE constituents[0].amplitude',
      () => tideCurve(place([{ name: 'M2', amplitude: Number.NaN, phaseLag: 0 }])),
    ],
    [
      'NOT_FINITE constituents[0].phaseLag',
      () => tideCurve(place([{ name: 'M2', amplitude: 1, phaseLag: Number.NaN }])),
    ],
    ['NOT_FINITE meanLevel', () => tideCurve(place([], { meanLevel: Number.NaN }))],
    [
      'DUPLICATE constituents[2].name',
      () =>
        tideCurve(
          place([
            { name: 'Mm', amplitude: 0, phaseLag: 0 },
            { name: 'M2', amplitude: 1, phaseLag: 0 },
            { name: 'M2', amplitude: 1, phaseLag: 0 },
          ]),
        ),
    ],
    ['UNKNOWN_VERSION version', () => tideCurve(place([], { version: 2 as 1 }))],
    ['UNKNOWN_FORMAT format', () => tideCurve(null as unknown as typeof quay)],
    ['WRONG_TYPE constituents', () => tideCurve(place({} as unknown as []))],
    [
      'UNKNOWN_CHOICE argumentModel',
      () => tideCurve(place([], { argumentModel: 'x' as 'iers2010' })),
    ],
    [
      'OUT_OF_RANGE sampling.meanOver',
      () => tideCurve(quay, { sampling: { meanOver: -1, stamp: 'start' } }),
    ],
    ['NOT_FINITE condition.above', () => curve.windows({ above: Number.NaN }, span)],
    ['CONFLICT condition.above', () => curve.windows({ above: 2, below: 1 }, span)],
    ['UNKNOWN_UNIT unit', () => tideCurve(place([], { unit: 'ft' as 'm' }))],
    [
      'NO_TIME_ZONE steps[0].at',
      () => tideCurve(place([], { steps: [{ at: '2031-01-01T00:00', change: 1 }] })),
    ],
    [
      'MODEL_CROSSED constituents[10]',
      () => tideCurve(officialConstants('9410230'), { models: { nodalModel: 'potential' } }),
    ],
    ['OUT_OF_RANGE t', () => curve.height('1066-10-14T09:00Z')],
    ['NOT_FINITE t', () => curve.rate(Number.NaN)],
    ['EMPTY_SPAN span.to', () => curve.turningPoints({ from: DAY, to: 0 })],
    ['EMPTY_SPAN span.to', () => curve.crossings(0, { from: 0, to: 0 })],
    ['NOT_FINITE level', () => curve.crossings(Number.NaN, span)],
    ['MISSING condition', () => curve.windows({}, span)],
    ['STEP_TOO_SHORT step', () => curve.heights({ start: 0, step: 6, count: 10 })],
    ['OUT_OF_RANGE count', () => curve.heights({ start: 0, step: HOUR, count: 1e12 })],
    ['OUT_OF_RANGE count', () => curve.heights({ start: 0, step: HOUR, count: -1 })],
    [
      'OUT_OF_RANGE start + step * (count - 1)',
      () => heightsOnGrid(curve.plan, { start: '2200-12-31T00:00Z', step: HOUR, count: 1000 }),
    ],
    ['NOT_FINITE times[1]', () => curve.heightsAt([0, Number.NaN])],
  ])('is refused with %s', (expected, run) => {
    const { code, path } = refusal(run);
    expect(`${code} ${path}`).toBe(expected);
  });

  it('offers near names', () => {
    const error = refusal(() => tideCurve(place([{ name: 'MM2', amplitude: 1, phaseLag: 0 }])));
    expect(error.message).toContain('near names');
  });
});
