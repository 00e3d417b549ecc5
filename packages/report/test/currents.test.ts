/** Currents as a table and as a picture: what is shown is where the numbers say. The ellipses are invented. */
import { componentsOf, ellipseOf } from '@staithe/fit';
import { describe, expect, test } from 'vitest';
import {
  caution,
  currentsText,
  ellipsesSvg,
  type ShownCurrents,
  type ShownEllipse,
} from '../src/index.js';
import { INVENTED, inventedCurrents } from './invented-currents.js';
import { all, expectNear, type Node, number, parse, withClass } from './parse.js';

const PIXEL = 0.02; // coordinates are written to a hundredth
const TENTH = 0.06; // pixels: of paths, which are written to a tenth
const SHARE = 2e-3; // a ratio of lengths of 40 pixels or more, each written to a hundredth
const ANGLE = 0.06; // degrees, written to a tenth

const fitted = inventedCurrents();
const still = { mean: { east: 0, north: 0 } };
const M2: ShownEllipse = {
  name: 'M2',
  major: 1,
  minor: 0.4,
  turning: 'left',
  bearing: 60,
  phaseLag: 30,
  standing: 'firm',
};
const of = (...ellipses: Partial<ShownEllipse>[]): ShownCurrents => ({
  constants: still,
  ellipses: ellipses.map((own) => ({ ...M2, ...own })),
});

describe('currentsText', () => {
  const lines = currentsText(fitted).split('\n');
  const rows = lines.filter((line) => /^ {2}\w/.test(line));

  test('groups by species, the longest first, and ends with the caution', () => {
    const shown = lines.slice(1, 16).map((line) => line.trim().split('  ')[0]?.trim());
    expect(shown).toEqual([
      ...['TWICE A DAY', 'M2', 'S2', 'N2', 'K2', 'MU2', 'L2', 'FOUR TIMES A DAY', 'M4', 'MS4'],
      ...['ONCE A DAY', 'K1', 'O1', 'SIX TIMES A DAY', 'M6'],
    ]);
    expect(lines.at(-1)).toBe(caution('currents'));
  });

  test('columns stand under their heads, and no line but the caution is longer than 92', () => {
    const [head = '', units = ''] = lines;
    expect(head.trim().split(/ {2,}/)).toEqual([
      ...['greatest', 'least', 'turning', 'towards', 'G', '95 % disc', 'grounds'],
    ]);
    expect(units).toMatch(/^TWICE A DAY +cm\/s +cm\/s +° +° +cm\/s$/);
    for (const row of rows) {
      for (const word of ['greatest', 'least', 'towards', ' G', '95 % disc']) {
        expect(row.slice(0, head.indexOf(word) + word.length)).toMatch(/\d$/);
      }
      expect(row.slice(head.indexOf('turning'))).toMatch(/^(left|right|either) /);
      expect(row.slice(head.indexOf('grounds'))).toMatch(/^(firm|faint|borrowed from S2)$/);
    }
    for (const line of lines.slice(0, -1)) expect([...line].length).toBeLessThanOrEqual(92);
  });

  test('a row says how fast, which way round, where to and when', () => {
    const one = { major: 1.124, minor: 0.181, radius95: 0.0187, bearing: 47, phaseLag: 359.97 };
    const text = currentsText(of(one, { name: 'S2', major: 0.562, minor: 0.1, turning: 'right' }));
    const [, , m2, s2] = text.split('\n');
    expect(m2).toBe(
      '  M2    ██████████     112.4    18.1  left        47.0     0.0        1.9  firm',
    );
    expect(s2).toBe(
      '  S2    █████           56.2    10.0  right       60.0    30.0          –  firm',
    );
  });

  test('a turn within its error is told as either way, and why', () => {
    const sure = currentsText(of({ minorSigma: 0.2 }));
    expect(sure).not.toContain('either');
    // 0.4 is under 1.96 times 0.21.
    const open = currentsText(of({ minorSigma: 0.21 }));
    expect(open.split('\n')[2]).toMatch(/ 40\.0 {2}either /);
    expect(open).toContain('\nturning   either way: the least speed is within its error');
    expect(currentsText(of({ minor: 0 })).split('\n')[2]).toContain('  0.0  either ');
  });

  test('mean, axis and what was left out stand below', () => {
    expect(lines).toContain('axis      47° and 227°, 97 % of what varies');
    const constants = {
      mean: { east: -0.03, north: -0.04 },
      // Variances of 4 and 1 (cm/s)², and nothing shared: √5.991 times 2 cm/s.
      uncertainty: { order: ['mean.east', 'mean.north'], covariance: [1e-4, 0, 4e-4] },
    };
    const meanIn = (more: Partial<ShownCurrents>): string | undefined =>
      currentsText({ ...of({}), ...more })
        .split('\n')
        .find((line) => line.startsWith('mean '));
    expect(meanIn({ constants: { mean: constants.mean } })).toBe('mean      5.0 cm/s towards 217°');
    expect(meanIn({ constants })).toBe('mean      5.0 cm/s towards 217°, 95 % disc of 4.9');
    expect(meanIn({ constants: { ...constants, mean: { east: 0.02, north: 0 } } })).toBe(
      'mean      2.0 cm/s towards 90°, within its 95 % disc of 4.9',
    );
    const candidates = [{ name: 'T2', decision: 'left' as const, reason: 'too near S2' }];
    expect(currentsText({ ...of({}), diagnostics: { candidates } })).toContain(
      '\nLeft out: T2 (too near S2)\n',
    );
  });

  test('the mean of a fit has the error of its covariance', () => {
    const { order, matrix } = fitted.covariance;
    const at = (i: string, j: string): number =>
      matrix[order.indexOf(i) * order.length + order.indexOf(j)] as number;
    const [a, b, c] = [
      at('mean.east', 'mean.east'),
      at('mean.north', 'mean.north'),
      at('mean.east', 'mean.north'),
    ];
    const largest = (a + b) / 2 + Math.sqrt(((a - b) / 2) ** 2 + c * c);
    const shown = /95 % disc of ([\d.]+)/.exec(lines.find((l) => l.startsWith('mean')) ?? '')?.[1];
    expectNear(Number(shown), 100 * Math.sqrt(5.991 * largest), 0.051);
  });

  test('nothing that flows', () => {
    expect(currentsText({ constants: still, ellipses: [] })).toBe(
      `\nmean      0.0 cm/s towards 0°\n${caution('currents')}`,
    );
    expect(currentsText(of({ major: 0, minor: 0 }))).not.toMatch(/[█▏]/);
  });
});

describe('ellipsesSvg', () => {
  const texts = (root: Node): string[] => all(root, 'text').map(({ text }) => text);
  const drawn = (fit: ShownCurrents, width = 760): Node => parse(ellipsesSvg(fit, { width }));
  /** Pixels of 1 m/s in the first panel: from the ellipse of M2, which is the longest. */
  const scaleOf = (root: Node): number => number(all(root, 'ellipse').at(-1), 'rx');

  test('axes are to scale and turned by the bearing, north up', () => {
    const root = drawn(of({}, { name: 'S2', major: 0.5, minor: 0.1, bearing: 120 }));
    // Longer ones lie on top, so the shorter S2 comes first.
    const [s2, m2] = all(root, 'ellipse');
    const scale = scaleOf(root);
    expect(scale).toBeGreaterThan(100);
    expectNear(number(m2, 'ry') / scale, 0.4, SHARE);
    expectNear(number(s2, 'rx') / scale, 0.5, SHARE);
    expectNear(number(s2, 'ry') / scale, 0.1, SHARE);
    // On the paper x is east, and angles are clockwise: 90° is no turn.
    const turned = [m2, s2].map((node) =>
      Number(/[-\d.]+/.exec(node?.attributes['transform'] ?? '')),
    );
    expect(turned).toEqual([-30, 30]);
    for (const mark of ['N', 'E', 'S', 'W']) expect(texts(root)).toContain(mark);
  });

  test.each(
    [20, 70, 110, 160].flatMap((bearing) =>
      (['left', 'right'] as const).flatMap((turning) =>
        [0, 75, 160, 250, 340].map((phaseLag) => ({ bearing, turning, phaseLag })),
      ),
    ),
  )('the dot is where the components say at V + u = 0, and the arrow goes on: %o', (shape) => {
    const own = { ...M2, ...shape };
    const { east, north } = componentsOf(own);
    const root = drawn(of(own));
    const scale = scaleOf(root);
    const at = (theta: number): [number, number] => {
      const part = ({ amplitude, phaseLag }: typeof east): number =>
        scale * amplitude * Math.cos(((theta - phaseLag) * Math.PI) / 180);
      return [part(east), -part(north)];
    };
    const [dot] = withClass(all(root, 'circle'), 'ink');
    const [x, y] = at(0);
    expectNear(number(dot, 'cx'), x, PIXEL);
    expectNear(number(dot, 'cy'), y, PIXEL);
    const [path] = withClass(all(root, 'path'), 'line-water');
    const ends = (path?.attributes['d']?.match(/-?[\d.]+/g) ?? []).map(Number);
    const [endX, endY] = at(45);
    expectNear(ends.at(-2) as number, endX, TENTH);
    expectNear(ends.at(-1) as number, endY, TENTH);
    // The head points along the path: its turn is that of the way just before its end.
    const transform = withClass(all(root, 'path'), 'water')[0]?.attributes['transform'] ?? '';
    const heading = Number(/rotate\(([-\d.]+)/.exec(transform)?.[1]);
    const [beforeX, beforeY] = at(39);
    const want = (Math.atan2(endX - beforeX, beforeY - endY) * 180) / Math.PI;
    expectNear(heading, want, ANGLE);
  });

  test('the disc stands at the tip that the phase lag belongs to', () => {
    const root = drawn(of({ radius95: 0.25 }));
    const scale = scaleOf(root);
    const [disc] = withClass(all(root, 'circle'), 'doubtful');
    expectNear(number(disc, 'r') / scale, 0.25, SHARE);
    expectNear(number(disc, 'cx'), scale * Math.sin(Math.PI / 3), PIXEL);
    expectNear(number(disc, 'cy'), -scale * Math.cos(Math.PI / 3), PIXEL);
  });

  test('borrowed ones are dashed; faint ones are grey and have neither dot nor arrow', () => {
    const root = drawn(
      of(
        {},
        { name: 'S2', major: 0.5, standing: 'borrowed', borrowedFrom: 'M2' },
        { name: 'N2', major: 0.3, standing: 'faint' },
      ),
    );
    const classes = all(root, 'ellipse').map(({ attributes }) => attributes['class']);
    expect(classes).toEqual(['line-muted', 'line-water dashed', 'line-water']);
    expect(withClass(all(root, 'circle'), 'ink')).toHaveLength(2);
    expect(texts(root)).toContain('faint: N2');
  });

  test('the turn is said in words', () => {
    const root = drawn(
      of(
        {},
        { name: 'S2', major: 0.9, turning: 'right' },
        { name: 'N2', major: 0.8, minorSigma: 1 },
      ),
    );
    expect(texts(root)).toContain('turning left: M2; right: S2; either way: N2');
  });

  test('the mean is an arrow on the scale of the first panel', () => {
    const fit = { ...of({}), constants: { mean: { east: 0.3, north: -0.4 } } };
    const root = drawn(fit);
    const scale = scaleOf(root);
    const [arrow, ...more] = all(root, 'line').filter(
      (node) => node.attributes['class'] === 'line-ink',
    );
    expect(more).toEqual([]);
    expectNear(number(arrow, 'x2'), 0.3 * scale, PIXEL);
    expectNear(number(arrow, 'y2'), 0.4 * scale, PIXEL);
    expect(texts(root)).toContain('mean');
    expect(texts(root)).toContain('mean 50.0 cm/s towards 143°');
  });

  test('a mean of more than twice the tide is said and not drawn', () => {
    const fit = { ...of({}), constants: { mean: { east: 2.2, north: 0 } } };
    expect(scaleOf(drawn(fit))).toBe(scaleOf(drawn(of({}))));
    expect(texts(drawn(fit))).not.toContain('mean');
    expect(texts(drawn(fit)).join(' ')).toContain('mean 220.0 cm/s towards 90°');
    // Up to there the panel makes room for it.
    const longer = { ...of({}), constants: { mean: { east: 2, north: 0 } } };
    expectNear(scaleOf(drawn(longer)) / scaleOf(drawn(of({}))), 0.5, SHARE);
  });

  test('the principal axis is a dotted line through each panel', () => {
    const root = drawn(fitted);
    const axes = withClass(all(root, 'line'), 'dotted');
    const heads = texts(root).filter((text) => / a day/.test(text));
    expect(axes).toHaveLength(heads.length);
    for (const axis of axes) {
      const angle = Math.atan2(number(axis, 'x2'), -number(axis, 'y2')) * (180 / Math.PI);
      expectNear(angle, fitted.principalAxis.bearing, ANGLE);
    }
  });

  test('each species has a panel, each ellipse is there and named, at any width', () => {
    for (const width of [320, 390, 760, 2000]) {
      const root = drawn(fitted, width);
      expect(all(root, 'ellipse')).toHaveLength(fitted.ellipses.length);
      const shown = texts(root).join(' ');
      for (const words of ['twice a day', 'the small ones', 'once a day', 'four times a day']) {
        expect(shown).toContain(words);
      }
      for (const { name } of INVENTED) expect(shown).toContain(name);
      expect(shown).toContain('rings every 50 cm/s');
      expect(root.text).toContain('The stream at Quenby Sound');
    }
  });

  test('what ellipseOf gives can be drawn without a fit', () => {
    const east = { amplitude: 0.3, phaseLag: 10 };
    const north = { amplitude: 0.2, phaseLag: 100 };
    const own = { name: 'M2', ...ellipseOf({ east, north }) };
    const root = drawn({ constants: still, ellipses: [own] });
    expect(all(root, 'ellipse')).toHaveLength(1);
    expect(withClass(all(root, 'line'), 'dotted')).toEqual([]);
  });

  test('nothing that flows is said', () => {
    expect(ellipsesSvg({ constants: still, ellipses: [] })).toContain('No constituent has a speed');
    expect(ellipsesSvg(of({ major: 0, minor: 0 }))).toContain('No constituent has a speed');
  });
});

describe('bad input', () => {
  const refused = (fit: ShownCurrents, code: string, path: string): void => {
    for (const show of [currentsText, ellipsesSvg]) {
      expect(() => show(fit)).toThrow(expect.objectContaining({ code, path }));
    }
  };
  test('a number that is none, a speed below 0, a name that nobody knows', () => {
    refused(of({}, { name: 'S2', major: Number.NaN }), 'NOT_FINITE', 'ellipses[1].major');
    refused(of({ minor: -0.1 }), 'OUT_OF_RANGE', 'ellipses[0].minor');
    refused(of({ radius95: Infinity }), 'NOT_FINITE', 'ellipses[0].radius95');
    refused(of({ bearing: Number.NaN }), 'NOT_FINITE', 'ellipses[0].bearing');
    refused(of({ name: 'XX9' }), 'UNKNOWN_CONSTITUENT', 'constituent');
    const constants = { mean: { east: 0, north: Number.NaN } };
    refused({ ...of({}), constants }, 'NOT_FINITE', 'constants.mean.north');
  });
  test('a width that no page has', () => {
    expect(() => ellipsesSvg(of({}), { width: 100 })).toThrow(
      expect.objectContaining({ code: 'OUT_OF_RANGE', path: 'options.width' }),
    );
  });
});
