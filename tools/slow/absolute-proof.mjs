/**
 * The sum of the potential's lines against the equilibrium tide of an ephemeris, hourly 1993 to 2011, and what is left.
 */
import { lunisolarLongitudesInto } from '@staithe/arguments';
import { potentialLines } from '@staithe/constituents';
import { loadVector } from '@staithe/test-vectors';
import {
  ALL,
  DEGREE_2,
  DEGREE_3,
  relativeRms,
  runProof,
  timesOf,
} from '../../packages/constituents/test/reference/absolute-proof.ts';
import {
  TERMS,
  tideOfEphemeris,
  tideOfLines,
  tideOfWaves,
} from '../../packages/constituents/test/reference/equilibrium-tide.ts';
import { recordLong } from '../accuracy/long.mjs';

const vector = 'ephemeris-equilibrium-tide';
const { cases: proof } = loadVector(vector);
const { ratios, samples } = runProof(proof, 1);
for (const { what, where, ratio, limit } of ratios) {
  console.log(what.padEnd(26), where.padEnd(14), ratio.toExponential(3), `limit ${limit}`);
}
for (const what of new Set(ratios.map((ratio) => ratio.what))) {
  const rows = ratios.filter((ratio) => ratio.what === what);
  for (const limit of new Set(rows.map((ratio) => ratio.limit))) {
    const own = rows.filter((ratio) => ratio.limit === limit);
    recordLong({
      package: 'constituents',
      vector,
      capability: `equilibrium tide, ${what}: rms of the difference over rms of the signal`,
      compared: `${own.map(({ where }) => where).join(', ')}; hourly; typical is the least of the places`,
      cases: samples,
      worst: Math.max(...own.map(({ ratio }) => ratio)),
      typical: Math.min(...own.map(({ ratio }) => ratio)),
      tolerance: limit,
      unit: '1',
    });
  }
}

// What is left, taken apart: each row changes one thing. One sample in 7 hours is enough for that.
const times = timesOf(proof, 7);
const ephemeris = tideOfEphemeris(times);
const lines = tideOfLines(times, potentialLines());
const catalogue = loadVector('hartmann-wenzel-1995').cases;
const waves = tideOfWaves(times, catalogue);

/** The numbers with the Earth turned on by an angle in degrees. */
function turned(numbers, degrees) {
  return numbers.map((value, i) => {
    const { order } = TERMS[Math.floor((i % (2 * TERMS.length)) / 2)];
    const angle = (order * degrees * Math.PI) / 180;
    const other = numbers[i % 2 === 0 ? i + 1 : i - 1];
    return value * Math.cos(angle) + (i % 2 === 0 ? -1 : 1) * other * Math.sin(angle);
  });
}
const places = proof.places.filter(({ longitude }) => longitude !== 120);
const show = (what, signal, other, terms = DEGREE_2) =>
  console.log(
    what.padEnd(60),
    places.map((place) => relativeRms(signal, other, place, terms).toExponential(2)).join('  '),
  );
console.log(`\n${places.map(({ name }) => name).join(', ')}`);
show('342 lines', ephemeris, lines);
show('517 waves', ephemeris, waves);
show('342 lines against 517 waves', waves, lines);
const ofDegree2 = catalogue.filter((wave) => wave[1] === 2).sort((a, b) => b[5] - a[5]);
for (const count of [32, 64, 128, 256, 342, 400, 450, 517]) {
  show(`the largest ${count} waves`, ephemeris, tideOfWaves(times, ofDegree2.slice(0, count)));
}
const lead = 0.0064; // degrees: aberration 0.0057, and ΔT·0.0411/3600
show('342 lines, Earth turned back by the lead of τ', ephemeris, turned(lines, -lead));
show('517 waves, Earth turned back by the lead of τ', ephemeris, turned(waves, -lead));
show('that lead by itself', ephemeris, turned(ephemeris, lead));
show('nutation by itself', ephemeris, tideOfEphemeris(times, false));
show('517 waves against the ephemeris without nutation', tideOfEphemeris(times, false), waves);
show('a second of UT by itself', ephemeris, turned(ephemeris, 15 / 3600));
show(
  'degrees 2 and 3, lines of degree 2 alone',
  ephemeris,
  tideOfLines(times, potentialLines({ degree: 2 })),
  ALL,
);
show('degrees 2 and 3, 417 lines', ephemeris, lines, ALL);
show('degrees 2 and 3, 650 waves', ephemeris, waves, ALL);
show('degree 3, 75 lines', ephemeris, lines, DEGREE_3);
show('degree 3, 133 waves', ephemeris, waves, DEGREE_3);

/** Phase in degrees of the numbers of one order against an angle of multipliers, over the whole span. */
function phaseOf(numbers, multipliers) {
  const six = new Float64Array(6);
  const column = 2 * DEGREE_2.find((term) => TERMS[term].order === multipliers[0]);
  let re = 0;
  let im = 0;
  times.forEach((time, i) => {
    lunisolarLongitudesInto(time, 'iers2010', six);
    const angle = (multipliers.reduce((sum, n, k) => sum + n * six[k], 0) * Math.PI) / 180;
    const x = numbers[i * 2 * TERMS.length + column];
    const y = numbers[i * 2 * TERMS.length + column + 1];
    re += x * Math.cos(angle) + y * Math.sin(angle);
    im += y * Math.cos(angle) - x * Math.sin(angle);
  });
  return ((Math.atan2(im, re) * 180) / Math.PI).toFixed(4);
}
const kept = potentialLines().filter(({ doodsonNumbers: [n1, , , , , n6] }) => n1 < 2 || n6 !== 2);
const without = tideOfLines(times, kept);
console.log('\nphase, degrees: ephemeris, lines, semidiurnal lines without those of 2 p_s');
for (const multipliers of [
  [2, 0, 0, 0, 0, 0],
  [2, 2, -2, 0, 0, 0],
]) {
  console.log(
    multipliers.join(' '),
    ...[ephemeris, lines, without].map((numbers) => phaseOf(numbers, multipliers)),
  );
}
