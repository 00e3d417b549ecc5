/**
 * The record is written only on request, and holds a test to the bound that it states.
 */
import { mkdtempSync, readdirSync, readFileSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterEach, describe, expect, it, vi } from 'vitest';
import { type Accuracy, recordAccuracy } from '../src/index.js';

const SEEN: Accuracy = {
  capability: 'a quantity',
  compared: 'six rows',
  cases: 6,
  worst: 0.07,
  typical: 0.04,
  tolerance: 0.1,
  unit: 'degrees',
};

describe('recordAccuracy', () => {
  afterEach(() => vi.unstubAllEnvs());

  it('appends a line with title, kind and package to the folder that STAITHE_RECORD names', () => {
    const folder = mkdtempSync(join(tmpdir(), 'record-'));
    vi.stubEnv('STAITHE_RECORD', folder);
    recordAccuracy('phase-conversion', SEEN);
    recordAccuracy('phase-conversion', { ...SEEN, capability: 'another' });
    const [file, ...others] = readdirSync(folder);
    const lines = readFileSync(join(folder, file as string), 'utf8')
      .trim()
      .split('\n');
    rmSync(folder, { recursive: true });
    expect(others).toEqual([]);
    expect(lines.map((line) => JSON.parse(line).capability)).toEqual(['a quantity', 'another']);
    expect(JSON.parse(lines[0] as string)).toMatchObject({
      package: 'test-vectors',
      vector: 'phase-conversion',
      kind: 'published',
      worst: 0.07,
    });
  });

  it('refuses a worst difference beyond the tolerance, nothing compared, an unknown vector', () => {
    vi.stubEnv('STAITHE_RECORD', '');
    expect(() => recordAccuracy('phase-conversion', { ...SEEN, worst: 0.11 })).toThrow();
    expect(() => recordAccuracy('phase-conversion', { ...SEEN, worst: Number.NaN })).toThrow();
    expect(() => recordAccuracy('phase-conversion', { ...SEEN, cases: 0 })).toThrow();
    expect(() => recordAccuracy('no-such-source', SEEN)).toThrowError(/got no-such-source/);
  });
});
