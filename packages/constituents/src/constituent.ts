/**
 * Constituents by name.
 * @module
 */
import {
  type ArgumentModel,
  type Degrees,
  describe,
  InputError,
  type InstantLike,
  toInstant,
  wrapDegrees,
} from '@staithe/core';
import { lunisolarLongitudesInto, lunisolarRates } from '@staithe/arguments';
import { type CompoundMember, parseCompound } from './compound.js';
import { type DoodsonNumbers, parseXdo } from './doodson.js';
import type { KnownConstituent } from './known.js';
import { ALIASES, LISTED_COMPOUNDS, NAMED } from './table.js';

/** A name: a listed one (for completion in editors), an alias, or a compound. @public */
export type ConstituentName = KnownConstituent | (string & {});

/** One constituent of the tide. @public */
export interface Constituent {
  /** Canonical spelling. */
  readonly name: string;
  /** Multipliers of τ, s, h, p, N′, p_s. */
  readonly doodsonNumbers: DoodsonNumbers;
  /** Multiples of 90° that V carries beyond the multipliers. */
  readonly quarterTurns: number;
  /** The multiplier of τ: 0 long-period, 1 diurnal, 2 semidiurnal … */
  readonly species: number;
  /** Degrees per mean solar hour at J2000. */
  readonly speed: number;
  readonly kind: 'astronomical' | 'compound' | 'meteorological';
  /** Other spellings of the trade. */
  readonly aliases: readonly string[];
  /** The lines of the potential that it stands for share these multipliers of τ, s, h and p_s. */
  readonly group: readonly [n1: number, n2: number, n3: number, n6: number];
  /** The members of a compound. */
  readonly composition?: readonly CompoundMember[] | undefined;
  readonly source: string;
}

const SOURCE = 'Doodson (1921); Schureman (1940), table 2; sign after Cartwright and Edden (1973)';
const J2000_MS = 946728000000;
const LONGEST = 24; // letters of a name that near ones are sought for

/** The named rows as a map from name to letters; `*` marks the meteorological ones. */
function namedRows(): Map<string, { letters: string; meteorological: boolean }> {
  const out = new Map<string, { letters: string; meteorological: boolean }>();
  for (const [, name, mark, letters] of NAMED.matchAll(/(\w+)([ *])([A-Z]{7})/g)) {
    out.set(name as string, { letters: letters as string, meteorological: mark === '*' });
  }
  return out;
}

function speedOf(numbers: DoodsonNumbers): number {
  const { tau, s, h, p, nPrime, ps } = lunisolarRates(J2000_MS);
  return [tau, s, h, p, nPrime, ps].reduce(
    (sum, rate, i) => sum + rate * (numbers[i] as number),
    0,
  );
}

function make(
  name: string,
  doodsonNumbers: DoodsonNumbers,
  quarterTurns: number,
  kind: Constituent['kind'],
  composition?: readonly CompoundMember[],
): Constituent {
  return {
    name,
    doodsonNumbers,
    quarterTurns,
    species: doodsonNumbers[0],
    speed: speedOf(doodsonNumbers),
    kind,
    aliases: ALIASES.split(' ').flatMap((row) => {
      const [alias, of] = row.split('=') as [string, string];
      return of === name ? [alias] : [];
    }),
    group: [doodsonNumbers[0], doodsonNumbers[1], doodsonNumbers[2], doodsonNumbers[5]],
    ...(composition ? { composition } : {}),
    source: composition ? 'sum of its members (common practice)' : SOURCE,
  };
}

function lookUp(name: string, rows: ReturnType<typeof namedRows>): Constituent | undefined {
  const row = rows.get(name);
  if (row) {
    const { doodsonNumbers, quarterTurns } = parseXdo(row.letters);
    return make(
      name,
      doodsonNumbers,
      quarterTurns,
      row.meteorological ? 'meteorological' : 'astronomical',
    );
  }
  const composition = parseCompound(name);
  if (!composition) return undefined;
  const numbers = [0, 0, 0, 0, 0, 0];
  let turns = 0;
  for (const { name: member, multiplicity } of composition) {
    const { doodsonNumbers, quarterTurns } = parseXdo(
      (rows.get(member) as { letters: string }).letters,
    );
    doodsonNumbers.forEach((n, i) => {
      numbers[i] = (numbers[i] as number) + n * multiplicity;
    });
    turns += quarterTurns * multiplicity;
  }
  // Quarter turns count modulo 4; −1, 0, 1, 2 as in the table.
  const wrapped = ((((turns + 1) % 4) + 4) % 4) - 1;
  // A difference that runs backwards or not at all is no oscillation of its own: SM0, not MS0.
  if (!(speedOf(numbers as unknown as DoodsonNumbers) > 0)) return undefined;
  return make(name, numbers as unknown as DoodsonNumbers, wrapped, 'compound', composition);
}

/** How many letters must change to get from one name to the other. */
function distance(a: string, b: string): number {
  let row = Array.from({ length: b.length + 1 }, (_, j) => j);
  for (let i = 1; i <= a.length; i++) {
    const next = [i];
    for (let j = 1; j <= b.length; j++) {
      const swap = (row[j - 1] as number) + (a[i - 1] === b[j - 1] ? 0 : 1);
      next.push(Math.min((row[j] as number) + 1, (next[j - 1] as number) + 1, swap));
    }
    row = next;
  }
  return row[b.length] as number;
}

function nearNames(name: string, rows: ReturnType<typeof namedRows>): string[] {
  const wanted = name.toUpperCase();
  return [...rows.keys(), ...LISTED_COMPOUNDS.split(' ')]
    .map((known) => ({ known, far: distance(wanted, known.toUpperCase()) }))
    .sort((a, b) => a.far - b.far)
    .slice(0, 4)
    .filter(({ far }) => far <= 2)
    .map(({ known }) => known);
}

/**
 * A constituent by name: a listed one, one of the trade's aliases (`MM`, `ν2`, `RHO`), or any compound.
 *
 * @param name - Case counts.
 * @returns The constituent.
 * @throws InputError `UNKNOWN_CONSTITUENT` with near names, or `AMBIGUOUS_CONSTITUENT`; path `constituent`.
 * @example
 * constituent('2MK3').doodsonNumbers; // [3, -1, 0, 0, 0, 0]
 * @public
 */
export function constituent(name: ConstituentName): Constituent {
  const rows = namedRows();
  const text = typeof name === 'string' ? name : '';
  const alias = ALIASES.split(' ').find((row) => row.startsWith(`${text}=`));
  const found = lookUp(alias?.slice(text.length + 1) ?? text, rows);
  if (found) return found;
  const near = text.length > LONGEST ? [] : nearNames(text, rows);
  const hint = near.length > 0 ? ` (near names: ${near.join(', ')})` : '';
  throw new InputError(
    'UNKNOWN_CONSTITUENT',
    'constituent',
    `expected the name of a constituent, got ${describe(name)}${hint}`,
    { near },
  );
}

/**
 * The listed constituents, built on call.
 *
 * @param filter - Keep those of this species, kind or Doodson numbers.
 * @returns A new list: lines of the potential first, then compounds.
 * @example
 * listConstituents({ species: 3, kind: 'astronomical' }).length; // 1
 * @public
 */
export function listConstituents(
  filter: {
    readonly species?: number | undefined;
    readonly kind?: Constituent['kind'] | undefined;
    readonly doodsonNumbers?: DoodsonNumbers | undefined;
  } = {},
): readonly Constituent[] {
  const rows = namedRows();
  const names = [...rows.keys(), ...LISTED_COMPOUNDS.split(' ')];
  return names
    .map((name) => lookUp(name, rows) as Constituent)
    .filter(
      ({ species, kind, doodsonNumbers }) =>
        species === (filter.species ?? species) &&
        kind === (filter.kind ?? kind) &&
        doodsonNumbers.join() === (filter.doodsonNumbers ?? doodsonNumbers).join(),
    );
}

/**
 * The equilibrium argument V at Greenwich.
 *
 * @param of - A constituent or its name.
 * @param t - An instant from year 1700 to 2200.
 * @param model - Which longitudes: `iers2010` (default) or `schureman1940`.
 * @returns Degrees in [0, 360).
 * @throws InputError of {@link constituent} and `toInstant`.
 * @example
 * equilibriumArgument('S2', '2031-06-01T03:00Z'); // 90
 * @public
 */
export function equilibriumArgument(
  of: Constituent | ConstituentName,
  t: InstantLike,
  model: ArgumentModel = 'iers2010',
): Degrees {
  const { doodsonNumbers, quarterTurns } = typeof of === 'string' ? constituent(of) : of;
  const six = new Float64Array(6);
  lunisolarLongitudesInto(toInstant(t, 't'), model, six);
  return wrapDegrees(
    six.reduce((sum, angle, i) => sum + angle * (doodsonNumbers[i] as number), quarterTurns * 90),
  );
}
