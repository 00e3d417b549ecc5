/**
 * Check values: one JSON file a source, found by id, checked against the schema when loaded.
 * @module
 */
import { readdirSync, readFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { InputError } from '@staithe/core';
import { Ajv2020 } from 'ajv/dist/2020.js';

/** Where a source comes from; also the name of the folder that its file lies in. @public */
export type VectorKind =
  | 'published'
  | 'reference-library'
  | 'open-data'
  | 'common-practice'
  | 'from-memory';

/** The kinds, strongest evidence first. @public */
export const VECTOR_KINDS: readonly VectorKind[] = [
  'published',
  'reference-library',
  'open-data',
  'common-practice',
  'from-memory',
];

/** How far a value may lie from the expected one. With both, the wider holds. @public */
export interface Tolerance {
  /** In the unit of the value. */
  readonly abs?: number | undefined;
  /** As a share of the expected value. */
  readonly rel?: number | undefined;
}

/** Check values of one source. @public */
export interface Vector<Cases = unknown> {
  readonly id: string;
  /** What is compared, with the chapter or table it stands in. */
  readonly title: string;
  /** Author, year, table, and how the values were obtained. */
  readonly source: string;
  readonly kind: VectorKind;
  readonly unit: string;
  /** What the source itself allows (rounding, its own approximations), and why. */
  readonly tolerance: Tolerance & { readonly why: string };
  readonly cases: Cases;
  readonly licence?: string;
  readonly notes?: readonly string[];
  /** When, or by which state of the repository. */
  readonly retrieved?: string;
}

/** A file of check values. @public */
export interface VectorFile {
  readonly id: string;
  readonly kind: VectorKind;
  readonly path: string;
}

const ROOT = fileURLToPath(new URL('../', import.meta.url));

const matchesSchema = new Ajv2020({ allErrors: true }).compile(
  JSON.parse(readFileSync(`${ROOT}schema/vector.schema.json`, 'utf8')) as object,
);

/**
 * Checks that plain data is a vector.
 *
 * @param json - Anything.
 * @param path - Named in the error.
 * @returns The same data.
 * @throws InputError `INVALID_DOCUMENT` with every finding.
 * @public
 */
export function checkVector<Cases = unknown>(json: unknown, path: string): Vector<Cases> {
  if (matchesSchema(json)) return json as Vector<Cases>;
  const findings = (matchesSchema.errors ?? []).map((e) => `${e.instancePath || '/'} ${e.message}`);
  throw new InputError('INVALID_DOCUMENT', path, `expected a vector, got ${findings.join('; ')}`);
}

/**
 * Lists the files of check values.
 *
 * @returns Sorted by kind, then id.
 * @public
 */
export function listVectors(): readonly VectorFile[] {
  const present = new Set(readdirSync(ROOT));
  return VECTOR_KINDS.filter((kind) => present.has(kind)).flatMap((kind) =>
    readdirSync(`${ROOT}${kind}`)
      .filter((name) => name.endsWith('.json'))
      .sort()
      .map((name) => ({ id: name.slice(0, -5), kind, path: `${ROOT}${kind}/${name}` })),
  );
}

/**
 * Loads the check values of one source.
 *
 * @param id - Name of the file without `.json`. Write it as a literal in the test: the frame looks for it.
 * @returns The vector; its cases in the shape that the caller names.
 * @throws InputError `UNKNOWN_CHOICE` where there is no such file, `INVALID_DOCUMENT` where it does not fit the schema.
 * @public
 */
export function loadVector<Cases = unknown>(id: string): Vector<Cases> {
  const files = listVectors();
  const file = files.find((f) => f.id === id);
  if (!file) {
    const known = files.map((f) => f.id).join(', ');
    throw new InputError('UNKNOWN_CHOICE', 'id', `expected one of ${known}, got ${id}`);
  }
  return checkVector<Cases>(JSON.parse(readFileSync(file.path, 'utf8')), file.path);
}
