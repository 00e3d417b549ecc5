/**
 * The harbour: everything a port asks for.
 * @module
 */
import { DAY, MINUTE } from '@staithe/core';
import { astronomicalTideLimits, harmonicLevels, tabulateTide, tidalDatums } from '@staithe/datums';
import { tideCurve } from '@staithe/predict';
import {
  constantsCsv,
  constantsText,
  heightsCsv,
  levelsText,
  monthText,
  reportHtml,
  turningPointsCsv,
  windowsCsv,
  windowsText,
} from '@staithe/report';
import { createHash } from 'node:crypto';
import { trueTide } from '../generate/records.mjs';
import { compareConstants, complain, difference } from './compare.mjs';
import { study } from './study.mjs';
import { block, count, keep, millimetres, row, shown, signed, under } from './terminal.mjs';

const ID = 'quenby-haven';
const DATUM = 'chart datum';
const MONTH = '2031-06';
// In Europe/Lisbon June begins at 23:00 UTC of 31 May.
const JUNE = { from: Date.UTC(2031, 4, 31, 23), to: Date.UTC(2031, 5, 30, 23) };
const YEAR = { start: Date.UTC(2031, 0, 1), step: 6 * MINUTE, count: 365 * 240 };
/** A ship that draws 6.2 m, with 0.9 m under the keel, over a sill 3.6 m below chart datum. */
const SHIP = { draught: 6.2, clearance: 0.9, sill: 3.6 };

const head = (text, lines) => text.split('\n').slice(0, lines).join('\n');

function predictYear(curve) {
  const since = performance.now();
  const heights = curve.heights(YEAR);
  row('predict', `${count(YEAR.count)} heights, the whole of 2031 every 6 minutes`, since);
  const { rms, mean } = difference(heights.values, trueTide(ID, YEAR));
  under(
    `the tide is within ${millimetres(rms)} mm (rms) of the truth; its mean level ${signed(mean)} mm beside it`,
  );
  keep(`${ID}-2031.csv`, heightsCsv(heights));
  keep(
    `${ID}-2031-waters.csv`,
    turningPointsCsv(curve.turningPoints({ from: '2031-01-01T00:00Z', to: '2032-01-01T00:00Z' })),
  );
  return heights;
}

function makeTable(curve, place) {
  const since = performance.now();
  const turningPoints = curve.turningPoints({ from: JUNE.from - DAY, to: JUNE.to + DAY });
  const table = monthText({
    place: place.name,
    turningPoints,
    month: MONTH,
    timeZone: place.timeZone,
    datum: DATUM,
    range: true,
  });
  keep(`${ID}-${MONTH}.txt`, `${table}\n`);
  row('table', `June 2031 in local time: ${shown(`${ID}-${MONTH}.txt`)}`, since);
  block(head(table, 6));
  return turningPoints;
}

function askWindows(curve, place) {
  const since = performance.now();
  const above = Math.round((SHIP.draught + SHIP.clearance - SHIP.sill) * 100) / 100;
  const list = curve.windows({ above }, JUNE);
  row('windows', `${list.length} in June in which a ship can pass the sill`, since);
  under(
    `draught ${SHIP.draught} m and ${SHIP.clearance} m under the keel over a sill ${SHIP.sill} m below datum: ${above.toFixed(1)} m of tide`,
  );
  const text = windowsText({
    place: place.name,
    windows: list,
    above,
    timeZone: place.timeZone,
    datum: DATUM,
  });
  keep(`${ID}-windows.txt`, `${text}\n`);
  keep(`${ID}-windows.csv`, windowsCsv(list));
  block(head(text, 4));
  return { list, above, ...JUNE };
}

/** The ladder: HAT and LAT predicted, mean waters of the record, the rest from the constants. */
function findLevels(constants, record) {
  const since = performance.now();
  const limits = astronomicalTideLimits(constants);
  const observed = tidalDatums(tabulateTide(record)).levels;
  const { levels, tideClass } = harmonicLevels(constants);
  const rungs = [
    { name: 'HAT', height: limits.HAT.height, grounds: 'predicted, 2020 to 2038' },
    { name: 'LAT', height: limits.LAT.height, grounds: 'predicted, 2020 to 2038' },
    ...['MHWS', 'MLWS'].map((name) => ({
      name,
      height: levels[name],
      grounds: 'from the constants',
    })),
    ...['MHHW', 'MHW', 'MSL', 'MLW', 'MLLW'].map((name) => ({
      name,
      height: observed[name].height,
      sigma: observed[name].sigma,
      grounds: `${observed[name].count} ${name === 'MSL' ? 'samples' : 'tides'}`,
    })),
  ];
  const ladder = levelsText({ rungs, datum: DATUM });
  keep(`${ID}-levels.txt`, `${ladder}\n`);
  row('levels', `${rungs.length} on the ladder, a tide of the class ${tideClass}`, since);
  block(head(ladder, ladder.split('\n').length - 1));
  return { rungs, limits };
}

/** @returns {Promise<string[]>} What is not as it should be. */
export async function harbour(files, truth) {
  const { place } = truth;
  console.log(`\n${place.name}: twice a day, about three metres\n`);
  const file = files.find(({ name }) => name === `${ID}.csv`);
  const pressure = files.find(({ name }) => name === `${ID}-pressure.csv`);
  const { record, check, heights, fit, moved } = study({ file, pressure }, truth, DATUM);
  const { constants } = fit;
  compareConstants(constants, truth, ['M2', 'S2', 'N2', 'K2', 'K1', 'O1', 'M4', 'M6', 'Sa']);
  keep(`${ID}.constants.json`, `${JSON.stringify(constants, null, 2)}\n`);
  keep(`${ID}.constants.csv`, constantsCsv(constants));
  keep(`${ID}.constants.txt`, `${constantsText(constants, fit.diagnostics)}\n`);

  const curve = tideCurve(constants);
  predictYear(curve);
  const turningPoints = makeTable(curve, place);
  const windows = askWindows(curve, place);
  const { rungs, limits } = findLevels(constants, heights);

  const since = performance.now();
  const page = reportHtml({
    place,
    datum: DATUM,
    timeZone: place.timeZone,
    record: {
      series: record.series,
      runs: check.reasons,
      steps: moved,
      findings: ['Air pressure was taken off before the fit: 9.95 mm a hectopascal from its mean.'],
    },
    fit,
    turningPoints,
    month: MONTH,
    weekHeights: curve.heights({ start: JUNE.from, step: 6 * MINUTE, count: 7 * 240 }),
    windows,
    levels: rungs,
    limits,
    generatedFrom: {
      program: 'the demo of Staithe; place and record are invented',
      file: file.name,
      sha256: createHash('sha256').update(file.text).digest('hex'),
    },
  });
  keep(`${ID}.html`, page);
  row('report', `${count(Math.round(page.length / 1000))} kB in one page without script`, since);
  return complain(place.name, constants, truth, 'M2');
}
