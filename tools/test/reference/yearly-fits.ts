/**
 * The nodal proof: the tide of an ephemeris fitted one year at a time, and how constant the constants come out.
 */
import {
  constituent,
  listConstituents,
  type PotentialLine,
  potentialLines,
} from '@staithe/constituents';
import {
  angleDifference,
  HOUR,
  isStaitheError,
  type NodalModel,
  uniformSeries,
} from '@staithe/core';
import { nodalPlan } from '@staithe/nodal';
import {
  DEGREE_2,
  heightsAt,
} from '../../../packages/constituents/test/reference/absolute-proof.js';
import { tideOfEphemeris } from '../../../packages/constituents/test/reference/equilibrium-tide.js';
import { fitHarmonics } from '@staithe/fit';

/** The vector `ephemeris-yearly-fits`. */
export interface YearlyFits {
  readonly from: string;
  readonly years: number;
  readonly hoursAYear: number;
  readonly latitude: number;
  readonly longitude: number;
  readonly leastTurns: number;
  readonly limits: Readonly<
    Record<string, { names: readonly string[]; amplitude: number; phaseLag: number }>
  >;
  readonly groups: readonly { name: string; doodsonNumbers: readonly number[]; size: number }[];
}

/** A group of lines of the potential: those sharing n1, n2, n3 and p_s. */
export interface Group {
  /** Of the largest line. */
  readonly doodsonNumbers: readonly number[];
  /** Root sum square of the lines, metres. */
  readonly size: number;
  /** Degrees an hour. */
  readonly speed: number;
  /** Of a listed constituent on the largest line, or of the weather's constituent that differs in p_s alone. */
  readonly name: string | undefined;
}

/** Speeds from named constituents alone: those of τ, s, h, p; N′ and p_s do not part groups in a year. */
function speedOf([n1, n2, n3, n4]: readonly number[]): number {
  const tau = constituent('M2').speed / 2;
  const s = constituent('Mf').speed / 2;
  const h = constituent('Ssa').speed / 2;
  const p = s - constituent('Mm').speed;
  return (n1 ?? 0) * tau + (n2 ?? 0) * s + (n3 ?? 0) * h + (n4 ?? 0) * p;
}

function nameOf(numbers: readonly number[]): string | undefined {
  const listed = listConstituents();
  const same = (count: number): string | undefined =>
    listed.find(
      ({ doodsonNumbers, kind }) =>
        (count === 6 || kind === 'meteorological') &&
        doodsonNumbers.slice(0, count).join() === numbers.slice(0, count).join(),
    )?.name;
  return same(6) ?? same(5);
}

/** The largest groups of degree 2 that stand so many turns apart within the hours, largest first. */
export function groupsOf(hours: number, leastTurns: number, count: number): Group[] {
  const byKey = new Map<string, PotentialLine[]>();
  for (const line of potentialLines({ degree: 2 })) {
    const [n1, n2, n3, , , n6] = line.doodsonNumbers;
    const key = [n1, n2, n3, n6].join();
    byKey.set(key, [...(byKey.get(key) ?? []), line]);
  }
  const groups = [...byKey.values()].map((lines) => {
    const main = lines.reduce((a, b) => (Math.abs(b.amplitude) > Math.abs(a.amplitude) ? b : a));
    const { doodsonNumbers } = main;
    const size = Math.sqrt(lines.reduce((sum, line) => sum + line.amplitude * line.amplitude, 0));
    return { doodsonNumbers, size, speed: speedOf(doodsonNumbers) };
  });
  const taken: Omit<Group, 'name'>[] = [];
  for (const group of groups.sort((a, b) => b.size - a.size)) {
    const apart = [0, ...taken.map(({ speed }) => speed)].every(
      (speed) => Math.abs(group.speed - speed) * hours >= leastTurns * 360,
    );
    if (apart && taken.length < count) taken.push(group);
  }
  return taken.map((group) => ({ ...group, name: nameOf(group.doodsonNumbers) }));
}

/** The names that a nodal model has a rule for. */
export function namesFor(proof: YearlyFits, model: NodalModel): string[] {
  return proof.groups
    .map(({ name }) => name)
    .filter((name) => {
      try {
        nodalPlan([constituent(name)], model);
        return true;
      } catch (error) {
        if (isStaitheError(error, 'NO_NODAL_FORMULA')) return false;
        throw error;
      }
    });
}

/** How far the yearly constants of one constituent stray. */
export interface Scatter {
  readonly name: string;
  /** Mean over the years, metres. */
  readonly amplitude: number;
  /** Amplitude of each year over the mean. */
  readonly shares: readonly number[];
  /** Largest departure of a year from the mean, as a share of the mean. */
  readonly amplitudeStrays: number;
  /** Largest departure of a year from the mean, degrees. */
  readonly phaseLagStrays: number;
}

/** Fits the chosen years (0 is the first) one at a time and says how constant the constants are. */
export function yearlyScatter(
  proof: YearlyFits,
  years: readonly number[],
  nodalModel: NodalModel,
): Scatter[] {
  const constituents = namesFor(proof, nodalModel);
  const fits = years.map((year) => {
    const start = new Date(proof.from).getTime() + year * proof.hoursAYear * HOUR;
    const times = Float64Array.from({ length: proof.hoursAYear }, (_, i) => start + i * HOUR);
    const values = heightsAt(tideOfEphemeris(times), proof, DEGREE_2);
    const series = uniformSeries({ start, step: HOUR, values });
    return fitHarmonics(series, { constituents, nodalModel, errorModel: 'independent' });
  });
  return constituents.map((name, i) => {
    const rows = fits.map(
      (fit) => fit.constants.constituents[i] as { amplitude: number; phaseLag: number },
    );
    const first = (rows[0] as { phaseLag: number }).phaseLag;
    const lags = rows.map(({ phaseLag }) => angleDifference(first, phaseLag));
    const mean = (values: readonly number[]): number =>
      values.reduce((sum, value) => sum + value, 0) / values.length;
    const amplitude = mean(rows.map((row) => row.amplitude));
    const lag = mean(lags);
    return {
      name,
      amplitude,
      shares: rows.map((row) => row.amplitude / amplitude),
      amplitudeStrays: Math.max(...rows.map((row) => Math.abs(row.amplitude / amplitude - 1))),
      phaseLagStrays: Math.max(...lags.map((value) => Math.abs(value - lag))),
    };
  });
}
