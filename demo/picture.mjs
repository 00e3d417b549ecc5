/**
 * The picture of the README, docs/pictures/quenby-haven.svg: the harbour's record with what was found in it, and a week of
 * the tide that came out of it. `--check` only tells whether the picture would change.
 *
 * Coordinates are rounded to a tenth of a pixel, so that every machine draws the same.
 */
import { DAY, MINUTE } from '@staithe/core';
import { tideCurve } from '@staithe/predict';
import { foldedRecordSvg, weekSvg } from '@staithe/report';
import { existsSync, mkdirSync, readFileSync, writeFileSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { makeDemoRecords } from './generate/records.mjs';
import { study } from './steps/study.mjs';
import { out, root } from './steps/terminal.mjs';

const WIDTH = 880;
const GAP = 16;
const TARGET = join(root, 'docs/pictures/quenby-haven.svg');
const DATUM = 'chart datum';
const ABOVE = 3.5;

/** Eleven fortnights that hold a stuck sensor, spikes, gaps and the moved zero. */
const RECORD = { from: Date.UTC(2030, 4, 2), to: Date.UTC(2030, 4, 2) + 11 * 14 * DAY };
const WEEK = { from: Date.UTC(2031, 4, 31, 23), to: Date.UTC(2031, 5, 7, 23) };

const COORDINATES =
  /\s(?:d|x|y|x1|x2|y1|y2|cx|cy|r|rx|width|height|points|transform|viewBox)="[^"]*"/g;
/** Numbers of coordinates to one decimal. */
const rounded = (svg) =>
  svg.replace(COORDINATES, (attribute) =>
    attribute.replace(/-?\d+\.\d+/g, (number) => String(Number(Number(number).toFixed(1)) + 0)),
  );

/** The height that a picture says it has. */
function heightOf(svg) {
  const [, height] = /^<svg[^>]*\sheight="([\d.]+)"/.exec(svg) ?? [];
  if (height === undefined) throw new Error('picture: expected a height in the SVG, got none');
  return Number(height);
}

/** Pictures one below the other. */
function stacked(pictures) {
  let y = 0;
  const parts = pictures.map((svg) => {
    const part = svg.replace(/^<svg/, `<svg y="${y}"`);
    y += heightOf(svg) + GAP;
    return part;
  });
  const height = y - GAP;
  return `<svg xmlns="http://www.w3.org/2000/svg" width="${WIDTH}" height="${height}" viewBox="0 0 ${WIDTH} ${height}" role="img" aria-label="A record with its faults found, and a week of the tide predicted from it">\n${parts.join('\n')}\n</svg>\n`;
}

function draw() {
  const { files, truth } = makeDemoRecords();
  const place = truth['quenby-haven'];
  const file = files.find(({ name }) => name === 'quenby-haven.csv');
  const pressure = files.find(({ name }) => name === 'quenby-haven-pressure.csv');
  const { record, check, moved, fit } = study({ file, pressure }, place, DATUM);
  const { start, step, values } = record.series;
  const first = (RECORD.from - start) / step;
  const series = {
    start: RECORD.from,
    step,
    values: values.slice(first, first + (RECORD.to - RECORD.from) / step),
  };
  // The stuck sensor has a second name, attenuated signal: the picture says one.
  const isShown = ({ from, to, reason }) =>
    from < RECORD.to && to >= RECORD.from && reason !== 'attenuated signal';
  const curve = tideCurve(fit.constants);
  return rounded(
    stacked([
      foldedRecordSvg(
        {
          series,
          runs: check.reasons.filter(isShown),
          steps: moved.filter(({ at }) => at >= RECORD.from && at < RECORD.to),
          title: 'Quenby Haven: five months of the record, and what the checks found',
        },
        { width: WIDTH },
      ),
      weekSvg(
        {
          heights: curve.heights({
            start: WEEK.from,
            step: 6 * MINUTE,
            count: (WEEK.to - WEEK.from) / (6 * MINUTE),
          }),
          turningPoints: curve.turningPoints({ from: WEEK.from, to: WEEK.to }),
          windows: curve.windows({ above: ABOVE }, WEEK),
          above: ABOVE,
          timeZone: place.place.timeZone,
          datum: DATUM,
          title: 'The week of 1 June 2031, and when a ship can pass the sill',
        },
        { width: WIDTH },
      ),
    ]),
  );
}

mkdirSync(out, { recursive: true });
const picture = draw();
if (process.argv.includes('--check')) {
  if (existsSync(TARGET) && readFileSync(TARGET, 'utf8') === picture) {
    console.log('docs/pictures/quenby-haven.svg is up to date');
  } else {
    console.error('docs/pictures/quenby-haven.svg: not up to date; run: node demo/picture.mjs');
    process.exitCode = 1;
  }
} else {
  mkdirSync(dirname(TARGET), { recursive: true });
  writeFileSync(TARGET, picture);
  console.log('wrote docs/pictures/quenby-haven.svg');
}
