/**
 * Reads and checks a constants document: every finding with path, expected and got.
 * @module
 */
import type { CurrentConstants, Finding, HarmonicConstants } from './constants-document.js';
import { describe, InputError, type InputErrorCode, refuse } from './errors.js';
import { toInstant } from './time.js';

/**
 * What a value must be: `t` text, `i` an instant as text, `n` a number (`n0` from 0, `n0,90` from 0 to 90), `=a|b (hint)`
 * one of these, `#a` too, with a code of its own; `[rule]` a list, an object its fields (after a key `$`: required, `?`:
 * judged even when absent), a function what it picks for the value.
 */
type Rule = string | readonly [Rule] | Shape | ((value: unknown) => Rule);
type Shape = { readonly [key: string]: Rule };
type Add = (path: string, expected: string, got: unknown, code?: InputErrorCode) => void;

const SIZE = 'n0';
const LATITUDE = 'n-90,90';
const ROWS: Rule = [
  {
    name$: 't',
    amplitude$: SIZE,
    phaseLag$: 'n',
    amplitudeSigma: SIZE,
    phaseLagSigma: SIZE,
    radius95: SIZE,
    standing: '=firm|faint|borrowed',
    borrowedFrom: 't',
  },
];
const COMMON: Shape = {
  place: { name$: 't', latitude: LATITUDE, longitude: 'n-360,360' },
  argumentModel$: '=iers2010|schureman1940',
  nodalModel$: '=potential|schureman1940|none',
  nodalHold: (value) =>
    typeof value === 'object' ? { heldAt$: 'i' } : '=continuous|calendar-year',
  nodalLatitude: LATITUDE,
  uncertainty: { order$: ['t'], covariance$: ['n'] },
  source: 't',
  record: { from$: 'i', to$: 'i', samples$: SIZE },
  validity: { from: 'i', to: 'i' },
};
const HEIGHT: Shape = {
  quantity: "=height (currents: parseConstants(json, 'current'))",
  unit$: '#m',
  datum: 't',
  meanLevel$: 'n',
  secularRate: { metresPerYear$: 'n', at$: 'i' },
  steps: [{ at$: 'i', change$: 'n' }],
  constituents$: ROWS,
};
const CURRENT: Shape = {
  'quantity?': '=current (heights: parseConstants(json))',
  unit$: '#m/s',
  mean$: { east$: 'n', north$: 'n' },
  east$: ROWS,
  north$: ROWS,
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

function checkLeaf(rule: string, value: unknown, path: string, add: Add): void {
  const kind = rule[0] as string;
  const rest = rule.slice(1);
  if ('=#'.includes(kind)) {
    const code = kind === '#' ? `UNKNOWN_${path.toUpperCase()}` : 'UNKNOWN_CHOICE';
    const choices = (rest.split(' (')[0] as string).split('|');
    // The version is the one number.
    if (path === 'version' ? value !== Number(rest) : !choices.includes(value as string))
      add(path, rest.replaceAll('|', ' or '), value, code as InputErrorCode);
  } else if (kind === 'n') {
    const [low, high] = rest.split(',').map(parseFloat) as [number, number];
    const found = value as number;
    // An end that is not given compares as false.
    if (!Number.isFinite(value) || found < low || found > high) {
      const range = high ? ` from ${low} to ${high}` : low === 0 ? ', 0 or more' : '';
      const code = typeof value === 'number' ? 'OUT_OF_RANGE' : undefined;
      add(path, `a finite number${range}`, value, code);
    }
  } else if (typeof value !== 'string' || !value) add(path, 'text', value);
  else if (kind === 'i') {
    try {
      toInstant(value, path);
    } catch (error) {
      add(path, 'an instant with Z or an offset', value, (error as InputError).code);
    }
  }
}

function check(rule: Rule, value: unknown, path: string, add: Add): void {
  if (typeof rule === 'string') checkLeaf(rule, value, path, add);
  else if (typeof rule === 'function') check(rule(value), value, path, add);
  else if (Array.isArray(rule)) {
    if (!Array.isArray(value)) return add(path, 'an array', value);
    for (let i = 0; i < value.length; i++) check(rule[0] as Rule, value[i], `${path}[${i}]`, add);
  } else {
    // The copy holds no other objects than plain ones and arrays.
    if ((value as object | null | undefined)?.constructor !== Object) {
      return add(path || 'constants', 'an object', value, 'WRONG_TYPE');
    }
    for (const [field, inner] of Object.entries(rule)) {
      const [key, mark] = field.split(/\b/) as [string, string?];
      const at = path ? `${path}.${key}` : key;
      const found = (value as Record<string, unknown>)[key];
      if (found !== undefined || mark === '?') check(inner, found, at, add);
      else if (mark) add(at, 'a value', found, 'MISSING');
    }
  }
}

type Whole = Pick<CurrentConstants, 'uncertainty'> & Readonly<Record<string, unknown>>;

/** What a schema cannot say: each name once in a list and in every list, and a covariance of the right length. */
function checkWhole(document: Whole, lists: readonly string[], add: Add): void {
  const names = lists.map((list) => {
    const seen = new Set<string>();
    (document[list] as CurrentConstants['east']).forEach(({ name }, i) => {
      if (seen.has(name)) add(`${list}[${i}].name`, 'each name once', name, 'DUPLICATE');
      seen.add(name);
    });
    return seen;
  });
  lists.forEach((list, i) => {
    for (const name of names[1 - i] ?? []) {
      if (!(names[i] as Set<string>).has(name)) add(list, name, undefined, 'MISSING');
    }
  });
  const { uncertainty } = document;
  if (!uncertainty) return;
  const { order, covariance } = uncertainty;
  const length = (order.length * (order.length + 1)) / 2;
  if (covariance.length !== length) {
    add('uncertainty.covariance', `${length} numbers`, covariance, 'LENGTH_MISMATCH');
  }
}

/**
 * Reads a constants document. Unknown keys are kept; an unknown version is refused.
 *
 * @param json - What `JSON.parse` gave. It is copied.
 * @param quantity - What is to be read: heights (default), or `current`. The other is refused, never turned into it.
 * @returns The document.
 * @throws InputError with the code of the first finding (`UNKNOWN_VERSION`, `UNKNOWN_UNIT`, `OUT_OF_RANGE`, `MISSING`,
 *   `DUPLICATE` …, else `INVALID_DOCUMENT`), its path, and all findings in `details.findings`; `UNKNOWN_CHOICE`, path
 *   `quantity`, for a document of the other quantity; `UNSAFE_KEY` for `__proto__`.
 * @example
 * parseConstants({ format: 'staithe-constants', version: 1, unit: 'm', meanLevel: 2.1, argumentModel: 'iers2010',
 *   nodalModel: 'potential', constituents: [{ name: 'M2', amplitude: 1.48, phaseLag: 93.1 }] }).meanLevel; // 2.1
 * @public
 */
export function parseConstants(json: unknown, quantity?: 'height'): HarmonicConstants;
/**
 * Reads a constants document of currents.
 *
 * @param json - What `JSON.parse` gave. It is copied.
 * @param quantity - `current`.
 * @returns The document, whose lists `east` and `north` hold the same names.
 * @throws InputError as for heights; `MISSING`, path `east` or `north`, for a name that only the other list has.
 * @example
 * parseConstants({ format: 'staithe-constants', version: 1, quantity: 'current', unit: 'm/s', mean: { east: 0.1, north: 0 },
 *   argumentModel: 'iers2010', nodalModel: 'potential', east: [{ name: 'M2', amplitude: 0.8, phaseLag: 40 }],
 *   north: [{ name: 'M2', amplitude: 0.3, phaseLag: 75 }] }, 'current').mean.east; // 0.1
 * @public
 */
export function parseConstants(json: unknown, quantity: 'current'): CurrentConstants;
export function parseConstants(
  json: unknown,
  quantity?: 'height' | 'current',
): HarmonicConstants | CurrentConstants {
  const document = copyPlain(json, '', 0);
  const codes: InputErrorCode[] = [];
  const findings: Finding[] = [];
  const add: Add = (path, expected, got, code = 'INVALID_DOCUMENT') => {
    codes.push(code);
    findings.push({ path, expected, got: describe(got) });
  };
  // Anything but 'current' reads heights, so that list.map(parseConstants), whose second argument is an index, does.
  const [shape, ...lists] =
    quantity === 'current'
      ? ([CURRENT, 'east', 'north'] as const)
      : ([HEIGHT, 'constituents'] as const);
  const rule = { format$: '#staithe-constants', version$: '#1', ...shape, ...COMMON };
  check(rule, document, '', add);
  if (!findings[0]) checkWhole(document as Whole, lists, add);
  const at = Math.max(0, codes.indexOf('UNKNOWN_VERSION'));
  const first = findings[at];
  if (!first) return document as HarmonicConstants;
  const more = findings.length > 1 ? `; ${findings.length - 1} more in details.findings` : '';
  const text = `expected ${first.expected}, got ${first.got}${more}`;
  throw new InputError(codes[at] as InputErrorCode, first.path, text, { findings });
}
