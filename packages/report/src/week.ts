/**
 * A week of the curve with high and low waters and the windows in which a condition holds.
 * @module
 */
import type { Instant, Metres, Series } from '@staithe/core';
import type { TideWindow, TurningPoint } from '@staithe/predict';
import { extent } from 'd3-array';
import { scaleLinear, scaleUtc } from 'd3-scale';
import { curveMonotoneX, line, symbol, symbolTriangle } from 'd3-shape';
import { type Child, element } from './internal/markup.js';
import { duration, metres } from './internal/numbers.js';
import {
  headHeight,
  type Picture,
  type PictureOptions,
  readOptions,
  standalone,
  textWidth,
  wrapNote,
} from './internal/picture.js';
import { readSamples, type Samples } from './internal/samples.js';
import { spread } from './internal/spread.js';
import { cleanText, requiredText } from './internal/text.js';
import { conditionText } from './windows-text.js';
import {
  clockText,
  localDays,
  type LocalDay,
  offsetName,
  readZone,
  wallText,
  type Zone,
  zoneText,
} from './internal/zone.js';

/** A week of predictions. @public */
export interface WeekInput {
  /** Predicted heights, metres above the datum; the picture spans them. */
  readonly heights: Series;
  readonly turningPoints: readonly TurningPoint[];
  readonly windows?: readonly TideWindow[] | undefined;
  /** The level that the windows ask for: drawn as a dashed line. */
  readonly above?: Metres | undefined;
  readonly below?: Metres | undefined;
  /** IANA zone, `UTC` or an offset: never the host's. */
  readonly timeZone: string;
  readonly datum: string;
  readonly title?: string | undefined;
}

interface Strip {
  readonly days: readonly LocalDay[];
  readonly from: Instant;
  readonly to: Instant;
  readonly top: number;
}

const MARGIN = { left: 40, right: 20, above: 32, below: 28, day: 20 };
const TALL = 118; // of the curve

function drawStrip(
  input: WeekInput,
  zone: Zone,
  samples: Samples,
  strip: Strip,
  plot: number,
  domain: readonly number[],
  full: number,
): Child[] {
  const share = strip.days.length / full;
  const x = scaleUtc()
    .domain([strip.from, strip.to])
    .range([MARGIN.left, MARGIN.left + plot * share])
    .clamp(true);
  const top = strip.top + MARGIN.above;
  const bottom = top + TALL;
  const y = scaleLinear().domain(domain).range([bottom, top]);
  const foot = bottom + MARGIN.below;
  const end = MARGIN.left + plot * share;
  const body: Child[] = [];
  for (const window of input.windows ?? []) {
    if (window.to <= strip.from || window.from >= strip.to) continue;
    const [x1, x2] = [x(window.from), x(window.to)];
    const text = duration(window.to - window.from);
    body.push(
      element('rect', {
        class: 'open',
        'fill-opacity': 0.16,
        x: x1,
        y: strip.top,
        width: x2 - x1,
        height: foot - strip.top,
      }),
      element('rect', { class: 'open', x: x1, y: foot - 3, width: x2 - x1, height: 3 }),
      x2 - x1 > textWidth(text, 10) + 2 &&
        element(
          'text',
          { class: 'open tiny', x: (x1 + x2) / 2, y: foot + 10, 'text-anchor': 'middle' },
          text,
        ),
    );
  }
  for (const tick of y.ticks(4)) {
    body.push(
      element('line', { class: 'line-grid', x1: MARGIN.left, x2: end, y1: y(tick), y2: y(tick) }),
      element(
        'text',
        { class: 'muted small', x: MARGIN.left - 6, y: y(tick) + 4, 'text-anchor': 'end' },
        y.tickFormat(4)(tick),
      ),
    );
  }
  for (const day of strip.days) {
    const [x1, x2] = [x(day.from), x(day.to)];
    const label =
      wallText('%a %-d %b', day.wall) +
      (day.change ? ` ${offsetName(day.change.after)} from ${clockText(zone, day.change.at)}` : '');
    const short = textWidth(label) < x2 - x1 - 4 ? label : wallText('%a %-d', day.wall);
    body.push(
      element('line', {
        class: 'line-muted',
        'stroke-width': 0.6,
        x1,
        x2: x1,
        y1: strip.top,
        y2: foot + 14 + MARGIN.day - 6,
      }),
      x2 - x1 > textWidth(short) &&
        element('text', { class: 'ink strong', x: x1 + 4, y: foot + 12 + MARGIN.day - 8 }, short),
    );
  }
  for (const level of [input.above, input.below]) {
    if (level === undefined || level < (domain[0] as number) || level > (domain[1] as number))
      continue;
    body.push(
      element('line', {
        class: 'line-open dashed',
        'stroke-width': 1.2,
        x1: MARGIN.left,
        x2: end,
        y1: y(level),
        y2: y(level),
      }),
    );
  }
  const points: [Instant, number][] = [];
  samples.times.forEach((t, i) => {
    if (t >= strip.from - samples.step && t <= strip.to + samples.step)
      points.push([t, samples.values[i] as number]);
  });
  const path = line()
    .defined(([, value]) => !Number.isNaN(value))
    .x(([t]) => x(t))
    .y(([, value]) => y(value))
    .curve(curveMonotoneX)
    .digits(1)(points);
  body.push(
    path !== null && element('path', { class: 'line-water', 'stroke-width': 1.8, d: path }),
  );
  const within = input.turningPoints.filter(
    ({ time }) => time >= samples.from && time < samples.to,
  );
  body.push(turns(within, strip, zone, x, y));
  return body;
}

/** Highs with time and height above the curve, lows below it. */
function turns(
  points: readonly TurningPoint[],
  strip: Strip,
  zone: Zone,
  x: (t: Instant) => number,
  y: (height: number) => number,
): Child[] {
  return (['high', 'low'] as const).map((kind) => {
    const here = points.filter(
      (point) => point.kind === kind && point.time >= strip.from && point.time < strip.to,
    );
    const places = spread(
      here.map(({ time }) => x(time)),
      32,
      MARGIN.left + 15,
      1e6,
    );
    const up = kind === 'high';
    return here.map(({ time, height }, i) => {
      const at = y(height);
      const rows = up ? [at - 19, at - 8] : [at + 17, at + 28];
      const mark = symbol(symbolTriangle, 22).digits(1)();
      const label = { x: places[i] as number, 'text-anchor': 'middle' };
      return [
        element('path', {
          class: 'water',
          d: mark ?? undefined,
          transform: `translate(${x(time).toFixed(1)} ${(at + (up ? -2 : 2)).toFixed(1)})${up ? '' : ' rotate(180)'}`,
        }),
        element(
          'text',
          { class: 'ink small strong halo', ...label, y: rows[up ? 0 : 1] },
          metres(height),
        ),
        element(
          'text',
          { class: 'muted tiny halo', ...label, y: rows[up ? 1 : 0] },
          clockText(zone, time),
        ),
      ];
    });
  });
}

/** The picture without its frame. */
export function drawWeek(input: WeekInput, options: PictureOptions): Picture {
  const { width, theme } = readOptions(options);
  const zone = readZone(input.timeZone);
  const datum = requiredText(input.datum, 'datum');
  const samples = readSamples(input.heights);
  const days = localDays(zone, samples.from, samples.to - samples.step);
  const plot = width - MARGIN.left - MARGIN.right;
  const perStrip = Math.min(days.length, Math.max(1, Math.floor(plot / 96)));
  // As even as it goes: seven days on a phone are three, three and one; four and three look better.
  const strips = Math.ceil(days.length / perStrip);
  const full = Math.ceil(days.length / strips);
  const asked = input.above !== undefined || input.below !== undefined;
  const text = `heights in m above ${datum}; times ${zoneText(zone, samples.from, samples.to)}${asked ? `; green: ${conditionText(input)}` : ''}`;
  const note = wrapNote(text, width - 16);
  const [low = 0, high = 1] = extent(
    [
      ...samples.values,
      ...input.turningPoints
        .filter(({ time }) => time >= samples.from && time < samples.to)
        .map(({ height }) => height),
    ].filter((v) => !Number.isNaN(v)),
  ) as [number?, number?];
  const domain = high > low ? [low, high] : [low - 0.5, high + 0.5];
  const pitch = MARGIN.above + TALL + MARGIN.below + MARGIN.day + 26;
  const top = headHeight(note) + 8;
  const body: Child[] = [];
  for (let i = 0; i < strips; i++) {
    const here = days.slice(i * full, (i + 1) * full);
    if (here.length === 0) continue;
    const strip = {
      days: here,
      from: (here[0] as LocalDay).from,
      to: (here[here.length - 1] as LocalDay).to,
      top: top + i * pitch,
    };
    body.push(...drawStrip(input, zone, samples, strip, plot, domain, full));
  }
  const title = cleanText(
    input.title ?? `Tides from ${wallText('%A %-d %B %Y', (days[0] as LocalDay).wall)}`,
  );
  return { width, height: top + strips * pitch, title, note, body, theme };
}

/**
 * Draws a week of the curve with its highs, lows and windows. On a narrow picture the days are folded into strips.
 *
 * @param input - Heights in metres above the datum, turning points, windows, zone and datum. Nothing is written to.
 * @param options - Width in pixels, theme.
 * @returns SVG.
 * @throws InputError `MISSING` or `UNKNOWN_CHOICE` path `timeZone`, `MISSING` path `datum`, `OUT_OF_RANGE` path
 * `options.width`; ComputationError `TOO_FEW_SAMPLES` under two samples.
 * @example
 * const heights = uniformSeries({ start: '2031-06-01T00:00Z', step: HOUR, values: [1, 2, 3, 2] });
 * weekSvg({ heights, turningPoints: [], timeZone: 'UTC', datum: 'chart datum' }).includes('chart datum'); // true
 * @public
 */
export function weekSvg(input: WeekInput, options: PictureOptions = {}): string {
  return standalone(drawWeek(input, options));
}
