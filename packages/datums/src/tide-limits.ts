/**
 * Highest and lowest astronomical tide.
 *
 * The extremes of the predicted tide over at least 19 years (IHO Resolution 3/1919), with the document's own hold, Sa and
 * Ssa included, secular rate and steps excluded: levels refer to the document's mean level.
 * @module
 */
import { DAY, type HarmonicConstants, InputError, type Span, toSpan } from '@staithe/core';
import { findTurningPoints, makePlan } from '@staithe/predict';
import { levelAfterSteps } from './means.js';
import type { DatumWarning, TideLimit, TideLimits } from './types.js';

const DEFAULT_SPAN: Span = { from: '2020-01-01T00:00Z', to: '2039-01-01T00:00Z' };
const SHORTEST = 6939 * DAY; // 19 years hold 6939 or 6940 days

function extreme(points: readonly TideLimit[], sign: 1 | -1): TideLimit {
  return points.reduce((best, point) => ((point.height - best.height) * sign > 0 ? point : best));
}

/**
 * HAT and LAT.
 *
 * @param constants - A constants document.
 * @param options - `span` of 19 years or more; default 2020 to 2038.
 * @returns Heights in metres above the datum of the constants, with their times, and each year's extremes.
 * @throws InputError of `makePlan` and `toSpan`; `OUT_OF_RANGE`, path `options.span`, below 19 years; `EMPTY_INPUT`,
 *   path `constants`, where the curve never turns.
 * @example
 * const { HAT, LAT } = astronomicalTideLimits(constants);
 * HAT.height > LAT.height; // true
 * @public
 */
export function astronomicalTideLimits(
  constants: HarmonicConstants,
  options: { readonly span?: Span | undefined } = {},
): TideLimits {
  const { from, to } = toSpan(options.span ?? DEFAULT_SPAN);
  if (to - from < SHORTEST) {
    throw new InputError(
      'OUT_OF_RANGE',
      'options.span',
      `expected 19 years (6939 days) or more, got ${((to - from) / DAY).toFixed(1)} days`,
    );
  }
  const whole = makePlan(constants);
  const level = levelAfterSteps(constants);
  const coefficients = whole.coefficients.slice();
  coefficients[0] = level;
  const plan = { ...whole, coefficients, ratePerMs: 0, steps: [] };
  const points = findTurningPoints(plan, { from, to });
  if (points.length === 0) {
    throw new InputError(
      'EMPTY_INPUT',
      'constants',
      'expected a tide that turns, got a flat curve',
    );
  }
  const years = new Map<number, TideLimit[]>();
  for (const { time, height } of points) {
    const year = new Date(time).getUTCFullYear();
    const list = years.get(year);
    if (list) list.push({ time, height });
    else years.set(year, [{ time, height }]);
  }
  const seasonal = ['Sa', 'Ssa'].filter((name) => !plan.basis.names.includes(name));
  const warnings: DatumWarning[] =
    seasonal.length === 0
      ? []
      : [
          {
            code: 'NO_SEASONAL_CYCLE',
            message: `the constants hold no ${seasonal.join(' and no ')}: HAT and LAT leave that cycle out`,
          },
        ];
  const all = points.map(({ time, height }) => ({ time, height }));
  return {
    HAT: extreme(all, 1),
    LAT: extreme(all, -1),
    years: [...years].map(([year, list]) => ({
      year,
      highest: extreme(list, 1),
      lowest: extreme(list, -1),
    })),
    from,
    to,
    meanLevel: {
      height: level,
      datum: constants.datum,
      epoch: constants.record && { from: constants.record.from, to: constants.record.to },
    },
    warnings,
  };
}
