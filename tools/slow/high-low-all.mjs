/**
 * All 107,273 official high and low waters of New London, 1939 to 2014, against the prediction.
 */
import { highLowRows } from '@staithe/test-vectors';
import { compareHighLow } from '../../packages/predict/test/reference/compare-high-low.ts';
import { officialConstants } from '../../packages/predict/test/reference/places.ts';
import { recordLong } from '../accuracy/long.mjs';

const LOST = ['1966-05-31T23:59', '2003-01-01T00:13', '2005-01-01T00:01']; // at joins of the published files
const vector = 'new-london-predicted-high-low';
const { rows, missing, extra, minutes, metres } = compareHighLow(
  highLowRows(vector),
  officialConstants('8461490'),
  1939,
  2015,
);
console.log({ rows, missing, extra, minutes, metres });
const names = extra.map((time) => time.slice(0, 16));
if (rows !== 107273 || missing.length > 0 || names.join() !== LOST.join()) {
  throw new Error(
    `expected every row and ${LOST.length} more, got ${rows} rows, ${missing.length} missing, ${names}`,
  );
}
if (!(Math.abs(minutes.mean) <= 0.05 && minutes.sd <= 0.43 && metres.sd <= 3.2e-3)) {
  throw new Error('spread beyond its bound');
}
if (!(Math.abs(metres.mean + 0.092) <= 0.001)) throw new Error(`mean offset ${metres.mean}`);
const common = { package: 'predict', vector, cases: rows };
recordLong({
  ...common,
  capability: 'times of high and low water',
  compared: 'all official rows 1939 to 2014, rounded to the minute; typical is the sd',
  worst: minutes.max,
  typical: minutes.sd,
  tolerance: 1.7,
  unit: 'min',
});
recordLong({
  ...common,
  capability: 'heights of high and low water',
  compared: 'all official rows 1939 to 2014, rounded to the centimetre; typical is the sd',
  worst: metres.max * 1000,
  typical: metres.sd * 1000,
  tolerance: 9.6,
  unit: 'mm',
});
