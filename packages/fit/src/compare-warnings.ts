/**
 * What bears on a comparison of two sets of constants and does not show in its numbers.
 * @module
 */
import { DAY, type HarmonicConstants, toInstant } from '@staithe/core';
import type { ConstantPair } from './compare-pairs.js';

/** A finding that does not stop a comparison. @public */
export interface ComparisonWarning {
  readonly code:
    | 'M1_CARRIED_OVER'
    | 'NO_NODAL_MODEL'
    | 'NODAL_MODELS_DIFFER'
    | 'TAKEN_AS_EXACT'
    | 'BORROWED'
    | 'RECORDS_OVERLAP'
    | 'LEVEL_MOVES'
    | 'DATUM_OF_TWO_PLACES';
  readonly message: string;
}

type Both = readonly [ConstantPair, ConstantPair];
type Said = ComparisonWarning | false;

/** `the first set`, `both sets`; nothing where neither. */
function whose(first: boolean, second: boolean): string {
  if (first && second) return 'both sets';
  return first ? 'the first set' : second ? 'the second set' : '';
}

function ofModels(
  first: HarmonicConstants,
  second: HarmonicConstants,
  common: readonly Both[],
): Said[] {
  const [a, b] = [first.nodalModel, second.nodalModel];
  const bare = whose(a === 'none', b === 'none');
  const m1 = a !== b && common.some(([{ name }]) => name === 'M1');
  const isScaled = m1 && (a === 'schureman1940' || b === 'schureman1940');
  return [
    isScaled && {
      code: 'M1_CARRIED_OVER',
      message: `H of M1 in the second set was carried over from ${b} to ${a}; other amplitudes need no such step`,
    },
    bare !== '' && {
      code: 'NO_NODAL_MODEL',
      message: `${bare} ${a === b ? 'have' : 'has'} no nodal model: the 18.6-year cycle of the time of the record is in the constants, up to 4 % of M2 and 20 % of O1`,
    },
    a !== b &&
      bare === '' && {
        code: 'NODAL_MODELS_DIFFER',
        message: `nodal models ${a} and ${b}: their f and u differ by up to 0.0008 for M2, 0.008 and 0.4° for O1, 0.18 and 14° for OO1, and a short record takes that into its constants`,
      },
  ];
}

function ofErrors(common: readonly Both[]): Said[] {
  const bare = (side: 0 | 1): string[] =>
    common.filter((both) => !both[side].errors && both[1 - side]?.errors).map(([{ name }]) => name);
  const exact = ([bare(0), bare(1)] as const).map((names, side): Said => {
    if (names.length === 0) return false;
    const own = side === 0 ? 'the first set' : 'the second set';
    const which = names.length < common.length ? ` for ${names.join(', ')}` : '';
    return {
      code: 'TAKEN_AS_EXACT',
      message: `${own} states no errors${which} and is taken as exact there`,
    };
  });
  const borrowed = common.filter((both) => both.some((pair) => pair.borrowed));
  return [
    ...exact,
    borrowed.length > 0 && {
      code: 'BORROWED',
      message: `borrowed in a set, so no evidence of their own: ${borrowed.map(([{ name }]) => name).join(', ')}`,
    },
  ];
}

/** Days that the two records share. */
function sharedDays(first: HarmonicConstants, second: HarmonicConstants): number {
  if (!first.record || !second.record) return 0;
  const from = Math.max(
    toInstant(first.record.from, 'first.record.from'),
    toInstant(second.record.from, 'second.record.from'),
  );
  const to = Math.min(
    toInstant(first.record.to, 'first.record.to'),
    toInstant(second.record.to, 'second.record.to'),
  );
  return Math.max(0, to - from) / DAY;
}

function ofRecords(first: HarmonicConstants, second: HarmonicConstants): Said[] {
  const days = sharedDays(first, second);
  const moves = ({ secularRate, steps = [] }: HarmonicConstants): boolean =>
    secularRate !== undefined || steps.length > 0;
  const moving = whose(moves(first), moves(second));
  const [one, other] = [first.place?.name, second.place?.name];
  const isOneDatum = first.datum !== undefined && first.datum === second.datum;
  const twoPlaces = one !== undefined && other !== undefined && one !== other;
  return [
    days > 0 && {
      code: 'RECORDS_OVERLAP',
      message: `the records share ${days.toFixed(1)} days, whose weather is in both: their errors are not independent, as is assumed`,
    },
    isOneDatum &&
      moving !== '' && {
        code: 'LEVEL_MOVES',
        message: `the level moves in ${moving}: the mean levels compared are those before any step, at the instant that the secular rate counts from`,
      },
    isOneDatum &&
      twoPlaces && {
        code: 'DATUM_OF_TWO_PLACES',
        message: `both count from ${first.datum}, but at two places, where a datum by one name may lie at two heights`,
      },
  ];
}

/**
 * @param first - The one document.
 * @param second - The other.
 * @param common - The constituents compared.
 */
export function comparisonWarnings(
  first: HarmonicConstants,
  second: HarmonicConstants,
  common: readonly Both[],
): ComparisonWarning[] {
  const said = [
    ...ofModels(first, second, common),
    ...ofErrors(common),
    ...ofRecords(first, second),
  ];
  return said.filter((warning): warning is ComparisonWarning => warning !== false);
}
