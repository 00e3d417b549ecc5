/**
 * From a file to constants: read, check, take air pressure off, fit, check against the fit, fit again with the moves of the
 * zero that were found.
 * @module
 */
import { seriesTimes, toInstant } from '@staithe/core';
import { fitHarmonics } from '@staithe/fit';
import { applyFlags, checkRecord, parseGaugeCsv } from '@staithe/gauge';
import { tideCurve } from '@staithe/predict';
import { compareFaults, compareSteps } from './compare.mjs';
import { inverseBarometer } from './pressure.mjs';
import { count, keep, millimetres, moment, row, signed, under } from './terminal.mjs';

function readAndCheck(file, truth, datum) {
  keep(file.name, file.text);
  let since = performance.now();
  const record = parseGaugeCsv(file.text, { datum });
  const missing = record.flags.reduce((n, flag) => n + (flag === 9 ? 1 : 0), 0);
  const due = record.flags.length;
  const read = `${count(due - missing)} of ${count(due)} samples`;
  row('read', `${read}, ${count(missing)} missing in ${record.reasons.length} gaps`, since);

  since = performance.now();
  const check = checkRecord(record.series);
  const failed = check.flags.reduce((n, flag) => n + (flag === 4 ? 1 : 0), 0);
  row('check', `${count(failed)} samples fail and are set aside`, since);
  compareFaults(record, check, truth);
  return { record, check, kept: applyFlags(record.series, check.flags) };
}

/**
 * What a record says, each step shown with its time.
 *
 * The fits are told no latitude: with one, lines of degree 3 would enter f and u, and the generator's sea has none.
 */
export function study({ file, pressure }, truth, datum) {
  const { record, check, kept } = readAndCheck(file, truth, datum);
  keep(pressure.name, pressure.text);

  let since = performance.now();
  const barometer = inverseBarometer(pressure);
  const times = seriesTimes(kept);
  const calmed = { ...kept, values: kept.values.map((height, i) => height - barometer(times[i])) };
  const options = { place: { name: truth.place.name }, datum, source: file.name };
  const first = tideCurve(fitHarmonics(calmed, options).constants);
  const { findings } = checkRecord(record.series, {
    expected: (ts) => first.heightsAt(ts).map((height, i) => height + barometer(ts[i])),
    limits: { besides: false },
  });
  const moved = findings.filter(({ kind }) => kind === 'zero-moved');
  const off = findings.length - moved.length;
  const found = `${moved.length} ${moved.length === 1 ? 'move' : 'moves'} of the zero, ${off} clock faults`;
  row('doubt', `${found}, against a first fit and the air pressure`, since);
  compareSteps(moved, truth);

  since = performance.now();
  const fit = fitHarmonics(calmed, { ...options, steps: moved.map((finding) => finding.at) });
  const { steps = [], ...steady } = fit.constants;
  const constants = { ...steady, place: placeOf(truth) };
  const standing = (word) => constants.constituents.filter((c) => c.standing === word).length;
  const held = `${constants.constituents.length} lines: ${standing('firm')} firm, ${standing('faint')} faint`;
  row('fit', `${held}; air pressure taken off`, since);
  const { rms, largest, largestAt } = fit.diagnostics.residual;
  const worst = `${millimetres(largest)} mm worst (${moment(largestAt)})`;
  under(`not tide: ${millimetres(rms)} mm typical, ${worst}`);
  for (const { at, change } of steps) {
    under(`the step of ${at}: ${signed(change)} mm, taken back from here on`);
  }
  const heights = onOneZero(kept, steps);
  return { record, check, heights, moved, fit: { ...fit, constants } };
}

/** A record whose zero does not move: the one before the first step is the datum's. */
function onOneZero(series, steps) {
  const times = seriesTimes(series);
  const values = series.values.map((height, i) =>
    steps.reduce(
      (left, { at, change }) => (times[i] >= toInstant(at) ? left - change : left),
      height,
    ),
  );
  return { ...series, values };
}

const placeOf = ({ place: { name, latitude, longitude } }) => ({ name, latitude, longitude });
