/**
 * What a call refuses: the error of the family that it throws.
 * @module
 */
import {
  type ComputationErrorCode,
  type ErrorDetails,
  type InputErrorCode,
  isStaitheError,
} from '@staithe/core';

/** What a refusal says. @public */
export interface Refusal {
  readonly code: InputErrorCode | ComputationErrorCode;
  /** Empty for a ComputationError. */
  readonly path: string;
  readonly message: string;
  readonly details: ErrorDetails | undefined;
}

/**
 * Runs a call that must be refused.
 *
 * @param run - The call.
 * @returns What the InputError or ComputationError says; any other error is thrown on, and so is the lack of one.
 * @public
 */
export function refusal(run: () => unknown): Refusal {
  try {
    run();
  } catch (error) {
    if (!isStaitheError(error)) throw error;
    const { code, message, details } = error;
    return { code, path: 'path' in error ? error.path : '', message, details };
  }
  throw new Error('expected a refusal');
}
