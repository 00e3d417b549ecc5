/**
 * Errors from redrawn residuals on 100 synthetic years, hourly and with gaps: the tide of La Jolla and noise with the spectrum of
 * its residual. Says what share of the truths lies within the 95 % regions, by phases and by blocks.
 */
import { fitHarmonics } from '@staithe/fit';
import { seeded } from '../../packages/fit/src/random.ts';
import {
  heightsOf,
  laJolla,
  noiseOf,
  recordOf,
  withGaps,
} from '../../packages/fit/test/reference/coloured-noise.ts';
import {
  count,
  emptyCoverage,
  percent,
  pooled,
} from '../../packages/fit/test/reference/coverage.ts';
import { recordLong } from '../accuracy/long.mjs';

const START = Date.UTC(2013, 0, 1);
const YEAR = 8760;
const YEARS = Number(process.env.YEARS ?? 100);
const MAIN = 'M2 S2 N2 K1 O1 P1 K2 Q1 M4 MS4 M6 Mf Mm Ssa Sa'.split(' ');
// Percent. The lines of a year share bins: all together they are some twenty independent ones.
const POOLED = [93, 97];
const EACH = [90, 98.5];
const INDEPENDENT = 20;
const SPREADS = 3;
// With gaps M2's cusp is steeper than its bins can tell (docs/fitting.md).
const LEAST_M2 = 85;

const { density, tide } = laJolla();
const heights = heightsOf(tide, START, YEAR);
const findings = [];

/** Percent that chance may take off a share. */
const spread = (share, trials) => SPREADS * Math.sqrt((share * (100 - share)) / trials);

function judge(words, rows, gaps) {
  const { disc, interval } = percent(pooled(rows, 'spectrum'));
  const each = rows
    .filter(({ name }) => MAIN.includes(name))
    .map(({ name, spectrum }) => ({ name, share: percent(spectrum).disc }));
  console.log(
    `${words}, ${YEARS} years: discs ${disc.toFixed(1)} %, intervals ${interval.toFixed(1)} %`,
  );
  console.log(`  ${each.map(({ name, share }) => `${name} ${share.toFixed(0)}`).join('  ')}`);
  const strict = each.filter(({ share }) => share < EACH[0] || share > EACH[1]);
  console.log(`  beyond ${EACH.join(' to ')} %: ${strict.map(({ name }) => name).join(' ')}`);
  for (const share of [disc, interval]) {
    const chance = spread(95, INDEPENDENT * YEARS);
    if (!(share > POOLED[0] - chance && share < POOLED[1] + chance)) {
      findings.push(`${words}: pooled ${share.toFixed(1)} %`);
    }
  }
  for (const { name, share } of each) {
    const least = gaps && name === 'M2' ? LEAST_M2 : EACH[0];
    if (!(share > least - spread(least, YEARS))) findings.push(`${words}: ${name} ${share} %`);
  }
  recordLong({
    package: 'fit',
    vector: 'la-jolla-residual-spectrum',
    capability: `share of truths outside of 95 % discs from redrawn residuals, ${words}`,
    compared: `${YEARS} synthetic years; typical is all constituents pooled, worst the worst of ${MAIN.length} main ones; 5 % is right`,
    cases: YEARS * tide.names.length,
    worst: Math.max(...each.map(({ share }) => 1 - share / 100)),
    typical: 1 - disc / 100,
    tolerance: 0.2,
    unit: '1',
  });
}

for (const gaps of [false, true]) {
  const ways = { phases: emptyCoverage(tide), blocks: emptyCoverage(tide) };
  const noise = noiseOf(density, seeded(20260));
  const random = seeded(7);
  for (let i = 0; i < YEARS; i++) {
    const record = recordOf(START, heights, noise.next().value.subarray(0, YEAR));
    const values = gaps ? withGaps(record.values, random) : record.values;
    for (const [by, rows] of Object.entries(ways)) {
      const redraw = { by, seed: 1 + i };
      const options = { constituents: tide.names, errorModel: 'redrawn', redraw };
      count(rows, fitHarmonics({ ...record, values }, options), tide);
    }
  }
  for (const [by, rows] of Object.entries(ways)) {
    judge(`by ${by}, ${gaps ? 'with gaps of 10 to 30 %' : 'hourly'}`, rows, gaps);
  }
}
if (findings.length > 0) throw new Error(findings.join('; '));
