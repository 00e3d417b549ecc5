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

function refusal(json: unknown): InputError {
  try {
    parseConstants(json);
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
