/**
 * Makes the spectrum of the residual of La Jolla: tsx --tsconfig tsconfig.test.json tools/vectors/la-jolla-residual.mjs.
 * Reads the vector la-jolla-observed and fits each of its nine years by itself, so it is run by hand when that vector or
 * the fit changes.
 */
import { constituent } from '@staithe/constituents';
import { HOUR, uniformSeries } from '@staithe/core';
import { fitHarmonics } from '@staithe/fit';
import { hourlySeries } from '@staithe/test-vectors';
import { encodeInt16, writeVector } from './write.mjs';

const YEARS = [2011, 2012, 2013, 2014, 2015, 2016, 2017, 2018, 2019];
const SIDE_LINES = ['H1', 'H2']; // annual side-lines of M2: no yearly fit parts them from its cusp
const record = hourlySeries('la-jolla-observed');
const count = record.values.length;

const at = (year) => (Date.UTC(year, 0, 1) - record.start) / HOUR;
const yearOf = (year) =>
  uniformSeries({
    start: Date.UTC(year, 0, 1),
    step: HOUR,
    values: record.values.slice(at(year), at(year + 1)),
  });
const names = fitHarmonics(yearOf(2012))
  .constants.constituents.map(({ name }) => name)
  .filter((name) => !SIDE_LINES.includes(name));

const residual = new Float64Array(count);
const sums = names.map(() => [0, 0]);
for (const year of YEARS) {
  const fit = fitHarmonics(yearOf(year), { constituents: names, errorModel: 'independent' });
  residual.set(fit.residuals.values, at(year));
  fit.constants.constituents.forEach(({ amplitude, phaseLag }, i) => {
    sums[i][0] += (amplitude * Math.cos((phaseLag * Math.PI) / 180)) / YEARS.length;
    sums[i][1] += (amplitude * Math.sin((phaseLag * Math.PI) / 180)) / YEARS.length;
  });
}
const constants = Object.fromEntries(
  names.map((name, i) => {
    const [a, b] = sums[i];
    const lag = (((Math.atan2(b, a) * 180) / Math.PI + 360) % 360).toFixed(2);
    return [name, [Number(Math.hypot(a, b).toFixed(5)), Number(lag)]];
  }),
);

// The periodogram by plain sums.
const cosine = Float64Array.from({ length: count }, (_, i) => Math.cos((2 * Math.PI * i) / count));
const sine = Float64Array.from({ length: count }, (_, i) => Math.sin((2 * Math.PI * i) / count));
const power = Float64Array.from({ length: count / 2 }, (_, k) => {
  let re = 0;
  let im = 0;
  for (let i = 0, j = 0; i < count; i++) {
    re += residual[i] * cosine[j];
    im += residual[i] * sine[j];
    j += k;
    if (j >= count) j -= count;
  }
  return (re * re + im * im) / count;
});

const BIN = 360 / count; // degrees per hour
const TURN = 360 / 8766; // of a year
const TAKEN = 0.25; // share of the noise that the yearly fits took out of a bin that is not believed
const BESIDE = 12; // bins on either side that fill such bins with their mean
const LINE = 6; // medians of those: a bin beyond is a line that is not fitted, and fills nothing
const LOW = 2.8 * TURN; // below, mean level, Sa and Ssa leave nothing: the power law above is carried on
const LOW_TO = 1.2; // degrees per hour
const lines = [0, ...names.map((name) => constituent(name).speed)];
const windowAt = (turns) => {
  const x = Math.PI * turns;
  return Math.abs(x) < 1e-6 ? 1 : (Math.sin(x) / x) ** 2;
};
const emptied = Array.from(power, (_, k) => {
  const near = lines.map((line) => Math.abs(k * BIN - line) / TURN).filter((turns) => turns < 1);
  return near.reduce((sum, turns) => sum + windowAt(turns), 0) > TAKEN;
});
const logs = Array.from({ length: 16 }, (_, i) => {
  const [from, to] = [i, i + 1].map((step) => LOW * (LOW_TO / LOW) ** (step / 16));
  const inside = [...power.keys()].filter((k) => k * BIN >= from && k * BIN < to && !emptied[k]);
  const mean = inside.reduce((sum, k) => sum + power[k], 0) / inside.length;
  return [Math.log(Math.sqrt(from * to)), Math.log(mean), inside.length];
}).filter(([, , size]) => size > 0);
const mean = (column) => logs.reduce((sum, row) => sum + row[column], 0) / logs.length;
const slope =
  logs.reduce((sum, [x, y]) => sum + (x - mean(0)) * (y - mean(1)), 0) /
  logs.reduce((sum, [x]) => sum + (x - mean(0)) ** 2, 0);
const lowLaw = (speed) => Math.exp(mean(1) + slope * (Math.log(speed) - mean(0)));

const filled = power.map((value, k) => {
  if (k * BIN < LOW) return lowLaw(Math.max(k, 1) * BIN);
  if (!emptied[k]) return value;
  const found = [];
  for (const side of [-1, 1]) {
    for (let j = k + side, got = 0; got < BESIDE && j * BIN >= LOW && j < power.length; j += side) {
      if (emptied[j]) continue;
      found.push(power[j]);
      got++;
    }
  }
  const median = found.sort((a, b) => a - b)[found.length >> 1];
  const noise = found.filter((one) => one <= LINE * median);
  return noise.reduce((sum, one) => sum + one, 0) / noise.length;
});
const SMOOTHED = 1; // bins on either side
const KEPT = 2; // each second bin is kept
const smooth = filled.map((value, k) => {
  if (k * BIN < LOW) return value;
  const inside = filled.slice(Math.max(0, k - SMOOTHED), k + SMOOTHED + 1);
  return inside.reduce((sum, one) => sum + one, 0) / inside.length;
});
const kept = Array.from(smooth).filter((_, k) => k % KEPT === 0);

writeVector({
  id: 'la-jolla-residual-spectrum',
  title: 'Spectrum of what yearly fits leave of La Jolla, 2011 to 2019',
  source:
    'Computed by tools/vectors/la-jolla-residual.mjs from the vector la-jolla-observed (NOAA/NOS/CO-OPS, station 9410230): periodogram of the residuals of nine yearly fits in one row',
  kind: 'open-data',
  unit: 'm^2 (density), m and degrees (constants)',
  licence:
    'Derived from work of the US Government, public domain in the USA; cite NOAA/NOS/CO-OPS.',
  tolerance: {
    rel: 0.6,
    why: 'mean of three bins of a periodogram, each exponentially distributed',
  },
  notes: [
    'A density is the variance of white noise of the same density at one value an hour.',
    `Bins of which the yearly fits took more than a quarter are filled with the mean of ${BESIDE} whole bins on either side, those beyond ${LINE} medians left out. ${SIDE_LINES.join(' and ')}, annual side-lines of M2, are not fitted.`,
    `Below ${LOW.toFixed(3)} degrees per hour stands the power law of what lies up to ${LOW_TO}, exponent ${slope.toFixed(2)}.`,
    'What the tide of La Jolla itself changes from year to year is not in it: it lies within a turn a year of the lines, where a fit of one year sees nothing.',
  ],
  cases: {
    spacing: KEPT * BIN,
    count: kept.length,
    encoding:
      'integers of 16 bits, little-endian, base64: 1000·log10 of the density in m², at multiples of the spacing (degrees per hour)',
    density: encodeInt16(kept.map((value) => Math.round(1000 * Math.log10(value)))),
    constants,
  },
});
