/**
 * The demo's two gauge records with everything that goes wrong in them, and the truth behind them.
 *
 * Nothing here comes from the packages but the table of the potential's lines: a fit or a prediction that agrees with this truth agrees
 * with something made apart from it. Every run gives the same text.
 * @module
 */
import { toCsv } from './csv.mjs';
import { drawSpikes, spoil } from './faults.mjs';
import { HARBOUR, LAGOON } from './places.mjs';
import { readPotentialLines } from './potential-lines.mjs';
import { HARBOUR_SCHEDULE, LAGOON_SCHEDULE } from './schedule.mjs';
import { tideHeights } from './tide.mjs';
import { describeTruth } from './truth.mjs';
import { drawSeiches, semidiurnalUnrest, weatherHeights } from './weather.mjs';

const HOUR = 3_600_000;

function makeRecord(place, schedule, lines) {
  const grid = {
    start: place.from,
    step: place.step,
    count: Math.round((place.until - place.from) / place.step),
  };
  const seiches = drawSeiches(place, schedule, grid);
  const spikes = drawSpikes(place, schedule, grid);
  const { pressure, level } = weatherHeights(place, schedule, seiches, grid);
  const restless = tideHeights(place, lines, grid, semidiurnalUnrest(place, grid));
  const tide = tideHeights(place, lines, grid);
  const clean = restless.map((height, i) => height + level[i]);
  const written = spoil(clean, { ...schedule, spikes }, grid);
  const notTide = clean.map((height, i) => height - tide[i]);
  const hourly = pressure.filter((_, i) => (i * place.step) % HOUR === 0);
  const truth = describeTruth(place, lines, schedule, { spikes, seiches, notTide, written });
  return {
    truth,
    files: [
      {
        name: `${place.id}.csv`,
        text: toCsv('Time (UTC),Water level (m)', written, { ...grid, digits: 3 }),
      },
      {
        name: `${place.id}-pressure.csv`,
        text: toCsv('Time (UTC),Air pressure at sea level (hPa)', hourly, {
          start: grid.start,
          step: HOUR,
          digits: 1,
        }),
      },
      { name: `${place.id}-truth.json`, text: `${JSON.stringify(truth, null, 2)}\n` },
    ],
  };
}

/** Both records: their files as text and their truths by place. */
export function makeDemoRecords() {
  const lines = readPotentialLines();
  const harbour = makeRecord(HARBOUR, HARBOUR_SCHEDULE, lines);
  const lagoon = makeRecord(LAGOON, LAGOON_SCHEDULE, lines);
  return {
    files: [...harbour.files, ...lagoon.files],
    truth: { [HARBOUR.id]: harbour.truth, [LAGOON.id]: lagoon.truth },
  };
}

/** The undisturbed tide of one of the places at any time: what a prediction should be. */
export function trueTide(id, grid) {
  const place = [HARBOUR, LAGOON].find((known) => known.id === id);
  if (place === undefined)
    throw new RangeError(`id: expected '${HARBOUR.id}' or '${LAGOON.id}', got '${id}'`);
  return tideHeights(place, readPotentialLines(), grid);
}
