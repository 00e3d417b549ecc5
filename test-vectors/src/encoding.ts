/**
 * Long columns are kept as integers of 16 bits, little-endian, in base64: small files that any language can read.
 * @module
 */

/**
 * Reads integers of 16 bits, little-endian, from base64.
 *
 * @param text - Base64, in one piece or in lines whose lengths are multiples of 4.
 * @returns A new array.
 * @public
 */
export function decodeInt16(text: string | readonly string[]): Int16Array {
  const bytes = Buffer.from(typeof text === 'string' ? text : text.join(''), 'base64');
  const integers = new Int16Array(bytes.length >> 1);
  for (let i = 0; i < integers.length; i++) integers[i] = bytes.readInt16LE(2 * i);
  return integers;
}
