import { describe, expect, it } from 'vitest';
import { findCycle, judgeImport, packageOf } from '../floors/graph.mjs';

const floors = {
  packages: { core: 0, fit: 5, predict: 5, report: 7, cli: 8 },
  nodeBuiltinsAllowed: ['cli'],
};
const from = (folder, dependencies = [], devDependencies = []) => ({
  folder,
  name: `@staithe/${folder}`,
  dependencies: new Set(dependencies),
  devDependencies: new Set(devDependencies),
});
const judge = (importer, part, specifier, top) =>
  judgeImport({ from: importer, part, specifier }, floors, top);

describe('packageOf', () => {
  it('keeps the scope and drops the subpath', () => {
    expect(packageOf('@staithe/core/x')).toBe('@staithe/core');
    expect(packageOf('d3-scale/src')).toBe('d3-scale');
    expect(packageOf('./time.js')).toBeUndefined();
  });
});

describe('judgeImport', () => {
  it('lets a source import a declared package of a lower floor', () => {
    expect(judge(from('fit', ['@staithe/core']), 'src', '@staithe/core')).toBeUndefined();
  });

  it('refuses an import upwards, sideways, undeclared or of Node', () => {
    expect(judge(from('core', ['@staithe/fit']), 'src', '@staithe/fit')).toMatch(/floor 5, from/);
    expect(judge(from('fit', ['@staithe/predict']), 'src', '@staithe/predict')).toMatch(/floor 5/);
    expect(judge(from('fit'), 'src', '@staithe/core')).toMatch(/does not declare/);
    expect(judge(from('fit'), 'src', 'node:fs')).toMatch(/a part of Node/);
    expect(judge(from('fit'), 'src', 'fs')).toMatch(/a part of Node/);
    expect(judge(from('fit'), 'src', '@staithe/weather')).toMatch(/has no floor/);
    expect(judge(from('fit'), 'src', '@staithe/test-vectors')).toMatch(/do not ship/);
  });

  it('lets the command use Node', () => {
    expect(judge(from('cli'), 'src', 'node:fs')).toBeUndefined();
  });

  it('lets a test import its own floor, the vectors and what the top declares, and no higher floor', () => {
    expect(judge(from('fit'), 'test', '@staithe/predict')).toBeUndefined();
    expect(judge(from('fit'), 'test', '@staithe/test-vectors')).toBeUndefined();
    expect(judge(from('fit'), 'test', 'vitest', new Set(['vitest']))).toBeUndefined();
    expect(judge(from('fit'), 'test', 'vitest')).toMatch(/does not declare/);
    expect(judge(from('fit'), 'test', '@staithe/report')).toMatch(/floor 7, from floor 5/);
  });
});

describe('findCycle', () => {
  it('names the way round', () => {
    const graph = new Map([
      ['a', ['b']],
      ['b', ['c']],
      ['c', ['b']],
    ]);
    expect(findCycle(graph)).toEqual(['b', 'c', 'b']);
  });

  it('is content with two ways to one place', () => {
    const graph = new Map([
      ['a', ['b', 'c']],
      ['b', ['d']],
      ['c', ['d']],
    ]);
    expect(findCycle(graph)).toBeUndefined();
  });
});
