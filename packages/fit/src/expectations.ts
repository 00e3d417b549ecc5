/**
 * What size the potential lets one expect of a constituent: its line times the response of the sea at the nearest large
 * constituents of its species. Where that is under √2 of its standard error, the tide is predicted better without it: leaving
 * out an amplitude a adds a²/2 to the mean square error, fitting it adds the variance of two coefficients at half each.
 * @module
 */
import type { Candidate } from './types.js';
import type { Expected } from './choose.js';

/** A fitted constituent and its errors. */
export interface Found {
  readonly name: string;
  readonly amplitude: number;
  readonly amplitudeSigma: number;
  readonly radius95: number;
}

const LARGE = 0.1; // of the largest line of the species in the potential: a witness of the sea's response
const SURE = 3; // discs
const WORTH = Math.sqrt(2); // standard errors

interface Witness {
  readonly speed: number;
  readonly response: number;
}

function responseAt(speed: number, witnesses: readonly Witness[]): number | undefined {
  let below: Witness | undefined;
  let above: Witness | undefined;
  for (const witness of witnesses) {
    if (witness.speed <= speed && witness.speed >= (below?.speed ?? 0)) below = witness;
    if (witness.speed >= speed && witness.speed <= (above?.speed ?? Infinity)) above = witness;
  }
  if (!below || !above) return (below ?? above)?.response;
  if (above.speed === below.speed) return below.response;
  const share = (speed - below.speed) / (above.speed - below.speed);
  return below.response * (1 - share) + above.response * share;
}

/**
 * The constituents that are expected to be smaller than their noise, each with its reason.
 *
 * @param expected - All candidates with their size in the potential.
 * @param found - What the fit with all of them gave.
 * @param parents - Never left out.
 */
export function tooSmall(
  expected: readonly Expected[],
  found: readonly Found[],
  parents: ReadonlySet<string>,
): Candidate[] {
  const fitted = new Map(found.map((one) => [one.name, one]));
  const lines = expected.filter(({ fromPotential }) => fromPotential);
  const largest = new Map<number, number>();
  for (const { of, size } of lines) {
    largest.set(of.species, Math.max(size, largest.get(of.species) ?? 0));
  }
  const witnesses = (species: number): Witness[] =>
    lines.flatMap(({ of, size }) => {
      const one = fitted.get(of.name);
      const large = of.species === species && size >= LARGE * (largest.get(species) as number);
      if (!one || !large || one.amplitude < SURE * one.radius95) return [];
      return [{ speed: of.speed, response: one.amplitude / size }];
    });
  const bySpecies = new Map([...largest.keys()].map((species) => [species, witnesses(species)]));
  return lines.flatMap(({ of, size }): Candidate[] => {
    const one = fitted.get(of.name);
    const response = responseAt(of.speed, bySpecies.get(of.species) as Witness[]);
    if (!one || response === undefined || parents.has(of.name)) return [];
    const awaited = response * size;
    if (awaited >= WORTH * one.amplitudeSigma) return [];
    const [mm, noise] = [1000 * awaited, 1000 * one.amplitudeSigma];
    const reason = `expected ${mm.toPrecision(2)} mm beside ${noise.toPrecision(2)} mm of noise`;
    return [
      { name: of.name, decision: 'left', reason, expected: awaited, noise: one.amplitudeSigma },
    ];
  });
}
