/**
 * Levels, form and ages of the tide that follow from a few constants.
 *
 * Textbook relations (from memory: D. T. Pugh 1987; class limits after A. Courtier 1938 and A. Defant), the ages are
 * phase differences over differences of speed. MHWS … MLWN from M2 and S2 are approximations of the averages.
 * @module
 */
import { constituent } from '@staithe/constituents';
import { angleDifference, type HarmonicConstants } from '@staithe/core';
import { makePlan } from '@staithe/predict';
import { levelAfterSteps } from './means.js';
import type { AbsentLevel, HarmonicLevels, TideClass } from './types.js';

/** Form number above which spring and neap tides of M2 and S2 say nothing about the tide. */
const MIXED = 1.5;

function classOf(form: number): TideClass {
  if (form <= 0.25) return 'semidiurnal';
  if (form <= MIXED) return 'mixed, mainly semidiurnal';
  return form <= 3 ? 'mixed, mainly diurnal' : 'diurnal';
}

/** Hours by which the tide of two constituents in phase follows the Moon: (G(a) − G(b))/(σ(a) − σ(b)). */
function age(constants: HarmonicConstants, a: string, b: string): number | undefined {
  const [first, second] = [a, b].map((name) =>
    constants.constituents.find((c) => c.name === name && c.amplitude > 0),
  );
  if (!first || !second) return undefined;
  const difference = angleDifference(second.phaseLag, first.phaseLag);
  return difference / (constituent(a).speed - constituent(b).speed);
}

/**
 * Levels that follow from constants.
 *
 * @param constants - A constants document.
 * @returns Metres above its datum, from the mean level after its last step; what a place does not have is in `absent` with the reason.
 * @throws InputError of `makePlan`.
 * @example
 * harmonicLevels(constants).tideClass; // 'semidiurnal'
 * @public
 */
export function harmonicLevels(constants: HarmonicConstants): HarmonicLevels {
  makePlan(constants); // refuses what cannot be predicted: names, numbers, unit, version
  const amplitude = (name: string): number | undefined => {
    const found = constants.constituents.find((c) => c.name === name)?.amplitude;
    return found === 0 ? undefined : found;
  };
  const [m2, s2, k1, o1] = [amplitude('M2'), amplitude('S2'), amplitude('K1'), amplitude('O1')];
  const level = levelAfterSteps(constants);
  const absent: AbsentLevel[] = [];
  const semidiurnal = (m2 ?? 0) + (s2 ?? 0);
  const diurnal = (k1 ?? 0) + (o1 ?? 0);
  const form = semidiurnal > 0 && diurnal > 0 ? diurnal / semidiurnal : undefined;
  const missing = (names: readonly (readonly [string, number | undefined])[]): string[] =>
    names.filter(([, value]) => value === undefined).map(([name]) => name);
  const refuse = (levels: readonly string[], reason: string): void => {
    absent.push(...levels.map((name) => ({ level: name, reason })));
  };
  const springs = ['MHWS', 'MHWN', 'MLWN', 'MLWS'];
  const lacking = missing([
    ['M2', m2],
    ['S2', s2],
  ]);
  let spring: HarmonicLevels['levels'] = { MSL: level };
  let ranges: HarmonicLevels['ranges'] = {};
  if (lacking.length > 0) refuse(springs, `the constants hold no ${lacking.join(' and no ')}`);
  else if (form !== undefined && form > MIXED) {
    refuse(
      springs,
      `form number ${form.toFixed(2)} is over ${MIXED}: spring and neap tides do not rule here`,
    );
  } else {
    const [a, b] = [m2 as number, s2 as number];
    spring = {
      MSL: level,
      MHWS: level + (a + b),
      MHWN: level + Math.abs(a - b),
      MLWN: level - Math.abs(a - b),
      MLWS: level - (a + b),
    };
    ranges = { spring: 2 * (a + b), neap: 2 * Math.abs(a - b) };
  }
  const four = missing([
    ['M2', m2],
    ['S2', s2],
    ['K1', k1],
    ['O1', o1],
  ]);
  if (four.length > 0) refuse(['ISLW'], `the constants hold no ${four.join(' and no ')}`);
  const three = missing([
    ['M2', m2],
    ['K1', k1],
    ['O1', o1],
  ]);
  const declination = (m2 ?? 0) + diurnal;
  const isDiurnal = semidiurnal === 0 || (form !== undefined && form > MIXED);
  if (!isDiurnal) {
    const why =
      form === undefined
        ? 'the constants hold no diurnal tide'
        : `form number ${form.toFixed(2)} is not over ${MIXED}`;
    refuse(['MHHW', 'MLLW'], `${why}: they need a tabulation`);
  } else if (three.length > 0)
    refuse(['MHHW', 'MLLW'], `the constants hold no ${three.join(' and no ')}`);
  const [phase, parallax, diurnalAge] = [
    age(constants, 'S2', 'M2'),
    age(constants, 'M2', 'N2'),
    age(constants, 'K1', 'O1'),
  ];
  return {
    levels: {
      ...spring,
      ...(isDiurnal && three.length === 0
        ? { MHHW: level + declination, MLLW: level - declination }
        : {}),
      ...(four.length === 0 ? { ISLW: level - (semidiurnal + diurnal) } : {}),
    },
    absent,
    ...(form === undefined ? {} : { formFactor: form }),
    ...(form === undefined && semidiurnal > 0
      ? {}
      : diurnal > 0
        ? { tideClass: classOf(form ?? Infinity) }
        : {}),
    ranges,
    ages: {
      ...(phase === undefined ? {} : { phase }),
      ...(parallax === undefined ? {} : { parallax }),
      ...(diurnalAge === undefined ? {} : { diurnal: diurnalAge }),
    },
  };
}
