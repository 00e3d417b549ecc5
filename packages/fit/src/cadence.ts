/**
 * How a record was sampled: its usual step, the step of which all distances are whole multiples, and the speed at which a
 * constituent shows itself at such a step.
 * @module
 */
import { HOUR } from '@staithe/core';

const REGULAR = 1e-3; // of a step: irregular times within this of whole steps alias like whole steps

/** The middle one of all steps; 0 for less than two times. */
export function usualStep(times: Float64Array): number {
  const steps = Float64Array.from({ length: Math.max(0, times.length - 1) }, (_, i) => {
    return (times[i + 1] as number) - (times[i] as number);
  }).sort();
  return steps[steps.length >> 1] ?? 0;
}

/** The step of which all distances are whole multiples; 0 where there is none. */
export function cadenceOf(times: Float64Array): number {
  const usual = usualStep(times);
  for (let i = 1; i < times.length; i++) {
    const steps = ((times[i] as number) - (times[i - 1] as number)) / usual;
    if (Math.abs(steps - Math.round(steps)) > REGULAR) return 0;
  }
  return usual;
}

/**
 * The speed at which a constituent shows itself when it is seen at each step: folded into the half turn a step that the
 * samples can tell apart.
 *
 * @param speed - Degrees per hour.
 * @param cadence - Milliseconds; 0: irregular, nothing is folded.
 * @returns Degrees per hour, 0 to 180° a step.
 */
export function shownSpeed(speed: number, cadence: number): number {
  const hours = cadence / HOUR;
  const turned = speed * hours;
  if (cadence === 0 || turned <= 180) return speed;
  const left = turned - 360 * Math.round(turned / 360);
  return Math.abs(left) / hours;
}
