/**
 * The reader behind both entry points: text in pieces, a record at the end. Holds the unfinished line and the numbers,
 * never the text.
 * @module
 */
import { describe, InputError, type InputErrorCode } from '@staithe/core';
import Papa from 'papaparse';
import { gapRuns } from '../gaps.js';
import type { GaugeRecord, ReadOptions } from '../record.js';
import { assembleSeries } from './assemble.js';
import { looksLikeDate } from './clock.js';
import type { Line } from './layout.js';
import { findLayout, placeOf } from './layout.js';
import { type RowReader, rowReader } from './rows.js';
import { sampleCollector } from './samples.js';
import { warningList } from './warnings.js';

/** Longest line, in characters. */
const LONGEST_LINE = 1000000;

export interface Reader {
  /** Takes a piece of text that may end anywhere; large pieces are best cut to some 64 k characters. */
  readonly take: (text: string) => void;
  readonly finish: () => GaugeRecord;
  readonly lines: () => number;
}

function isSkipped(text: string): boolean {
  return text.trim() === '' || text.trimStart().startsWith('#');
}

function findDelimiter(text: string): string {
  const bare = text.replace(/"[^"]*"/g, '');
  if (bare.includes('\t')) return '\t';
  return bare.includes(';') ? ';' : ',';
}

function isChoice(value: unknown, path: string, choices: readonly string[]): void {
  if (value === undefined || (typeof value === 'string' && choices.includes(value))) return;
  const expected = `expected ${choices.join(', ')}`;
  throw new InputError('UNKNOWN_CHOICE', path, `${expected}, got ${describe(value)}`);
}

/** Refuses options that name no choice there is. */
function checkOptions(options: ReadOptions): void {
  isChoice(options.whenTwice, 'options.whenTwice', ['refuse', 'first', 'second', 'by-order']);
  isChoice(options.onConflict, 'options.onConflict', ['refuse', 'first']);
  isChoice(options.onDisorder, 'options.onDisorder', ['refuse', 'sort']);
  isChoice(options.dateOrder, 'options.dateOrder', ['day-first', 'month-first']);
  isChoice(options.delimiter, 'options.delimiter', [',', ';', '\t']);
}

/** Makes a reader. */
export function gaugeReader(options: ReadOptions): Reader {
  checkOptions(options);
  const warnings = warningList();
  const collector = sampleCollector(options, warnings);
  let delimiter: string = options.delimiter ?? ',';
  let carry = '';
  let line = 0; // lines read so far
  let begun = false;
  let header: Line | undefined;
  let rows: RowReader | undefined;

  const refuse = (code: InputErrorCode, path: string, text: string): never => {
    throw new InputError(code, path, text);
  };
  const split = (block: string, lines: number): string[][] => {
    if (block === '') return [['']]; // the library gives no row for it
    const cells = Papa.parse(block, { delimiter, newline: '\n', skipEmptyLines: false }).data;
    if (cells.length !== lines) {
      const odd = block.split('\n').findIndex((one) => one.split('"').length % 2 === 0);
      const expected = 'expected quotes closed on their line, got an open one';
      refuse('UNKNOWN_LAYOUT', placeOf(line + 1 + Math.max(odd, 0)), expected);
    }
    return cells;
  };
  /** The lines before the data; true once the layout is known. */
  const open = (text: string): boolean => {
    const number = line + 1;
    if (options.headerLine !== undefined && number < options.headerLine) return false;
    if (isSkipped(text)) return false;
    if (!header) delimiter = options.delimiter ?? findDelimiter(text);
    const cells = split(text, 1)[0] as string[];
    const entry = { number, text, cells };
    if (!header && !cells.some(looksLikeDate)) {
      header = entry;
      return false;
    }
    if (!header && cells.length === 1) {
      const got = describe(text);
      refuse(
        'UNKNOWN_LAYOUT',
        `line ${number}`,
        `expected columns apart by , ; or tab, got ${got}`,
      );
    }
    const layout = findLayout(header, entry, options);
    rows = rowReader(layout, options, delimiter !== ',', warnings, collector);
    return true;
  };
  const readBlock = (block: string, lines: number): void => {
    const reader = rows as RowReader;
    const cells = split(block, lines);
    for (let i = 0; i < cells.length; i++) {
      const row = cells[i] as string[];
      line++;
      const first = (row[0] as string).trimStart();
      if (first.startsWith('#') || (first === '' && row.every((cell) => cell.trim() === ''))) {
        continue;
      }
      reader.read(row, line);
    }
  };
  /** Whole lines, apart by \n. */
  const takeLines = (text: string): void => {
    let rest = text;
    while (!rows) {
      const end = rest.indexOf('\n');
      const one = end < 0 ? rest : rest.slice(0, end);
      if (open(one)) break;
      line++;
      if (end < 0) return;
      rest = rest.slice(end + 1);
    }
    let lines = 1;
    for (let at = rest.indexOf('\n'); at >= 0; at = rest.indexOf('\n', at + 1)) lines++;
    readBlock(rest, lines);
  };

  return {
    take(piece) {
      let text = carry + piece;
      if (!begun && text.length > 0) {
        begun = true;
        if (text.charCodeAt(0) === 0xfeff) text = text.slice(1);
      }
      const openReturn = text.endsWith('\r'); // its \n may come with the next piece
      if (text.includes('\r')) {
        const whole = openReturn ? text.slice(0, -1) : text;
        text = whole.replace(/\r\n?/g, '\n') + (openReturn ? '\r' : '');
      }
      const end = text.lastIndexOf('\n');
      carry = text.slice(end + 1);
      if (end >= 0) takeLines(text.slice(0, end));
      if (carry.length > LONGEST_LINE) {
        const expected = `expected at most ${LONGEST_LINE} characters, got more`;
        refuse('LINE_TOO_LONG', placeOf(line + 1), expected);
      }
    },
    finish() {
      const last = carry.endsWith('\r') ? carry.slice(0, -1) : carry;
      carry = '';
      if (last !== '') takeLines(last);
      if (!rows) {
        const path = header ? placeOf(header.number) : 'text';
        const got = header ? 'a header and nothing below it' : 'nothing';
        return refuse('EMPTY_INPUT', path, `expected a header and lines of data, got ${got}`);
      }
      const { layout, zoneName } = rows;
      const samples = collector.finish();
      if (samples.times.length() === 0) {
        return refuse('EMPTY_INPUT', 'text', 'expected samples, got a day without any');
      }
      const { series, step } = assembleSeries(samples, warnings);
      const flags = new Uint8Array(series.values.length).fill(2);
      series.values.forEach((value, i) => {
        if (Number.isNaN(value)) flags[i] = 9;
      });
      return {
        series,
        flags,
        reasons: gapRuns(series),
        unit: layout.unit,
        timeZone: zoneName(),
        ...(layout.datum === undefined ? {} : { datum: layout.datum }),
        ...(step === undefined ? {} : { step }),
        warnings: warnings.list(),
      };
    },
    lines: () => line,
  };
}
