/**
 * Cells and lines of CSV.
 *
 * Source of the form: RFC 4180 (quotes), with `\n` between lines.
 * @module
 */

const quoted = (cell: string): string =>
  /[",\n\r]/.test(cell) ? `"${cell.replaceAll('"', '""')}"` : cell;

/** Rows as text, the last closed as well. */
export const csvLines = (rows: readonly (readonly string[])[]): string =>
  `${rows.map((cells) => cells.map(quoted).join(',')).join('\n')}\n`;

/** A number with an ASCII minus; what is missing is an empty cell; minus zero is zero. */
export const numberCell = (value: number | undefined, decimals: number): string =>
  value === undefined || Number.isNaN(value)
    ? ''
    : (Number(value.toFixed(decimals)) + 0).toFixed(decimals);
