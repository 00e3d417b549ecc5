/**
 * Draws every picture and table from invented constants into a folder, to be looked at:
 * `npx tsx --tsconfig tsconfig.base.json packages/report/bench/draw.ts [folder]`. Prints how long each took.
 */
import { mkdirSync, mkdtempSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { DAY, HOUR, MINUTE, uniformSeries } from '@staithe/core';
import { tideCurve } from '@staithe/predict';
import {
  constantsText,
  dialsSvg,
  foldedRecordSvg,
  levelsLadderSvg,
  levelsText,
  monthSvg,
  monthText,
  reportHtml,
  residualRasterSvg,
  weekSvg,
  windowsText,
} from '@staithe/report';
import {
  diurnalConstants,
  inventedConstants,
  inventedRecord,
  inventedRungs,
} from '../test/invented.js';

const folder = process.argv[2] ?? mkdtempSync(join(tmpdir(), 'staithe-draw-'));
mkdirSync(folder, { recursive: true });
const timeZone = 'Europe/Lisbon';
const datum = 'chart datum';
const constants = inventedConstants();
const curve = tideCurve(constants);
const record = inventedRecord();
const month = { from: '2031-02-26T00:00Z', to: '2031-04-03T00:00Z' };
const turningPoints = curve.turningPoints(month);
const list = curve.windows({ above: 4.2 }, month);
const weekHeights = curve.heights({
  start: '2031-03-25T00:00Z',
  step: 10 * MINUTE,
  count: 7 * 144 - 6,
});
const residuals = record.residuals;
const rungs = inventedRungs();
const sky = [
  { date: '2031-03-08', moon: 'full', note: 'Moon 4°N, perigee in 2 d' },
  { date: '2031-03-23', moon: 'new' },
] as const;
const leftOver = [{ speed: 57.968, amplitude: 0.009, likely: 'M4' }];
const windows = { list, above: 4.2, from: Date.parse(month.from), to: Date.parse(month.to) };

function write(name: string, make: () => string): void {
  const began = performance.now();
  const text = make();
  const took = performance.now() - began;
  writeFileSync(join(folder, name), text);
  console.log(
    `${name.padEnd(24)} ${(text.length / 1000).toFixed(0).padStart(6)} kB ${took.toFixed(0).padStart(6)} ms`,
  );
}

for (const width of [760, 360]) {
  write(`record-${width}.svg`, () =>
    foldedRecordSvg(
      {
        series: record.series,
        runs: record.runs,
        steps: record.steps,
        title: 'The record of Quenby Haven',
      },
      { width },
    ),
  );
  write(`dials-${width}.svg`, () => dialsSvg(constants, { width }));
  write(`dials-diurnal-${width}.svg`, () => dialsSvg(diurnalConstants(), { width }));
  write(`raster-${width}.svg`, () => residualRasterSvg({ residuals, leftOver }, { width }));
  write(`week-${width}.svg`, () =>
    weekSvg(
      { heights: weekHeights, turningPoints, windows: list, above: 4.2, timeZone, datum },
      { width },
    ),
  );
  write(`month-${width}.svg`, () =>
    monthSvg(
      {
        place: 'Quenby Haven',
        turningPoints,
        month: '2031-03',
        timeZone,
        datum,
        sky,
        windows: list,
      },
      { width },
    ),
  );
  write(`levels-${width}.svg`, () => levelsLadderSvg({ rungs, datum }, { width }));
}
write('constants.txt', () => constantsText(constants, record.diagnostics));
write('month.txt', () =>
  monthText({
    place: 'Quenby Haven',
    turningPoints,
    month: '2031-03',
    timeZone,
    datum,
    sky,
    range: true,
  }),
);
write('levels.txt', () => levelsText({ rungs, datum }));
write('windows.txt', () =>
  windowsText({ place: 'Quenby Haven', windows: list, above: 4.2, timeZone, datum }),
);
write('report.html', () =>
  reportHtml({
    place: { name: 'Quenby Haven', latitude: 47.2, longitude: -9.3 },
    datum,
    timeZone,
    record: {
      series: record.series,
      runs: record.runs,
      steps: record.steps,
      findings: ['3 lines held 9999 and count as missing.'],
    },
    fit: { constants, residuals, diagnostics: record.diagnostics, warnings: [], leftOver },
    turningPoints,
    month: '2031-03',
    weekHeights,
    windows,
    levels: rungs,
    limits: {
      HAT: { height: 5.21, time: Date.UTC(2033, 2, 12, 5, 40) },
      LAT: { height: -0.06, time: Date.UTC(2033, 8, 20, 11, 2) },
      from: Date.UTC(2030, 0, 1),
      to: Date.UTC(2049, 0, 1),
    },
    sky,
    generatedFrom: {
      program: 'staithe 0.1.0',
      file: 'quenby.csv',
      sha256: 'ab'.repeat(32),
      at: '2031-02-01T00:00Z',
    },
  }),
);
write('report-bare.html', () =>
  reportHtml({
    place: { name: 'Quenby Haven' },
    datum,
    timeZone: 'UTC',
    fit: { constants },
    turningPoints: [],
    generatedFrom: { program: 'staithe 0.1.0' },
  }),
);
write('week-long.svg', () =>
  weekSvg({
    heights: uniformSeries({
      start: 0,
      step: HOUR,
      values: curve.heights({ start: 0, step: HOUR, count: 40 }).values,
    }),
    turningPoints: curve.turningPoints({ from: 0, to: 2 * DAY }),
    timeZone: 'UTC',
    datum,
  }),
);
console.log(folder);
