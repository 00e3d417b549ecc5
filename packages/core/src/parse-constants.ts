/**
 * Reads and checks a constants document: every finding with path, expected and got.
 * @module
 */
import type { Finding, HarmonicConstants } from './constants-document.js';
import { describe, InputError, type InputErrorCode, isStaitheError } from './errors.js';
import { toInstant } from './time.js';

type Check = (value: unknown, path: string, add: Add) => void;
type Add = (path: string, expected: string, got: unknown, code?: InputErrorCode) => void;
type Shape = Readonly<Record<string, readonly [check: Check, required?: boolean]>>;

const DEEPEST = 32;

/** A copy without surprises: plain data only, no key that could reach a prototype. */
function copyPlain(value: unknown, path: string, depth: number): unknown {
  if (typeof value !== 'object' || value === null) return value;
  if (depth > DEEPEST) {
    throw new InputError('INVALID_DOCUMENT', path, `expected at most ${DEEPEST} levels, got more`);
  }
  if (Array.isArray(value)) return value.map((v, i) => copyPlain(v, `${path}[${i}]`, depth + 1));
  const out: Record<string, unknown> = {};
  for (const [key, inner] of Object.entries(value)) {
    const at = path ? `${path}.${key}` : key;
    if (key === '__proto__' || key === 'constructor' || key === 'prototype') {
      throw new InputError('UNSAFE_KEY', at, `expected another key, got ${describe(key)}`);
    }
    out[key] = copyPlain(inner, at, depth + 1);
  }
  return out;
}

const finite =
  (low: number, high: number, words: string): Check =>
  (value, path, add) => {
    if (typeof value === 'number' && value >= low && value <= high) return;
    add(path, words, value, typeof value === 'number' ? 'OUT_OF_RANGE' : undefined);
  };
const BIG = Number.MAX_VALUE;
const aNumber: Check = finite(-BIG, BIG, 'a finite number');
const zeroOrMore: Check = finite(0, BIG, 'a finite number, 0 or more');
const latitude: Check = finite(-90, 90, 'degrees from -90 to 90');
const longitude: Check = finite(-360, 360, 'degrees east from -360 to 360');
const text: Check = (value, path, add) => {
  if (typeof value !== 'string' || value === '') add(path, 'text', value);
};
const instant: Check = (value, path, add) => {
  if (typeof value !== 'string') return add(path, 'an instant as text with Z or an offset', value);
  try {
    toInstant(value, path);
  } catch (error) {
    add(
      path,
      'an instant with Z or an offset',
      value,
      isStaitheError(error) ? (error.code as InputErrorCode) : undefined,
    );
  }
};
const oneOf =
  (code: InputErrorCode, ...choices: readonly unknown[]): Check =>
  (value, path, add) => {
    if (!choices.includes(value)) add(path, choices.join(' or '), value, code);
  };
const shape =
  (fields: Shape): Check =>
  (value, path, add) => {
    if (typeof value !== 'object' || value === null || Array.isArray(value)) {
      return add(path || 'constants', 'an object', value, 'WRONG_TYPE');
    }
    for (const [key, [check, required]] of Object.entries(fields)) {
      const inner = (value as Record<string, unknown>)[key];
      const at = path ? `${path}.${key}` : key;
      if (inner !== undefined) check(inner, at, add);
      else if (required) add(at, 'a value', undefined, 'MISSING');
    }
  };
const list =
  (check: Check): Check =>
  (value, path, add) => {
    if (!Array.isArray(value)) return add(path, 'an array', value);
    value.forEach((inner: unknown, i) => check(inner, `${path}[${i}]`, add));
  };
const hold: Check = (value, path, add) => {
  if (typeof value === 'object') return shape({ heldAt: [instant, true] })(value, path, add);
  oneOf('UNKNOWN_CHOICE', 'continuous', 'calendar-year')(value, path, add);
};

const constantsShape = (): Check =>
  shape({
    format: [oneOf('UNKNOWN_FORMAT', 'staithe-constants'), true],
    version: [oneOf('UNKNOWN_VERSION', 1), true],
    quantity: [oneOf('UNKNOWN_CHOICE', 'height')],
    unit: [oneOf('UNKNOWN_UNIT', 'm'), true],
    place: [shape({ name: [text, true], latitude: [latitude], longitude: [longitude] })],
    datum: [text],
    meanLevel: [aNumber, true],
    secularRate: [shape({ metresPerYear: [aNumber, true], at: [instant, true] })],
    steps: [list(shape({ at: [instant, true], change: [aNumber, true] }))],
    argumentModel: [oneOf('UNKNOWN_CHOICE', 'iers2010', 'schureman1940'), true],
    nodalModel: [oneOf('UNKNOWN_CHOICE', 'potential', 'schureman1940', 'none'), true],
    nodalHold: [hold],
    nodalLatitude: [latitude],
    constituents: [
      list(
        shape({
          name: [text, true],
          amplitude: [zeroOrMore, true],
          phaseLag: [aNumber, true],
          amplitudeSigma: [zeroOrMore],
          phaseLagSigma: [zeroOrMore],
          radius95: [zeroOrMore],
          standing: [oneOf('UNKNOWN_CHOICE', 'firm', 'faint', 'borrowed')],
          borrowedFrom: [text],
        }),
      ),
      true,
    ],
    uncertainty: [shape({ order: [list(text), true], covariance: [list(aNumber), true] })],
    source: [text],
    record: [shape({ from: [instant, true], to: [instant, true], samples: [zeroOrMore, true] })],
    validity: [shape({ from: [instant], to: [instant] })],
  });

/** What a schema cannot say: one entry a name, and a covariance of the right length. */
function checkWhole(document: HarmonicConstants, add: Add): void {
  const seen = new Set<string>();
  document.constituents.forEach(({ name }, i) => {
    if (seen.has(name)) add(`constituents[${i}].name`, 'each name once', name, 'DUPLICATE');
    seen.add(name);
  });
  const { order, covariance } = document.uncertainty ?? { order: [], covariance: [] };
  const length = (order.length * (order.length + 1)) / 2;
  if (covariance.length !== length) {
    add('uncertainty.covariance', `${length} numbers`, covariance, 'LENGTH_MISMATCH');
  }
}

/**
 * Reads a constants document. Unknown keys are kept; an unknown version is refused.
 *
 * @param json - What `JSON.parse` gave. It is copied.
 * @returns The document.
 * @throws InputError with the code of the first finding (`UNKNOWN_VERSION`, `UNKNOWN_UNIT`, `OUT_OF_RANGE`, `MISSING`,
 *   `DUPLICATE` …, else `INVALID_DOCUMENT`), its path, and all findings in `details.findings`; `UNSAFE_KEY` for `__proto__`.
 * @example
 * parseConstants({ format: 'staithe-constants', version: 1, unit: 'm', meanLevel: 2.1, argumentModel: 'iers2010',
 *   nodalModel: 'potential', constituents: [{ name: 'M2', amplitude: 1.48, phaseLag: 93.1 }] }).meanLevel; // 2.1
 * @public
 */
export function parseConstants(json: unknown): HarmonicConstants {
  const document = copyPlain(json, '', 0);
  const findings: (Finding & { code: InputErrorCode })[] = [];
  const add: Add = (path, expected, got, code = 'INVALID_DOCUMENT') => {
    findings.push({ path, expected, got: describe(got), code });
  };
  constantsShape()(document, '', add);
  if (findings.length === 0) checkWhole(document as HarmonicConstants, add);
  const first = findings.find((f) => f.code === 'UNKNOWN_VERSION') ?? findings[0];
  if (!first) return document as HarmonicConstants;
  const more = findings.length > 1 ? `; ${findings.length - 1} more in details.findings` : '';
  throw new InputError(
    first.code,
    first.path,
    `expected ${first.expected}, got ${first.got}${more}`,
    { findings: findings.map(({ path, expected, got }) => ({ path, expected, got })) },
  );
}
