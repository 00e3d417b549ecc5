/**
 * What is not tide: air pressure and wind, storms, seiches, the harbour's unrest and the instrument's own noise.
 *
 * The noise is a sum of autoregressive processes, red like a gauge's: days for the weather, an hour for the harbour, none for the instrument.
 * @module
 */
import { normalStream, uniformStream } from './random.mjs';

const HOUR = 3_600_000;
const DAY = 24 * HOUR;
const METRES_PER_HECTOPASCAL = -0.00995; // inverse barometer: 1 / (density 1025 kg/m3 · gravity 9.81 m/s2)
const MEAN_PRESSURE = 1015;
const UNREST_DAYS = 20;
const SEICHE_PERIOD_MINUTES = 22;

/** First-order autoregression of standard deviation 1 whose memory fades to 1/e in `memory` milliseconds. */
function redNoise(name, { step, count }, memory) {
  const draw = normalStream(name);
  const kept = Math.exp(-step / memory);
  const fresh = Math.sqrt(1 - kept * kept);
  const values = new Float64Array(count);
  let value = draw();
  for (let i = 0; i < count; i++) {
    values[i] = value;
    value = kept * value + fresh * draw();
  }
  return values;
}

/** Red noise through a second fading memory, hence smooth like the weather; standard deviation 1. */
function smoothRedNoise(name, grid, memory, smoothing) {
  const values = redNoise(name, grid, memory);
  const kept = Math.exp(-grid.step / smoothing);
  const size = Math.sqrt((memory + smoothing) / memory); // the variance that the smoothing takes
  let value = values[0];
  return values.map((next) => {
    value = kept * value + (1 - kept) * next;
    return size * value;
  });
}

/** A raised cosine: 1 in the middle of the span, 0 at its ends and outside. */
function bell(time, { from, to }) {
  if (time <= from || time >= to) return 0;
  return (1 - Math.cos((2 * Math.PI * (time - from)) / (to - from))) / 2;
}

/**
 * Slow unrest of the semidiurnal tide, which widens M2's line to a cusp: in-phase and quadrature parts of relative size `semidiurnalUnrest`.
 *
 * @returns {(signal: { re: Float64Array, im: Float64Array }) => void} Changes a complex signal in place.
 */
export function semidiurnalUnrest(place, grid) {
  const inPhase = redNoise(`${place.id}/unrest/in phase`, grid, UNREST_DAYS * DAY);
  const quadrature = redNoise(`${place.id}/unrest/quadrature`, grid, UNREST_DAYS * DAY);
  return ({ re, im }) => {
    for (let i = 0; i < re.length; i++) {
      const x = 1 + place.semidiurnalUnrest * inPhase[i];
      const y = place.semidiurnalUnrest * quadrature[i];
      [re[i], im[i]] = [re[i] * x - im[i] * y, re[i] * y + im[i] * x];
    }
  };
}

/** Bursts of the harbour's own oscillation, one in each equal part of the record, and one in every storm. */
export function drawSeiches(place, { seiches, storms }, { start, step, count }) {
  const draw = uniformStream(`${place.id}/seiches`);
  const part = (count * step) / Math.max(1, seiches);
  const burst = (middle, half, amplitude) => ({
    from: Math.round(middle - half),
    to: Math.round(middle + half),
    periodMinutes: SEICHE_PERIOD_MINUTES,
    amplitude: Math.round(amplitude * 1000) / 1000,
  });
  const bursts = Array.from({ length: seiches }, (_, i) =>
    burst(start + (i + 0.1 + 0.8 * draw()) * part, (3 + 6 * draw()) * HOUR, 0.02 + 0.06 * draw()),
  );
  return [...bursts, ...storms.map(({ from, to }) => burst((from + to) / 2, 10 * HOUR, 0.09))].sort(
    (a, b) => a.from - b.from,
  );
}

/**
 * @returns {{ pressure: Float64Array, level: Float64Array }} Air pressure in hectopascals and what weather and harbour add to the level, metres.
 */
export function weatherHeights(place, { storms }, seiches, grid) {
  const { pressure: pressureSize, wind, harbour, instrument } = place.weather;
  const time = (i) => grid.start + i * grid.step;
  const pressure = smoothRedNoise(`${place.id}/pressure`, grid, 60 * HOUR, 10 * HOUR).map(
    (value, i) =>
      MEAN_PRESSURE +
      pressureSize * value -
      storms.reduce((sum, storm) => sum + storm.pressureFall * bell(time(i), storm), 0),
  );
  const setUp = smoothRedNoise(`${place.id}/wind`, grid, 30 * HOUR, 4 * HOUR);
  const unrest = redNoise(`${place.id}/harbour`, grid, 1.5 * HOUR);
  const hiss = normalStream(`${place.id}/instrument`);
  const level = pressure.map(
    (value, i) =>
      METRES_PER_HECTOPASCAL * (value - MEAN_PRESSURE) +
      wind * setUp[i] +
      harbour * unrest[i] +
      instrument * hiss(),
  );
  for (const storm of storms) {
    const windPart = storm.height + METRES_PER_HECTOPASCAL * storm.pressureFall; // the rest of the surge is the wind's
    for (let i = 0; i < level.length; i++) level[i] += windPart * bell(time(i), storm);
  }
  for (const seiche of seiches) {
    const turn = (2 * Math.PI) / (seiche.periodMinutes * 60_000);
    const first = Math.max(0, Math.ceil((seiche.from - grid.start) / grid.step));
    for (let i = first; i < level.length && time(i) < seiche.to; i++) {
      level[i] +=
        seiche.amplitude * bell(time(i), seiche) * Math.sin(turn * (time(i) - seiche.from));
    }
  }
  return { pressure, level };
}
