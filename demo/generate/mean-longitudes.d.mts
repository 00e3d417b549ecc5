/** tau, s, h, p, N', ps in degrees, not wrapped. */
export function doodsonVariables(instant: number): number[];
/** Degrees an hour. */
export const DOODSON_RATES: readonly number[];
export function combine(multipliers: readonly number[], variables: readonly number[]): number;
