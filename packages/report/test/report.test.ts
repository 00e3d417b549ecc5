/** The page: seven questions, sentences that follow the data, nothing from outside. */
import { DAY, HOUR } from '@staithe/core';
import { tideCurve } from '@staithe/predict';
import { describe, expect, test } from 'vitest';
import { caution, type ReportInput, reportHtml } from '../src/index.js';
import { inventedConstants, inventedRecord, inventedRungs } from './invented.js';
import { all, type Node, parse, withClass } from './parse.js';

const constants = inventedConstants();
const curve = tideCurve(constants);
const record = inventedRecord();
const span = { from: Date.parse('2031-05-30T00:00Z'), to: Date.parse('2031-07-03T00:00Z') };
const windows = { list: curve.windows({ above: 4 }, span), above: 4, ...span };
const full: ReportInput = {
  place: { name: 'Quenby Haven', latitude: 47.2, longitude: -9.3 },
  datum: 'chart datum',
  timeZone: 'Europe/Lisbon',
  record: { series: record.series, runs: record.runs, steps: record.steps },
  fit: { constants, residuals: record.residuals, diagnostics: record.diagnostics },
  turningPoints: curve.turningPoints(span),
  month: '2031-06',
  weekHeights: curve.heights({ start: '2031-06-01T00:00Z', step: HOUR / 2, count: 48 * 7 }),
  windows,
  levels: inventedRungs(),
  generatedFrom: { program: 'staithe 0.1.0', file: 'quenby.csv', sha256: 'ab'.repeat(32) },
};
const bare: ReportInput = {
  place: { name: 'Quenby Haven' },
  datum: 'chart datum',
  timeZone: 'UTC',
  fit: { constants },
  turningPoints: [],
  generatedFrom: { program: 'staithe 0.1.0' },
};
const html = reportHtml(full);
const root = parse(html);
const sections = all(root, 'section');
const sentences = (page: Node): string[] =>
  all(all(page, 'section')[0] as Node, 'li').map(({ text }) => text);

test('seven questions in order', () => {
  expect(all(root, 'h2').map(({ text }) => text)).toEqual([
    '1What can I rely on?',
    '2What was wrong with the record?',
    '3What does the tide do here?',
    '4What is not tide?',
    '5When can I enter?',
    '6Which levels, and how sure?',
    '7Where does each number come from?',
  ]);
});

test('the caution stands under 1, 5 and 6', () => {
  const boxes = sections.map((section) =>
    withClass(all(section, 'p'), 'caution').map(({ text }) => text),
  );
  expect(boxes).toEqual([
    [caution('heights')],
    [],
    [],
    [],
    [caution('windows')],
    [caution('levels')],
    [],
  ]);
});

describe('a resistant fit', () => {
  const weights = new Float64Array(record.series.values.length).fill(1);
  weights.set([0.2, 0], 480);
  const resistant = {
    ...{ curve: 'biweight' as const, cutoff: 8, scale: 0.0213 },
    ...{ weights, doubted: 2, setAside: 1 },
  };
  const pageOf = (more: Partial<ReportInput['fit']>): Node =>
    parse(reportHtml({ ...full, fit: { ...full.fit, ...more } }));
  const page = pageOf({ resistant, errorModel: 'redrawn' });
  const answer = (node: Node, question: number): string =>
    (all(node, 'section')[question - 1] as Node).text;

  test('says what it doubted, marks it, and where the weights come from', () => {
    expect(answer(page, 2)).toContain(
      'The fit gave 2 samples less than half weight, 1 of them none.',
    );
    for (const picture of all(all(page, 'section')[1] as Node, 'svg')) {
      expect(picture.text).toContain('less than half weight in the fit: 2 samples');
      expect(withClass(all(picture, 'circle'), 'line-reject').length).toBeGreaterThan(1);
    }
    expect(answer(page, 7)).toContain(
      'resistant (biweight): falling to none at 8 scales of 21.3 mm',
    );
    expect(answer(page, 7)).toContain('the fit repeated on what is not tide, redrawn');
  });
  test('that doubted nothing says so; huber falls beyond its cutoff', () => {
    const calm = { ...resistant, curve: 'huber' as const, cutoff: 1.345, doubted: 0, setAside: 0 };
    const other = pageOf({ resistant: { ...calm, weights: weights.map(() => 1) } });
    expect(answer(other, 2)).toContain('The fit gave no sample less than half weight.');
    expect(answer(other, 7)).toContain('resistant (huber): falling beyond 1.345 scales');
  });
  test('is not spoken of where all samples weigh alike', () => {
    for (const question of [2, 7]) expect(answer(root, question)).not.toContain('weight');
    expect(answer(root, 7)).toContain('the noise beside each line in the spectrum');
  });
  test('of another record is refused', () => {
    expect(() => pageOf({ resistant: { ...resistant, weights: weights.slice(1) } })).toThrow(
      expect.objectContaining({ code: 'LENGTH_MISMATCH', path: 'weights' }),
    );
  });
});

test('a fit without the worst of its residual tells the rest', () => {
  const { rms } = record.diagnostics.residual;
  const diagnostics = { ...record.diagnostics, residual: { rms } };
  const page = parse(reportHtml({ ...full, fit: { ...full.fit, diagnostics } }));
  expect(sentences(page)[2]).toContain('What is not tide is 81 mm typically (root mean square): ');
  expect((all(page, 'section')[3] as Node).text).toContain(
    'What is left after the tide is 81 mm (root mean square). ',
  );
});

test('no script, no handler, no address outside, no import', () => {
  expect(all(root, 'script')).toHaveLength(0);
  expect(html).not.toMatch(
    /\son\w+=|javascript:|@import|url\(|<(link|iframe|object|embed|img|base)\b/i,
  );
  const addresses = html.match(/https?:\/\/[^"'\s<]+/g) ?? [];
  expect(new Set(addresses)).toEqual(new Set(['http://www.w3.org/2000/svg'])); // the name of the SVG namespace
  for (const { attributes } of all(root, 'a'))
    expect(attributes['href']).toMatch(/^#question-[1-7]$/);
  const policy = all(root, 'meta').find(({ attributes }) => attributes['http-equiv']);
  expect(policy?.attributes['content']).toBe("default-src 'none'; style-src 'unsafe-inline'");
});

test('each picture is there for a wide and for a narrow page, and links lead somewhere', () => {
  for (const figure of all(root, 'figure')) {
    const widths = all(figure, 'svg').map(({ attributes }) => attributes['width']);
    expect(widths).toEqual(['760', '360']);
  }
  expect(all(root, 'figure')).toHaveLength(6);
  const ids = html.match(/\sid="[^"]+"/g) ?? [];
  expect(new Set(ids).size).toBe(ids.length);
});

describe('the five sentences follow the data', () => {
  test('with everything', () => {
    const [samples, lines, rest, open, levels] = sentences(root) as [
      string,
      string,
      string,
      string,
      string,
    ];
    const missing = record.series.values.filter((v) => Number.isNaN(v)).length;
    expect(samples).toContain(
      `${(record.series.values.length - missing).toString().replace(/(\d{3})$/, '\u00a0$1')} of`,
    );
    expect(samples).toContain(
      `${record.runs.filter(({ flag }) => flag === 3).length} runs of samples are flagged doubtful`,
    );
    expect(samples).toContain(`${record.runs.filter(({ flag }) => flag === 4).length} rejected`);
    expect(lines).toContain('27 constituents is M2 with 1482 mm within 6.0 mm');
    expect(lines).toContain('19 firm, 5 faint, 3 borrowed');
    expect(rest).toContain('81 mm typically');
    expect(rest).toContain('402 mm at its worst, on 3 Feb 2030 04:10 UTC+00:00');
    expect(open).toContain(`in ${windows.list.length} windows`);
    expect(levels).toContain(
      '8 levels are given, from LAT at −0.06 m to HAT at 5.21 m above chart datum',
    );
  });
  test('other data, other sentences', () => {
    const page = parse(
      reportHtml({
        ...full,
        windows: { ...windows, list: [] },
        limits: {
          HAT: { height: 6.5, time: Date.UTC(2033, 2, 12) },
          LAT: { height: -1, time: Date.UTC(2034, 2, 12) },
          from: Date.UTC(2030, 0, 1),
          to: Date.UTC(2049, 0, 1),
        },
      }),
    );
    expect(sentences(page)[3]).toContain('higher than 4.00 m above chart datum at no time');
    expect(sentences(page)[4]).toContain(
      'stays between −1.00 m (12 Mar 2034) and 6.50 m (12 Mar 2033)',
    );
  });
  test('what was not given is named, five sentences all the same', () => {
    const page = parse(reportHtml(bare));
    expect(sentences(page)).toHaveLength(5);
    expect(sentences(page)[0]).toContain('No record was given');
    expect(sentences(page)[2]).toContain('without its diagnostics');
    expect(page.text).toContain('No levels were worked out');
    expect(page.text).toContain('there is no month of tides');
  });
});

test('every number has its provenance', () => {
  const rows = all(sections[6] as Node, 'tr').map((row) => row.children.map(({ text }) => text));
  const of = (name: string): string | undefined => rows.find(([first]) => first === name)?.[1];
  expect(of('Source')).toBe(`quenby.csvSHA-256 ${'ab'.repeat(32)}`);
  expect(of('Models')).toContain('IERS Conventions (2010)');
  expect(of('Models')).toContain('running continuously');
  expect(of('Borrowed lines')).toContain('K2 from S2');
  expect(of('95 % discs')).toContain('spectrum');
  expect(of('MHHW')).toBe('4.20 m ± 0.02: 705 tides');
  expect(of('MLW')).toBe('missing: low waters below the sill are cut off');
  expect(of('Made by')).toBe('staithe 0.1.0');
});

test('the faults are counted by reason, worst figure with its limit', () => {
  const rows = all(sections[1] as Node, 'tr').map((row) => row.children.map(({ text }) => text));
  expect(rows).toContainEqual([
    'flat line',
    'rejected',
    '1',
    '2.1 d',
    '2.1 d (allowed 6 h 00 min)',
  ]);
  expect(rows).toContainEqual([
    'climatology',
    'doubtful',
    '1',
    '19 h 42 min',
    '5.90 m (allowed −0.50 m to 5.60 m)',
  ]);
});

test('the month defaults to that of the first turning point, in the zone', () => {
  const turningPoints = curve.turningPoints({ from: '2031-05-31T23:00Z', to: '2031-07-01T00:00Z' });
  expect(reportHtml({ ...full, month: undefined, turningPoints })).toContain(
    'Quenby Haven, June 2031',
  );
});

test('a page is plain data in, text out: the same twice, input untouched', () => {
  const copy = structuredClone(full);
  expect(reportHtml(copy)).toBe(html);
  expect(copy).toEqual(full);
});

test.each([
  ['WRONG_TYPE', 'place.name', { place: {} as { name: string } }],
  ['MISSING', 'datum', { datum: '' }],
  ['BAD_TIME', 'month', { month: '2031-6' }],
  ['UNKNOWN_CHOICE', 'timeZone', { timeZone: 'Europe/Quenby' }],
])('%s at %s', (code, path, change) => {
  expect(() => reportHtml({ ...full, ...change })).toThrow(expect.objectContaining({ code, path }));
});

test('a page of thirteen months stays below 1.5 MB', () => {
  expect((record.diagnostics.to - record.diagnostics.from) / DAY).toBe(395);
  expect(html.length).toBeLessThan(1.5e6);
});
