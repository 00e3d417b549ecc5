/**
 * The picture that explains the ellipse of a current: where each term of the conventions stands, and the same over one turn.
 * North is up, so a point (east, north) is drawn at (x, −y).
 */
import type { CurrentComponents, CurrentEllipse } from '@staithe/fit';
import { scaleLinear } from 'd3-scale';
import { curveLinearClosed, line } from 'd3-shape';
import { at, svg, text } from './drawing.js';

const WIDTH = 440;
const CENTRE = { x: 200, y: 205 };
const UNIT = 168; // pixels for the greatest speed
const TURN = { left: 40, right: 420, top: 470, bottom: 610 };

const radians = (degrees: number): number => (degrees * Math.PI) / 180;

type Point = readonly [x: number, y: number];

const along = (length: number, bearing: number): Point => [
  CENTRE.x + length * UNIT * Math.sin(radians(bearing)),
  CENTRE.y - length * UNIT * Math.cos(radians(bearing)),
];

const path = (style: string, d: string): string => `<path class="${style}" d="${d}"/>`;
const segment = (style: string, [x1, y1]: Point, [x2, y2]: Point): string =>
  path(style, `M${at(x1)} ${at(y1)}L${at(x2)} ${at(y2)}`);

/** A filled arrow head at a point, pointing along (dx, dy). */
function head([x, y]: Point, dx: number, dy: number, size = 9): string {
  const long = Math.hypot(dx, dy);
  const [ux, uy] = [(dx / long) * size, (dy / long) * size];
  const [bx, by] = [x - ux, y - uy];
  const side = 0.42;
  return `<path fill="currentColor" d="M${at(x)} ${at(y)}L${at(bx - side * uy)} ${at(by + side * ux)}L${at(bx + side * uy)} ${at(by - side * ux)}Z"/>`;
}

/** Where the tip is at θ, by the components: what the ellipse says must come out of them. */
function pointAt({ east, north }: CurrentComponents, theta: number): Point {
  return [
    CENTRE.x + UNIT * east.amplitude * Math.cos(radians(theta - east.phaseLag)),
    CENTRE.y - UNIT * north.amplitude * Math.cos(radians(theta - north.phaseLag)),
  ];
}

function plan(shape: CurrentEllipse, components: CurrentComponents): string {
  const { major, minor, bearing, phaseLag, turning } = shape;
  const whole = Array.from({ length: 120 }, (_, i) => pointAt(components, 3 * i));
  const round = line<Point>().curve(curveLinearClosed).digits(1)([...whole]) ?? '';
  const across = turning === 'left' ? bearing - 90 : bearing + 90;
  const [zero, tip] = [pointAt(components, 0), pointAt(components, phaseLag)];
  const [least, back] = [pointAt(components, phaseLag + 90), pointAt(components, phaseLag + 180)];
  const heads = [60, 135, 225, 315].map((later) => {
    const theta = phaseLag + later;
    const here = pointAt(components, theta + 4);
    const before = pointAt(components, theta - 4);
    return head(here, here[0] - before[0], here[1] - before[1]);
  });
  const arc = line<Point>().digits(1)(
    Array.from({ length: 12 }, (_, i): Point => along(0.34, (bearing * i) / 11)),
  );
  const arcEnd = along(0.34, bearing);
  const arcBefore = along(0.34, bearing - 6);
  const dot = ([x, y]: Point): string =>
    `<circle fill="currentColor" cx="${at(x)}" cy="${at(y)}" r="3.5"/>`;
  const middle = along(-major * 0.55, bearing);
  const side = along(minor * 0.6, across);
  return [
    segment('axis', [CENTRE.x - 190, CENTRE.y], [CENTRE.x + 190, CENTRE.y]),
    segment('axis', [CENTRE.x, CENTRE.y + 175], [CENTRE.x, CENTRE.y - 180]),
    head([CENTRE.x + 190, CENTRE.y], 1, 0),
    head([CENTRE.x, CENTRE.y - 180], 0, -1),
    text(CENTRE.x + 192, CENTRE.y - 8, 'east', 'end'),
    text(CENTRE.x, CENTRE.y - 187, 'north'),
    path('main', round),
    segment('axis', back, tip),
    segment('axis', along(-minor, across), least),
    path('axis', arc ?? ''),
    head(arcEnd, arcEnd[0] - arcBefore[0], arcEnd[1] - arcBefore[1], 7),
    text(CENTRE.x + 5, CENTRE.y - 0.44 * UNIT, 'bearing', 'start'),
    text(middle[0] + 8, middle[1] + 14, 'major', 'start'),
    text(side[0] - 5, side[1] + 10, 'minor', 'end'),
    heads.join(''),
    segment('other', zero, [zero[0], CENTRE.y]),
    segment('other', zero, [CENTRE.x, zero[1]]),
    segment('side', [CENTRE.x, CENTRE.y], zero),
    [zero, tip, least, back].map(dot).join(''),
    text(zero[0] + 24, zero[1] - 14, 'θ = V + u = 0'),
    text((CENTRE.x + zero[0]) / 2 - 2, zero[1] - 5, 'east part'),
    text(zero[0] - 5, CENTRE.y - 8, 'north part', 'end'),
    text(tip[0] + 11, tip[1], 'θ = G:', 'start'),
    text(tip[0] + 11, tip[1] + 14, 'greatest speed', 'start'),
    text(least[0] - 8, least[1] - 8, 'θ = G + 90°', 'end'),
    text(back[0] - 10, back[1] + 32, 'θ = G + 180°'),
    text(CENTRE.x - 185, CENTRE.y + 168, `turning ${turning}`, 'start'),
  ].join('');
}

function oneTurn(shape: CurrentEllipse, { east, north }: CurrentComponents): string {
  const { major, bearing, phaseLag } = shape;
  const { left, right, top, bottom } = TURN;
  const x = scaleLinear([0, 360], [left, right]);
  const y = scaleLinear([-major, major], [bottom, top]);
  const component =
    ({ amplitude, phaseLag: lag }: CurrentComponents['east']) =>
    (theta: number): number =>
      amplitude * Math.cos(radians(theta - lag));
  const [toEast, toNorth] = [component(east), component(north)];
  const toBearing = (theta: number): number =>
    toEast(theta) * Math.sin(radians(bearing)) + toNorth(theta) * Math.cos(radians(bearing));
  const thetas = Array.from({ length: 73 }, (_, i) => 5 * i);
  const curve = (style: string, value: (theta: number) => number): string => {
    const draw = line<number>(
      (theta) => x(theta),
      (theta) => y(value(theta)),
    ).digits(1);
    return path(style, draw(thetas) ?? '');
  };
  const mark = (lag: number, value: number, words: string, row: number): string => {
    const [from, level] = [x(lag), top - 6 - 13 * row];
    const late = lag > 240;
    const name = text(from + (late ? -3 : 3), level - 2, words, late ? 'end' : 'start');
    return segment('axis', [from, y(value)], [from, level]) + name;
  };
  const ticks = [0, 90, 180, 270, 360].map((theta) => text(x(theta), bottom + 16, `${theta}°`));
  return [
    segment('axis', [left, y(0)], [right, y(0)]),
    curve('other', toNorth),
    curve('side', toEast),
    curve('main', toBearing),
    mark(phaseLag, major, 'G', 0),
    mark(east.phaseLag, east.amplitude, 'G of east', 1),
    mark(north.phaseLag, north.amplitude, 'G of north', 2),
    ticks.join(''),
    text(x(180), bottom + 32, 'θ = V + u'),
    ...[
      ['main', 'towards the bearing'],
      ['side', 'east'],
      ['other', 'north'],
    ].map(([style, words], i) => {
      const from = left + ([0, 150, 240][i] as number);
      const level = bottom + 50;
      return (
        segment(style as string, [from, level], [from + 22, level]) +
        text(from + 28, level + 4, words as string, 'start')
      );
    }),
  ].join('');
}

/** The conventions of docs/currents.md on one ellipse. */
export function ellipseSvg(shape: CurrentEllipse, components: CurrentComponents): string {
  const paper = `<rect width="${WIDTH}" height="680" fill="#fff"/>`;
  const label = 'An ellipse of a tidal current with its terms, and its components over one turn';
  return svg(WIDTH, 680, label, paper + plan(shape, components) + oneTurn(shape, components));
}
