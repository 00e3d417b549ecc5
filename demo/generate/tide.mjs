/**
 * The tide of a place on an even grid: the potential's lines through the response, shallow-water tides, seasons, mean level.
 *
 * Each line is a turning pointer: its angle is exact at the start of every block of a day and turns evenly within it.
 * @module
 */
import { combine, doodsonVariables } from './mean-longitudes.mjs';
import { lineAmplitude, RADIANS } from './response.mjs';

const DAY = 86_400_000;

/** Doodson variables at the start of each block and their change a step, degrees. */
function blocksOf({ start, step, count }) {
  const length = Math.max(1, Math.floor(DAY / step));
  const blocks = [];
  for (let from = 0; from < count; from += length) {
    const to = Math.min(count, from + length);
    const variables = doodsonVariables(start + from * step);
    const before = doodsonVariables(start + from * step - step / 2);
    const hourAngle = (360 * step) / DAY;
    const change = doodsonVariables(start + from * step + step / 2).map(
      (value, i) => value - before[i],
    );
    change[0] = hourAngle + change[2] - change[1]; // free of the jump of the hour angle at midnight
    blocks.push({ from, to, variables, change });
  }
  return blocks;
}

/**
 * The sum of the lines of one species as a complex signal whose real part is the height.
 *
 * @param {number} species 0, 1 or 2 cycles a day.
 * @param {{ start: number, step: number, count: number }} grid
 * @returns {{ re: Float64Array, im: Float64Array }} Metres.
 */
function speciesSignal(place, lines, species, grid) {
  const re = new Float64Array(grid.count);
  const im = new Float64Array(grid.count);
  const blocks = blocksOf(grid);
  for (const line of lines) {
    if (line.multipliers[0] !== species) continue;
    const c = lineAmplitude(place, line);
    for (const { from, to, variables, change } of blocks) {
      const angle = (combine(line.multipliers, variables) % 360) * RADIANS;
      const turn = combine(line.multipliers, change) * RADIANS;
      const cosTurn = Math.cos(turn);
      const sinTurn = Math.sin(turn);
      let x = c.re * Math.cos(angle) - c.im * Math.sin(angle);
      let y = c.re * Math.sin(angle) + c.im * Math.cos(angle);
      for (let i = from; i < to; i++) {
        re[i] += x;
        im[i] += y;
        const turned = x * cosTurn - y * sinTurn;
        y = x * sinTurn + y * cosTurn;
        x = turned;
      }
    }
  }
  return { re, im };
}

/** Quarter- and sixth-diurnal heights: the square and the cube of the semidiurnal signal, each with its own size and lag. */
function addShallowWater(heights, { re, im }, { square, squareLag, cube, cubeLag }) {
  const [a, b] = [square * Math.cos(squareLag * RADIANS), square * Math.sin(squareLag * RADIANS)];
  const [c, d] = [cube * Math.cos(cubeLag * RADIANS), cube * Math.sin(cubeLag * RADIANS)];
  for (let i = 0; i < heights.length; i++) {
    const x = re[i] * re[i] - im[i] * im[i];
    const y = 2 * re[i] * im[i];
    heights[i] += a * x + b * y + c * (x * re[i] - y * im[i]) + d * (x * im[i] + y * re[i]);
  }
}

/** The yearly and half-yearly cycle, which is sea and air, counted from the Sun's mean longitude. */
function addSeasons(heights, { seasons }, { start, step }) {
  for (let i = 0; i < heights.length; i++) {
    const sun = doodsonVariables(start + i * step)[2];
    for (const { multiple, amplitude, phaseLag } of seasons) {
      heights[i] += amplitude * Math.cos((multiple * sun - phaseLag) * RADIANS);
    }
  }
}

/**
 * @param {{ start: number, step: number, count: number }} grid Milliseconds.
 * @param {(semidiurnal: { re: Float64Array, im: Float64Array }) => void} [disturb] Changes the semidiurnal signal in place.
 * @returns {Float64Array} Metres above the datum.
 */
export function tideHeights(place, lines, grid, disturb = () => {}) {
  const semidiurnal = speciesSignal(place, lines, 2, grid);
  disturb(semidiurnal);
  const diurnal = speciesSignal(place, lines, 1, grid).re;
  const slow = speciesSignal(place, lines, 0, grid).re;
  const heights = semidiurnal.re.map(
    (height, i) => place.meanLevel + height + diurnal[i] + slow[i],
  );
  addShallowWater(heights, semidiurnal, place.shallow);
  addSeasons(heights, place, grid);
  return heights;
}
