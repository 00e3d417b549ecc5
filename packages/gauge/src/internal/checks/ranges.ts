/**
 * Gross range, climatology and neighbour: a height against fixed ends. Ends themselves pass.
 * @module
 */
import type { Ends, UsedLimits } from '../../limits.js';
import { medianOf, sampleOf } from '../robust.js';
import type { CheckSignal, Note } from './signal.js';

function judge(i: number, height: number, doubt: Ends, reject: Ends, note: Note): void {
  const beyond = (ends: Ends): number => Math.max(ends[0] - height, height - ends[1]);
  if (beyond(reject) > 0) note(i, 4, height, reject, beyond(reject));
  else if (beyond(doubt) > 0) note(i, 3, height, doubt, beyond(doubt));
}

/** Gross range. */
export function checkInstrument(
  signal: CheckSignal,
  limits: NonNullable<UsedLimits['instrument']>,
  note: Note,
): void {
  signal.heights.forEach((height, i) => {
    judge(i, height, limits.doubt, limits.reject, note);
  });
}

/** Climatology: the ends of the month, UTC. */
export function checkSeason(
  signal: CheckSignal,
  limits: NonNullable<UsedLimits['season']>,
  note: Note,
): void {
  signal.heights.forEach((height, i) => {
    const month = new Date(signal.times[i] as number).getUTCMonth();
    judge(i, height, limits.doubt[month] as Ends, limits.reject[month] as Ends, note);
  });
}

/** Neighbour or forecast: the residual about its median. */
export function checkBesides(
  residual: Float64Array,
  limits: NonNullable<UsedLimits['besides']>,
  note: Note,
): void {
  const middle = medianOf(sampleOf(residual.length, (i) => residual[i] as number));
  residual.forEach((value, i) => {
    const away = Math.abs(value - middle);
    if (away > limits.reject) note(i, 4, away, limits.reject, away);
    else if (away > limits.doubt) note(i, 3, away, limits.doubt, away);
  });
}
