import { HOUR, isStaitheError } from '@staithe/core';
import { describe, expect, it } from 'vitest';
import { dayOf, momentText, readMoment, readZone, startOfDay } from '../src/local-time.js';

const lisbon = readZone('Europe/Lisbon');
const at = (text: string): number => Date.parse(text);

// Rules of the zones from the IANA database, in force since long before: clocks of Lisbon change at 01:00 UTC on the last
// Sundays of March and October; those of Asuncion were put forward at midnight; Apia had no 30 December 2011.
describe('readMoment', () => {
  it('takes an instant with zone as it is, and a date as the start of the local day', () => {
    expect(readMoment('2031-06-01T12:00Z', lisbon, '--from')).toBe(at('2031-06-01T12:00Z'));
    expect(readMoment('2031-06-01T12:00+05:45', lisbon, '--from')).toBe(at('2031-06-01T06:15Z'));
    expect(readMoment('2031-06-01', lisbon, '--from')).toBe(at('2031-05-31T23:00Z'));
    expect(readMoment('2031-01-01', lisbon, '--from')).toBe(at('2031-01-01T00:00Z'));
    expect(readMoment('2031-06-01', readZone('-03:30'), '--from')).toBe(at('2031-06-01T03:30Z'));
  });
  it('takes a local time that occurs once', () => {
    expect(readMoment('2031-06-01T12:00', lisbon, '--from')).toBe(at('2031-06-01T11:00Z'));
    expect(readMoment('2031-03-30T02:00', lisbon, '--from')).toBe(at('2031-03-30T01:00Z'));
  });
  it.each([
    ['2031-03-30T01:30', 'SKIPPED_TIME'],
    ['2031-10-26T01:30', 'AMBIGUOUS_TIME'],
    ['2031-02-30', 'BAD_TIME'],
    ['2031-06-01T12', 'BAD_TIME'],
    ['1066-10-14', 'OUT_OF_RANGE'],
  ] as const)('refuses %s: %s', (text, code) => {
    let caught: unknown;
    try {
      readMoment(text, lisbon, '--from');
    } catch (error) {
      caught = error;
    }
    expect(isStaitheError(caught, code)).toBe(true);
    expect((caught as { path: string }).path).toBe('--from');
  });
});

describe('startOfDay', () => {
  it('is the first instant of a day whose midnight the clocks skip', () => {
    const asuncion = readZone('America/Asuncion');
    // 2 October 2022: 00:00 became 01:00.
    expect(startOfDay(at('2022-10-02T00:00Z'), asuncion)).toBe(at('2022-10-02T04:00Z'));
  });
  it('is the first of two midnights', () => {
    // Havana puts its clocks back at 01:00, so 00:00 to 01:00 occurs twice: 6 November 2022.
    expect(startOfDay(at('2022-11-06T00:00Z'), readZone('America/Havana'))).toBe(
      at('2022-11-06T04:00Z'),
    );
  });
  it('of a day that a zone leaves out is that of the next', () => {
    expect(startOfDay(at('2011-12-30T00:00Z'), readZone('Pacific/Apia'))).toBe(
      at('2011-12-30T10:00Z'),
    );
  });
  it('of an instant is at most 25 hours before it', () => {
    for (let t = at('2031-03-29T00:00Z'); t < at('2031-04-01T00:00Z'); t += HOUR) {
      const start = dayOf(t, lisbon);
      expect(start).toBeLessThanOrEqual(t);
      expect(t - start).toBeLessThan(25 * HOUR);
      expect(momentText(start, lisbon)).toMatch(/ 00:00 \+0[01]:00$/);
    }
  });
});

describe('momentText', () => {
  it('tells repeated hours apart and rounds to the minute', () => {
    expect(momentText(at('2031-10-26T00:30Z'), lisbon)).toBe('2031-10-26 01:30 +01:00');
    expect(momentText(at('2031-10-26T01:30Z'), lisbon)).toBe('2031-10-26 01:30 +00:00');
    expect(momentText(at('2031-06-01T11:59:30Z'), readZone('UTC'))).toBe('2031-06-01 12:00Z');
    expect(momentText(at('2031-06-01T12:00Z'), readZone('-03:30'))).toBe('2031-06-01 08:30 -03:30');
  });
});

describe('readZone', () => {
  it.each(['Mars/Base', '', '+19:00', '2', '+0200x'])('refuses %j', (text) => {
    expect(() => readZone(text)).toThrow('--zone: expected an IANA zone');
  });
});
