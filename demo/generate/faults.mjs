/**
 * What the instrument and its keepers do to a clean record: a moved zero, spikes, a stuck sensor, gaps.
 * @module
 */
import { uniformStream } from './random.mjs';

const within = (time, { from, to }) => time >= from && time < to;
const SPIKE_RANGE = [0.3, 3]; // metres

/**
 * Single wild samples, up or down, at least an hour and two samples away from any gap or stuck run and from one another.
 *
 * @returns {{ at: number, change: number }[]} In order of time; metres.
 */
export function drawSpikes(place, { spikes, gaps, stuck }, { start, step, count }) {
  const draw = uniformStream(`${place.id}/spikes`);
  const clear = Math.max(3_600_000, 2 * step);
  const taken = [...gaps, ...stuck].map(({ from, to }) => ({ from: from - clear, to: to + clear }));
  const drawn = [];
  while (drawn.length < spikes) {
    const at = start + Math.floor(draw() * count) * step;
    const [least, most] = SPIKE_RANGE;
    const size = Math.round((least + (most - least) * draw() ** 2) * 1000) / 1000; // small ones are more common, and harder to see
    const change = draw() < 0.5 ? size : -size;
    if (taken.some((span) => within(at, span))) continue;
    taken.push({ from: at - clear, to: at + clear });
    drawn.push({ at, change });
  }
  return drawn.sort((a, b) => a.at - b.at);
}

/**
 * @param {Float64Array} clean Metres; left as it is.
 * @returns {Float64Array} The same with the faults in it; NaN where the file has no row.
 */
export function spoil(clean, { steps, spikes, stuck, gaps }, { start, step }) {
  const spikeAt = new Map(spikes.map(({ at, change }) => [at, change]));
  const spoiled = clean.map((height, i) => {
    const time = start + i * step;
    const zero = steps.reduce((sum, { at, change }) => (time >= at ? sum + change : sum), 0);
    return height + zero + (spikeAt.get(time) ?? 0);
  });
  const indexOf = (time) => Math.ceil((time - start) / step);
  for (const { from, to } of stuck)
    spoiled.fill(spoiled[indexOf(from)], indexOf(from), indexOf(to));
  for (const { from, to } of gaps) spoiled.fill(Number.NaN, indexOf(from), indexOf(to));
  return spoiled;
}
