/**
 * Mean longitudes and anomalies of Moon and Sun, and the events that come round with them.
 *
 * Source: J. Meeus, Astronomical Algorithms, 2nd ed. (1998), eq. 47.1 to 47.5 and 25.2, from memory. Powers of time
 * below 6e-5° from 1700 to 2200 are left out, here and in the whole folder. His mean phases (49.1) and mean apsides
 * (50.1) are the instants where two of these angles pass multiples of 90° and 180°, and are found from them.
 * @module
 */
import { type Degrees, type Instant, type Span, toSpan } from '@staithe/core';
import { centuriesAt, instantOf, polynomial } from './series.js';

/** An angle that grows with time: degrees, not wrapped, from Julian centuries TT. */
type Turning = (t: number) => Degrees;

/** L′, mean longitude of the Moon, light-time taken off. */
export function moonLongitude(t: number): Degrees {
  return polynomial([218.3164477, 481267.88123421, -0.0015786], t);
}

/** L₀, mean longitude of the Sun. */
export function sunLongitude(t: number): Degrees {
  return polynomial([280.46646, 36000.76983, 0.0003032], t);
}

/** D, mean elongation of the Moon. */
export function elongation(t: number): Degrees {
  return polynomial([297.8501921, 445267.1114034, -0.0018819], t);
}

/** M, mean anomaly of the Sun. */
export function sunAnomaly(t: number): Degrees {
  return polynomial([357.5291092, 35999.0502909, -0.0001536], t);
}

/** M′, mean anomaly of the Moon. */
export function moonAnomaly(t: number): Degrees {
  return polynomial([134.9633964, 477198.8675055, 0.0087414, 1 / 69699], t);
}

/** F, mean distance of the Moon from its ascending node. */
export function nodeDistance(t: number): Degrees {
  return polynomial([93.272095, 483202.0175233, -0.0036539], t);
}

/** The Moon's mean ascending node Ω. */
export function nodeLongitude(t: number): Degrees {
  return moonLongitude(t) - nodeDistance(t);
}

/** When an angle has turned through so many degrees: Julian centuries TT. */
export function whenPassed(angle: Turning, degrees: Degrees): number {
  const rate = angle(1) - angle(0);
  let t = 0;
  // The Sun's rate differs from its mean by 3.4 %: each round divides the error by 30, from 2° to below 1e-8°.
  for (let round = 0; round < 7; round++) t += (degrees - angle(t)) / rate;
  return t;
}

/**
 * The events of a span, one near each of the equal parts of the circle that a mean angle passes.
 *
 * @param span - Half-open; membership is decided on the whole millisecond.
 * @param kinds - Two or four, from where the angle is 0°.
 * @param angle - The mean angle.
 * @param timeOf - Julian centuries TT of event number k, where the mean angle is k parts or about that.
 * @returns The events in the span, in order, at instants of UT.
 */
export function eventsIn<Kind>(
  span: Span,
  kinds: readonly Kind[],
  angle: Turning,
  timeOf: (k: number) => number,
): readonly { readonly kind: Kind; readonly time: Instant }[] {
  const { from, to } = toSpan(span);
  const near = (instant: Instant): number =>
    Math.floor((angle(centuriesAt(instant)) / 360) * kinds.length);
  const events: { kind: Kind; time: Instant }[] = [];
  for (let k = near(from) - 1; k <= near(to) + 2; k++) {
    const time = instantOf(timeOf(k));
    const kind = kinds[k & (kinds.length - 1)] as Kind;
    if (time >= from && time < to) events.push({ kind, time });
  }
  return events;
}
