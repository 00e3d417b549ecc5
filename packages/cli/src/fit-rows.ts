/**
 * The rows that every fit has.
 * @module
 */
import type { HarmonicConstant } from '@staithe/core';
import type { ResistantWeights } from '@staithe/fit';
import { count, counted, row } from './terminal.js';

/** `held      37 lines: 31 firm, 3 faint, 3 borrowed`. */
export function heldRow(lines: readonly Pick<HarmonicConstant, 'standing'>[]): string {
  const standings = (['firm', 'faint', 'borrowed'] as const)
    .map((standing) => [lines.filter((c) => c.standing === standing).length, standing] as const)
    .filter(([n]) => n > 0)
    .map(([n, standing]) => `${n} ${standing}`);
  return row('held', `${counted(lines.length, 'line')}: ${standings.join(', ')}`);
}

/** `doubted   204 samples of less than half weight, 8 of none`; nothing where all weigh alike. */
export function doubtedRow(
  weights: Pick<ResistantWeights, 'doubted' | 'setAside'> | undefined,
  one: string,
): string {
  if (weights === undefined) return '';
  const { doubted, setAside } = weights;
  if (doubted === 0) return row('doubted', `no ${one} of less than half weight`);
  const none = setAside === 0 ? '' : `, ${count(setAside)} of none`;
  return row('doubted', `${counted(doubted, one)} of less than half weight${none}`);
}

/** The same as plain data, without the weight of each sample. */
export function doubtedJson({
  resistant,
}: {
  readonly resistant?: (Omit<ResistantWeights, 'scale'> & { readonly scale: unknown }) | undefined;
}): object {
  if (resistant === undefined) return {};
  const { curve, cutoff, scale, doubted, setAside } = resistant;
  return { resistant: { curve, cutoff, scale, doubted, setAside } };
}
