import fc from 'fast-check';
import { refusal } from '@staithe/test-vectors';
import { describe, expect, it } from 'vitest';
import {
  DAY,
  EARLIEST,
  formatInstant,
  HOUR,
  LATEST,
  MINUTE,
  toInstant,
  toSpan,
  toStep,
} from '../src/index.js';

describe('toInstant', () => {
  it('reads ISO 8601 with Z or an offset', () => {
    const noon = Date.UTC(2031, 5, 1, 12);
    for (const text of [
      '2031-06-01T12:00Z',
      '2031-06-01T12:00:00Z',
      '2031-06-01T12:00:00.000Z',
      '2031-06-01T14:00+02:00',
      '2031-06-01T14:00+0200',
      '2031-06-01T14:00+02',
      '2031-06-01T08:30-03:30',
    ]) {
      expect(toInstant(text), text).toBe(noon);
    }
    expect(toInstant('2031-06-01T24:00Z')).toBe(noon + 12 * HOUR);
    expect(toInstant('2031-06-01T12:00:00,5Z')).toBe(noon + 500);
    expect(toInstant(new Date(noon))).toBe(noon);
    expect(toInstant({ epochMilliseconds: noon })).toBe(noon);
    expect(toInstant(noon + 0.25)).toBe(noon + 0.25);
  });

  it.each([
    ['2031-06-01T12:00', 'NO_TIME_ZONE'],
    ['2031-06-01', 'BAD_TIME'],
    ['2031-06-30T23:59:60Z', 'LEAP_SECOND'],
    ['2031-02-29T12:00Z', 'BAD_TIME'],
    ['2031-13-01T12:00Z', 'BAD_TIME'],
    ['2031-06-01T24:01Z', 'BAD_TIME'],
    ['2031-06-01T24:00:00.9Z', 'BAD_TIME'],
    ['2031-06-01T12:61Z', 'BAD_TIME'],
    ['2031-06-01T12:00+19:00', 'BAD_TIME'],
    ['1 June 2031', 'BAD_TIME'],
    ['1066-10-14T09:00Z', 'OUT_OF_RANGE'],
    ['0066-10-14T09:00Z', 'OUT_OF_RANGE'],
    ['2201-01-01T00:01Z', 'OUT_OF_RANGE'],
    [Number.NaN, 'NOT_FINITE'],
    [Infinity, 'NOT_FINITE'],
    [new Date('nonsense'), 'NOT_FINITE'],
    [null, 'WRONG_TYPE'],
    [{}, 'WRONG_TYPE'],
  ])('refuses %s as %s', (value, code) => {
    const error = refusal(() => toInstant(value as string, 'options.from'));
    expect(error.code).toBe(code);
    expect(error.path).toBe('options.from');
    expect(error.message).toMatch(/^options\.from: expected .*, got /);
  });

  it('agrees with formatInstant', () => {
    fc.assert(
      fc.property(fc.integer({ min: EARLIEST, max: LATEST }), (t) => {
        expect(toInstant(formatInstant(t))).toBe(t);
      }),
    );
    expect(formatInstant(Date.UTC(2031, 5, 1))).toBe('2031-06-01T00:00Z');
    expect(formatInstant(Date.UTC(2031, 5, 1, 0, 0, 30))).toBe('2031-06-01T00:00:30Z');
    expect(formatInstant(Date.UTC(2031, 5, 1, 0, 0, 30, 500))).toBe('2031-06-01T00:00:30.5Z');
  });
});

describe('spans and steps', () => {
  it('refuses what does not go forward', () => {
    expect(toSpan({ from: 0, to: DAY })).toEqual({ from: 0, to: DAY });
    expect(refusal(() => toSpan({ from: 5, to: 5 })).code).toBe('EMPTY_SPAN');
    expect(refusal(() => toSpan({ from: 5, to: 4 })).path).toBe('span.to');
  });

  it('refuses a step in minutes with the hint', () => {
    expect(toStep(6 * MINUTE)).toBe(360000);
    const error = refusal(() => toStep(6));
    expect(error.code).toBe('STEP_TOO_SHORT');
    expect(error.message).toContain('6 * MINUTE');
    expect(refusal(() => toStep(Number.NaN)).code).toBe('NOT_FINITE');
  });
});
