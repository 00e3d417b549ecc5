/**
 * Text of others (file names, places, columns) made safe for a terminal, in the one place that all output passes.
 * @module
 */

// Control codes but tab and line feed, and the marks that turn the reading direction.
const UNSAFE =
  // eslint-disable-next-line no-control-regex -- control codes are what is looked for
  /[\u0000-\u0008\u000b-\u001f\u007f-\u009f\u061c\u200e\u200f\u2028-\u202e\u2066-\u2069\ufeff]/g;

/** Every unsafe character as the escape that JSON has for it. */
export function printable(text: string): string {
  return text.replace(UNSAFE, (c) => `\\u${c.charCodeAt(0).toString(16).padStart(4, '0')}`);
}

/** The same on one line: for messages and the names in them. */
export function onOneLine(text: string): string {
  return printable(text.replace(/[\t\n\r]+/g, ' '));
}

/** JSON that a terminal can take as it is: what is not safe in a string is escaped there. NaN must not occur. */
export function jsonText(value: unknown): string {
  return `${printable(JSON.stringify(value, null, 2))}\n`;
}
