/** Names with HTML, XML or terminal codes in them never reach a page, a picture, a table or a file raw. */
import { HOUR, type InputError, uniformSeries } from '@staithe/core';
import { describe, expect, test } from 'vitest';
import {
  constantsCsv,
  constantsText,
  currentsText,
  dialsSvg,
  ellipsesSvg,
  foldedRecordSvg,
  levelsLadderSvg,
  levelsText,
  monthSvg,
  monthText,
  type ReportInput,
  reportHtml,
  residualRasterSvg,
  weekSvg,
  windowsText,
} from '../src/index.js';
import { inventedConstants, inventedRecord } from './invented.js';
import { all, parse } from './parse.js';

const ESC = '\u001b';
const HOSTILE =
  `<script>alert(1)</script>]]>&amp;"'--><img src=x onerror=y>` +
  `${ESC}[31mred${ESC}[0m${ESC}]0;title\u0007\u009b2J\u0000\u0008\r\n\u202egnp\u2066\ud800\ufffe end`;
const series = uniformSeries({ start: '2031-06-01T00:00Z', step: HOUR, values: [1, 2, 3, 2, 1] });
const at = Date.UTC(2031, 5, 1, 2);
const turningPoints = [{ kind: 'high' as const, time: at, height: 3 }];
const windows = [{ from: at, to: at + HOUR, openStart: false, openEnd: false }];
const run = { from: at, to: at, flag: 4, reason: HOSTILE };
const constants = { ...inventedConstants(), place: { name: HOSTILE }, source: HOSTILE };
const rungs = [
  { name: HOSTILE, height: 1, grounds: HOSTILE },
  { name: 'MSL', height: 0 },
  { name: HOSTILE, missing: HOSTILE },
];
const month = { place: HOSTILE, turningPoints, month: '2031-06', timeZone: 'UTC', datum: HOSTILE };
const sky = [{ date: '2031-06-01', note: HOSTILE }];
const leftOver = [{ speed: 57.968, amplitude: 0.009, likely: HOSTILE }];
const { diagnostics } = inventedRecord(20);
const candidates = [{ name: HOSTILE, decision: 'left' as const, reason: HOSTILE }];
const report: ReportInput = {
  place: { name: HOSTILE, latitude: 1, longitude: 2 },
  datum: HOSTILE,
  timeZone: 'UTC',
  record: { series, runs: [run], steps: [{ at, change: 0.1 }], findings: [HOSTILE] },
  fit: {
    constants,
    diagnostics: { ...diagnostics, candidates },
    residuals: series,
    warnings: [{ message: HOSTILE }],
    leftOver,
  },
  turningPoints,
  weekHeights: series,
  windows: { list: windows, above: 2, from: at, to: at + HOUR },
  levels: rungs,
  sky,
  generatedFrom: { program: HOSTILE, file: HOSTILE, sha256: HOSTILE },
};

const currents = {
  constants: { mean: { east: 0.1, north: 0.2 }, place: { name: HOSTILE } },
  ellipses: [
    {
      ...{ name: 'M2', major: 1, minor: 0.1, turning: 'left' as const, bearing: 20, phaseLag: 30 },
      ...{ standing: 'borrowed' as const, borrowedFrom: HOSTILE },
    },
  ],
  diagnostics: { candidates },
};

const MARKUP: Record<string, () => string> = {
  foldedRecordSvg: () => foldedRecordSvg({ series, runs: [run], title: HOSTILE }),
  foldedRecordSvgNarrow: () =>
    foldedRecordSvg({ series, runs: [run], title: HOSTILE }, { width: 360 }),
  dialsSvg: () => dialsSvg(constants, { title: HOSTILE }),
  dialsSvgOfPlace: () => dialsSvg(constants),
  ellipsesSvg: () => ellipsesSvg(currents, { title: HOSTILE }),
  ellipsesSvgOfPlace: () => ellipsesSvg(currents),
  residualRasterSvg: () => residualRasterSvg({ residuals: series, leftOver, title: HOSTILE }),
  weekSvg: () =>
    weekSvg({
      heights: series,
      turningPoints,
      windows,
      timeZone: 'UTC',
      datum: HOSTILE,
      title: HOSTILE,
    }),
  monthSvg: () => monthSvg({ ...month, sky }),
  levelsLadderSvg: () => levelsLadderSvg({ rungs, datum: HOSTILE, title: HOSTILE }),
  reportHtml: () => reportHtml(report),
};
const TEXT: Record<string, () => string> = {
  constantsText: () => constantsText(constants, { candidates }),
  constantsCsv: () => constantsCsv(constants),
  currentsText: () => currentsText(currents),
  monthText: () => monthText({ ...month, sky }),
  levelsText: () => levelsText({ rungs, datum: HOSTILE }),
  windowsText: () =>
    windowsText({ place: HOSTILE, windows, above: 2, timeZone: 'UTC', datum: HOSTILE }),
};

const UNSAFE =
  // eslint-disable-next-line no-control-regex -- control codes are what is looked for
  /[\u0000-\u0009\u000b-\u001f\u007f-\u009f\u202a-\u202e\u2066-\u2069\ufffe\uffff]|\p{Surrogate}/u;

describe('markup', () => {
  for (const [name, make] of Object.entries(MARKUP)) {
    test(`${name} stays well-formed and holds the hostile name as text only`, () => {
      const markup = make();
      const root = parse(markup);
      expect(all(root, 'script')).toHaveLength(0);
      expect(all(root, 'img')).toHaveLength(0);
      expect(root.text).toContain('<script>alert(1)</script>]]>&amp;');
      expect(markup).not.toMatch(/<script|<img|\]\]>&(?!amp;|gt;)/);
      expect(markup).not.toMatch(UNSAFE);
      expect(root.text).not.toMatch(/\[31m|\]0;title|2J/);
    });
  }
});

describe('text', () => {
  for (const [name, make] of Object.entries(TEXT)) {
    test(`${name} holds no control code`, () => {
      const text = make();
      expect(text).not.toMatch(UNSAFE);
      expect(text).not.toMatch(/\[31m|\]0;title|2J/);
    });
  }
});

test('a hostile name of a constituent is refused before it is shown', () => {
  const [first] = inventedConstants().constituents;
  const bad = {
    ...inventedConstants(),
    constituents: [{ ...first, name: `M2${ESC}[2J<b>`, amplitude: 1, phaseLag: 0 }],
  };
  for (const show of [constantsText, constantsCsv, dialsSvg]) {
    try {
      show(bad);
      expect.unreachable();
    } catch (error) {
      expect((error as InputError).name).toBe('InputError');
      expect((error as InputError).message).not.toMatch(UNSAFE);
    }
  }
});

test('a hostile zone is refused with an escaped message', () => {
  try {
    monthText({ ...month, place: 'a', datum: 'b', timeZone: `Mars/${ESC}[31m` });
    expect.unreachable();
  } catch (error) {
    expect((error as InputError).code).toBe('UNKNOWN_CHOICE');
    expect((error as InputError).path).toBe('timeZone');
    expect((error as InputError).message).not.toMatch(UNSAFE);
  }
});
