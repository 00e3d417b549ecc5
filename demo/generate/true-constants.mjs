/**
 * The harmonic constants that a perfect fit would find, so that height = f · H · cos(V + u - G): they follow from the response
 * and the table alone, with no record made or fitted.
 * @module
 */
import { combine, DOODSON_RATES } from './mean-longitudes.mjs';
import { lineAmplitude, RADIANS, responseAt } from './response.mjs';

// Main lines by their multipliers of tau, s, h, p, N', ps.
const ASTRONOMICAL = {
  Mm: [0, 1, 0, -1, 0, 0],
  Mf: [0, 2, 0, 0, 0, 0],
  '2Q1': [1, -3, 0, 2, 0, 0],
  Q1: [1, -2, 0, 1, 0, 0],
  RHO1: [1, -2, 2, -1, 0, 0],
  O1: [1, -1, 0, 0, 0, 0],
  P1: [1, 1, -2, 0, 0, 0],
  K1: [1, 1, 0, 0, 0, 0],
  J1: [1, 2, 0, -1, 0, 0],
  OO1: [1, 3, 0, 0, 0, 0],
  '2N2': [2, -2, 0, 2, 0, 0],
  MU2: [2, -2, 2, 0, 0, 0],
  N2: [2, -1, 0, 1, 0, 0],
  NU2: [2, -1, 2, -1, 0, 0],
  M2: [2, 0, 0, 0, 0, 0],
  L2: [2, 1, 0, -1, 0, 0],
  T2: [2, 2, -3, 0, 0, 1],
  S2: [2, 2, -2, 0, 0, 0],
  K2: [2, 2, 0, 0, 0, 0],
};
const SHALLOW = {
  MN4: [4, -1, 0, 1, 0, 0],
  M4: [4, 0, 0, 0, 0, 0],
  MS4: [4, 2, -2, 0, 0, 0],
  S4: [4, 4, -4, 0, 0, 0],
  '2MN6': [6, -1, 0, 1, 0, 0],
  M6: [6, 0, 0, 0, 0, 0],
  '2MS6': [6, 2, -2, 0, 0, 0],
  '2SM6': [6, 4, -4, 0, 0, 0],
};

const wrap = (degrees) => ((degrees % 360) + 360) % 360;
const round = (value, digits) => Number(value.toFixed(digits));
const difference = (a, b) => a.map((value, i) => value - b[i]);

function entry(name, kind, multipliers, amplitude, phaseLag) {
  return {
    name,
    kind,
    doodsonNumbers: multipliers,
    speed: round(combine(multipliers, DOODSON_RATES), 7),
    amplitude: round(amplitude, 6),
    phaseLag: round(wrap(phaseLag), 4),
  };
}

/** The complex amplitude at `multipliers` of the product of `order` semidiurnal signals: every way to reach that sum counts. */
function product(lines, multipliers, order) {
  if (order === 1) return lines.get(multipliers.join()) ?? { re: 0, im: 0 };
  const sum = { re: 0, im: 0 };
  for (const { own, re, im } of lines.values()) {
    const rest = product(lines, difference(multipliers, own), order - 1);
    sum.re += re * rest.re - im * rest.im;
    sum.im += re * rest.im + im * rest.re;
  }
  return sum;
}

/**
 * @returns {{ name: string, kind: string, doodsonNumbers: number[], speed: number, amplitude: number, phaseLag: number }[]}
 * Speed in degrees an hour, amplitude in metres, phaseLag the Greenwich phase lag in degrees.
 */
export function trueConstants(place, lines) {
  const table = new Map(lines.map((line) => [line.multipliers.join(), line]));
  const astronomical = Object.entries(ASTRONOMICAL).map(([name, multipliers]) => {
    const { gain, lag } = responseAt(place, multipliers);
    return entry(
      name,
      'astronomical',
      multipliers,
      Math.abs(table.get(multipliers.join()).amplitude) * gain,
      lag,
    );
  });
  const seasons = place.seasons.map(({ name, multiple, amplitude, phaseLag }) =>
    entry(name, 'meteorological', [0, 0, multiple, 0, 0, 0], amplitude, phaseLag),
  );
  const { square, squareLag, cube, cubeLag } = place.shallow;
  if (square === 0 && cube === 0) return [...seasons, ...astronomical];
  const semidiurnal = new Map(
    lines
      .filter(({ multipliers }) => multipliers[0] === 2)
      .map((line) => [
        line.multipliers.join(),
        { own: line.multipliers, ...lineAmplitude(place, line) },
      ]),
  );
  const shallow = Object.entries(SHALLOW).map(([name, multipliers]) => {
    const order = multipliers[0] / 2;
    const [size, lag] = order === 2 ? [square, squareLag] : [cube, cubeLag];
    const { re, im } = product(semidiurnal, multipliers, order);
    return entry(
      name,
      'compound',
      multipliers,
      size * Math.hypot(re, im),
      lag - Math.atan2(im, re) / RADIANS,
    );
  });
  return [...seasons, ...astronomical, ...shallow];
}
