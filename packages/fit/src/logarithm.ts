/**
 * Natural logarithm and exponential by exactly specified operations alone: the same to the last bit in every engine.
 * Good to some 1e-15 of the value; times of powers of 2 are exact.
 * @module
 */
const LN_2_HIGH = 0.6931471803691238; // 32 bits, so that small multiples are exact
const LN_2_LOW = 1.9082149292705877e-10;

/**
 * @param x - Above 0, finite.
 * @returns ln x.
 */
export function logarithm(x: number): number {
  let rest = x;
  let halvings = 0;
  for (; rest >= 1.5; rest *= 0.5) halvings++;
  for (; rest < 0.75; rest *= 2) halvings--;
  // 2 artanh s, |s| <= 1/5: the first term left out is below 1e-19.
  const s = (rest - 1) / (rest + 1);
  let series = 0;
  for (let n = 25; n > 0; n -= 2) series = 1 / n + s * s * series;
  return halvings * LN_2_HIGH + (halvings * LN_2_LOW + 2 * s * series);
}

/**
 * @param x - Finite, |x| <= 700.
 * @returns e^x.
 */
export function exponential(x: number): number {
  const twos = Math.floor(x / (LN_2_HIGH + LN_2_LOW) + 0.5);
  const rest = x - twos * LN_2_HIGH - twos * LN_2_LOW;
  // |rest| <= 0.35: the first term left out is below 1e-18.
  let series = 0;
  for (let n = 15; n > 0; n--) series = (1 + series) * (rest / n);
  let value = 1 + series;
  for (let i = 0; i < twos; i++) value *= 2;
  for (let i = 0; i > twos; i--) value *= 0.5;
  return value;
}
