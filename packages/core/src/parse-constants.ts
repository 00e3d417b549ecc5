/**
 * Reads and checks a constants document: every finding with path, expected and got.
 * @module
 */
import type { Finding, HarmonicConstants } from './constants-document.js';
import { describe, InputError, type InputErrorCode, isStaitheError, refuse } from './errors.js';
import { toInstant } from './time.js';

/**
 * What a value must be: `t` text, `i` an instant as text, `n` a number (`n0,90` from 0 to 90), `=a|b` one of these;
 * `[rule]` a list, an object its fields (`!` after a key: required), a function what it picks for the value.
 */
type Rule = string | readonly [Rule] | Shape | ((value: unknown) => Rule);
type Shape = { readonly [key: string]: Rule };
type Add = (path: string, expected: string, got: unknown, code?: InputErrorCode) => void;

const SIZE = 'n0,';
const LATITUDE = 'n-90,90';
const DOCUMENT: Shape = {
  'format!': '=staithe-constants',
  'version!': '=1',
  quantity: '=height',
  'unit!': '=m',
  place: { 'name!': 't', latitude: LATITUDE, longitude: 'n-360,360' },
  datum: 't',
  'meanLevel!': 'n',
  secularRate: { 'metresPerYear!': 'n', 'at!': 'i' },
  steps: [{ 'at!': 'i', 'change!': 'n' }],
  'argumentModel!': '=iers2010|schureman1940',
  'nodalModel!': '=potential|schureman1940|none',
  nodalHold: (value) =>
    typeof value === 'object' ? { 'heldAt!': 'i' } : '=continuous|calendar-year',
  nodalLatitude: LATITUDE,
  'constituents!': [
    {
      'name!': 't',
      'amplitude!': SIZE,
      'phaseLag!': 'n',
      amplitudeSigma: SIZE,
      phaseLagSigma: SIZE,
      radius95: SIZE,
      standing: '=firm|faint|borrowed',
      borrowedFrom: 't',
    },
  ],
  uncertainty: { 'order!': ['t'], 'covariance!': ['n'] },
  source: 't',
  record: { 'from!': 'i', 'to!': 'i', 'samples!': SIZE },
  validity: { from: 'i', to: 'i' },
};
const DEEPEST = 32;

/** A copy without surprises: plain data only, no key that could reach a prototype. */
function copyPlain(value: unknown, path: string, depth: number): unknown {
  if (typeof value !== 'object' || !value) return value;
  if (depth > DEEPEST) {
    refuse('INVALID_DOCUMENT', path, `at most ${DEEPEST} levels`, value);
  }
  if (Array.isArray(value)) return value.map((v, i) => copyPlain(v, `${path}[${i}]`, depth + 1));
  const out: Record<string, unknown> = {};
  for (const [key, inner] of Object.entries(value)) {
    const at = path ? `${path}.${key}` : key;
    if (key in {}) {
      refuse('UNSAFE_KEY', at, 'another key', key);
    }
    out[key] = copyPlain(inner, at, depth + 1);
  }
  return out;
}

function checkInstant(value: string, path: string, add: Add): void {
  try {
    toInstant(value, path);
  } catch (error) {
    if (isStaitheError(error))
      add(path, 'an instant with Z or an offset', value, error.code as InputErrorCode);
  }
}

function checkLeaf(rule: string, value: unknown, path: string, add: Add): void {
  const kind = rule[0];
  const rest = rule.slice(1);
  if (kind === '=') {
    const key = (path.split('.').pop() as string).toUpperCase();
    const code = /^(FORMAT|VERSION|UNIT)$/.test(key) ? `UNKNOWN_${key}` : 'UNKNOWN_CHOICE';
    const choices = rest.split('|');
    const type = key === 'VERSION' ? 'number' : 'string';
    if (typeof value === type && choices.includes(String(value))) return;
    add(path, choices.join(' or '), value, code as InputErrorCode);
  } else if (kind === 'n') {
    const [low, high] = rest.split(',').map((end) => (end ? Number(end) : undefined));
    const inside =
      Number.isFinite(value) &&
      !((value as number) < (low ?? -Infinity)) &&
      !((value as number) > (high ?? Infinity));
    const range = high ? ` from ${low} to ${high}` : low === 0 ? ', 0 or more' : '';
    if (!inside)
      add(
        path,
        `a finite number${range}`,
        value,
        typeof value === 'number' ? 'OUT_OF_RANGE' : undefined,
      );
  } else if (typeof value !== 'string' || !value) add(path, 'text', value);
  else if (kind === 'i') checkInstant(value, path, add);
}

function check(rule: Rule, value: unknown, path: string, add: Add): void {
  if (typeof rule === 'string') checkLeaf(rule, value, path, add);
  else if (typeof rule === 'function') check(rule(value), value, path, add);
  else if (Array.isArray(rule)) {
    if (!Array.isArray(value)) return add(path, 'an array', value);
    for (let i = 0; i < value.length; i++) check(rule[0] as Rule, value[i], `${path}[${i}]`, add);
  } else {
    if (typeof value !== 'object' || !value || Array.isArray(value)) {
      return add(path || 'constants', 'an object', value, 'WRONG_TYPE');
    }
    for (const [field, inner] of Object.entries(rule)) {
      const key = field.replace('!', '');
      const at = path ? `${path}.${key}` : key;
      const found = (value as Record<string, unknown>)[key];
      if (found !== undefined) check(inner, found, at, add);
      else if (key !== field) add(at, 'a value', found, 'MISSING');
    }
  }
}

/** What a schema cannot say: one entry a name, and a covariance of the right length. */
function checkWhole({ constituents, uncertainty }: HarmonicConstants, add: Add): void {
  const seen = new Set<string>();
  constituents.forEach(({ name }, i) => {
    if (seen.has(name)) add(`constituents[${i}].name`, 'each name once', name, 'DUPLICATE');
    seen.add(name);
  });
  const count = uncertainty?.order.length ?? 0;
  const length = (count * (count + 1)) / 2;
  if (uncertainty && uncertainty.covariance.length !== length) {
    add('uncertainty.covariance', `${length} numbers`, uncertainty.covariance, 'LENGTH_MISMATCH');
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
  const codes: InputErrorCode[] = [];
  const findings: Finding[] = [];
  const add: Add = (path, expected, got, code = 'INVALID_DOCUMENT') => {
    codes.push(code);
    findings.push({ path, expected, got: describe(got) });
  };
  check(DOCUMENT, document, '', add);
  if (findings.length === 0) checkWhole(document as HarmonicConstants, add);
  const at = Math.max(0, codes.indexOf('UNKNOWN_VERSION'));
  const first = findings[at];
  if (!first) return document as HarmonicConstants;
  const more = findings.length > 1 ? `; ${findings.length - 1} more in details.findings` : '';
  const text = `expected ${first.expected}, got ${first.got}${more}`;
  throw new InputError(codes[at] as InputErrorCode, first.path, text, { findings });
}
