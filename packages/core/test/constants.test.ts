import { Ajv2020 } from 'ajv/dist/2020.js';
import { describe, expect, it } from 'vitest';
import schema from '../schema/constants.schema.json' with { type: 'json' };
import { InputError, parseConstants } from '../src/index.js';

const good = {
  format: 'staithe-constants',
  version: 1,
  unit: 'm',
  place: { name: 'Example Quay', latitude: 52, longitude: -4 },
  meanLevel: 2.5,
  argumentModel: 'iers2010',
  nodalModel: 'potential',
  constituents: [
    { name: 'M2', amplitude: 1.5, phaseLag: 140, radius95: 0.01, standing: 'firm' },
    { name: 'S2', amplitude: 0.5, phaseLag: 185 },
  ],
};

const valid = new Ajv2020({ allErrors: true }).compile(schema);

function refusal(json: unknown, quantity?: 'current'): InputError {
  try {
    if (quantity) parseConstants(json, quantity);
    else parseConstants(json);
  } catch (error) {
    if (error instanceof InputError) return error;
    throw error;
  }
  throw new Error('expected a refusal');
}

const first = good.constituents[0];
const accepted: [string, unknown][] = [
  ['the least', good],
  [
    'everything',
    {
      ...good,
      quantity: 'height',
      datum: 'chart datum',
      secularRate: { metresPerYear: 0.003, at: '2030-01-01T00:00Z' },
      steps: [{ at: '2030-05-01T10:30Z', change: 0.08 }],
      nodalHold: { heldAt: '2030-07-02T12:00Z' },
      nodalLatitude: 52,
      uncertainty: { order: ['meanLevel'], covariance: [1e-6] },
      source: 'an example',
      record: { from: '2029-11-01T00:00Z', to: '2030-12-01T00:00Z', samples: 94000 },
      validity: { from: '2029-11-01T00:00Z' },
    },
  ],
  ['calendar years', { ...good, nodalHold: 'calendar-year' }],
  ['an unknown key', { ...good, note: { kept: [1, 2] } }],
];

const refused: [string, unknown, string, string][] = [
  ['feet', { ...good, unit: 'ft' }, 'UNKNOWN_UNIT', 'unit'],
  ['version 2', { ...good, version: 2, nodalModel: 'newer' }, 'UNKNOWN_VERSION', 'version'],
  ['version as text', { ...good, version: '1' }, 'UNKNOWN_VERSION', 'version'],
  ['another format', { ...good, format: 'other' }, 'UNKNOWN_FORMAT', 'format'],
  ['currents', { ...good, quantity: 'current' }, 'UNKNOWN_CHOICE', 'quantity'],
  [
    'a negative amplitude',
    { ...good, constituents: [{ ...first, amplitude: -1 }] },
    'OUT_OF_RANGE',
    'constituents[0].amplitude',
  ],
  [
    'a missing amplitude',
    { ...good, constituents: [{ name: 'M2', phaseLag: 1 }] },
    'MISSING',
    'constituents[0].amplitude',
  ],
  [
    'an amplitude as text',
    { ...good, constituents: [{ ...first, amplitude: '1.5' }] },
    'INVALID_DOCUMENT',
    'constituents[0].amplitude',
  ],
  [
    'a nameless constituent',
    { ...good, constituents: [{ ...first, name: '' }] },
    'INVALID_DOCUMENT',
    'constituents[0].name',
  ],
  ['constituents as an object', { ...good, constituents: {} }, 'INVALID_DOCUMENT', 'constituents'],
  ['an unknown nodal model', { ...good, nodalModel: 'other' }, 'UNKNOWN_CHOICE', 'nodalModel'],
  ['an unknown hold', { ...good, nodalHold: 'monthly' }, 'UNKNOWN_CHOICE', 'nodalHold'],
  ['a hold without instant', { ...good, nodalHold: {} }, 'MISSING', 'nodalHold.heldAt'],
  [
    'a rate without zone',
    { ...good, secularRate: { metresPerYear: 0, at: '2030-01-01T00:00' } },
    'NO_TIME_ZONE',
    'secularRate.at',
  ],
  [
    'a latitude of 91',
    { ...good, place: { name: 'x', latitude: 91 } },
    'OUT_OF_RANGE',
    'place.latitude',
  ],
  [
    'an unknown standing',
    { ...good, constituents: [{ ...first, standing: 'sure' }] },
    'UNKNOWN_CHOICE',
    'constituents[0].standing',
  ],
  ['a list', [], 'WRONG_TYPE', 'constants'],
  ['nothing', null, 'WRONG_TYPE', 'constants'],
];

describe('parseConstants', () => {
  it.each(accepted)('accepts %s, as the schema does', (_, json) => {
    expect(parseConstants(json)).toEqual(json);
    expect(valid(json)).toBe(true);
  });

  it.each(refused)('refuses %s, as the schema does', (_, json, code, path) => {
    const error = refusal(json);
    expect([error.code, error.path]).toEqual([code, path]);
    expect(error.message).toMatch(/expected .*, got /);
    expect(valid(json)).toBe(false);
  });

  it.each([
    ['NaN', { ...good, meanLevel: Number.NaN }, 'OUT_OF_RANGE', 'meanLevel'],
    [
      'an amplitude of NaN',
      { ...good, constituents: [{ ...first, amplitude: Number.NaN }] },
      'OUT_OF_RANGE',
      'constituents[0].amplitude',
    ],
    [
      'a name twice',
      { ...good, constituents: [first, first] },
      'DUPLICATE',
      'constituents[1].name',
    ],
    [
      'a short covariance',
      { ...good, uncertainty: { order: ['meanLevel', 'M2.cos'], covariance: [1] } },
      'LENGTH_MISMATCH',
      'uncertainty.covariance',
    ],
    [
      'a date that does not exist',
      { ...good, steps: [{ at: '2030-02-30T00:00Z', change: 1 }] },
      'BAD_TIME',
      'steps[0].at',
    ],
  ])('refuses %s, which a schema cannot say', (_, json, code, path) => {
    expect([refusal(json).code, refusal(json).path]).toEqual([code, path]);
  });

  it('refuses keys that could reach a prototype', () => {
    const hostile: unknown = JSON.parse(
      `{ "place": { "name": "x", "__proto__": { "admin": true } } }`,
    );
    expect([refusal(hostile).code, refusal(hostile).path]).toEqual([
      'UNSAFE_KEY',
      'place.__proto__',
    ]);
    let deep: unknown = 1;
    for (let i = 0; i < 100; i++) deep = [deep];
    expect(refusal({ deep }).code).toBe('INVALID_DOCUMENT');
  });

  it('copies, and tells every finding', () => {
    const document = parseConstants(good);
    expect(document).not.toBe(good);
    expect(structuredClone(document)).toEqual(document);
    const error = refusal({
      ...good,
      unit: 'ft',
      meanLevel: 'x',
      constituents: [{ name: 'M2', amplitude: -1, phaseLag: null }],
    });
    expect((error.details?.['findings'] as unknown[]).length).toBe(4);
  });
});

const rows = [
  { name: 'M2', amplitude: 0.8, phaseLag: 40, radius95: 0.02, standing: 'firm' },
  { name: 'S2', amplitude: 0.3, phaseLag: 85 },
];
const current = {
  format: 'staithe-constants',
  version: 1,
  quantity: 'current',
  unit: 'm/s',
  mean: { east: 0.1, north: -0.05 },
  argumentModel: 'iers2010',
  nodalModel: 'potential',
  east: rows,
  north: rows,
};
const [m2, s2] = rows;

const acceptedCurrents: [string, unknown][] = [
  ['the least', current],
  [
    'everything',
    {
      ...current,
      place: { name: 'Example Narrows', latitude: 52, longitude: -4 },
      nodalHold: 'calendar-year',
      nodalLatitude: 52,
      uncertainty: { order: ['mean.east', 'east.M2.cos'], covariance: [1e-6, 0, 1e-6] },
      source: 'an example',
      record: { from: '2029-11-01T00:00Z', to: '2030-12-01T00:00Z', samples: 94000 },
      validity: { to: '2031-01-01T00:00Z' },
    },
  ],
  ['the names of north in another order', { ...current, north: [s2, m2] }],
  ['an unknown key', { ...current, note: { kept: [1, 2] } }],
  ['no constituent at all', { ...current, east: [], north: [] }],
];

const refusedCurrents: [string, unknown, string, string][] = [
  ['metres', { ...current, unit: 'm' }, 'UNKNOWN_UNIT', 'unit'],
  ['version 2', { ...current, version: 2, unit: 'newer' }, 'UNKNOWN_VERSION', 'version'],
  ['one number as the mean', { ...current, mean: 0.1 }, 'WRONG_TYPE', 'mean'],
  ['half a mean', { ...current, mean: { east: 0.1 } }, 'MISSING', 'mean.north'],
  ['east alone', { ...current, north: undefined }, 'MISSING', 'north'],
  [
    'a negative amplitude',
    { ...current, north: [m2, { ...s2, amplitude: -1 }] },
    'OUT_OF_RANGE',
    'north[1].amplitude',
  ],
  ['an unknown nodal model', { ...current, nodalModel: 'x' }, 'UNKNOWN_CHOICE', 'nodalModel'],
  ['a third quantity', { ...current, quantity: 'salinity' }, 'UNKNOWN_CHOICE', 'quantity'],
  ['a list', [], 'WRONG_TYPE', 'constants'],
];

describe('parseConstants of currents', () => {
  it.each(acceptedCurrents)('accepts %s, as the schema does', (_, json) => {
    expect(parseConstants(json, 'current')).toEqual(json);
    expect(valid(json)).toBe(true);
  });

  it.each(refusedCurrents)('refuses %s, as the schema does', (_, json, code, path) => {
    const error = refusal(json, 'current');
    expect([error.code, error.path]).toEqual([code, path]);
    expect(error.message).toMatch(/expected .*, got /);
    expect(valid(json)).toBe(false);
  });

  it.each([
    ['a name twice', { ...current, east: [m2, m2, s2] }, 'DUPLICATE', 'east[1].name'],
    ['a name that north lacks', { ...current, north: [m2] }, 'MISSING', 'north'],
    ['a name that east lacks', { ...current, east: [s2] }, 'MISSING', 'east'],
    [
      'a short covariance',
      { ...current, uncertainty: { order: ['mean.east'], covariance: [] } },
      'LENGTH_MISMATCH',
      'uncertainty.covariance',
    ],
  ])('refuses %s, which a schema cannot say', (_, json, code, path) => {
    const error = refusal(json, 'current');
    expect([error.code, error.path]).toEqual([code, path]);
  });

  it('tells how to read a document of the other quantity', () => {
    expect(refusal(current).message).toMatch(
      'quantity: expected height (currents: parseConstants(json, \'current\')), got "current"',
    );
    for (const [json, got] of [
      [{ ...good, quantity: 'height' }, '"height"'],
      [good, 'undefined'],
    ] as const) {
      const error = refusal(json, 'current');
      expect([error.code, error.path]).toEqual(['UNKNOWN_CHOICE', 'quantity']);
      expect(error.message).toMatch(
        `quantity: expected current (heights: parseConstants(json)), got ${got}`,
      );
    }
    expect([refusal(current).code, refusal(current).path]).toEqual(['UNKNOWN_CHOICE', 'quantity']);
  });

  it('reads heights as an argument of map, whose second argument is an index', () => {
    const read = parseConstants as unknown as (json: unknown, index: number) => unknown;
    expect([good, good].map(read)).toEqual([good, good]);
  });

  it('copies, and tells every missing row', () => {
    const document = parseConstants(current, 'current');
    expect(document).not.toBe(current);
    expect(structuredClone(document)).toEqual(document);
    const error = refusal({ ...current, east: [m2], north: [s2] }, 'current');
    expect(error.details?.['findings']).toEqual([
      { path: 'east', expected: 'S2', got: 'undefined' },
      { path: 'north', expected: 'M2', got: 'undefined' },
    ]);
  });
});
