/**
 * Keeps the result of a long check in docs/accuracy-long.json, from which docs/accuracy.md shows it with its date.
 */
import { existsSync, readdirSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { root } from '../gate/packages.mjs';
import { keyOf } from './rows.mjs';

const PATH = join(root, 'docs', 'accuracy-long.json');

/** The long results on record, in a fixed order. */
export function readLong(path = PATH) {
  return existsSync(path) ? JSON.parse(readFileSync(path, 'utf8')) : [];
}

function vectorFile(id) {
  const folder = join(root, 'test-vectors');
  const kind = readdirSync(folder).find((name) => existsSync(join(folder, name, `${id}.json`)));
  if (!kind) throw new Error(`vector: expected the id of a vector, got ${id}`);
  const { title } = JSON.parse(readFileSync(join(folder, kind, `${id}.json`), 'utf8'));
  return { title, kind };
}

/**
 * Records one comparison: `{ package, vector, capability, compared, cases, worst, typical, tolerance, unit }`. Replaces
 * an older result of the same comparison. Refuses a worst difference beyond the tolerance.
 */
export function recordLong(entry, { path = PATH, now = new Date() } = {}) {
  const { package: name, vector, capability, compared } = entry;
  const { cases, worst, typical, tolerance, unit } = entry;
  if (!(cases > 0 && typical <= worst && worst <= tolerance)) {
    throw new Error(
      `${capability}: expected cases > 0 and typical <= worst <= ${tolerance}, got ${cases}, ${typical}, ${worst}`,
    );
  }
  const row = {
    package: name,
    vector,
    ...vectorFile(vector),
    capability,
    compared,
    cases,
    worst,
    typical,
    tolerance,
    unit,
    date: now.toISOString().slice(0, 10),
  };
  const rows = [...readLong(path).filter((other) => keyOf(other) !== keyOf(row)), row];
  rows.sort((a, b) => (keyOf(a) < keyOf(b) ? -1 : 1));
  writeFileSync(path, `${JSON.stringify(rows, null, 2)}\n`);
}
