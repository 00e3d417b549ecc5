/**
 * The slow, obvious twin of the kernels: f, V and u exactly at each instant, then a plain sum with Math.cos.
 */
import { constituent, equilibriumArgument } from '@staithe/constituents';
import { lunisolarLongitudes } from '@staithe/arguments';
import { type ArgumentModel, HOUR, type NodalHold, type NodalModel } from '@staithe/core';
import { nodalPhasorsInto, nodalPlan } from '@staithe/nodal';

export interface DirectModel {
  readonly argumentModel: ArgumentModel;
  readonly nodalModel: NodalModel;
  readonly nodalHold: NodalHold;
  readonly latitude?: number | undefined;
}

const RADIANS = Math.PI / 180;

/** Re and Im of f·e^{i(V + u)} for each name. */
export function directPhasors(
  names: readonly string[],
  model: DirectModel,
): (t: number) => [number, number][] {
  const list = names.map((name) => constituent(name));
  const plan = nodalPlan(list, model.nodalModel, model.latitude);
  const nodal = new Float64Array(2 * list.length);
  return (t) => {
    const year = new Date(t).getUTCFullYear();
    const january = Date.UTC(year, 0, 1);
    const held =
      model.nodalHold === 'continuous'
        ? t
        : model.nodalHold === 'calendar-year'
          ? Date.UTC(year, 6, 2, 12)
          : Date.parse(model.nodalHold.heldAt);
    const at = lunisolarLongitudes(held, model.argumentModel);
    nodalPhasorsInto(plan, at.p, at.nPrime, nodal);
    return list.map((of, j) => {
      const [re, im] = [nodal[2 * j] as number, nodal[2 * j + 1] as number];
      let v = equilibriumArgument(of, t, model.argumentModel);
      if (model.nodalHold === 'calendar-year') {
        v =
          equilibriumArgument(of, january, model.argumentModel) + (of.speed * (t - january)) / HOUR;
        if (of.name === 'M1' && model.nodalModel === 'schureman1940') {
          // Official yearly tables: V0 without p on 1 January and u = ξ − ν + Q on 2 July.
          v += at.p - lunisolarLongitudes(january, model.argumentModel).p;
        }
      }
      const [c, s] = [Math.cos(v * RADIANS), Math.sin(v * RADIANS)];
      return [re * c - im * s, re * s + im * c];
    });
  };
}

export function directHeight(
  names: readonly string[],
  coefficients: ArrayLike<number>,
  model: DirectModel,
): (t: number) => number {
  const phasors = directPhasors(names, model);
  return (t) =>
    phasors(t).reduce(
      (sum, [re, im], j) =>
        sum + (coefficients[1 + 2 * j] as number) * re + (coefficients[2 + 2 * j] as number) * im,
      coefficients[0] as number,
    );
}
