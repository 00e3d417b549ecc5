/**
 * Twenty records each of La Jolla 2012 and Eastport 2019 with 10 % spikes of ±2 m and a stuck day, fitted with equal and
 * with resistant weighting: how far from the fit of the clean record.
 */
import { hourlySeries } from '@staithe/test-vectors';
import { fitHarmonics } from '@staithe/fit';
import {
  apart,
  FAR,
  JUDGED,
  NEAR,
  OLD,
  spoil,
  within,
  yearOf,
} from '../../packages/fit/test/reference/spoilt.ts';
import { recordLong } from '../accuracy/long.mjs';

const SEEDS = Array.from({ length: 20 }, (_, i) => i + 1);
const SHOWN = [...JUDGED, 'N2'];
const EASTPORT = 2e-3; // m, of an M2 of 2.6 m
const LEAST_SPOILT = 15; // of the twenty
const RESISTANT = { ...OLD, weighting: 'resistant' };

/** Distances of each seed: the two fits of the spoilt record, and the clean record without the samples that get a spike. */
function distances(clean, reference) {
  const columns = { resistant: [], equal: [], lost: [] };
  for (const seed of SEEDS) {
    const { series, spikes } = spoil(clean, { seed });
    columns.resistant.push(apart(fitHarmonics(series, RESISTANT), reference, SHOWN));
    columns.equal.push(apart(fitHarmonics(series, OLD), reference, SHOWN));
    const values = Float64Array.from(clean.values);
    for (const i of spikes) values[i] = Number.NaN;
    const options = reference.resistant ? RESISTANT : OLD;
    columns.lost.push(apart(fitHarmonics({ ...clean, values }, options), reference, SHOWN));
  }
  return columns;
}

const of = (rows, name, key) => rows.map((row) => row.find((one) => one.name === name)[key]);
const judged = (rows) => rows.map((row) => row.filter(({ name }) => JUDGED.includes(name)));

function show(place, columns) {
  console.log(
    `${place}: worst of ${SEEDS.length}, mm and degrees; within ${NEAR.amplitude * 1000} mm and ${NEAR.phaseLag} degrees`,
  );
  for (const [what, rows] of Object.entries(columns)) {
    const cells = SHOWN.map((name) => {
      const mm = (Math.max(...of(rows, name, 'amplitude')) * 1000).toFixed(2);
      return `${name} ${mm.padStart(5)} ${Math.max(...of(rows, name, 'phaseLag')).toFixed(3)}`;
    });
    const near = judged(rows).filter((row) => within(row, NEAR)).length;
    console.log(what.padEnd(10), cells.join('  '), ` ${near}`);
  }
}

const laJolla = yearOf(hourlySeries('la-jolla-observed'), 2012);
const first = distances(laJolla, fitHarmonics(laJolla, OLD));
show('La Jolla 2012', first);
const eastport = hourlySeries('eastport-observed-2019');
const second = distances(eastport, fitHarmonics(eastport, RESISTANT));
show('Eastport 2019', second);

const findings = [];
const spoilt = judged(first.equal).filter((row) => !within(row, FAR)).length;
if (spoilt < LEAST_SPOILT) {
  findings.push(`expected ${LEAST_SPOILT} spoilt by equal weighting, got ${spoilt}`);
}

function record(vector, place, rows, key, tolerance, unit) {
  const all = judged(rows).flatMap((row) => row.map((one) => one[key]));
  const scale = unit === 'mm' ? 1000 : 1;
  try {
    recordLong({
      package: 'fit',
      vector,
      capability: `${key === 'amplitude' ? 'amplitudes' : 'phase lags'} of a resistant fit under spikes and a stuck day`,
      compared: `${place}: ${JUDGED.join(', ')} of the clean record; 10 % spikes of 2 m, ${SEEDS.length} seeds`,
      cases: all.length,
      worst: Math.max(...all) * scale,
      typical: Math.sqrt(all.reduce((sum, value) => sum + value * value, 0) / all.length) * scale,
      tolerance: tolerance * scale,
      unit,
    });
  } catch (error) {
    findings.push(`${place}: ${error.message}`);
  }
}
record('la-jolla-observed', 'La Jolla 2012', first.resistant, 'amplitude', NEAR.amplitude, 'mm');
record('la-jolla-observed', 'La Jolla 2012', first.resistant, 'phaseLag', NEAR.phaseLag, 'degrees');
record('eastport-observed-2019', 'Eastport 2019', second.resistant, 'amplitude', EASTPORT, 'mm');
if (findings.length > 0) throw new Error(findings.join('\n'));
