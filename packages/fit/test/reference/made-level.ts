/**
 * Levels without noise by the slow functions, one instant at a time: what a fit must give back.
 */
import { directPhasors, type DirectModel } from '../../../basis/test/reference/direct-sum.js';
import type { HarmonicFit } from '../../src/index.js';

/** A constituent of the truth, metres and degrees. */
export type TrueConstituent = readonly [name: string, amplitude: number, phaseLag: number];

/** The models that a fit takes by default. */
export const USUAL: DirectModel = {
  argumentModel: 'iers2010',
  nodalModel: 'potential',
  nodalHold: 'continuous',
};

const RADIANS = Math.PI / 180;

/** The sum of f·H·cos(V + u − G) at an instant, metres. */
export function madeLevel(
  truth: readonly TrueConstituent[],
  model: DirectModel = USUAL,
): (time: number) => number {
  const phasors = directPhasors(
    truth.map(([name]) => name),
    model,
  );
  const pairs = truth.map(([, amplitude, phaseLag]) => [
    amplitude * Math.cos(phaseLag * RADIANS),
    amplitude * Math.sin(phaseLag * RADIANS),
  ]);
  return (time) =>
    phasors(time).reduce((sum, [re, im], j) => {
      const [a, b] = pairs[j] as [number, number];
      return sum + a * re + b * im;
    }, 0);
}

/** H cos G and H sin G, metres, in the order of the names: from a truth, or from the constants of a fit. */
export function componentsOf(
  from: readonly TrueConstituent[] | HarmonicFit,
  names: readonly string[],
): number[] {
  const rows: readonly TrueConstituent[] =
    'constants' in from
      ? from.constants.constituents.map((c) => [c.name, c.amplitude, c.phaseLag])
      : from;
  return names.flatMap((wanted) => {
    const row = rows.find(([name]) => name === wanted);
    if (!row) throw new Error(`expected ${wanted} among ${rows.map(([name]) => name).join(' ')}`);
    const [, amplitude, phaseLag] = row;
    return [amplitude * Math.cos(phaseLag * RADIANS), amplitude * Math.sin(phaseLag * RADIANS)];
  });
}
