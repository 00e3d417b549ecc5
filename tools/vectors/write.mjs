/**
 * Writing check values: tidy JSON under test-vectors/<kind>/, tables read from CSV, integer columns as base64.
 */
import { createHash } from 'node:crypto';
import { mkdirSync, readFileSync, writeFileSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';

const OUT = join(dirname(fileURLToPath(import.meta.url)), '..', '..', 'test-vectors');
const WIDTH = 118;
const BASE64_WIDTH = 116;

/** JSON where what fits on a line stands on one. */
function tidy(value, indent = '') {
  const flat = JSON.stringify(value, null, 1)?.replace(/\n\s*/g, ' ');
  if (value === null || typeof value !== 'object' || flat.length + indent.length < WIDTH) {
    return flat;
  }
  const inner = `${indent} `;
  const list = Array.isArray(value);
  const lines = list
    ? value.map((item) => inner + tidy(item, inner))
    : Object.entries(value)
        .filter(([, item]) => item !== undefined)
        .map(([key, item]) => `${inner}${JSON.stringify(key)}: ${tidy(item, inner)}`);
  return `${list ? '[' : '{'}\n${lines.join(',\n')}\n${indent}${list ? ']' : '}'}`;
}

/** Writes one vector to its place. */
export function writeVector(vector) {
  const folder = join(OUT, vector.kind);
  mkdirSync(folder, { recursive: true });
  const text = `${tidy(vector)}\n`;
  writeFileSync(join(folder, `${vector.id}.json`), text);
  console.log(`${vector.kind}/${vector.id}: ${(text.length / 1024).toFixed(0)} KiB`);
}

/** The SHA-256 of a file, hexadecimal. */
export function sha256(path) {
  return createHash('sha256').update(readFileSync(path)).digest('hex');
}

/** Reads a CSV table without quotes; lines that start with # are comments. Cells stay text. */
export function readTable(path) {
  const lines = readFileSync(path, 'utf8')
    .split(/\r?\n/)
    .filter((line) => line !== '' && !line.startsWith('#'));
  const names = lines[0].split(',');
  return lines.slice(1).map((line) => {
    const cells = line.split(',');
    return Object.fromEntries(names.map((name, i) => [name, cells[i] ?? '']));
  });
}

/** Integers of 16 bits, little-endian, as base64 in lines. Refuses what does not fit. */
export function encodeInt16(integers) {
  const bytes = Buffer.alloc(integers.length * 2);
  integers.forEach((integer, i) => {
    if (!Number.isInteger(integer)) throw new Error(`[${i}]: expected an integer, got ${integer}`);
    bytes.writeInt16LE(integer, i * 2);
  });
  return bytes.toString('base64').match(new RegExp(`.{1,${BASE64_WIDTH}}`, 'g'));
}

/** A decimal text as a whole number of units of 10^-decimals, exactly. */
export function scaled(text, decimals) {
  const number = Number(text) * 10 ** decimals;
  const integer = Math.round(number);
  if (text.trim() === '' || Math.abs(number - integer) > 1e-6) {
    throw new Error(`expected ${decimals} decimals, got ${text}`);
  }
  return integer + 0;
}
