/**
 * The truth against the files: an ordinary least squares fit, written out here, must find the constants that the truth states.
 * Nodal factors are the rounded formulas of D. T. Pugh, Tides, Surges and Mean Sea-Level (1987), table 4.3 (from memory).
 */
import { beforeAll, describe, expect, test } from 'vitest';
import { doodsonVariables } from '../generate/mean-longitudes.mjs';
import { makeDemoRecords, type PlaceId, trueTide } from '../generate/records.mjs';

const HOUR = 3_600_000;
const RADIANS = Math.PI / 180;
const apart = (a: number, b: number): number => Math.abs(((((a - b) % 360) + 540) % 360) - 180);

// Quarter turns of the trade's definitions, in degrees.
const QUARTER: Readonly<Record<string, number>> = {
  K1: 90,
  J1: 90,
  OO1: 90,
  O1: -90,
  P1: -90,
  Q1: -90,
  RHO1: -90,
  '2Q1': -90,
  L2: 180,
};

/** f and u (degrees) at a node of longitude N. */
function nodal(name: string, node: number): readonly [number, number] {
  const [cosNode, sinNode, cosTwice] = [
    Math.cos(node * RADIANS),
    Math.sin(node * RADIANS),
    Math.cos(2 * node * RADIANS),
  ];
  const moon: readonly [number, number] = [1 - 0.037 * cosNode, -2.1 * sinNode];
  if (['M2', 'N2', '2N2', 'MU2', 'NU2', 'MS4', '2SM6'].includes(name)) return moon;
  if (['M4', 'MN4', '2MS6'].includes(name)) return [moon[0] ** 2, 2 * moon[1]];
  if (['M6', '2MN6'].includes(name)) return [moon[0] ** 3, 3 * moon[1]];
  if (['O1', 'Q1', '2Q1', 'RHO1'].includes(name))
    return [1.009 + 0.187 * cosNode - 0.015 * cosTwice, 10.8 * sinNode];
  if (name === 'K1') return [1.006 + 0.115 * cosNode, -8.9 * sinNode];
  if (name === 'K2') return [1.024 + 0.286 * cosNode, -17.7 * sinNode];
  return [1, 0];
}

/** Solves the symmetric system a x = b by elimination; a and b are used up. */
function solve(a: number[][], b: number[]): number[] {
  const at = (i: number, j: number): number => a[i]?.[j] ?? Number.NaN;
  for (let k = 0; k < b.length; k++) {
    for (let i = k + 1; i < b.length; i++) {
      const ratio = at(i, k) / at(k, k);
      a[i] = (a[i] ?? []).map((value, j) => value - ratio * at(k, j));
      b[i] = (b[i] ?? 0) - ratio * (b[k] ?? 0);
    }
  }
  const x: number[] = [];
  for (let i = b.length - 1; i >= 0; i--) {
    const known = x.reduce((sum, value, j) => sum + value * at(i, i + 1 + j), 0);
    x.unshift(((b[i] ?? 0) - known) / at(i, i));
  }
  return x;
}

type Truth = ReturnType<typeof makeDemoRecords>['truth'][PlaceId];
interface Found {
  readonly amplitude: number;
  readonly phaseLag: number;
}

/** Fits mean level and every constituent of the truth to heights at times. */
function fit(
  { constituents }: Truth,
  times: readonly number[],
  heights: readonly number[],
): Map<string, Found> {
  const size = 1 + 2 * constituents.length;
  const normal = Array.from({ length: size }, () => new Array<number>(size).fill(0));
  const right = new Array<number>(size).fill(0);
  times.forEach((time, k) => {
    const variables = doodsonVariables(time);
    const row = [1];
    for (const { name, doodsonNumbers } of constituents) {
      const [f, u] = nodal(name, -(variables[4] ?? 0));
      const v = doodsonNumbers.reduce(
        (sum, n, i) => sum + n * (variables[i] ?? 0),
        QUARTER[name] ?? 0,
      );
      row.push(f * Math.cos((v + u) * RADIANS), f * Math.sin((v + u) * RADIANS));
    }
    row.forEach((value, i) => {
      const into = normal[i] ?? [];
      for (let j = 0; j < size; j++) into[j] = (into[j] ?? 0) + value * (row[j] ?? 0);
      right[i] = (right[i] ?? 0) + value * (heights[k] ?? 0);
    });
  });
  const x = solve(normal, right);
  return new Map(
    constituents.map(({ name }, i) => {
      const [a, b] = [x[1 + 2 * i] ?? Number.NaN, x[2 + 2 * i] ?? Number.NaN];
      return [name, { amplitude: Math.hypot(a, b), phaseLag: Math.atan2(b, a) / RADIANS }];
    }),
  );
}

let demo: ReturnType<typeof makeDemoRecords>;
let harbour: Map<string, Found>;
let lagoon: Map<string, Found>;
beforeAll(() => {
  demo = makeDemoRecords();
  harbour = fitFile('quenby-haven');
  lagoon = fitFile('merrowby-lagoon');
});

/** Hourly rows of the file outside spikes and stuck runs, the step taken off. */
function hourlyRows(id: PlaceId): { times: number[]; heights: number[] } {
  const { faults } = demo.truth[id];
  const text = demo.files.find(({ name }) => name === `${id}.csv`)?.text ?? '';
  const times: number[] = [];
  const heights: number[] = [];
  for (const row of text.trimEnd().split('\n').slice(1)) {
    const [stamp = '', value] = row.split(',');
    const time = Date.parse(`${stamp.replace(' ', 'T')}Z`);
    if (time % HOUR !== 0) continue;
    let zero = 0;
    let wrong = false;
    for (const fault of faults) {
      if (fault.kind === 'step' && time >= Date.parse(fault.at)) zero += fault.change;
      if (fault.kind === 'spike' && time === Date.parse(fault.at)) wrong = true;
      if (fault.kind === 'stuck' && time >= Date.parse(fault.from) && time < Date.parse(fault.to))
        wrong = true;
    }
    if (wrong) continue;
    times.push(time);
    heights.push(Number(value) - zero);
  }
  return { times, heights };
}

function fitFile(id: PlaceId): Map<string, Found> {
  const { times, heights } = hourlyRows(id);
  return fit(demo.truth[id], times, heights);
}

/** Distance of found and true constants as vectors, metres. */
function distance(id: PlaceId, found: Map<string, Found>, name: string): number {
  const expected = demo.truth[id].constituents.find((constituent) => constituent.name === name);
  const got = found.get(name);
  if (expected === undefined || got === undefined)
    throw new Error(`${name}: expected in truth and fit`);
  const angle = apart(got.phaseLag, expected.phaseLag) * RADIANS;
  return Math.hypot(
    got.amplitude * Math.cos(angle) - expected.amplitude,
    got.amplitude * Math.sin(angle),
  );
}

describe('the constants of the truth', () => {
  test.each([
    ['M2', 0.01], // the slow unrest of 0.5 % moves a year's M2 by 2 to 3 mm, the rounded f and u by as much
    ['S2', 0.01],
    ['N2', 0.01],
    ['K2', 0.01],
    ['K1', 0.005],
    ['O1', 0.005],
    ['P1', 0.005],
    ['M4', 0.005],
    ['MS4', 0.005],
    ['MN4', 0.005],
    ['M6', 0.005],
  ])('of the harbour are found in its file: %s within %f m', (name, tolerance) => {
    expect(distance('quenby-haven', harbour, name)).toBeLessThan(tolerance);
  });

  test.each([
    ['K1', 0.005],
    ['O1', 0.005],
    ['P1', 0.005],
    ['Q1', 0.005],
    ['M2', 0.002],
  ])('of the lagoon are found in its file: %s within %f m', (name, tolerance) => {
    expect(distance('merrowby-lagoon', lagoon, name)).toBeLessThan(tolerance);
  });

  test('make a semidiurnal harbour of 2.5 to 3.5 m and a diurnal lagoon', () => {
    const amplitude = (id: PlaceId, name: string): number =>
      demo.truth[id].constituents.find((constituent) => constituent.name === name)?.amplitude ??
      Number.NaN;
    const form = (id: PlaceId): number =>
      (amplitude(id, 'K1') + amplitude(id, 'O1')) / (amplitude(id, 'M2') + amplitude(id, 'S2'));
    expect(form('quenby-haven')).toBeLessThan(0.25);
    expect(form('merrowby-lagoon')).toBeGreaterThan(3);
    expect(meanRange('quenby-haven')).toBeGreaterThan(2.5);
    expect(meanRange('quenby-haven')).toBeLessThan(3.5);
    expect(meanRange('merrowby-lagoon')).toBeLessThan(1); // microtidal is under 2 m
  });
});

/** Mean height of the turns upwards less that of the turns downwards over a year of the undisturbed tide, metres. */
function meanRange(id: PlaceId): number {
  const heights = trueTide(id, { start: Date.UTC(2030, 0, 1), step: HOUR / 5, count: 365 * 120 });
  const highs: number[] = [];
  const lows: number[] = [];
  heights.forEach((height, i) => {
    const [before, after] = [heights[i - 1], heights[i + 1]];
    if (before === undefined || after === undefined) return;
    if (height > before && height >= after) highs.push(height);
    if (height < before && height <= after) lows.push(height);
  });
  const mean = (values: number[]): number =>
    values.reduce((sum, value) => sum + value, 0) / values.length;
  return mean(highs) - mean(lows);
}

describe('the undisturbed tide', () => {
  test('is the same whether a pointer has turned to an instant or starts there', () => {
    const start = Date.UTC(2030, 6, 4, 7, 12);
    const series = trueTide('quenby-haven', { start, step: HOUR / 10, count: 720 });
    for (const i of [1, 239, 240, 719]) {
      const [alone] = trueTide('quenby-haven', {
        start: start + (i * HOUR) / 10,
        step: HOUR,
        count: 1,
      });
      expect(Math.abs((series[i] ?? Number.NaN) - (alone ?? 0))).toBeLessThan(1e-9); // metres: rounding of 240 turns
    }
  });

  test('refuses a place it does not know', () => {
    expect(() => trueTide('elsewhere' as PlaceId, { start: 0, step: HOUR, count: 1 })).toThrow(
      /id: expected 'quenby-haven'/,
    );
  });
});
