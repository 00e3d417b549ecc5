/**
 * The records as text: one row a sample, the zone and the unit in the header, no row where there is no value.
 * @module
 */

/**
 * @param {string} header
 * @param {Float64Array} values
 * @param {{ start: number, step: number, digits: number }} layout
 */
export function toCsv(header, values, { start, step, digits }) {
  const rows = [header];
  values.forEach((value, i) => {
    if (Number.isNaN(value)) return;
    const minute = new Date(start + i * step).toISOString().slice(0, 16).replace('T', ' ');
    rows.push(`${minute},${value.toFixed(digits)}`);
  });
  return `${rows.join('\n')}\n`;
}
