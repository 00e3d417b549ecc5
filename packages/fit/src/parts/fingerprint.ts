/**
 * A fingerprint of plain data: FNV-1a (G. Fowler, L. Noll and K.-P. Vo) of its JSON with keys in order, twice 32 bits.
 * @module
 */

/** JSON with the keys of objects in order, so that equal data give equal text. */
function canonical(value: unknown): string {
  if (Array.isArray(value)) return `[${value.map(canonical).join()}]`;
  if (typeof value !== 'object' || value === null) return JSON.stringify(value) ?? 'null';
  const entries = Object.entries(value).filter(([, inner]) => inner !== undefined);
  const sorted = entries.sort(([a], [b]) => (a < b ? -1 : 1));
  return `{${sorted.map(([key, inner]) => `${JSON.stringify(key)}:${canonical(inner)}`).join()}}`;
}

const PRIME = 0x01000193;
const BASIS = 0x811c9dc5;

function fnv(text: string, start: number): string {
  let hash = start;
  for (let i = 0; i < text.length; i++) hash = Math.imul(hash ^ text.charCodeAt(i), PRIME);
  return (hash >>> 0).toString(16).padStart(8, '0');
}

/** Sixteen hexadecimal digits. */
export function fingerprintOf(value: unknown): string {
  const text = canonical(value);
  return fnv(text, BASIS) + fnv(text, BASIS ^ text.length);
}
