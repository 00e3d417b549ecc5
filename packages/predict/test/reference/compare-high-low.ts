/** Predicted turning points beside published rows, matched one to one. */
import type { HarmonicConstants } from '@staithe/core';
import { type HighLowRows } from '@staithe/test-vectors';
import { tideCurve } from '../../src/index.js';

const NEAR = 7200000; // two hours: turning points of one kind are ten apart
const OFFSET = -0.092; // rows above NAVD88, constants above mean sea level (README of the source)

interface Spread {
  readonly mean: number;
  readonly sd: number;
  /** Largest distance from the expected offset. */
  readonly max: number;
}

function spread(values: readonly number[], offset: number): Spread {
  const mean = values.reduce((sum, v) => sum + v, 0) / values.length;
  const squares = values.reduce((sum, v) => sum + (v - mean) * (v - mean), 0);
  const max = values.reduce((most, v) => Math.max(most, Math.abs(v - offset)), 0);
  return { mean, sd: Math.sqrt(squares / values.length), max };
}

/** Rows of the years `from` to before `to`, against the curve: published minus predicted. */
export function compareHighLow(
  rows: HighLowRows,
  constants: HarmonicConstants,
  from: number,
  to: number,
): { rows: number; missing: string[]; extra: string[]; minutes: Spread; metres: Spread } {
  const span = { from: Date.UTC(from, 0, 1), to: Date.UTC(to, 0, 1) };
  const points = tideCurve(constants).turningPoints(span);
  const missing: string[] = [];
  const extra: string[] = [];
  const minutes: number[] = [];
  const metres: number[] = [];
  let j = 0;
  for (let i = 0; i < rows.times.length; i++) {
    const time = rows.times[i] as number;
    if (time < span.from || time >= span.to) continue;
    for (;;) {
      const point = points[j];
      if (!point || point.time > time + NEAR) {
        missing.push(new Date(time).toISOString());
        break;
      }
      j++;
      if (Math.abs(point.time - time) <= NEAR && point.kind === rows.kinds[i]) {
        minutes.push((time - point.time) / 60000);
        metres.push((rows.heights[i] as number) - point.height);
        break;
      }
      extra.push(new Date(point.time).toISOString());
    }
  }
  for (; j < points.length; j++) extra.push(new Date(points[j]?.time as number).toISOString());
  return {
    rows: minutes.length,
    missing,
    extra,
    minutes: spread(minutes, 0),
    metres: spread(metres, OFFSET),
  };
}
