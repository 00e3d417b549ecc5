/**
 * f and u of many constituents at once: a plan as plain data, evaluated at an instant without allocating per line.
 * @module
 */
import {
  type Degrees,
  degreesToRadians,
  describe,
  InputError,
  type NodalModel,
  wrapDegrees,
} from '@staithe/core';
import { sinCosInto } from '@staithe/core/trig';
import { type Constituent, constituent, potentialLines } from '@staithe/constituents';
import { schuremanFormula, schuremanPair } from './schureman1940.js';
import { sideLines } from './side-lines.js';

/** What the plan knows of one constituent that is no compound. @public */
export interface NodalRule {
  readonly name: string;
  /** A formula of Schureman (1940), where that model is asked for. */
  readonly formula?: string | undefined;
  /** Rows of Δp, ΔN′, ratio, turn in degrees: the group of the potential. */
  readonly lines?: Float64Array | undefined;
}

/** Plain data; survives `structuredClone`. @public */
export interface NodalPlan {
  readonly rules: readonly NodalRule[];
  /** For each constituent the rules it multiplies: pairs of rule index and multiplicity. Empty: f = 1, u = 0. */
  readonly factors: readonly (readonly (readonly [rule: number, multiplicity: number])[])[];
  /** Constituents whose lines of degree 3 were left out because degree 2 is weak at the latitude. */
  readonly leftOut: readonly string[];
}

function checkModel(model: NodalModel): void {
  if (model === 'potential' || model === 'schureman1940' || model === 'none') return;
  throw new InputError(
    'UNKNOWN_CHOICE',
    'nodalModel',
    `expected potential, schureman1940 or none, got ${describe(model)}`,
  );
}

/**
 * Plans f and u for a list of constituents.
 *
 * @param constituents - In any order; compounds multiply the rules of their members.
 * @param model - `potential`, `schureman1940` or `none`.
 * @param latitude - Degrees north, for the lines of degree 3 in `potential`.
 * @returns Plain data.
 * @throws InputError `UNKNOWN_CHOICE`; `NO_NODAL_FORMULA` where SP 98 has no formula for a constituent, path `nodalModel`;
 *   `OUT_OF_RANGE`, path `latitude`.
 * @example
 * nodalPlan([constituent('M2'), constituent('M4')], 'potential').rules.length; // 1
 * @public
 */
export function nodalPlan(
  constituents: readonly Constituent[],
  model: NodalModel,
  latitude?: Degrees,
): NodalPlan {
  checkModel(model);
  const rules: NodalRule[] = [];
  const leftOut: string[] = [];
  const potential = model === 'potential' ? potentialLines() : [];
  const ruleOf = (of: Constituent): number | undefined => {
    if (model === 'none' || of.kind === 'meteorological') return undefined;
    const known = rules.findIndex(({ name }) => name === of.name);
    if (known >= 0) return known;
    if (model === 'schureman1940') {
      const formula = schuremanFormula(of.name);
      if (formula === undefined) {
        throw new InputError(
          'NO_NODAL_FORMULA',
          'nodalModel',
          `expected potential for ${of.name}, got schureman1940, which has no formula for it`,
        );
      }
      return formula === '1' ? undefined : rules.push({ name: of.name, formula }) - 1;
    }
    const group = sideLines(of, { latitude }, potential);
    if (group.leftOut) leftOut.push(of.name);
    const rows = group.lines.flatMap(({ perigee, node, ratio, turn }) => [
      perigee,
      node,
      ratio,
      turn,
    ]);
    return rows.length <= 4
      ? undefined
      : rules.push({ name: of.name, lines: Float64Array.from(rows) }) - 1;
  };
  const factors = constituents.map((of) => {
    const members = of.composition ?? [{ name: of.name, multiplicity: 1 }];
    return members.flatMap(({ name, multiplicity }) => {
      const rule = ruleOf(name === of.name ? of : constituent(name));
      return rule === undefined ? [] : [[rule, multiplicity] as const];
    });
  });
  return { rules, factors, leftOut };
}

/** f·cos u and f·sin u of one rule. */
function rulePhasor(
  { formula, lines }: NodalRule,
  perigee: Degrees,
  nPrime: Degrees,
  pair: Float64Array,
): readonly [number, number] {
  if (formula !== undefined) {
    const [f, u] = schuremanPair(formula, perigee, -nPrime);
    sinCosInto(u, pair);
    return [f * (pair[1] as number), f * (pair[0] as number)];
  }
  let re = 0;
  let im = 0;
  const rows = lines as Float64Array;
  for (let i = 0; i < rows.length; i += 4) {
    const angle = degreesToRadians(
      (rows[i] as number) * perigee + (rows[i + 1] as number) * nPrime + (rows[i + 3] as number),
    );
    const ratio = rows[i + 2] as number;
    sinCosInto(angle, pair);
    re += ratio * (pair[1] as number);
    im += ratio * (pair[0] as number);
  }
  return [re, im];
}

/**
 * f·cos u and f·sin u of every constituent of a plan.
 *
 * @param plan - Of {@link nodalPlan}.
 * @param perigee - p, degrees.
 * @param nPrime - N′, degrees.
 * @param out - Written to: pairs f·cos u, f·sin u, length 2 × constituents.
 * @example
 * const out = new Float64Array(2);
 * nodalPhasorsInto(nodalPlan([constituent('S2')], 'schureman1940'), 0, 0, out);
 * out[0]; // 1
 * @public
 */
export function nodalPhasorsInto(
  plan: NodalPlan,
  perigee: Degrees,
  nPrime: Degrees,
  out: Float64Array,
): void {
  const pair = new Float64Array(2);
  const phasors = plan.rules.map((rule) =>
    rulePhasor(rule, wrapDegrees(perigee), wrapDegrees(nPrime), pair),
  );
  plan.factors.forEach((factors, k) => {
    let re = 1;
    let im = 0;
    for (const [rule, multiplicity] of factors) {
      const [a, b] = phasors[rule] as readonly [number, number];
      // A member that is taken away turns u round; f stays a factor, not a reciprocal.
      const c = multiplicity < 0 ? -b : b;
      for (let n = Math.abs(multiplicity); n > 0; n--)
        [re, im] = [re * a - im * c, re * c + im * a];
    }
    out[2 * k] = re;
    out[2 * k + 1] = im;
  });
}
