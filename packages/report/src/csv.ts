/**
 * CSV for programs: headers name quantity and unit, numbers have an ASCII minus, instants are UTC. No comment lines: place,
 * datum and models belong in metadata beside the file.
 * @module
 */
import {
  describe,
  formatInstant,
  type HarmonicConstants,
  InputError,
  MINUTE,
  type Series,
  seriesTimes,
} from '@staithe/core';
import type { TideWindow, TurningPoint } from '@staithe/predict';
import { csvLines, numberCell } from './internal/cells.js';
import { groundsOf, groupBySpecies } from './internal/species.js';
import { cleanText } from './internal/text.js';

/**
 * The constants as CSV, grouped by species, largest first.
 *
 * @param constants - The document.
 * @returns `line,returns_every_h,H_m,G_deg,disc95_m,grounds` and a line each; `disc95_m` is empty where it is not known.
 * @throws InputError of `parseConstants` and `constituent`.
 * @example
 * constantsCsv(constants).split('\n')[0]; // 'line,returns_every_h,H_m,G_deg,disc95_m,grounds'
 * @public
 */
export function constantsCsv(constants: HarmonicConstants): string {
  const rows = groupBySpecies(constants).flatMap((group) =>
    group.lines.map(({ own, period }) => [
      cleanText(own.name),
      numberCell(period, 7),
      numberCell(own.amplitude, 6),
      numberCell(own.phaseLag, 4),
      numberCell(own.radius95, 6),
      cleanText(groundsOf(own)),
    ]),
  );
  return csvLines([['line', 'returns_every_h', 'H_m', 'G_deg', 'disc95_m', 'grounds'], ...rows]);
}

/** The 95 % band of heights, metres; as long as the series. @public */
export interface HeightBand {
  readonly low: ArrayLike<number>;
  readonly high: ArrayLike<number>;
}

/**
 * Heights as CSV.
 *
 * @param series - Metres; NaN becomes an empty cell.
 * @param band - The 95 % band; without it the file has no columns for it.
 * @returns `instant_utc,height_m` (and `,band95_low_m,band95_high_m`) and a line each, to 0.1 mm.
 * @throws InputError `LENGTH_MISMATCH`, paths `band.low` and `band.high`.
 * @example
 * heightsCsv(uniformSeries({ start: '2031-06-01T00:00Z', step: HOUR, values: [1.5] })); // 'instant_utc,height_m\n2031-06-01T00:00Z,1.5000\n'
 * @public
 */
export function heightsCsv(series: Series, band?: HeightBand): string {
  const { values } = series;
  for (const side of ['low', 'high'] as const) {
    if (band === undefined || band[side].length === values.length) continue;
    throw new InputError(
      'LENGTH_MISMATCH',
      `band.${side}`,
      `expected ${values.length}, got ${describe(band[side].length)}`,
    );
  }
  const rows: string[][] = [
    ['instant_utc', 'height_m', ...(band ? ['band95_low_m', 'band95_high_m'] : [])],
  ];
  const times = seriesTimes(series);
  for (let i = 0; i < values.length; i++) {
    const row = [formatInstant(times[i] as number), numberCell(values[i], 4)];
    if (band) row.push(numberCell(band.low[i], 4), numberCell(band.high[i], 4));
    rows.push(row);
  }
  return csvLines(rows);
}

/**
 * High and low waters as CSV: at a high water the tide turns from rising.
 *
 * @param turningPoints - Metres above the datum.
 * @param options - `atSigma`: standard error of each time in milliseconds; without it the file has no column for it.
 * @returns `turning_at_utc,turns_from,height_m` (and `,at_sigma_s`) and a line each.
 * @throws InputError `LENGTH_MISMATCH`, path `options.atSigma`.
 * @example
 * turningPointsCsv([{ kind: 'high', time: 0, height: 3.1 }]); // 'turning_at_utc,turns_from,height_m\n1970-01-01T00:00Z,rising,3.1000\n'
 * @public
 */
export function turningPointsCsv(
  turningPoints: readonly TurningPoint[],
  options: { readonly atSigma?: ArrayLike<number> | undefined } = {},
): string {
  const { atSigma } = options;
  if (atSigma !== undefined && atSigma.length !== turningPoints.length) {
    throw new InputError(
      'LENGTH_MISMATCH',
      'options.atSigma',
      `expected ${turningPoints.length}, got ${atSigma.length}`,
    );
  }
  const rows = turningPoints.map(({ kind, time, height }, i) => [
    formatInstant(time),
    kind === 'high' ? 'rising' : 'falling',
    numberCell(height, 4),
    ...(atSigma === undefined ? [] : [numberCell((atSigma[i] as number) / 1000, 1)]),
  ]);
  const head = [
    'turning_at_utc',
    'turns_from',
    'height_m',
    ...(atSigma === undefined ? [] : ['at_sigma_s']),
  ];
  return csvLines([head, ...rows]);
}

/**
 * Windows as CSV.
 *
 * @param windows - Of `findWindows`.
 * @returns `opens_at_utc,closes_at_utc,open_min,cut_at_start,cut_at_end` and a line each.
 * @example
 * windowsCsv([{ from: 0, to: 60000, openStart: true, openEnd: false }]).split('\n')[1]; // '1970-01-01T00:00Z,1970-01-01T00:01Z,1.0,true,false'
 * @public
 */
export function windowsCsv(windows: readonly TideWindow[]): string {
  const rows = windows.map(({ from, to, openStart, openEnd }) => [
    formatInstant(from),
    formatInstant(to),
    numberCell((to - from) / MINUTE, 1),
    String(openStart),
    String(openEnd),
  ]);
  return csvLines([
    ['opens_at_utc', 'closes_at_utc', 'open_min', 'cut_at_start', 'cut_at_end'],
    ...rows,
  ]);
}
