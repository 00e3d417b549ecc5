/**
 * The lagoon: a tide that comes once a day, in short.
 * @module
 */
import { HOUR } from '@staithe/core';
import { harmonicLevels } from '@staithe/datums';
import { tideCurve } from '@staithe/predict';
import { trueTide } from '../generate/records.mjs';
import { compareConstants, complain, difference } from './compare.mjs';
import { study } from './study.mjs';
import { count, keep, millimetres, row, signed, under } from './terminal.mjs';

const ID = 'merrowby-lagoon';
const DATUM = 'lagoon datum';
const YEAR = { start: Date.UTC(2031, 0, 1), step: HOUR, count: 365 * 24 };

/** @returns {Promise<string[]>} What is not as it should be. */
export async function lagoon(files, truth) {
  const { name } = truth.place;
  console.log(`\n${name}: once a day, half a metre\n`);
  const file = files.find((entry) => entry.name === `${ID}.csv`);
  const pressure = files.find((entry) => entry.name === `${ID}-pressure.csv`);
  const { fit } = study({ file, pressure }, truth, DATUM);
  const { constants } = fit;
  compareConstants(constants, truth, ['K1', 'O1', 'P1', 'Q1', 'M2', 'S2', 'Sa']);
  keep(`${ID}.constants.json`, `${JSON.stringify(constants, null, 2)}\n`);

  const since = performance.now();
  const heights = tideCurve(constants).heights(YEAR);
  row('predict', `${count(YEAR.count)} heights, the whole of 2031 every hour`, since);
  const { rms, mean } = difference(heights.values, trueTide(ID, YEAR));
  under(
    `the tide is within ${millimetres(rms)} mm (rms) of the truth; its mean level ${signed(mean)} mm beside it`,
  );
  const { tideClass, formFactor } = harmonicLevels(constants);
  row('levels', `a tide of the class ${tideClass}, form number ${formFactor?.toFixed(1)}`);
  return complain(name, constants, truth, 'K1');
}
