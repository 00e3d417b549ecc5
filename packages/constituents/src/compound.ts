/**
 * The grammar of compound tides: `2MS6`, `MSN2`, `2SM2`, `3M2S2`, `M10`, `2(MS)8`.
 *
 * A name is a row of members, each a letter (or NU, MU, LAM) with an optional count before it, then the species.
 * Members add up from the left; from some member on they are taken away, so that the species comes out: 2SM2 is
 * 2·S2 − M2, MNS2 is M2 + N2 − S2. K stands for K1 or K2, whichever makes the species. A single member gives
 * overtides: M4 is 2·M2. Where no such reading makes the species, the first count stands for all members: 2MS8 is
 * 2(MS)8. A name with two readings is refused with both. Common practice.
 * @module
 */
import { describe, InputError, refuse } from '@staithe/core';
import { LISTED_COMPOUNDS } from './table.js';

/** One member of a compound tide and how often it counts; negative where it is taken away. @public */
export interface CompoundMember {
  readonly name: string;
  readonly multiplicity: number;
}

const MEMBERS: Readonly<Record<string, readonly string[]>> = /* @__PURE__ */ Object.freeze({
  M: ['M2'],
  S: ['S2'],
  N: ['N2'],
  K: ['K1', 'K2'],
  O: ['O1'],
  P: ['P1'],
  Q: ['Q1'],
  J: ['J1'],
  T: ['T2'],
  R: ['R2'],
  L: ['L2'],
  NU: ['NU2'],
  MU: ['MU2'],
  LAM: ['LAM2'],
});
const LARGEST_COUNT = 12;

function speciesOf(name: string): number {
  return Number(name.slice(-1));
}

/** The members of a name in writing order, or undefined where it is no compound name at all. */
function split(body: string): { letter: string; count: number }[] | undefined {
  const out: { letter: string; count: number }[] = [];
  const token = /(\d*)(?:\(([A-Z]+)\)|(NU|MU|LAM|[MSNKOPQJTRL]))/y;
  while (token.lastIndex < body.length) {
    const found = token.exec(body);
    if (!found) return undefined;
    const count = found[1] ? Number(found[1]) : 1;
    if (count < 1 || count > LARGEST_COUNT) return undefined;
    const letters = found[3] ? [found[3]] : (found[2]?.match(/NU|MU|LAM|[A-Z]/g) ?? []);
    for (const letter of letters) {
      if (!Object.hasOwn(MEMBERS, letter)) return undefined;
      out.push({ letter, count });
    }
  }
  return out.length > 0 && out.length <= 6 ? out : undefined;
}

function* choices(members: readonly { letter: string; count: number }[]): Generator<string[]> {
  const [first, ...rest] = members;
  if (!first) {
    yield [];
    return;
  }
  for (const name of MEMBERS[first.letter] as readonly string[]) {
    for (const others of choices(rest)) yield [name, ...others];
  }
}

function readings(
  members: readonly { letter: string; count: number }[],
  species: number,
): CompoundMember[][] {
  const out: CompoundMember[][] = [];
  const only = members.length === 1 ? members[0] : undefined;
  for (const names of choices(members)) {
    if (only) {
      const count = species / speciesOf(names[0] as string);
      const fits =
        only.count === 1 && Number.isInteger(count) && count >= 2 && count <= LARGEST_COUNT;
      if (fits) out.push([{ name: names[0] as string, multiplicity: count }]);
      continue;
    }
    for (let added = members.length; added >= 1; added--) {
      const signed = members.map(({ count }, i) => (i < added ? count : -count));
      const sum = signed.reduce((total, n, i) => total + n * speciesOf(names[i] as string), 0);
      if (sum === species)
        out.push(names.map((name, i) => ({ name, multiplicity: signed[i] as number })));
    }
  }
  return out;
}

/** The count before the first member for all of them: 2MS8 is 2(MS)8, where 2·M2 + S2 makes no species 8. */
function spread(
  members: readonly { letter: string; count: number }[],
): { letter: string; count: number }[] {
  const count = members[0]?.count ?? 1;
  const plain = members.slice(1).every((member) => member.count === 1);
  return plain && count > 1 ? members.map(({ letter }) => ({ letter, count })) : [];
}

/** A reading in words: `2·S2 − M2`. */
function inWords(members: readonly CompoundMember[]): string {
  return members
    .map(({ name, multiplicity }, i) => {
      const count = Math.abs(multiplicity);
      const sign = multiplicity < 0 ? '− ' : i > 0 ? '+ ' : '';
      return `${sign}${count > 1 ? `${count}·` : ''}${name}`;
    })
    .join(' ');
}

/**
 * Reads the name of a compound tide.
 *
 * @param name - Such as `2MK3`.
 * @returns Its members, or undefined where the name is no compound name.
 * @throws InputError `AMBIGUOUS_CONSTITUENT`, path `constituent`, with the readings, where it has two.
 * @example
 * parseCompound('2SM2')?.[1]?.multiplicity; // -1
 * @public
 */
export function parseCompound(name: string): readonly CompoundMember[] | undefined {
  const parts = /^(.*?[A-Z)])(\d{1,2})$/.exec(name);
  const members = parts && split(parts[1] as string);
  if (!members) return undefined;
  const species = Number(parts[2]);
  const plain = readings(members, species);
  const wide = plain.length === 0 ? spread(members) : [];
  const found = wide.length > 1 ? readings(wide, species) : plain;
  if (found.length < 2) return found[0];
  throw new InputError(
    'AMBIGUOUS_CONSTITUENT',
    'constituent',
    `expected one reading, got ${describe(name)}: ${found.map(inWords).join(' or ')}`,
    { readings: found },
  );
}

/**
 * Writes the name of a compound tide: the listed one where there is one, else members that are added, then those taken
 * away, then the species.
 *
 * @param members - As {@link parseCompound} gives them.
 * @returns A name that reads back as these members.
 * @throws InputError `AMBIGUOUS_CONSTITUENT` or `UNKNOWN_CONSTITUENT`, path `composition`, where no name does.
 * @example
 * formatCompound([{ name: 'S2', multiplicity: 2 }, { name: 'M2', multiplicity: -1 }]); // '2SM2'
 * @public
 */
export function formatCompound(members: readonly CompoundMember[]): string {
  const key = (list: readonly CompoundMember[] | undefined): string =>
    (list ?? [])
      .map(({ name, multiplicity }) => `${multiplicity}${name}`)
      .sort()
      .join();
  const wanted = key(members);
  const listed = LISTED_COMPOUNDS.split(' ').find((name) => key(parseCompound(name)) === wanted);
  if (listed) return listed;
  const species = members.reduce((sum, m) => sum + m.multiplicity * speciesOf(m.name), 0);
  const ordered = [...members].sort(
    (a, b) => Math.sign(b.multiplicity) - Math.sign(a.multiplicity),
  );
  const body = ordered.map(({ name, multiplicity }) => {
    const count = Math.abs(multiplicity);
    return `${count > 1 && members.length > 1 ? count : ''}${name.slice(0, -1)}`;
  });
  const name = `${body.join('')}${species}`;
  if (members.length > 0 && key(parseCompound(name)) === wanted) return name;
  return refuse('UNKNOWN_CONSTITUENT', 'composition', 'members that a compound name can say', name);
}
