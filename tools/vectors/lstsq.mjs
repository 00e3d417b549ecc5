/**
 * Makes the vector of harmonic fits by numpy: npx tsx --tsconfig tsconfig.test.json tools/vectors/lstsq.mjs. The designs
 * are written out column by column with the slow functions, one instant at a time. Run by hand (python3 with numpy) when a
 * model changes (some minutes); what it writes is committed.
 */
import { spawnSync } from 'node:child_process';
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { equilibriumArgument } from '@staithe/constituents';
import { nodalCorrection } from '@staithe/nodal';
import { encodeInt16, writeVector } from './write.mjs';

const HOUR = 3600000;
const YEAR = 365.25 * 24 * HOUR;
const PER_METRE = 10000;
const RADIANS = Math.PI / 180;
const START = '2031-02-03T00:00Z';

/** Numbers in (0, 1): the minimal standard generator of S. Park and K. Miller (1988), multiplier 48271. */
function generator(seed) {
  let state = seed;
  return () => (state = (state * 48271) % 2147483647) / 2147483647;
}

/** f·cos(V + u), f·sin(V + u) of one constituent at one instant. */
function wave(name, time, { argumentModel, nodalModel, place }) {
  const { f, u } = nodalCorrection(name, time, {
    model: nodalModel,
    argumentModel,
    latitude: nodalModel === 'potential' ? place?.latitude : undefined,
  });
  const angle = (equilibriumArgument(name, time, argumentModel) + u) * RADIANS;
  return [f * Math.cos(angle), f * Math.sin(angle)];
}

/** A covariate so long before an instant, on the straight line between the two values about it. */
function valueBefore({ start, stepMinutes, integers, perUnit }, time, lag) {
  const place = (time - lag - Date.parse(start)) / (stepMinutes * 60000);
  const below = Math.floor(place);
  const share = place - below;
  const [low, high] = [integers[below] / perUnit, integers[below + 1] / perUnit];
  return share === 0 ? low : low * (1 - share) + high * share;
}

/** The columns of a case by name, each a list with one number a sample. */
function columnsOf(times, options, covariates) {
  const { constituents, borrow = [], secularRate, steps = [] } = options;
  const columns = [{ name: 'meanLevel', values: times.map(() => 1) }];
  if (secularRate) {
    const middle = Math.round((times[0] + times[times.length - 1]) / 2);
    columns.push({ name: 'secularRate', values: times.map((time) => (time - middle) / YEAR) });
  }
  steps.forEach((step, k) => {
    const at = Date.parse(step);
    columns.push({ name: `step[${k}]`, values: times.map((time) => (time >= at ? 1 : 0)) });
  });
  let at = 0;
  for (const covariate of covariates) {
    for (const lag of covariate.lags) {
      const values = times.map((time) => valueBefore(covariate, time, lag));
      const mean = values.reduce((sum, value) => sum + value, 0) / values.length;
      columns.push({ name: `covariate[${at++}]`, values: values.map((value) => value - mean) });
    }
  }
  for (const name of constituents) {
    const cosines = [];
    const sines = [];
    const children = borrow.filter(({ from }) => from === name);
    for (const time of times) {
      let [cosine, sine] = wave(name, time, options);
      for (const child of children) {
        // A child of amplitude ρ·H and phase lag G + Δ: ρ·H·cos(θ − G − Δ), written out in H cos G and H sin G.
        const [x, y] = wave(child.name, time, options);
        const c = Math.cos(child.phaseLagDifference * RADIANS) * child.amplitudeRatio;
        const s = Math.sin(child.phaseLagDifference * RADIANS) * child.amplitudeRatio;
        cosine += x * c + y * s;
        sine += y * c - x * s;
      }
      cosines.push(cosine);
      sines.push(sine);
    }
    columns.push({ name: `${name}.cos`, values: cosines }, { name: `${name}.sin`, values: sines });
  }
  return columns;
}

/** Levels in whole units of a tenth of a millimetre: a truth of our own, red noise and white noise. */
function levelsOf(columns, times, random) {
  const truth = columns.map(({ name }) => {
    if (name === 'meanLevel') return 0.3;
    if (name === 'secularRate') return 0.2;
    if (name.startsWith('step')) return 0.1 * (random() - 0.5);
    if (name.startsWith('covariate')) return -0.005 * random();
    return (name.startsWith('M2') ? 1.2 : 0.25 * random() * random()) * (random() - 0.5);
  });
  let weather = 0;
  return times.map((time, i) => {
    weather = 0.95 * weather + 0.02 * (random() - 0.5);
    const noise = weather + 0.02 * (random() + random() + random() - 1.5);
    const level = columns.reduce((sum, { values }, k) => sum + truth[k] * values[i], noise);
    return Math.round(level * PER_METRE);
  });
}

/** What numpy makes of a design. */
function solve(columns, levels) {
  const folder = mkdtempSync(join(tmpdir(), 'lstsq-'));
  try {
    const rows = levels.length;
    const design = new Float64Array(rows * columns.length);
    columns.forEach(({ values }, k) => {
      for (let i = 0; i < rows; i++) design[i * columns.length + k] = values[i];
    });
    writeFileSync(join(folder, 'design.bin'), design);
    const data = Float64Array.from(levels, (level) => level / PER_METRE);
    writeFileSync(join(folder, 'data.bin'), data);
    const script = join(dirname(fileURLToPath(import.meta.url)), 'lstsq.py');
    const { status, stdout, stderr } = spawnSync(
      'python3',
      [script, folder, String(rows), String(columns.length)],
      { encoding: 'utf8', maxBuffer: 1e8 },
    );
    if (status !== 0) throw new Error(stderr);
    return JSON.parse(stdout);
  } finally {
    rmSync(folder, { recursive: true });
  }
}

const hourly = (count) => Array.from({ length: count }, (_, i) => Date.parse(START) + i * HOUR);

/** Pressure at sea level in tenths of a hectopascal, wandering about 1013 hPa. */
function pressure(start, stepMinutes, count, random) {
  let level = 0;
  const integers = Array.from({ length: count }, () => {
    level = 0.98 * level + 2 * (random() - 0.5) * 3;
    return 10130 + Math.round(10 * level);
  });
  return { start, stepMinutes, integers, perUnit: 10 };
}

const YEARLY =
  'Sa Ssa Mm MSf Mf 2Q1 Q1 RHO1 O1 M1 P1 S1 K1 J1 OO1 2N2 MU2 N2 NU2 M2 LAM2 L2 T2 S2 R2 K2 2MK3 M3 MK3 MN4 M4 MS4 S4 M6 2MS6 S6 M8'.split(
    ' ',
  );
const STRONG = ['M2', 'S2', 'N2', 'K1', 'O1', 'Q1', 'Mf', 'M4', 'MS4', 'MN4', 'M6', 'MK3'];
const YEAR_LONG = 365 * 24;

/** Runs of missing samples: [first, count], 30 % of all. */
function runs(count, random) {
  const gone = new Set();
  const out = [];
  while (gone.size < 0.3 * count) {
    const first = Math.floor(random() * count);
    const length = Math.min(1 + Math.floor(300 * random() * random()), count - first);
    const clear = Array.from({ length: length + 2 }, (_, i) => first - 1 + i);
    if (clear.some((i) => gone.has(i)) || first === 0 || first + length === count) continue;
    for (let i = 0; i < length; i++) gone.add(first + i);
    out.push([first, length]);
  }
  return out.sort((a, b) => a[0] - b[0]);
}

const iers = { argumentModel: 'iers2010', nodalModel: 'potential' };
const year = { name: 'a year, hourly', times: hourly(YEAR_LONG), seed: 1 };
const posed = [
  { ...year, options: { ...iers, constituents: YEARLY } },
  {
    ...year,
    name: 'the same with gaps in runs, 30 %, older models',
    gaps: runs(YEAR_LONG, generator(2)),
    valuesOf: year.name,
    options: { argumentModel: 'schureman1940', nodalModel: 'schureman1940', constituents: YEARLY },
  },
  {
    name: 'irregular times over 120 days, lines of degree 3',
    intervals: Array.from({ length: 2200 }, generator(3)).map((x) => 60 + Math.floor(9300 * x)),
    seed: 4,
    options: { ...iers, place: { name: 'Example Quay', latitude: 52.5 }, constituents: STRONG },
  },
  {
    name: '35 days, hourly, four borrowed',
    times: hourly(35 * 24),
    seed: 5,
    options: {
      ...iers,
      constituents: ['M2', 'S2', 'N2', 'K1', 'O1', 'Q1', 'M4', 'MS4', 'M6'],
      borrow: [
        { name: 'P1', from: 'K1', amplitudeRatio: 0.331, phaseLagDifference: -4 },
        { name: 'K2', from: 'S2', amplitudeRatio: 0.272, phaseLagDifference: 3.5 },
        { name: 'NU2', from: 'N2', amplitudeRatio: 0.194, phaseLagDifference: 7 },
        { name: 'T2', from: 'S2', amplitudeRatio: 0.059, phaseLagDifference: 350 },
      ],
    },
  },
  {
    name: '200 days, hourly, rate, two steps, pressure with three lags',
    times: hourly(200 * 24),
    seed: 6,
    options: {
      ...iers,
      constituents: STRONG,
      secularRate: true,
      steps: ['2031-03-20T12:00Z', '2031-06-01T07:30Z'],
    },
    covariate: {
      ...pressure('2031-02-02T00:00Z', 180, 8 * 203, generator(7)),
      name: 'pressure',
      lags: [0, 1.5 * HOUR, 7 * HOUR],
    },
  },
];

/** A covariate as the vector keeps it. */
function encoded({ name, start, stepMinutes, lags, perUnit, integers }) {
  return { name, start, stepMinutes, lags, perUnit, values: encodeInt16(integers) };
}

const versions = new Set();
const cases = posed.map((one) => {
  const { name, seed, options, intervals, gaps, valuesOf, covariate } = one;
  let times = one.times;
  if (intervals) {
    let time = Date.parse(START);
    times = intervals.map((seconds) => (time += seconds * 1000));
  }
  const covariates = covariate ? [covariate] : [];
  const random = generator(seed);
  // Levels come from the design of the year as it stands first; gaps take samples out of both.
  const first = valuesOf ? posed.find((other) => other.name === valuesOf).options : options;
  const levels = levelsOf(columnsOf(times, first, covariates), times, random);
  const gone = new Set(
    (gaps ?? []).flatMap(([at, n]) => Array.from({ length: n }, (_, i) => at + i)),
  );
  const kept = times.map((_, i) => i).filter((i) => !gone.has(i));
  const columns = columnsOf(
    kept.map((i) => times[i]),
    options,
    covariates,
  );
  const result = solve(
    columns,
    kept.map((i) => levels[i]),
  );
  const { numpy, condition, moved, pinv, variance, coefficients, covariance } = result;
  versions.add(numpy);
  console.log(name, kept.length, columns.length, { condition, moved, pinv, variance });
  if (!(moved[1] < 1e-15 && pinv < 1e-12)) throw new Error(`${name}: numpy disagrees with itself`);
  const sizes = columns.map((_, i) => covariance[i][i]);
  const pairs = columns.flatMap((_, i) => [1, 2, 7].map((apart) => [i, i - apart]));
  return {
    name,
    options,
    record: {
      start: START,
      ...(intervals ? { secondsSinceBefore: encodeInt16(intervals) } : { stepMinutes: 60 }),
      ...(gaps ? { gaps: gaps.map((gap) => gap.join(' ')).join(', ') } : {}),
      ...(valuesOf ? { valuesOf } : { values: encodeInt16(levels) }),
    },
    covariate: covariate && encoded(covariate),
    samples: kept.length,
    condition,
    variance,
    columns: columns.map(({ name: column }, i) => [column, coefficients[i], sizes[i]]),
    covariances: pairs.filter(([, j]) => j >= 0).map(([i, j]) => [i, j, covariance[i][j]]),
  };
});

writeVector({
  id: 'numpy-lstsq',
  title:
    'Harmonic fits by least squares on designs written out column by column: coefficients and covariance',
  source: `Coefficients: numpy ${[...versions].join(', ')}, linalg.lstsq on columns of unit length, refined with residuals of extended precision; covariance: s^2 (A^T A)^-1 by linalg.qr, s^2 the sum of squared residuals over samples less unknowns. Columns: equilibrium argument, f and u at each instant, one by one`,
  kind: 'reference-library',
  unit: 'm; secularRate m a year of 365.25 days; covariate m a hectopascal; covariances in the squares',
  licence: 'BSD-3-Clause (numpy); the numbers were computed with it',
  tolerance: {
    rel: 1e-12,
    why: 'the second step of refinement moves no coefficient by 1e-15 of the largest; covariances by QR and by the pseudoinverse of the products agree within 1e-12 of the standard errors',
  },
  notes: [
    'Levels are made: a tide, red and white noise, rounded to 0.1 mm; both sides get exactly these.',
    `values: integers of 16 bits, little-endian, base64, ${PER_METRE} a metre. gaps: first sample and number of each run. secondsSinceBefore: the first counts from start.`,
    'covariate: a straight line between its values, each lag less its mean over the samples. The rate counts from the middle of the record.',
    'columns: name, coefficient, variance; covariances: row, column, value.',
  ],
  cases,
});
