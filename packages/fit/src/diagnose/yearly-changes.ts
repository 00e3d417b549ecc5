/**
 * How constituents differ from year to year: the points H·e^{iG} of each year about their mean.
 * @module
 */
import {
  type Degrees,
  degreesToRadians,
  type Metres,
  radiansToDegrees,
  wrapDegrees,
} from '@staithe/core';
import { atan2, cos, sin } from '@staithe/core/trig';
import type { HarmonicFit } from '../types.js';

/** A straight line through the years. @public */
export interface YearlyTrend {
  /** Metres a year along the mean. */
  readonly amplitudePerYear: Metres;
  readonly amplitudeSigma: Metres;
  /** Degrees a year. */
  readonly phaseLagPerYear: Degrees;
  readonly phaseLagSigma: Degrees;
}

/** How a constituent differs from year to year. @public */
export interface YearlyChange {
  readonly name: string;
  /** Of the mean of the points H·e^{iG}. */
  readonly amplitude: Metres;
  readonly phaseLag: Degrees;
  /** Root mean square of the distance of a year's point from the mean. */
  readonly scatter: Metres;
  /** Root mean square of the stated error of a year's point: √(σ²(H) + H²σ²(G)). */
  readonly sigma: Metres;
  /** The year furthest from the mean, and how far. */
  readonly largest: { readonly year: number; readonly distance: Metres };
  /** χ² of the distances with the stated errors over its degrees of freedom: about 1 where errors explain the scatter. */
  readonly ratio: number;
  /** From four years on; errors by the stated ones or the scatter about the line, whichever is larger. */
  readonly trend?: YearlyTrend | undefined;
}

/** A fit of one year. */
export interface YearFit {
  readonly year: number;
  readonly fit: HarmonicFit;
}

/** A year's point turned so that the mean lies along the first axis, with its covariance. */
interface Point {
  readonly year: number;
  readonly along: number;
  readonly across: number;
  readonly varAlong: number;
  readonly varAcross: number;
  readonly covariance: number;
}

const LEAST = 4; // years of a trend

/** H cos G and H sin G of a year, with the covariance of the pair. */
function pairOf(
  { fit }: YearFit,
  name: string,
): { a: number; b: number; aa: number; ab: number; bb: number } {
  const { order, matrix } = fit.covariance;
  const at = order.indexOf(`${name}.cos`);
  const read = (i: number, j: number): number => matrix[(at + i) * order.length + at + j] as number;
  const own = fit.constants.constituents.find((one) => one.name === name);
  const { amplitude, phaseLag } = own as { amplitude: number; phaseLag: number };
  const angle = degreesToRadians(phaseLag);
  const [a, b] = [amplitude * cos(angle), amplitude * sin(angle)];
  return { a, b, aa: read(0, 0), ab: read(0, 1), bb: read(1, 1) };
}

/** The straight line through one coordinate of the points. */
function lineOf(
  points: readonly Point[],
  read: (point: Point) => number,
  variance: (point: Point) => number,
): { slope: number; sigma: number } {
  const n = points.length;
  const middle = points.reduce((sum, { year }) => sum + year, 0) / n;
  const spread = points.reduce((sum, { year }) => sum + (year - middle) ** 2, 0);
  const mean = points.reduce((sum, point) => sum + read(point), 0) / n;
  const slope =
    points.reduce((sum, point) => sum + (point.year - middle) * read(point), 0) / spread;
  const left = points.reduce(
    (sum, point) => sum + (read(point) - mean - slope * (point.year - middle)) ** 2,
    0,
  );
  const stated = points.reduce((sum, point) => sum + variance(point), 0) / n;
  return { slope, sigma: Math.sqrt(Math.max(stated, left / (n - 2)) / spread) };
}

function trendOf(points: readonly Point[], amplitude: number): YearlyTrend {
  const along = lineOf(
    points,
    (point) => point.along,
    ({ varAlong }) => varAlong,
  );
  const across = lineOf(
    points,
    (point) => point.across,
    ({ varAcross }) => varAcross,
  );
  return {
    amplitudePerYear: along.slope,
    amplitudeSigma: along.sigma,
    phaseLagPerYear: radiansToDegrees(across.slope / amplitude),
    phaseLagSigma: radiansToDegrees(across.sigma / amplitude),
  };
}

/** dᵀC⁻¹d of a point about (amplitude, 0); 0 where no error is stated. */
function squaredDistance(point: Point, amplitude: number): number {
  const { varAlong, varAcross, covariance } = point;
  const [x, y] = [point.along - amplitude, point.across];
  const determinant = varAlong * varAcross - covariance * covariance;
  if (!(determinant > 0)) return 0;
  return (x * x * varAcross - 2 * x * y * covariance + y * y * varAlong) / determinant;
}

function changeOf(years: readonly YearFit[], name: string): YearlyChange {
  const pairs = years.map((one) => ({ year: one.year, ...pairOf(one, name) }));
  const n = pairs.length;
  const re = pairs.reduce((sum, { a }) => sum + a, 0) / n;
  const im = pairs.reduce((sum, { b }) => sum + b, 0) / n;
  const amplitude = Math.sqrt(re * re + im * im);
  const [c, s] = amplitude > 0 ? [re / amplitude, im / amplitude] : [1, 0];
  const points = pairs.map(
    ({ year, a, b, aa, ab, bb }): Point => ({
      year,
      along: a * c + b * s,
      across: b * c - a * s,
      varAlong: aa * c * c + 2 * ab * c * s + bb * s * s,
      varAcross: aa * s * s - 2 * ab * c * s + bb * c * c,
      covariance: (bb - aa) * c * s + ab * (c * c - s * s),
    }),
  );
  const distances = points.map(({ year, along, across }) => ({
    year,
    distance: Math.sqrt((along - amplitude) ** 2 + across * across),
  }));
  const squares = distances.reduce((sum, { distance }) => sum + distance * distance, 0);
  const stated = points.reduce((sum, { varAlong, varAcross }) => sum + varAlong + varAcross, 0);
  const chiSquared = points.reduce((sum, point) => sum + squaredDistance(point, amplitude), 0);
  return {
    name,
    amplitude,
    phaseLag: wrapDegrees(radiansToDegrees(atan2(im, re))),
    scatter: Math.sqrt(squares / n),
    sigma: Math.sqrt(stated / n),
    largest: distances.reduce((most, one) => (one.distance > most.distance ? one : most)),
    ratio: chiSquared / (2 * (n - 1)),
    ...(n >= LEAST && amplitude > 0 ? { trend: trendOf(points, amplitude) } : {}),
  };
}

/**
 * @param years - Two or more, all with the same constituents.
 * @returns One a fitted constituent, in the order of the fits.
 */
export function changesOf(years: readonly YearFit[]): YearlyChange[] {
  const [first] = years;
  if (!first || years.length < 2) return [];
  return first.fit.constants.constituents.flatMap(({ name, standing }) =>
    standing === 'borrowed' ? [] : [changeOf(years, name)],
  );
}
