import { DAY, HOUR } from '@staithe/core';
import { publishedConstants } from '@staithe/test-vectors';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { type TideCurve, type TurningPoint, tideCurve } from '../src/index.js';
import { officialConstants, place } from './reference/places.js';
import { scanTurningPoints, signChanges } from './reference/scan.js';

const NAMES = 'M2 S2 N2 K2 K1 O1 P1 Q1 Mf Sa M4 MS4 MN4 M6 2MS6 M8 MK3 S4 S6 L2 NU2'.split(' ');
const TIME = 50; // ms, where |h″| > 0.01 m/h² or |h′| > 0.02 m/h

const places = fc
  .tuple(
    fc.uniqueArray(fc.constantFrom(...NAMES), { minLength: 3, maxLength: 21 }),
    fc.array(
      fc.tuple(
        fc.double({ min: 0.01, max: 1, noNaN: true }),
        fc.double({ min: 0, max: 360, noNaN: true }),
      ),
      { minLength: 21, maxLength: 21 },
    ),
  )
  .map(([names, values]) =>
    place(
      names.map((name, i) => {
        const [size, phaseLag] = values[i] as [number, number];
        return { name, amplitude: size, phaseLag };
      }),
    ),
  );
const start = fc.integer({ min: Date.UTC(1990, 0, 1), max: Date.UTC(2060, 0, 1) });

/** Between neighbouring turning points the slope has the sign that their kinds say: none is extra, none between. */
function confirmBySigns(curve: TideCurve, found: readonly TurningPoint[]): void {
  for (let i = 1; i < found.length; i++) {
    const [a, b] = [found[i - 1] as TurningPoint, found[i] as TurningPoint];
    expect(a.kind).not.toBe(b.kind);
    const slope = curve.rate((a.time + b.time) / 2);
    // Instants are whole milliseconds: a pair closer than that leaves no room for a sign.
    if (b.time - a.time > 2) expect(slope > 0).toBe(a.kind === 'low');
  }
}

describe('turning points', () => {
  it('are those of a scan each 5 s, none missing, none extra, at random places', () => {
    fc.assert(
      fc.property(places, start, (constants, from) => {
        const curve = tideCurve(constants);
        const to = from + 6 * DAY;
        const scan = scanTurningPoints(curve, from, to);
        const found = curve.turningPoints({ from, to });
        confirmBySigns(curve, found);
        for (const { time, before } of scan) {
          const twin = found.find(
            (p) => Math.abs(p.time - time) < 2500 && (p.kind === 'high') === before > 0,
          );
          expect(twin, new Date(time).toISOString()).toBeDefined();
          const curvature = Math.abs(curve.rate(time + 1000) - curve.rate(time - 1000)) * 1800;
          if (twin && curvature > 0.01) expect(Math.abs(twin.time - time)).toBeLessThan(TIME);
          if (twin) expect(Math.abs(curve.height(twin.time) - twin.height)).toBeLessThan(1e-6);
        }
      }),
      { numRuns: 8 },
    );
  }, 60000);

  it('of Anchorage with its shallow water are those of a scan each 5 s', () => {
    // OO2 means O1 + Q1 in that list, M2KS2, 2MS8 and 2MN8 are written without their brackets: left out here.
    const others = new Set(['OO2', 'M2KS2', '2MS8', '2MN8']);
    const rows = publishedConstants('9455920').rows.filter(({ name }) => !others.has(name));
    const curve = tideCurve(
      place(rows.map(({ name, amplitude, phaseLag }) => ({ name, amplitude, phaseLag }))),
    );
    const from = Date.UTC(2031, 2, 20);
    const found = curve.turningPoints({ from, to: from + 8 * DAY });
    const scan = scanTurningPoints(curve, from, from + 8 * DAY);
    expect(found.map(({ kind }) => kind)).toEqual(
      scan.map(({ before }) => (before > 0 ? 'high' : 'low')),
    );
    found.forEach(({ time }, i) =>
      expect(Math.abs(time - (scan[i]?.time as number))).toBeLessThan(TIME),
    );
  });

  it('are found where a double high water parts by minutes', () => {
    // M4 with a quarter of M2's amplitude and a little more makes the top flat, then splits it.
    for (const ratio of [0.2499, 0.25, 0.2501, 0.2505, 0.26, 0.3]) {
      const curve = tideCurve(
        place(
          [
            { name: 'M2', amplitude: 1, phaseLag: 0 },
            { name: 'M4', amplitude: ratio, phaseLag: 180 },
          ],
          { nodalModel: 'none' },
        ),
      );
      const from = Date.UTC(2031, 5, 1);
      const found = curve.turningPoints({ from, to: from + 3 * DAY });
      const scan = scanTurningPoints(curve, from, from + 3 * DAY);
      // At the critical ratio the top is flat to the rounding of the constants: the signs decide.
      confirmBySigns(curve, found);
      if (ratio !== 0.25) expect(found.length, `ratio ${ratio}`).toBe(scan.length);
    }
  });

  it('join: adjacent spans give what the whole gives, events at a cut belong to the later span', () => {
    fc.assert(
      fc.property(
        places,
        start,
        fc.double({ min: 0.1, max: 0.9, noNaN: true }),
        fc.boolean(),
        (constants, from, share, atEvent) => {
          const curve = tideCurve(constants);
          const to = from + 4 * DAY;
          const whole = curve.turningPoints({ from, to });
          const event = whole[Math.floor(whole.length * share)]?.time;
          const cut =
            atEvent && event !== undefined && event > from
              ? event
              : Math.round(from + share * (to - from));
          expect([
            ...curve.turningPoints({ from, to: cut }),
            ...curve.turningPoints({ from: cut, to }),
          ]).toEqual(whole);
          const level = constants.meanLevel + 0.1;
          expect([
            ...curve.crossings(level, { from, to: cut }),
            ...curve.crossings(level, { from: cut, to }),
          ]).toEqual(curve.crossings(level, { from, to }));
        },
      ),
      { numRuns: 25 },
    );
  });

  it('do not count the jumps between calendar years', () => {
    const curve = tideCurve(officialConstants('9410230'));
    const found = curve.turningPoints({ from: Date.UTC(2011, 11, 25), to: Date.UTC(2012, 0, 8) });
    for (let i = 1; i < found.length; i++) {
      const [a, b] = [found[i - 1], found[i]];
      const join =
        (a?.time as number) < Date.UTC(2012, 0, 1) && (b?.time as number) >= Date.UTC(2012, 0, 1);
      if (!join) expect(a?.kind).not.toBe(b?.kind);
    }
  });
});

describe('crossings', () => {
  it('are those of a scan each 5 s', () => {
    fc.assert(
      fc.property(
        places,
        start,
        fc.double({ min: -0.8, max: 0.8, noNaN: true }),
        (constants, from, level) => {
          const curve = tideCurve(constants);
          const to = from + 5 * DAY;
          const scan = signChanges((t) => curve.height(t) - level, from, to);
          const found = curve.crossings(level, { from, to });
          for (const { time, before } of scan) {
            const twin = found.find(
              (c) => Math.abs(c.time - time) < 2500 && (c.direction === 'rising') === before < 0,
            );
            expect(twin, new Date(time).toISOString()).toBeDefined();
            if (twin && Math.abs(curve.rate(time)) > 0.02)
              expect(Math.abs(twin.time - time)).toBeLessThan(TIME);
          }
          const close = found.filter(
            (c, i) => (found[i + 1]?.time ?? Infinity) - c.time < 5000,
          ).length;
          expect(found.length - scan.length).toBeLessThanOrEqual(2 * close);
        },
      ),
      { numRuns: 8 },
    );
  }, 60000);

  it('alternate, and a touch is none', () => {
    const curve = tideCurve(
      place([{ name: 'S2', amplitude: 1, phaseLag: 0 }], { nodalModel: 'none' }),
    );
    const span = { from: Date.UTC(2031, 5, 1), to: Date.UTC(2031, 5, 4) };
    expect(curve.crossings(1.0000001, span)).toEqual([]);
    expect(curve.crossings(0.5, span).length).toBe(12);
    const top = curve.crossings(1, span);
    expect(top.length % 2).toBe(0);
    const directions = curve.crossings(0.999, span).map(({ direction }) => direction);
    directions.forEach((d, i) => expect(d).toBe(i % 2 === 0 ? directions[0] : directions[1]));
  });
});

describe('windows', () => {
  it('cover exactly the times that hold', () => {
    fc.assert(
      fc.property(places, start, (constants, from) => {
        const curve = tideCurve(constants);
        const span = { from, to: from + 3 * DAY };
        const windows = curve.windows({ above: 0.2, below: 0.9 }, span);
        for (let t = from + HOUR / 7; t < span.to; t += 11 * 60000) {
          const h = curve.height(t);
          const inside = windows.some((w) => t >= w.from && t < w.to);
          if (Math.abs(h - 0.2) > 1e-4 && Math.abs(h - 0.9) > 1e-4)
            expect(inside).toBe(h >= 0.2 && h <= 0.9);
        }
        for (const w of windows) {
          expect(w.openStart).toBe(w.from === span.from);
          expect(w.openEnd).toBe(w.to === span.to);
        }
      }),
      { numRuns: 15 },
    );
  });

  it('say when they open or close in a jump of the level', () => {
    const step = Date.UTC(2031, 5, 2, 12);
    const constants = place([{ name: 'M2', amplitude: 0.2, phaseLag: 0 }], {
      meanLevel: 0,
      steps: [{ at: '2031-06-02T12:00Z', change: 1 }],
    });
    const span = { from: Date.UTC(2031, 5, 1), to: Date.UTC(2031, 5, 4) };
    const curve = tideCurve(constants);
    expect(curve.windows({ above: 0.5 }, span)).toEqual([
      { from: step, to: span.to, openStart: false, openEnd: true, join: true },
    ]);
    expect(curve.crossings(0.5, span)).toEqual([]);
  });
});
