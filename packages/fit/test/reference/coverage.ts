/** How often the true values lie within what a fit calls 95 %. */
import type { HarmonicFit } from '../../src/index.js';
import type { Tide } from './coloured-noise.js';

const ROUND = 1.959963984540054; // ±σ that hold 95 % of a normal number
const DISC = 5.991464547107979; // χ², two degrees of freedom
const WELL_ABOVE = 3; // radii of the disc: from here amplitude and phase are two straight directions

/** One way to draw error bars: trials and hits of discs, and of amplitudes and phase lags. */
export interface Tally {
  trials: number;
  discs: number;
  intervals: number;
  within: number;
}

/** Of one constituent, by the error model of the fit and by the textbook's from the same residual. */
export interface Coverage {
  readonly name: string;
  readonly spectrum: Tally;
  readonly independent: Tally;
}

const empty = (): Tally => ({ trials: 0, discs: 0, intervals: 0, within: 0 });

export function emptyCoverage({ names }: Tide): Coverage[] {
  return names.map((name) => ({ name, spectrum: empty(), independent: empty() }));
}

/** Variance of the residual over n − p. */
function varianceOf({ diagnostics }: HarmonicFit): number {
  const { residual, samples, unknowns } = diagnostics;
  return (residual.rms * residual.rms * samples) / (samples - unknowns);
}

/** Counts a fit; its list is that of the tide. */
export function count(into: readonly Coverage[], fit: HarmonicFit, { names, pairs }: Tide): void {
  const { order, matrix } = fit.covariance;
  const variance = varianceOf(fit);
  names.forEach((name, i) => {
    const found = fit.constants.constituents.find((c) => c.name === name);
    const noise = fit.diagnostics.noise.find((n) => n.name === name);
    const row = into[i] as Coverage;
    if (!found || !noise) throw new Error(`${name}: expected in the fit`);
    const { amplitude, phaseLag, amplitudeSigma, phaseLagSigma, radius95 } = found;
    const [a, b] = pairs[i] as readonly [number, number];
    const truth = Math.hypot(a, b);
    const lag = (phaseLag * Math.PI) / 180;
    const apart = Math.hypot(amplitude * Math.cos(lag) - a, amplitude * Math.sin(lag) - b);
    const turn = ((phaseLag - (Math.atan2(b, a) * 180) / Math.PI + 900) % 360) - 180;
    const at = order.indexOf(`${name}.cos`);
    const read = (k: number, j: number): number =>
      matrix[(at + k) * order.length + at + j] as number;
    // (AᵀA)⁻¹ of the pair is its covariance over the density that both columns share.
    const scale = variance / (noise.sigma * noise.sigma);
    const half = (read(0, 0) - read(1, 1)) / 2;
    const longest = (read(0, 0) + read(1, 1)) / 2 + Math.hypot(half, read(0, 1));
    const add = (tally: Tally, radius: number, factor: number): void => {
      tally.trials++;
      if (apart <= radius) tally.discs++;
      if (!(truth > WELL_ABOVE * (radius95 as number))) return;
      tally.intervals += 2;
      if (Math.abs(amplitude - truth) <= ROUND * factor * (amplitudeSigma as number))
        tally.within++;
      if (Math.abs(turn) <= ROUND * factor * (phaseLagSigma as number)) tally.within++;
    };
    add(row.spectrum, radius95 as number, 1);
    add(row.independent, Math.sqrt(DISC * scale * longest), Math.sqrt(scale));
  });
}

/** The sum over constituents. */
export function pooled(rows: readonly Coverage[], of: 'spectrum' | 'independent'): Tally {
  const sum = empty();
  for (const row of rows) {
    sum.trials += row[of].trials;
    sum.discs += row[of].discs;
    sum.intervals += row[of].intervals;
    sum.within += row[of].within;
  }
  return sum;
}

/** Shares in percent. */
export function percent({ trials, discs, intervals, within }: Tally): {
  disc: number;
  interval: number;
} {
  return { disc: (100 * discs) / trials, interval: (100 * within) / intervals };
}
