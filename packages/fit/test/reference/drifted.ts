/**
 * A record as a drifting clock would have written it: the value at t is that of t + drift(t), drift from −minutes/2 at the
 * first sample to +minutes/2 at the last. Between samples by a sinc under a raised cosine over 24 steps on either side:
 * within 0.1 % up to 80 % of the fastest wave that the samples can show. Past the ends the record is taken to stand still.
 */
import { HOUR, type UniformSeries } from '@staithe/core';

const REACH = 24; // steps

export function drifted(series: UniformSeries, minutes: number): UniformSeries {
  const { values, step } = series;
  const last = values.length - 1;
  const out = values.map((_, i) => {
    const at = i + (minutes / 60) * (i / last - 0.5) * (HOUR / step);
    const near = Math.round(at);
    let sum = 0;
    let total = 0;
    for (let k = near - REACH; k <= near + REACH; k++) {
      const apart = at - k;
      const sinc = apart === 0 ? 1 : Math.sin(Math.PI * apart) / (Math.PI * apart);
      const weight = (sinc * (1 + Math.cos((Math.PI * apart) / (REACH + 1)))) / 2;
      sum += weight * (values[Math.min(last, Math.max(0, k))] as number);
      total += weight;
    }
    return sum / total;
  });
  return { ...series, values: out };
}
