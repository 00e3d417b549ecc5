/**
 * Samples that a resistant fit doubts, put back where the weather was: on the fitted curve plus the straight line between
 * the residuals of their trusted neighbours.
 *
 * Leaving a tenth of red noise out spreads its slow part over all lines. The residual of a doubted sample is known from its
 * neighbours far better than not at all, so it takes part with that in place of what was written (docs/fitting.md).
 * @module
 */
import { DAY } from '@staithe/core';

const DOUBT = 0.5; // of full trust
const FARTHEST = 2 * DAY; // between trusted neighbours: beyond, the weather in between is anybody's guess

/**
 * Right-hand sides with what is doubted replaced, where it can be.
 *
 * @param times - Instants.
 * @param sides - As observed; NaN takes no part.
 * @param residuals - Of the resistant fit.
 * @param trust - From 0 to 1.
 */
export function withDoubtedFilled(
  times: Float64Array,
  sides: readonly Float64Array[],
  residuals: readonly Float64Array[],
  trust: Float64Array,
): Float64Array[] {
  const out = sides.map((side) => Float64Array.from(side));
  let before = -1;
  for (let after = 0; after < trust.length; after++) {
    if (!((trust[after] as number) >= DOUBT)) continue;
    const apart = before < 0 ? Infinity : (times[after] as number) - (times[before] as number);
    for (let i = before + 1; i < after && apart <= FARTHEST; i++) {
      if (Number.isNaN(trust[i])) continue;
      const share = ((times[i] as number) - (times[before] as number)) / apart;
      out.forEach((side, k) => {
        const residual = residuals[k] as Float64Array;
        const between =
          (residual[before] as number) * (1 - share) + (residual[after] as number) * share;
        side[i] = (side[i] as number) - (residual[i] as number) + between;
      });
    }
    before = after;
  }
  return out;
}
