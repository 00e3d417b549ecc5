/**
 * The constituent that a line may be.
 * @module
 */
import { type Constituent, listConstituents } from '@staithe/constituents';
import type { NodalModel } from '@staithe/core';
import { shownSpeed } from '../cadence.js';
import { candidatesFor } from '../choose.js';

/** A constituent with the speed at which it shows itself. */
interface Known {
  readonly name: string;
  readonly shown: number;
}

/**
 * Makes the function that names a line: of the constituents that are not fitted the one of the largest expected size, of
 * those without one the nearest.
 *
 * @param nodalModel - Of the fit.
 * @param fitted - Names.
 * @param cadence - Milliseconds between samples, 0 where irregular.
 */
export function makeNamer(
  nodalModel: NodalModel,
  fitted: readonly string[],
  cadence: number,
): (speed: number, within: number) => string | undefined {
  const known = (list: readonly Constituent[]): Known[] =>
    list
      .filter(({ name }) => !fitted.includes(name))
      .map(({ name, speed }) => ({ name, shown: shownSpeed(speed, cadence) }));
  const expected = known(candidatesFor(nodalModel).expected.map(({ of }) => of));
  const others = known(listConstituents());
  return (speed, within) => {
    const away = ({ shown }: Known): number => Math.abs(shown - speed);
    const first = expected.find((one) => away(one) <= within);
    if (first) return first.name;
    const nearest = others.reduce((a, b) => (away(b) < away(a) ? b : a));
    return away(nearest) <= within ? nearest.name : undefined;
  };
}
