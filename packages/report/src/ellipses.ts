/**
 * Ellipses: the stream seen from above, one panel for each species, each constituent the way that the tip of its arrow goes.
 * @module
 */
import { median } from 'd3-array';
import { format } from 'd3-format';
import { scaleLinear } from 'd3-scale';
import { line, symbol, symbolTriangle } from 'd3-shape';
import {
  axisText,
  groupCurrents,
  isFaint,
  type Mean,
  meanOf,
  meanText,
  pointAt,
  type ShownCurrents,
  type ShownEllipse,
  speedText,
  towards,
  turnOf,
} from './internal/currents.js';
import { type Child, element } from './internal/markup.js';
import {
  cellsOf,
  type DrawnPanel,
  drawName,
  framed,
  inRows,
  type Panel,
  panelsOf,
  placeNames,
  plate,
  rimMarks,
  type Tip,
} from './internal/panels.js';
import {
  headHeight,
  type Picture,
  type PictureOptions,
  readOptions,
  standalone,
  wrapNote,
} from './internal/picture.js';
import type { Line } from './internal/species.js';
import { cleanText } from './internal/text.js';

/** Options of the ellipses. @public */
export interface EllipsesOptions extends PictureOptions {
  /** Default: `The stream at` and the place. */
  readonly title?: string | undefined;
}

type Scale = (speed: number) => number;

const MOST_NAMES = 9;
const CELL = 300; // pixels: ellipses along one channel need more room than arrows on a dial
const FARTHEST_MEAN = 2; // times the rim of the ellipses: a longer mean would dwarf them and is not drawn
const SWEEP = 45; // degrees of V + u that the thick piece takes
const SWEEP_STEP = 3; // degrees

/** The rim has room for each ellipse, and for the error of each that stands out of the noise, if any does. */
function rimOf(lines: readonly Line<ShownEllipse>[]): number {
  const noise = lines.every(isFaint);
  const reaches = lines.map((line) => {
    return line.own.major + (noise || !isFaint(line) ? (line.own.radius95 ?? 0) : 0);
  });
  return 1.04 * Math.max(...reaches);
}

/** The greatest speed towards its bearing: the point that the phase lag belongs to. */
const tipOf = ({ major, bearing }: ShownEllipse, scale: Scale): [number, number] =>
  towards(scale(major), bearing);

function drawEllipse({ own }: Line<ShownEllipse>, scale: Scale): Child {
  const dashed = own.standing === 'borrowed' ? ' dashed' : '';
  const faint = own.standing === 'faint';
  return element('ellipse', {
    class: faint ? 'line-muted' : `line-water${dashed}`,
    'stroke-width': faint ? 1 : 1.4,
    rx: scale(own.major),
    ry: scale(own.minor),
    transform: `rotate(${(own.bearing - 90).toFixed(1)})`,
  });
}

/** The error at the tip of the longest axis; that of a faint one is an outline, for it says no more than the noise does. */
function disc(line: Line<ShownEllipse>, scale: Scale, radius: number): Child {
  const { own } = line;
  const [cx, cy] = tipOf(own, scale);
  const r = scale(own.radius95 ?? 0);
  const inside = Math.hypot(cx, cy) + r < radius + 34;
  if (r < 0.8 || !inside) return undefined;
  if (isFaint(line)) {
    return element('circle', { class: 'line-grid', cx, cy, r, 'stroke-width': 0.8 });
  }
  return [
    element('circle', { class: 'doubtful', cx, cy, r, 'fill-opacity': 0.7 }),
    element('circle', { class: 'line-muted', cx, cy, r, 'stroke-width': 0.7 }),
  ];
}

/** The dot where the tip is at V + u = 0, and the eighth of a turn that follows, with its arrow head. */
function sweep({ own }: Line<ShownEllipse>, scale: Scale): Child {
  if (own.standing === 'faint') return undefined;
  const at = (theta: number): [number, number] => {
    const [x, y] = pointAt(own, theta);
    return [scale(x), scale(y)];
  };
  const points = Array.from({ length: SWEEP / SWEEP_STEP + 1 }, (_, i) => at(i * SWEEP_STEP));
  const [x, y] = points[0] as [number, number];
  const [endX, endY] = points[points.length - 1] as [number, number];
  const [beforeX, beforeY] = points[points.length - 3] as [number, number];
  const heading = (Math.atan2(endX - beforeX, beforeY - endY) * 180) / Math.PI;
  const long = Math.hypot(endX - x, endY - y);
  const head = symbol(symbolTriangle, 30).digits(1)();
  return [
    element('path', {
      class: 'line-water',
      'stroke-width': 2.8,
      d: line().digits(1)(points) ?? undefined,
    }),
    long > 4 &&
      element('path', {
        class: 'water',
        d: head ?? undefined,
        transform: `translate(${endX.toFixed(2)} ${endY.toFixed(2)}) rotate(${heading.toFixed(1)})`,
      }),
    element('circle', { class: 'ink', cx: x, cy: y, r: 2.6 }),
  ];
}

/** The mean current as an arrow with its error. */
function drawMean({ speed, bearing, radius95 = 0 }: Mean, scale: Scale): Child {
  const [x, y] = towards(scale(speed), bearing);
  const r = scale(radius95);
  const head = symbol(symbolTriangle, 34).digits(1)();
  return [
    r > 0.8 && element('circle', { class: 'line-muted', cx: x, cy: y, r, 'stroke-width': 0.7 }),
    element('line', { class: 'line-ink', 'stroke-width': 2, x1: 0, y1: 0, x2: x, y2: y }),
    element('path', {
      class: 'ink',
      d: head ?? undefined,
      transform: `translate(${x.toFixed(2)} ${y.toFixed(2)}) rotate(${bearing.toFixed(1)}) translate(0 2.4)`,
    }),
  ];
}

function axisLine(bearing: number, radius: number): Child {
  const [x, y] = towards(radius, bearing);
  return element('line', { class: 'line-ink dotted', x1: -x, y1: -y, x2: x, y2: y });
}

const nameOf = ({ own }: Line<ShownEllipse>): string => cleanText(own.name, 12);
const listed = (lines: readonly Line<ShownEllipse>[]): string => lines.map(nameOf).join(', ');

/** What stands below a panel: scale, noise, who turns which way, who has no name in it. */
function factsOf(
  lines: readonly Line<ShownEllipse>[],
  named: readonly Line<ShownEllipse>[],
  rings: readonly number[],
  noise: number | undefined,
): string[] {
  const ring = `${format('~g')((rings[0] as number) * 100)} cm/s`;
  const facts = [rings.length > 1 ? `rings every ${ring}` : `ring ${ring}`];
  if (noise !== undefined && noise > 0) facts.push(`noise ends at ${speedText(noise)} cm/s`);
  const clear = lines.filter((own) => !isFaint(own));
  const turns = ['left', 'right', 'either'].flatMap((turn) => {
    const those = clear.filter(({ own }) => turnOf(own) === turn);
    return those.length === 0
      ? []
      : [`${turn}${turn === 'either' ? ' way' : ''}: ${listed(those)}`];
  });
  if (turns.length > 0) facts.push(`turning ${turns.join('; ')}`);
  const also = clear.filter((own) => !named.includes(own));
  if (also.length > 0) facts.push(`also: ${listed(also)}`);
  const faint = lines.filter((own) => isFaint(own) && !named.includes(own));
  if (faint.length > 0) facts.push(`faint: ${listed(faint)}`);
  return facts;
}

interface Common {
  readonly cell: number;
  readonly radius: number;
  /** Bearing of the principal axis. */
  readonly axis: number | undefined;
}

/** A panel; with the mean current where it is the first. */
function drawPanel(
  { words, lines }: Panel<ShownEllipse>,
  common: Common,
  mean: Mean | undefined,
): DrawnPanel {
  const { radius, axis } = common;
  const own = rimOf(lines);
  const isDrawn = mean !== undefined && mean.speed > 0 && mean.speed <= FARTHEST_MEAN * own;
  const rim = isDrawn ? Math.max(own, 1.04 * (mean.speed + (mean.radius95 ?? 0))) : own;
  const scale = scaleLinear().domain([0, rim]).range([0, radius]);
  const noise = median(lines, (one) =>
    one.own.standing === 'borrowed' ? undefined : one.own.radius95,
  );
  const ticks = scale.ticks(3).filter((tick) => tick > 0 && tick <= rim);
  const rings = ticks.length > 0 ? ticks : [rim];
  const firm = lines.filter((one) => !isFaint(one));
  const named = (firm.length > 0 ? firm : lines).slice(0, MOST_NAMES);
  // Names at alternate ends of the axes stand half as close.
  const tips = named.map((one, i): Tip => {
    const [x, y] = tipOf(one.own, scale);
    return { text: nameOf(one), tip: i % 2 === 0 ? [x, y] : [-x, -y] };
  });
  if (isDrawn) tips.push({ text: 'mean', tip: towards(scale(mean.speed), mean.bearing) });
  const placed = placeNames(tips, radius);
  const drawing = [
    plate(radius, rings.map(scale)),
    rimMarks(radius, placed, ['N', 'E', 'S', 'W']),
    axis !== undefined && axisLine(axis, radius),
    noise !== undefined &&
      scale(noise) > 1 &&
      scale(noise) < radius + 20 &&
      element('circle', { class: 'line-reject dashed', r: scale(noise) }),
    lines.map((one) => disc(one, scale, radius)),
    [...lines].reverse().map((one) => [drawEllipse(one, scale), sweep(one, scale)]),
    isDrawn && drawMean(mean, scale),
    placed.map(drawName),
  ];
  return framed(words, drawing, factsOf(lines, named, rings, noise), common);
}

/** The picture without its frame. */
function drawEllipses(fit: ShownCurrents, options: EllipsesOptions): Picture {
  const { width, theme } = readOptions(options);
  const panels = panelsOf(groupCurrents(fit), ({ own }) => own.major, isFaint);
  const { constants, principalAxis } = fit;
  const place = constants.place ? ` at ${cleanText(constants.place.name, 60)}` : '';
  const title = cleanText(options.title ?? `The stream${place}`);
  const mean = meanOf(constants);
  const note = [
    'seen from above, north up; ellipse: where the tip of the arrow goes; dot: where it is at V + u = 0; thick: the eighth of a turn from there; disc: 95 % of the error, where G is counted; dashed: borrowed; grey: faint; dashed ring: noise; arrow from the centre: mean; dotted: principal axis',
    `mean ${meanText(mean)}`,
    ...(principalAxis ? [`principal axis ${axisText(principalAxis)}`] : []),
  ].flatMap((text) => wrapNote(text, width - 16));
  const cells = cellsOf(width, panels.length, CELL);
  const radius = Math.min(128, cells.cell / 2 - 52);
  const common = { ...cells, radius, axis: principalAxis?.bearing };
  const drawn = panels.map((panel, i) => drawPanel(panel, common, i === 0 ? mean : undefined));
  const { body, bottom } = inRows(drawn, cells, headHeight(note) + 6);
  if (panels.length === 0) {
    const at = { class: 'muted', x: 8, y: bottom + 14 };
    body.push(element('text', at, 'No constituent has a speed.'));
  }
  const height = bottom + (panels.length === 0 ? 26 : 4);
  return { width, height, title, note, body, theme };
}

/**
 * Draws the stream as seen from above, north up: one panel for each species, each constituent an ellipse about the common
 * centre, to a scale in cm/s. A dot shows where the tip of the arrow is at V + u = 0, a thick piece with an arrow head the
 * eighth of a turn that follows, a disc the 95 % error at the tip that the phase lag belongs to. The mean current is an arrow
 * in the first panel, the principal axis a dotted line. Borrowed ellipses are dashed, faint ones grey; which way each turns is
 * also said in words.
 *
 * @param fit - Of `fitCurrents`, or as much of it as there is. Nothing is written to.
 * @param options - Width in pixels, theme, title.
 * @returns SVG.
 * @throws InputError `NOT_FINITE`, `OUT_OF_RANGE` (a speed below 0), paths `ellipses[2].major` …, `constants.mean.east` …;
 *   `OUT_OF_RANGE` path `options.width`; those of `constituent`.
 * @example
 * const fit = fitCurrents({ east: record, north: record }, { constituents: ['M2', 'S2'] });
 * ellipsesSvg(fit, { width: 360 }).includes('twice a day'); // true
 * @public
 */
export function ellipsesSvg(fit: ShownCurrents, options: EllipsesOptions = {}): string {
  return standalone(drawEllipses(fit, options));
}
