/** What the pictures show is where the numbers say. */
import { DAY, HOUR, uniformSeries } from '@staithe/core';
import { tideCurve } from '@staithe/predict';
import { describe, expect, test } from 'vitest';
import {
  dialsSvg,
  foldedRecordSvg,
  levelsLadderSvg,
  monthSvg,
  residualRasterSvg,
  weekSvg,
} from '../src/index.js';
import { diurnalConstants, inventedConstants, inventedRecord, inventedRungs } from './invented.js';
import { all, expectNear, type Node, number, parse, withClass } from './parse.js';

const PIXEL = 0.02; // coordinates are written to a hundredth
const TENTH = 0.05; // pixels
const SHARE = 1e-3; // a ratio of lengths of 80 pixels or more, each written to a hundredth

const texts = (root: Node): string[] => all(root, 'text').map(({ text }) => text);
const constants = inventedConstants();
const curve = tideCurve(constants);

describe('dialsSvg', () => {
  const arrowsOf = (root: Node): Node[] =>
    all(root, 'line').filter((node) => number(node, 'x1') === 0 && number(node, 'y1') === 0);
  const twoOf = (M2: number, S2: number, lagM2: number, lagS2: number): Node[] =>
    arrowsOf(
      parse(
        dialsSvg({
          ...constants,
          constituents: [
            { name: 'M2', amplitude: M2, phaseLag: lagM2 },
            {
              name: 'S2',
              amplitude: S2,
              phaseLag: lagS2,
              standing: 'borrowed',
              borrowedFrom: 'M2',
            },
          ],
        }),
      ),
    );
  // Longer arrows lie on top, so the shorter S2 comes first.
  test('an arrow has length H and points to G, clockwise from the top', () => {
    const [s2, m2] = twoOf(1, 0.5, 90, 180);
    expectNear(number(m2, 'y2'), 0, TENTH);
    expect(number(m2, 'x2')).toBeGreaterThan(50);
    expectNear(number(s2, 'y2') / number(m2, 'x2'), 0.5, SHARE);
    expect(Math.abs(number(s2, 'x2'))).toBeLessThan(PIXEL);
  });
  test('a borrowed one is dashed, a fitted one is not', () => {
    const [s2, m2] = twoOf(1, 0.5, 10, 20);
    expect(s2?.attributes['class']).toContain('dashed');
    expect(m2?.attributes['class']).not.toContain('dashed');
  });
  test('each species has a dial, each constituent an arrow and a name or a mention', () => {
    const root = parse(dialsSvg(constants));
    expect(arrowsOf(root)).toHaveLength(constants.constituents.length);
    const shown = texts(root).join(' ');
    for (const words of ['twice a day', 'once a day', 'slower than a day', 'six times a day']) {
      expect(shown).toContain(words);
    }
    for (const { name } of constants.constituents) expect(shown).toContain(name);
  });
  test('a disc has the radius of its error on the scale of the arrows', () => {
    const root = parse(
      dialsSvg({
        ...constants,
        constituents: [{ name: 'M2', amplitude: 1, phaseLag: 90, radius95: 0.25 }],
      }),
    );
    const [disc] = withClass(all(root, 'circle'), 'doubtful');
    const [arrow] = arrowsOf(root);
    expectNear(number(disc, 'r') / number(arrow, 'x2'), 0.25, SHARE);
  });
  test('a faint one is grey, and one that is noise gets no dial of its own', () => {
    const faint = ['MU2', 'L2', 'T2'].map((name) => ({
      name,
      amplitude: 0.004,
      phaseLag: 0,
      radius95: 0.01,
      standing: 'faint' as const,
    }));
    const root = parse(
      dialsSvg({
        ...constants,
        constituents: [{ name: 'M2', amplitude: 1, phaseLag: 90 }, ...faint],
      }),
    );
    const classes = arrowsOf(root).map(({ attributes }) => attributes['class']);
    expect(classes.sort()).toEqual(['line-muted', 'line-muted', 'line-muted', 'line-water']);
    expect(texts(root)).toContain('faint: MU2, L2, T2');
    expect(texts(root).join(' ')).not.toContain('small ones');
  });
  test('a document without amplitudes says so', () => {
    expect(dialsSvg({ ...constants, constituents: [] })).toContain(
      'No constituent has an amplitude',
    );
    expect(parse(dialsSvg(diurnalConstants())).text).toContain('Port Ansel');
  });
});

describe('levelsLadderSvg', () => {
  const rungsOf = (root: Node): Node[] => withClass(all(root, 'line'), 'line-water');
  test('rungs stand to scale', () => {
    const rungs = [
      { name: 'A', height: 4 },
      { name: 'B', height: 3.9 },
      { name: 'C', height: 1 },
    ];
    const [a, b, c] = rungsOf(parse(levelsLadderSvg({ rungs, datum: 'LAT' }))).map((node) =>
      number(node, 'y1'),
    ) as [number, number, number];
    expectNear((b - a) / (c - a), 0.1 / 3, SHARE);
  });
  test('every gap, height, error and reason is printed', () => {
    const root = parse(levelsLadderSvg({ rungs: inventedRungs(), datum: 'LAT' }));
    const shown = texts(root).join(' ');
    for (const gap of ['0.60', '0.41', '0.11', '1.48', '0.02', '1.49', '0.12', '1.04'])
      expect(shown).toContain(`↕ ${gap}`);
    expect(shown).toContain('−0.06');
    expect(shown).toContain('missing: low waters below the sill are cut off');
    expect(shown).toContain('missing: a full epoch of 19 years is needed');
    expect(withClass(rungsOf(root), 'dashed')).toHaveLength(1);
  });
  test('labels keep their distance', () => {
    const rungs = Array.from({ length: 9 }, (_, i) => ({
      name: `L${i}`,
      height: 2 + i / 1000,
      grounds: 'a tide',
    }));
    for (const width of [360, 760]) {
      const root = parse(levelsLadderSvg({ rungs, datum: 'LAT' }, { width }));
      const ys = withClass(all(root, 'text'), 'strong')
        .map((node) => number(node, 'y'))
        .sort((a, b) => a - b);
      for (let i = 1; i < ys.length; i++)
        expect((ys[i] as number) - (ys[i - 1] as number)).toBeGreaterThanOrEqual(30);
    }
  });
  test('no rungs, one rung and a rung without height', () => {
    expect(parse(levelsLadderSvg({ rungs: [], datum: 'LAT' })).text).toContain(
      'No levels were given',
    );
    expect(
      parse(levelsLadderSvg({ rungs: [{ name: 'MSL', height: 0 }], datum: 'LAT' })).text,
    ).toContain('0.00');
    expect(() => levelsLadderSvg({ rungs: [{ name: 'MSL' }], datum: 'LAT' })).toThrow(
      expect.objectContaining({ code: 'MISSING', path: 'rungs[0].height' }),
    );
    expect(() =>
      levelsLadderSvg({ rungs: [{ name: 'MSL', height: Number.NaN }], datum: 'LAT' }),
    ).toThrow(expect.objectContaining({ code: 'NOT_FINITE', path: 'rungs[0].height' }));
    expect(() => levelsLadderSvg({ rungs: [{ name: ' ', height: 1 }], datum: 'LAT' })).toThrow(
      expect.objectContaining({ code: 'MISSING', path: 'rungs[0].name' }),
    );
  });
});

describe('weekSvg', () => {
  const span = { from: '2031-06-01T00:00Z', to: '2031-06-08T00:00Z' };
  const heights = curve.heights({ start: span.from, step: HOUR / 6, count: 7 * 144 });
  const turningPoints = curve.turningPoints(span);
  const windows = curve.windows({ above: 3.5 }, span);
  const input = {
    heights,
    turningPoints,
    windows,
    above: 3.5,
    timeZone: 'UTC',
    datum: 'chart datum',
  };
  test('each high and low water is marked once, with height and time', () => {
    for (const width of [360, 760]) {
      const root = parse(weekSvg(input, { width }));
      expect(withClass(all(root, 'path'), 'water')).toHaveLength(turningPoints.length);
      const times = texts(root).filter((text) => /^\d\d:\d\d$/.test(text));
      expect(times).toHaveLength(turningPoints.length);
    }
  });
  test('windows are as wide as they are long', () => {
    const root = parse(weekSvg(input, { width: 1000 }));
    const bars = withClass(all(root, 'rect'), 'open').filter(
      (node) => node.attributes['height'] === '3',
    );
    const wide = bars.map((node) => number(node, 'width'));
    // No window crosses midnight into another strip here: seven days stand in one strip at this width.
    const perDay = (1000 - 40 - 20) / 7;
    expect(wide).toHaveLength(windows.length);
    windows.forEach(({ from, to }, i) => {
      expect(Math.abs((wide[i] as number) - ((to - from) / DAY) * perDay)).toBeLessThan(PIXEL);
    });
  });
  test('the zone is named', () => {
    expect(weekSvg({ ...input, timeZone: 'Europe/Lisbon' })).toContain('Europe/Lisbon, UTC+01:00');
    expect(() => weekSvg({ ...input, timeZone: undefined as unknown as string })).toThrow(
      expect.objectContaining({ code: 'MISSING', path: 'timeZone' }),
    );
  });
  test('a gap in the heights breaks the curve', () => {
    const values = heights.values.slice();
    values.fill(Number.NaN, 300, 400);
    const curveOf = (h: Float64Array): string =>
      withClass(
        all(
          parse(weekSvg({ ...input, heights: { ...heights, values: h } }, { width: 1000 })),
          'path',
        ),
        'line-water',
      )[0]?.attributes['d'] ?? '';
    expect(curveOf(heights.values).match(/M/g)).toHaveLength(1);
    expect(curveOf(values).match(/M/g)).toHaveLength(2);
  });
});

describe('foldedRecordSvg', () => {
  const record = inventedRecord();
  const input = {
    series: record.series,
    runs: record.runs,
    steps: record.steps,
    title: 'Quenby Haven',
  };
  test('thirteen months are 29 rows, each with its date', () => {
    const root = parse(foldedRecordSvg(input));
    expect(texts(root).filter((text) => /^\d+ [A-Z][a-z]{2} 203\d$/.test(text))).toHaveLength(29);
    expect(withClass(all(root, 'path'), 'line-water')).toHaveLength(29);
  });
  test('runs are shaded where they are and named', () => {
    const at = Date.UTC(2030, 0, 9);
    const series = uniformSeries({
      start: at,
      step: HOUR,
      values: Array.from({ length: 336 }, (_, i) => Math.sin(i)),
    });
    const runs = [{ from: at + 7 * DAY, to: at + 9 * DAY - HOUR, flag: 4, reason: 'flat line' }];
    const root = parse(foldedRecordSvg({ series, runs, title: 'a' }, { width: 774 }));
    const plot = 774 - 84 - 212;
    const [shade] = withClass(all(root, 'rect'), 'rejected');
    expectNear(number(shade, 'x'), 84 + plot / 2, TENTH);
    expectNear(number(shade, 'width'), (2 * plot) / 14, TENTH);
    expect(texts(root)).toContain('flat line, rejected, 2.0 d');
  });
  test('a gap breaks the curve, a step is dotted and has its size', () => {
    const root = parse(foldedRecordSvg(input));
    const curves = withClass(all(root, 'path'), 'line-water').map(
      ({ attributes }) => attributes['d']?.match(/M/g)?.length,
    );
    expect(curves[8]).toBe(2);
    expect(curves[4]).toBe(1);
    expect(withClass(all(root, 'line'), 'dotted')).toHaveLength(1);
    expect(texts(root)).toContain('zero +79 mm');
  });
  test('more than the page holds is said, never dropped in silence', () => {
    const long = uniformSeries({ start: 0, step: HOUR, values: new Float64Array(24 * 14 * 40) });
    const markup = foldedRecordSvg({ series: long, runs: [], title: 'a' });
    expect(markup).toContain('30 of 40 fortnights of the record are drawn');
    const later = foldedRecordSvg({ series: long, runs: [], title: 'a' }, { from: 20 * 14 * DAY });
    expect(texts(parse(later))).toContain('8 Oct 1970');
  });
  test('a spike that was rejected does not flatten the rest', () => {
    const values = Array.from({ length: 336 }, (_, i) => Math.sin(i / 2));
    values[100] = 900;
    const series = uniformSeries({ start: 0, step: HOUR, values });
    const runs = [{ from: 100 * HOUR, to: 100 * HOUR, flag: 4, reason: 'spike' }];
    const bar = (marked: boolean): string | undefined =>
      texts(parse(foldedRecordSvg({ series, runs: marked ? runs : [], title: 'a' }))).find((text) =>
        / m$/.test(text),
      );
    expect(bar(true)).toBe('1 m');
    expect(bar(false)).toBe('500 m');
  });
  test('samples of less than half weight have circles, and the legend counts them', () => {
    const at = Date.UTC(2030, 0, 9);
    const values = Array.from({ length: 336 }, (_, i) => Math.sin(i / 2));
    const series = uniformSeries({ start: at, step: HOUR, values });
    const weights = new Float64Array(336).fill(1);
    weights.set([0.49, 0, 0.5, Number.NaN], 90);
    weights[200] = 0.2;
    for (const [width, left, plot] of [
      [774, 84, 774 - 84 - 212],
      [360, 8, 360 - 16],
    ] as const) {
      const root = parse(foldedRecordSvg({ series, runs: [], weights, title: 'a' }, { width }));
      const circles = withClass(all(root, 'circle'), 'line-reject');
      // Two samples side by side have one circle, at the one of less weight; one more explains them.
      expect(circles).toHaveLength(3);
      expectNear(number(circles[0], 'cx'), left + (91 / 336) * plot, TENTH);
      expectNear(number(circles[1], 'cx'), left + (200 / 336) * plot, TENTH);
      expect(texts(root)).toContain('less than half weight in the fit: 3 samples');
      expect(number(circles[2], 'cy')).toBeLessThan(number(root, 'height'));
    }
    const none = parse(foldedRecordSvg({ series, runs: [], title: 'a' }));
    expect(all(none, 'circle')).toEqual([]);
    expect(texts(none).join(' ')).not.toContain('weight');
  });
  test('weights of another length are refused', () => {
    expect(() => foldedRecordSvg({ ...input, weights: [1, 1] })).toThrow(
      expect.objectContaining({ code: 'LENGTH_MISMATCH', path: 'weights' }),
    );
  });
  test('a begin after the end of the record is refused', () => {
    const from = Date.UTC(2040, 0, 1);
    expect(() => foldedRecordSvg(input, { from })).toThrow(
      expect.objectContaining({ code: 'OUT_OF_RANGE', path: 'options.from' }),
    );
  });
  test('one sample is too few', () => {
    const one = uniformSeries({ start: 0, step: HOUR, values: [1] });
    expect(() => foldedRecordSvg({ series: one, runs: [], title: 'a' })).toThrow(
      expect.objectContaining({ code: 'TOO_FEW_SAMPLES' }),
    );
  });
});

describe('residualRasterSvg', () => {
  const fills = (values: ArrayLike<number>): Map<string, number> => {
    const root = parse(
      residualRasterSvg({
        residuals: { start: Date.UTC(2030, 0, 1), step: HOUR, values: Float64Array.from(values) },
      }),
    );
    return new Map(
      all(root, 'path').map(({ attributes }) => [
        attributes['fill'] as string,
        attributes['d']?.match(/M/g)?.length ?? 0,
      ]),
    );
  };
  test('what repeats with the lunar day shows as stripes, what lasts as bands', () => {
    const hours = Array.from({ length: 24 * 200 }, (_, i) => i);
    // One rectangle joins cells of one colour above each other: bands need few of them, stripes many.
    const total = (map: Map<string, number>): number =>
      [...map.values()].reduce((a, b) => a + b, 0);
    const bands = total(fills(hours.map((i) => (Math.floor(i / 240) % 2 ? 0.1 : -0.1))));
    const stripes = total(
      fills(hours.map((i) => 0.1 * Math.cos((14.4920521 * i * Math.PI) / 180))),
    );
    expect(stripes).toBeGreaterThan(4 * bands);
  });
  test('lightness rises with the residual, so grey print keeps the order', () => {
    const root = parse(
      residualRasterSvg({
        residuals: {
          start: 0,
          step: HOUR,
          values: new Float64Array(100).map((_, i) => Math.sin(i)),
        },
      }),
    );
    const legend = all(root, 'rect').filter(({ attributes }) =>
      attributes['fill']?.startsWith('rgb'),
    );
    const light = legend.map(({ attributes }) => {
      const [r, g, b] = (attributes['fill']?.match(/\d+/g) ?? []).map(Number) as [
        number,
        number,
        number,
      ];
      return 0.2126 * r + 0.7152 * g + 0.0722 * b; // ITU-R BT.709 weights
    });
    expect(light).toHaveLength(9);
    for (let i = 1; i < light.length; i++)
      expect(light[i]).toBeGreaterThan((light[i - 1] as number) + 8);
  });
  test('gaps stay blank and the list of what is left stands below', () => {
    const residuals = uniformSeries({
      start: 0,
      step: HOUR,
      values: new Float64Array(400).fill(Number.NaN),
    });
    const root = parse(
      residualRasterSvg({
        residuals,
        leftOver: [{ speed: 57.9682, amplitude: 0.0091, likely: 'M4' }],
      }),
    );
    expect(all(root, 'path')).toHaveLength(0);
    expect(texts(root)).toContain('left over: near 57.968°/h, 9 mm, likely M4');
  });
  test('a longitude that is none is refused', () => {
    const residuals = uniformSeries({ start: 0, step: HOUR, values: [0, 0] });
    expect(() => residualRasterSvg({ residuals, longitude: 999 })).toThrow(
      expect.objectContaining({ code: 'OUT_OF_RANGE', path: 'longitude' }),
    );
  });
});

test('monthSvg has a ruler a day, as long as the day', () => {
  const root = parse(
    monthSvg({
      place: 'a',
      turningPoints: [],
      month: '2031-03',
      timeZone: 'Europe/Lisbon',
      datum: 'LAT',
    }),
  );
  const rulers = withClass(all(root, 'line'), 'line-grid').filter(
    (node) => number(node, 'y1') === number(node, 'y2'),
  );
  const long = rulers.map((node) => number(node, 'x2') - number(node, 'x1'));
  expect(long).toHaveLength(31);
  expectNear((long[29] as number) / (long[0] as number), 23 / 24, SHARE);
});

test.each([319, 2001, Number.NaN])('a width of %d is refused', (width) => {
  expect(() => dialsSvg(constants, { width })).toThrow(
    expect.objectContaining({ code: 'OUT_OF_RANGE', path: 'options.width' }),
  );
});

test('an unknown theme is refused; light leaves out nothing but the dark colours', () => {
  expect(() => dialsSvg(constants, { theme: 'dusk' as 'light' })).toThrow(
    expect.objectContaining({ code: 'UNKNOWN_CHOICE', path: 'options.theme' }),
  );
  expect(dialsSvg(constants, { theme: 'light' })).toContain('class="staithe-picture light"');
});

test('no text of a picture begins outside it', () => {
  const month = {
    place: 'Quenby Haven',
    turningPoints: curve.turningPoints({ from: '2031-03-01T00:00Z', to: '2031-04-01T00:00Z' }),
    month: '2031-03',
    timeZone: 'UTC',
    datum: 'LAT',
  };
  for (const width of [320, 360, 760]) {
    for (const markup of [
      dialsSvg(constants, { width }),
      monthSvg(month, { width }),
      levelsLadderSvg({ rungs: inventedRungs(), datum: 'LAT' }, { width }),
    ]) {
      const root = parse(markup);
      const high = number(root, 'height');
      const outside = all(root, 'text').filter(
        (node) => number(node, 'x') > width || number(node, 'y') > high,
      );
      expect(outside).toHaveLength(0);
    }
  }
});
