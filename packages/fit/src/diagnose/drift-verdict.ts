/**
 * The drifts of several species joined: their mean, whether they agree, whether there is a drift at all.
 * @module
 */

/** The drift that one species shows. @public */
export interface SpeciesDrift {
  /** 1 diurnal, 2 semidiurnal … */
  readonly species: number;
  /** Over the record; above 0: the clock loses. */
  readonly minutes: number;
  readonly sigma: number;
}

/** What `clockDrift` gives. @public */
export interface ClockDrift {
  /** Over the record, mean of the species that count. Above 0: the clock loses, its stamps fall behind the truth. */
  readonly minutes: number;
  readonly sigma: number;
  /** Those with a firm tide; `counts` where the error is at most three times the smallest. */
  readonly species: readonly (SpeciesDrift & { readonly counts: boolean })[];
  /** Whether there are two or more, and all lie about that mean as chance lets them in 99 of 100 cases. */
  readonly agree: boolean;
  /** Whether they agree on a drift beyond three standard errors. */
  readonly found: boolean;
  /** Whether H1 and H2 were fitted; without them a seasonal change of M2 looks like a drift. */
  readonly annual: boolean;
}

const FURTHEST = 3; // times the smallest error
const FOUND = 3; // standard errors
// χ² that chance exceeds in one case of a hundred, for 1 to 12 degrees of freedom.
const CHI_99 = [
  6.635, 9.21, 11.345, 13.277, 15.086, 16.812, 18.475, 20.09, 21.666, 23.209, 24.725, 26.217,
];

/** @param species - One or more. */
export function joinSpecies(species: readonly SpeciesDrift[]): Omit<ClockDrift, 'annual'> {
  const best = species.reduce((least, { sigma }) => Math.min(least, sigma), Infinity);
  const all = species.map((one) => ({ ...one, counts: one.sigma <= FURTHEST * best }));
  const counted = all.filter(({ counts }) => counts);
  // Where there is no noise at all, all weigh alike.
  const weigh = (sigma: number): number => (best > 0 ? (best / sigma) * (best / sigma) : 1);
  const total = counted.reduce((sum, { sigma }) => sum + weigh(sigma), 0);
  const minutes = counted.reduce((sum, one) => sum + weigh(one.sigma) * one.minutes, 0) / total;
  const chiSquared = (list: readonly SpeciesDrift[]): number =>
    list.reduce((sum, one) => sum + (best > 0 ? ((one.minutes - minutes) / one.sigma) ** 2 : 0), 0);
  const free = counted.length - 1;
  const scatter = free > 0 ? Math.sqrt(Math.max(1, chiSquared(counted) / free)) : 1;
  const sigma = (best / Math.sqrt(total)) * scatter;
  const others = Math.min(all.length - 1, CHI_99.length);
  const agree = others > 0 && chiSquared(all) <= (CHI_99[others - 1] as number);
  return { minutes, sigma, species: all, agree, found: agree && Math.abs(minutes) > FOUND * sigma };
}
