/**
 * All windows of 29 days of La Jolla from August 2010 on, with the constituents that a month cannot part borrowed from the
 * published set: the shares within the limits, and what becomes of K1 and S2 without borrowing.
 */
import { angleDifference, uniformSeries } from '@staithe/core';
import { fitHarmonics } from '@staithe/fit';
import { hourlySeries, publishedConstants } from '@staithe/test-vectors';
import { recordLong } from '../accuracy/long.mjs';

const DAYS = 29;
const FITTED = 'M2 S2 N2 K1 O1 Q1 M4 M6 MS4 MN4 MK3 2MK3 J1 OO1 M3 Mm MSf'.split(' ');
// Each beside its larger neighbour, which a month cannot part from it.
const BORROWED = {
  P1: 'K1',
  K2: 'S2',
  NU2: 'N2',
  S1: 'K1',
  RHO1: 'Q1',
  LAM2: 'M2',
  L2: 'M2',
  MU2: 'N2',
  '2N2': 'N2',
  '2Q1': 'Q1',
  M1: 'O1',
};
const LIMITS = { M2: [0.02, 1.5], O1: [0.04, 2.5], K1: [0.07, 3.5], S2: [0.08, 4.5] };
const LIMITS_T2 = { S2: [0.035, 2.5] };

const published = publishedConstants('9410230').rows;
const of = (rows, name) => rows.find((row) => row.name === name);
const rule = ([name, from]) => {
  const [child, parent] = [of(published, name), of(published, from)];
  return {
    name,
    from,
    amplitudeRatio: child.amplitude / parent.amplitude,
    phaseLagDifference: angleDifference(parent.phaseLag, child.phaseLag),
  };
};

const record = hourlySeries('la-jolla-observed');
const before = hourlySeries('la-jolla-observed-2010');
const start = before.start;
const values = Float64Array.of(...before.values, ...record.values);

const models = {
  argumentModel: 'schureman1940',
  nodalModel: 'schureman1940',
  errorModel: 'independent',
};
const rules = Object.entries(BORROWED)
  .filter(([name]) => of(published, name)?.amplitude > 0)
  .map(rule);
const withT2 = [...rules, rule(['T2', 'S2'])];

function tally(limits, borrow) {
  const inside = Object.fromEntries(Object.keys(limits).map((name) => [name, 0]));
  const off = { K1: 0, S2: 0 };
  const errors = Object.fromEntries(Object.keys(limits).map((name) => [name, []]));
  let windows = 0;
  for (let day = 0; 24 * (day + DAYS) <= values.length; day++) {
    const series = uniformSeries({
      start: start + day * 86400000,
      step: record.step,
      values: values.slice(24 * day, 24 * (day + DAYS)),
    });
    const { constituents } = fitHarmonics(series, {
      ...models,
      constituents: FITTED,
      borrow,
    }).constants;
    windows++;
    for (const [name, [relative, degrees]] of Object.entries(limits)) {
      const [got, want] = [of(constituents, name), of(published, name)];
      const error = Math.abs(got.amplitude / want.amplitude - 1);
      errors[name].push(error);
      const turned = Math.abs(angleDifference(want.phaseLag, got.phaseLag));
      if (error <= relative && turned <= degrees) inside[name]++;
    }
    for (const name of Object.keys(off)) {
      const [got, want] = [of(constituents, name), of(published, name)];
      if (Math.abs(got.amplitude / want.amplitude - 1) > 0.1) off[name]++;
    }
  }
  return { windows, inside, off, errors };
}

const misses = [];
function report(text, { windows, inside, errors }, limits) {
  for (const [name, [relative, degrees]] of Object.entries(limits)) {
    const share = inside[name] / windows;
    console.log(
      `${text}: ${name} within ${(100 * relative).toFixed(1)} % and ${degrees}°: ${(100 * share).toFixed(1)} % of ${windows} windows`,
    );
    if (share < 0.9) misses.push(`${text}: ${name} ${(100 * share).toFixed(1)} %`);
    const sorted = [...errors[name]].sort((a, b) => a - b);
    recordLong({
      package: 'fit',
      vector: 'la-jolla-observed',
      capability: `${name} of a month, ${text}`,
      compared: `published, ${windows} windows of 29 days, nine of ten; typical is the median`,
      cases: windows,
      worst: sorted[Math.floor(0.9 * windows)],
      typical: sorted[windows >> 1],
      tolerance: relative,
      unit: '1',
    });
  }
}
const usual = tally(LIMITS, rules);
const more = tally(LIMITS_T2, withT2);
const bare = tally(LIMITS, []);
console.log('without borrowing off by more than 10 %:', bare.off, 'of', bare.windows);
report('P1, K2, NU2 and the small ones borrowed', usual, LIMITS);
report('T2 borrowed too', more, LIMITS_T2);
if (bare.off.K1 < bare.windows / 2 || bare.off.S2 < bare.windows / 2) {
  misses.push(
    `without borrowing: K1 ${bare.off.K1}, S2 ${bare.off.S2} of ${bare.windows} beyond 10 %`,
  );
}
if (misses.length > 0) throw new Error(misses.join('\n'));
