/**
 * Levels without noise by the slow functions, one instant at a time: what a fit must give back.
 */
import { constituent, equilibriumArgument } from '@staithe/constituents';
import { nodalCorrection } from '@staithe/nodal';
import type { HarmonicFit } from '../../src/index.js';

/** A constituent of the truth, metres and degrees. */
export type TrueConstituent = readonly [name: string, amplitude: number, phaseLag: number];

const RADIANS = Math.PI / 180;

/** The sum of f·H·cos(V + u − G) at an instant, metres, by the models that a fit takes by default. */
export function madeLevel(truth: readonly TrueConstituent[]): (time: number) => number {
  const lines = truth.map(([name, amplitude, phaseLag]) => ({
    of: constituent(name),
    amplitude,
    phaseLag,
  }));
  return (time) =>
    lines.reduce((sum, { of, amplitude, phaseLag }) => {
      const { f, u } = nodalCorrection(of, time);
      const angle = equilibriumArgument(of, time) + u - phaseLag;
      return sum + f * amplitude * Math.cos(angle * RADIANS);
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
