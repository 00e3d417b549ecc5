/**
 * What a fit has to say beside its result.
 * @module
 */
import type { Constituent } from '@staithe/constituents';
import type { Design } from './design.js';
import type { LineNoise } from './noise.js';
import type { RecordSummary } from './record.js';
import { closePairs } from './select.js';
import type { FitWarning } from './types.js';

const POOR = 1e4; // condition of the design that is worth a word
const GAPS = 0.3; // share of samples
const MONTH = 27; // days
const FEW_BINS = 4;

/**
 * @param record - Of the fit.
 * @param design - Of the fit.
 * @param condition - Of the design.
 * @param noise - Beside each line.
 * @param asked - The caller's list of constituents; empty where the choice was ours.
 */
export function warningsOf(
  record: RecordSummary,
  design: Design,
  condition: number,
  noise: readonly LineNoise[],
  asked: readonly Constituent[],
): FitWarning[] {
  const { missing } = record;
  const length = record.samples + missing;
  const spectral = noise.some(({ bins }) => bins > 0);
  const few = spectral ? noise.filter(({ bins }) => bins < FEW_BINS).length : 0;
  const list: (FitWarning | false)[] = [
    record.days < MONTH && {
      code: 'SHORT_RECORD',
      message: `${record.days.toFixed(1)} days: less than a month, in which the Moon passes all its positions`,
    },
    missing > GAPS * length && {
      code: 'MANY_GAPS',
      message: `${missing} of ${length} samples are missing`,
    },
    condition > POOR && {
      code: 'POORLY_CONDITIONED',
      message: `condition of the design ${condition.toExponential(1)}: errors of some constants are large and correlated`,
    },
    few > 0 && {
      code: 'FEW_SPECTRUM_BINS',
      message: `${few} error bars rest on fewer than ${FEW_BINS} bins of the residual's spectrum`,
    },
  ];
  const weak = design.basis.nodal.leftOut;
  if (weak.length > 0) {
    list.push({
      code: 'WEAK_DEGREE_2',
      message: `lines of degree 3 left out for ${weak.join(', ')}: degree 2 is under 5 % of its maximum at this latitude`,
    });
  }
  return [...list.filter((w): w is FitWarning => w !== false), ...closePairs(asked, record)];
}
