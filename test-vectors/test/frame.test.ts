/**
 * Every file of check values has a source, fits its folder, cites a chapter or table, and is read by a test.
 */
import { existsSync, readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { describe, expect, it } from 'vitest';
import { checkVector, listVectors, loadVector, VECTOR_KINDS } from '../src/index.js';

const ROOT = fileURLToPath(new URL('../../', import.meta.url));

/** Tests of the frame itself name vectors without comparing anything with them: they do not count as readers. */
const OF_THE_FRAME = [
  'frame.test.ts',
  'readers.test.ts',
  'matchers.test.ts',
  'record.test.ts',
  'accuracy.test.mjs',
].map((name) => join(ROOT, 'test-vectors', 'test', name));

/** Calls that read a vector without naming it. */
const READ_BY_CALL: Readonly<Record<string, RegExp>> = {
  'noaa-constants-37': /publishedConstants\('(?!9455920)\d{7}'\)|stationDatums\('\d{7}'\)/,
  'noaa-constants-anchorage': /publishedConstants\('9455920'\)/,
};

function filesUnder(folder: string): string[] {
  if (!existsSync(folder)) return [];
  return readdirSync(folder, { recursive: true, encoding: 'utf8' })
    .filter((name) => /\.(ts|mts|js|mjs)$/.test(name))
    .map((name) => join(folder, name));
}

function testSources(): string[] {
  const packages = readdirSync(join(ROOT, 'packages')).map((name) => `packages/${name}`);
  return [...packages, 'test-vectors', 'tools', 'demo']
    .flatMap((folder) => filesUnder(join(ROOT, folder, 'test')))
    .filter((path) => !OF_THE_FRAME.includes(path))
    .map((path) => readFileSync(path, 'utf8'));
}

function isRead(id: string, sources: readonly string[]): boolean {
  const call = READ_BY_CALL[id];
  const literals = [`'${id}'`, `"${id}"`, `\`${id}\``];
  return sources.some(
    (text) => literals.some((literal) => text.includes(literal)) || call?.test(text),
  );
}

const SOUND = {
  id: 'a-source',
  title: 'Some handbook (1950), Table 3',
  source: 'An Author (1950), Some handbook, Table 3',
  kind: 'published',
  unit: 'm',
  tolerance: { abs: 0.01, why: 'printed to 0.01' },
  cases: [1],
};

describe('the schema', () => {
  it('takes a vector with keys of its own', () => {
    expect(checkVector({ ...SOUND, columns: ['a'] }, 'x')).toMatchObject(SOUND);
  });

  it.each([
    ['no source', { ...SOUND, source: undefined }, /source/],
    ['an empty source', { ...SOUND, source: '' }, /\/source/],
    ['a kind that does not exist', { ...SOUND, kind: 'hearsay' }, /\/kind/],
    ['no reason for the tolerance', { ...SOUND, tolerance: { abs: 1 } }, /why/],
    ['no tolerance', { ...SOUND, tolerance: { why: 'because so' } }, /abs/],
    ['no cases', { ...SOUND, cases: [] }, /\/cases/],
    ['an id that is no file name', { ...SOUND, id: 'A Source' }, /\/id/],
  ])('refuses %s', (_, json, finding) => {
    const plain: unknown = JSON.parse(JSON.stringify(json));
    expect(() => checkVector(plain, 'x')).toThrowError(finding);
  });
});

describe('loadVector', () => {
  it('refuses an unknown id and lists those there are', () => {
    expect(() => loadVector('nothing')).toThrowError(/expected one of .*phase-conversion.*nothing/);
  });
});

describe('the files', () => {
  const files = listVectors();
  const sources = testSources();

  it('lie in folders named by kind, under unique ids', () => {
    const others = ['README.md', 'node_modules', 'package.json', 'schema', 'src', 'test'];
    const found = readdirSync(join(ROOT, 'test-vectors')).filter(
      (name) => !others.includes(name) && !/config/.test(name),
    );
    expect(VECTOR_KINDS).toEqual(expect.arrayContaining(found));
    expect(new Set(files.map((file) => file.id)).size).toBe(files.length);
    expect(files.length).toBeGreaterThan(0);
  });

  it.each(files.map((file) => [file.id, file] as const))('%s is sound', (id, file) => {
    const vector = loadVector(id);
    expect(vector.id).toBe(id);
    expect(vector.kind).toBe(file.kind);
    expect(vector.title, 'a title cites a chapter or table, no routine').not.toMatch(
      /routine|program|software|library/i,
    );
    expect(vector.licence ?? '', 'licence').not.toBe('');
    expect(/from memory/.test(vector.source), 'from memory is said and marked').toBe(
      vector.kind === 'from-memory',
    );
    expect(readFileSync(file.path).length, 'bytes').toBeLessThan(1.4e6);
  });

  it('are all read by a test', () => {
    expect(files.map((file) => file.id).filter((id) => !isRead(id, sources))).toEqual([]);
  });
});
