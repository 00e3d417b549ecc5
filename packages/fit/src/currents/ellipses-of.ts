/**
 * The ellipses of a fit of currents, with errors from the joint covariance of the two components.
 * @module
 */
import { degreesToRadians, type HarmonicConstant, wrapDegrees } from '@staithe/core';
import { cos, sin } from '@staithe/core/trig';
import type { Design, Fold } from '../design.js';
import { ellipseOf, rotaryOf } from '../ellipse.js';
import type { FittedEllipse } from './types.js';

/** Covariance of the four coefficients of a fitted constituent: east, then north. */
function covarianceAt(joint: Float64Array, order: readonly string[], name: string): Float64Array {
  const columns = ['east', 'north'].flatMap((side) =>
    ['cos', 'sin'].map((part) => order.indexOf(`${side}.${name}.${part}`)),
  );
  return Float64Array.from(
    columns.flatMap((i) => columns.map((j) => joint[i * order.length + j] as number)),
  );
}

/** A borrowed constituent is its parent made smaller and turned by the difference of phase lags: so are its errors. */
function borrowedCovariance(parent: Float64Array, { ratio, difference }: Fold): Float64Array {
  const angle = degreesToRadians(wrapDegrees(difference));
  const [c, s] = [ratio * cos(angle), ratio * sin(angle)];
  const turn = (row: number, column: number): number => {
    if (row >> 1 !== column >> 1) return 0;
    if (row === column) return c;
    return row > column ? s : -s;
  };
  const out = new Float64Array(16);
  for (let i = 0; i < 4; i++) {
    for (let j = 0; j < 4; j++) {
      let sum = 0;
      for (let k = 0; k < 4; k++) {
        for (let l = 0; l < 4; l++) {
          sum += turn(i, k) * (parent[4 * k + l] as number) * turn(j, l);
        }
      }
      out[4 * i + j] = sum;
    }
  }
  return out;
}

/** The ellipses of fitted and borrowed constituents, in the order of `east`. */
export function ellipsesOf(
  design: Design,
  east: readonly HarmonicConstant[],
  north: readonly HarmonicConstant[],
  joint: Float64Array,
  order: readonly string[],
): FittedEllipse[] {
  return east.map((first, i): FittedEllipse => {
    const { name, borrowedFrom } = first;
    const components = { east: first, north: north[i] as HarmonicConstant };
    const fold = design.folds[i - design.fitted];
    const fitted = covarianceAt(joint, order, borrowedFrom ?? name);
    const covariance = fold ? borrowedCovariance(fitted, fold) : fitted;
    const ellipse = ellipseOf({ ...components, covariance });
    const { major, minor, radius95 = 0 } = ellipse;
    const isFirm = Math.sqrt(major * major + minor * minor) > radius95;
    return {
      name,
      ...ellipse,
      rotary: rotaryOf(components),
      standing: borrowedFrom === undefined ? (isFirm ? 'firm' : 'faint') : 'borrowed',
      ...(borrowedFrom === undefined ? {} : { borrowedFrom }),
    };
  });
}
