/**
 * A comparison of two sets of constants as CSV for programs.
 * @module
 */
import type { ConstantsComparison } from '@staithe/fit';
import { csvLines, numberCell } from './internal/cells.js';
import { cleanText } from './internal/text.js';

const HEAD = [
  'line',
  'H_first_m',
  'H_second_m',
  'H_change_m',
  'G_first_deg',
  'G_second_deg',
  'G_change_deg',
  'apart_m',
  'apart_sigma_m',
  'disc95_m',
  'errors_from',
  'beyond_errors',
];

/**
 * The rows of a comparison as CSV, the largest distance first.
 *
 * @param comparison - Of `compareConstants`.
 * @returns A header that names quantity and unit, and a line for each constituent that both sets have.
 * @example
 * comparisonCsv(compareConstants(constants, constants)).split('\n')[1]; // 'M2,1.500000,1.500000,0.000000,140.0000,140.0000,0.0000,0.000000,,,neither,'
 * @public
 */
export function comparisonCsv(comparison: ConstantsComparison): string {
  const rows = comparison.rows.map((row) => [
    cleanText(row.name, 24),
    numberCell(row.first.amplitude, 6),
    numberCell(row.second.amplitude, 6),
    numberCell(row.amplitudeChange, 6),
    numberCell(row.first.phaseLag, 4),
    numberCell(row.second.phaseLag, 4),
    numberCell(row.phaseLagChange, 4),
    numberCell(row.distance, 6),
    numberCell(row.sigma, 6),
    numberCell(row.radius95, 6),
    row.errorsFrom,
    row.exceeds === undefined ? '' : String(row.exceeds),
  ]);
  return csvLines([HEAD, ...rows]);
}
