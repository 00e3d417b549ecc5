/**
 * The record of accuracy: what a test saw, written only when STAITHE_RECORD names a folder.
 * @module
 */
import { appendFileSync } from 'node:fs';
import { join } from 'node:path';
import { expect } from 'vitest';
import { loadVector, type VectorKind } from './vector.js';

/** What a test has to say about one capability. @public */
export interface Accuracy {
  /** The quantity computed, in a few words. */
  readonly capability: string;
  /** Which values of the source, over which span. */
  readonly compared: string;
  readonly cases: number;
  /** Largest absolute difference. */
  readonly worst: number;
  /** Root mean square, or another typical size that `compared` names. */
  readonly typical: number;
  /** The bound that the test holds `worst` to. */
  readonly tolerance: number;
  readonly unit: string;
  /** Shown in the short table of the README, one a package. */
  readonly headline?: true | undefined;
}

/** A line of the record. @public */
export interface AccuracyRow extends Accuracy {
  readonly package: string;
  readonly vector: string;
  readonly title: string;
  readonly kind: VectorKind;
}

function packageOf(testPath: string): string {
  const found = /\/(?:packages\/([^/]+)|(test-vectors|tools|demo))\/test\//.exec(
    testPath.replaceAll('\\', '/'),
  );
  return found?.[1] ?? found?.[2] ?? 'other';
}

/**
 * Holds what was seen to its tolerance, and records it for docs/accuracy.md when STAITHE_RECORD names a folder.
 * Call it in the test that made the comparison.
 *
 * @param id - The vector compared with.
 * @param accuracy - What was seen; spread what a matcher returned into it.
 * @throws InputError `UNKNOWN_CHOICE` for an unknown vector.
 * @public
 */
export function recordAccuracy(id: string, accuracy: Accuracy): void {
  const { title, kind } = loadVector(id);
  const { capability, compared, cases, worst, typical, tolerance, unit, headline } = accuracy;
  expect(cases, `${capability}: cases`).toBeGreaterThan(0);
  expect(worst, `${capability}: worst difference`).toBeLessThanOrEqual(tolerance);
  expect(typical, `${capability}: typical difference`).toBeLessThanOrEqual(worst);
  const folder = process.env['STAITHE_RECORD'];
  if (!folder) return;
  const row: AccuracyRow = {
    package: packageOf(expect.getState().testPath ?? ''),
    vector: id,
    title,
    kind,
    capability,
    compared,
    cases,
    worst,
    typical,
    tolerance,
    unit,
    ...(headline ? { headline } : {}),
  };
  appendFileSync(join(folder, `accuracy-${process.pid}.jsonl`), `${JSON.stringify(row)}\n`);
}
