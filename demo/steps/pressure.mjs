/**
 * Air pressure as water: under high pressure the sea stands lower, about a centimetre a hectopascal.
 *
 * Common practice: the inverse barometer, 1 / (density 1025 kg/m³ · gravity 9.81 m/s²) = 9.95 mm a hectopascal.
 * @module
 */
import { HOUR, toInstant } from '@staithe/core';

const METRES_PER_HECTOPASCAL = -0.00995;

/**
 * Reads an hourly pressure file.
 *
 * @returns {(t: number) => number} What air pressure adds to the level, metres; its mean over the file is nothing.
 */
export function inverseBarometer({ text }) {
  const rows = text.trim().split('\n').slice(1);
  const start = toInstant(`${rows[0].slice(0, 16).replace(' ', 'T')}Z`);
  const pressure = rows.map((line) => Number(line.slice(17)));
  const mean = pressure.reduce((sum, value) => sum + value, 0) / pressure.length;
  const last = pressure.length - 1;
  return (t) => {
    const place = Math.min(last, Math.max(0, (t - start) / HOUR)); // beyond the file its ends hold
    const i = Math.min(last - 1, Math.floor(place));
    const between = pressure[i] + (place - i) * (pressure[i + 1] - pressure[i]);
    return METRES_PER_HECTOPASCAL * (between - mean);
  };
}
