/**
 * The two errors of the family. Callers test `code`, not the class: two copies of a package may be loaded.
 * @module
 */

/** Why an input was refused. Codes are public and never renamed. @public */
export type InputErrorCode =
  | 'WRONG_TYPE'
  | 'NOT_FINITE'
  | 'OUT_OF_RANGE'
  | 'MISSING'
  | 'EMPTY_INPUT'
  | 'BAD_TIME'
  | 'NO_TIME_ZONE'
  | 'TWO_TIME_ZONES'
  | 'AMBIGUOUS_TIME'
  | 'SKIPPED_TIME'
  | 'LEAP_SECOND'
  | 'STEP_TOO_SHORT'
  | 'EMPTY_SPAN'
  | 'NOT_RISING'
  | 'LENGTH_MISMATCH'
  | 'BAD_NUMBER'
  | 'UNKNOWN_UNIT'
  | 'UNKNOWN_COLUMN'
  | 'UNKNOWN_LAYOUT'
  | 'LINE_TOO_LONG'
  | 'UNKNOWN_CONSTITUENT'
  | 'AMBIGUOUS_CONSTITUENT'
  | 'DUPLICATE'
  | 'CONFLICT'
  | 'UNKNOWN_CHOICE'
  | 'UNKNOWN_FORMAT'
  | 'UNKNOWN_VERSION'
  | 'INVALID_DOCUMENT'
  | 'UNSAFE_KEY'
  | 'MODEL_CROSSED'
  | 'NO_NODAL_FORMULA'
  | 'INSEPARABLE';

/** Why a sound input could not be turned into a result. @public */
export type ComputationErrorCode = 'TOO_FEW_SAMPLES' | 'RANK_DEFICIENT' | 'NO_TIDE';

/** Plain data about an error: what survives `structuredClone`. @public */
export type ErrorDetails = Readonly<Record<string, unknown>>;

/**
 * An input is not what the function asks for. The message reads `path: expected …, got …`.
 *
 * @example
 * new InputError('OUT_OF_RANGE', 'step', 'expected 1000 or more, got 6').message; // 'step: expected 1000 or more, got 6'
 * @public
 */
export class InputError extends RangeError {
  override readonly name: string = 'InputError';
  readonly code: InputErrorCode;
  readonly path: string;
  readonly details: ErrorDetails | undefined;

  /**
   * @param code - Why it was refused.
   * @param path - Where in the input: `values[3]`, `options.borrow[0].from`.
   * @param text - `expected …, got …`.
   * @param details - Plain data for programs.
   */
  constructor(code: InputErrorCode, path: string, text: string, details?: ErrorDetails) {
    super(`${path}: ${text}`);
    this.code = code;
    this.path = path;
    this.details = details;
  }
}

/**
 * A sound input does not lead to a result: too few samples, a rank that is not full, no tide at all.
 *
 * @example
 * new ComputationError('TOO_FEW_SAMPLES', 'expected 75 samples or more, got 20').code; // 'TOO_FEW_SAMPLES'
 * @public
 */
export class ComputationError extends Error {
  override readonly name: string = 'ComputationError';
  readonly code: ComputationErrorCode;
  readonly details: ErrorDetails | undefined;

  /**
   * @param code - Why there is no result.
   * @param text - What was found.
   * @param details - Plain data for programs.
   */
  constructor(code: ComputationErrorCode, text: string, details?: ErrorDetails) {
    super(text);
    this.code = code;
    this.details = details;
  }
}

/**
 * Tells whether a caught value is one of the two errors, also when it comes from another copy of the package.
 *
 * @param error - Anything.
 * @param code - Asks for this code as well.
 * @returns True for an `InputError` or `ComputationError` (with that code).
 * @example
 * isStaitheError(new InputError('MISSING', 'unit', 'expected m, got nothing'), 'MISSING'); // true
 * @public
 */
export function isStaitheError(
  error: unknown,
  code?: InputErrorCode | ComputationErrorCode,
): error is InputError | ComputationError {
  if (!(error instanceof Error)) return false;
  if (error.name !== 'InputError' && error.name !== 'ComputationError') return false;
  const own = (error as { code?: unknown }).code;
  return typeof own === 'string' && (code === undefined || own === code);
}

/**
 * A short, safe picture of any value for a message: at most 60 characters, control characters escaped or replaced.
 *
 * @param value - Anything.
 * @returns Text for the "got" part of a message.
 * @example
 * describe('12;5'); // '"12;5"'
 * @public
 */
export function describe(value: unknown): string {
  const kind = typeof value;
  if (kind === 'string') {
    const text = value as string;
    const short = text.length > 60 ? `${text.slice(0, 57)}...` : text;
    // JSON escapes the control characters below a space; the others and those that turn the line round go.
    return JSON.stringify(short).replace(/[\x7f-\x9f\u2028-\u202e\u2066-\u2069]/g, '\ufffd');
  }
  if (!value || (kind !== 'object' && kind !== 'function')) return String(value);
  return Array.isArray(value) ? `an array of ${value.length}` : `an ${kind}`.replace('an f', 'a f');
}

/**
 * Throws an {@link InputError} whose message reads `path: expected …, got …`.
 *
 * @param code - Why it is refused.
 * @param path - Where in the input.
 * @param expected - What was expected, in words.
 * @param got - What was got; shown by {@link describe}.
 * @param details - Plain data for programs.
 * @throws InputError, always.
 * @example
 * refuse('UNKNOWN_UNIT', 'unit', 'm', 'ft'); // throws UNKNOWN_UNIT
 * @public
 */
export function refuse(
  code: InputErrorCode,
  path: string,
  expected: string,
  got: unknown,
  details?: ErrorDetails,
): never {
  throw new InputError(code, path, `expected ${expected}, got ${describe(got)}`, details);
}
