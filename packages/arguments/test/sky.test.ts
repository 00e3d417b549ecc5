import { angleDifference, EARLIEST, LATEST, wrapDegrees } from '@staithe/core';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  lunarApsides,
  moonPhases,
  moonPosition,
  seasons,
  sunAltitude,
  sunPosition,
} from '../src/sky.js';

const DAY = 86400000;
const FINDERS = [moonPhases, lunarApsides, seasons] as const;
const instants = fc.integer({ min: EARLIEST + 800 * DAY, max: LATEST - 800 * DAY });

describe('events', () => {
  it('of adjacent spans join to those of the whole', () => {
    fc.assert(
      fc.property(
        instants,
        fc.integer({ min: 1, max: 400 * DAY }),
        fc.integer({ min: 1, max: 400 * DAY }),
        (from, first, second) => {
          for (const find of FINDERS) {
            const whole = find({ from, to: from + first + second });
            const parts = [
              ...find({ from, to: from + first }),
              ...find({ from: from + first, to: from + first + second }),
            ];
            expect(parts).toEqual(whole);
          }
        },
      ),
      { numRuns: 40 },
    );
  });

  it('belong to a span that begins with them, not to one that ends with them', () => {
    for (const find of FINDERS) {
      const [event] = find({ from: '2031-01-01T00:00Z', to: '2032-01-01T00:00Z' });
      const time = event?.time as number;
      expect(Number.isInteger(time)).toBe(true);
      expect(find({ from: time, to: time + 1 })).toEqual([event]);
      expect(find({ from: time - 1, to: time })).toEqual([]);
    }
  });

  it('come in turn, over the whole range', () => {
    const span = { from: EARLIEST, to: LATEST };
    const turns = [
      [moonPhases(span), ['new', 'first-quarter', 'full', 'last-quarter'], 6.5, 8.4],
      [lunarApsides(span), ['perigee', 'apogee'], 11.5, 16.1],
      [
        seasons(span),
        ['march-equinox', 'june-solstice', 'september-equinox', 'december-solstice'],
        88,
        94.5,
      ],
    ] as const;
    for (const [events, kinds, shortest, longest] of turns) {
      const offset = (kinds as readonly string[]).indexOf(events[0]?.kind as string);
      events.forEach(({ kind, time }, i) => {
        if (kind !== kinds[(i + offset) % kinds.length]) throw new Error(`${kind} at ${time}`);
        const days = i === 0 ? shortest : (time - (events[i - 1]?.time as number)) / DAY;
        if (days < shortest || days > longest) throw new Error(`${days} days before ${time}`);
      });
      expect(events.length).toBeGreaterThan(2000);
    }
  });
});

describe('events and positions', () => {
  const span = { from: '2020-01-01T00:00Z', to: '2030-01-01T00:00Z' };

  it('agree at the phases, to 0.02° of elongation (2 minutes)', () => {
    const angles = { new: 0, 'first-quarter': 90, full: 180, 'last-quarter': 270 };
    for (const { kind, time } of moonPhases(span)) {
      const ahead = moonPosition(time).longitude - sunPosition(time).longitude;
      expect(Math.abs(angleDifference(angles[kind], ahead))).toBeLessThan(0.02);
    }
  });

  it('agree at the equinoxes and solstices', () => {
    seasons(span).forEach(({ time }, i) => {
      const off = angleDifference(sunPosition(time).longitude, i * 90);
      expect(Math.abs(off)).toBeLessThan(1e-6);
    });
  });

  it('agree at perigee and apogee: the Moon is farther off, or nearer, two hours before and after', () => {
    for (const { kind, time, distance } of lunarApsides(span)) {
      const sign = kind === 'perigee' ? 1 : -1;
      for (const hours of [-2, 2]) {
        const there = moonPosition(time + hours * 3600000).distance;
        expect(sign * (there - distance)).toBeGreaterThan(0);
      }
    }
  });
});

describe('the altitude of the Sun', () => {
  it('is its declination at a pole, and the other way round at the other', () => {
    fc.assert(
      fc.property(instants, fc.integer({ min: -360, max: 360 }), (t, longitude) => {
        const { declination } = sunPosition(t);
        expect(Math.abs(sunAltitude(t, { latitude: 90, longitude }) - declination)).toBeLessThan(
          1e-9,
        );
        expect(Math.abs(sunAltitude(t, { latitude: -90, longitude }) + declination)).toBeLessThan(
          1e-9,
        );
      }),
    );
  });

  it('is that of the antipode with its sign turned', () => {
    fc.assert(
      fc.property(
        instants,
        fc.integer({ min: -90, max: 90 }),
        fc.integer({ min: -180, max: 180 }),
        (t, latitude, longitude) => {
          const there = sunAltitude(t, {
            latitude: -latitude,
            longitude: wrapDegrees(longitude + 180),
          });
          expect(Math.abs(sunAltitude(t, { latitude, longitude }) + there)).toBeLessThan(1e-9);
        },
      ),
    );
  });
});

describe('bad input', () => {
  const place = { latitude: 52, longitude: 0 };

  it.each([
    ['an instant outside the range', () => moonPosition('1066-10-14T09:00Z'), 'OUT_OF_RANGE', 't'],
    ['no zone', () => sunPosition('2031-06-01T00:00'), 'NO_TIME_ZONE', 't'],
    ['NaN', () => sunAltitude(Number.NaN, place), 'NOT_FINITE', 't'],
    [
      'a latitude beyond the pole',
      () => sunAltitude(0, { latitude: 91, longitude: 0 }),
      'OUT_OF_RANGE',
      'place.latitude',
    ],
    [
      'a latitude as text',
      () => sunAltitude(0, { latitude: '52' as unknown as number, longitude: 0 }),
      'NOT_FINITE',
      'place.latitude',
    ],
    [
      'a longitude more than a turn off',
      () => sunAltitude(0, { latitude: 0, longitude: -361 }),
      'OUT_OF_RANGE',
      'place.longitude',
    ],
    ['an empty span', () => moonPhases({ from: 1, to: 1 }), 'EMPTY_SPAN', 'span.to'],
    ['a span turned round', () => lunarApsides({ from: 2, to: 1 }), 'EMPTY_SPAN', 'span.to'],
    ['a bad end', () => seasons({ from: 0, to: 'soon' }), 'BAD_TIME', 'span.to'],
  ])('is refused: %s', (_, call, code, path) => {
    expect(call).toThrowError(expect.objectContaining({ code, path }) as Error);
  });
});
