/**
 * What is not tide: a raster with the date along x, the hour of the lunar day along y, and the residual as colour. Tide left
 * over shows as stripes, weather as vertical bands.
 *
 * The colours rise in lightness from low to high, so they can be told apart without colour vision and in grey print.
 * Source: J. R. Nuñez, C. R. Anderton, R. S. Renslow, PLoS ONE 13 (2018) e0199239 (cividis), through d3-scale-chromatic.
 * @module
 */
import { lunisolarLongitudes, lunisolarRates } from '@staithe/arguments';
import {
  DAY,
  type Degrees,
  describe,
  HOUR,
  InputError,
  type Instant,
  type Series,
  wrapDegrees,
} from '@staithe/core';
import { quantile } from 'd3-array';
import { format } from 'd3-format';
import { pathRound } from 'd3-path';
import { scaleLinear, scaleQuantize, scaleUtc } from 'd3-scale';
import { interpolateCividis } from 'd3-scale-chromatic';
import { utcFormat } from 'd3-time-format';
import { type Child, element } from './internal/markup.js';
import { millimetres, signedMillimetres } from './internal/numbers.js';
import {
  headHeight,
  type Picture,
  type PictureOptions,
  readOptions,
  standalone,
  wrapNote,
} from './internal/picture.js';
import { readSamples, type Samples } from './internal/samples.js';
import { cleanText } from './internal/text.js';
import type { LeftOver } from './types.js';

/** What is left after the fitted tide. @public */
export interface ResidualRasterInput {
  /** Observed minus fitted, metres. */
  readonly residuals: Series;
  /** Degrees east: hours then count from the Moon's lower transit there; else at Greenwich. */
  readonly longitude?: Degrees | undefined;
  /** Lines that stand out, for the short list. */
  readonly leftOver?: readonly LeftOver[] | undefined;
  readonly title?: string | undefined;
}

const CLASSES = 9;
const SEAM = 0.35; // pixels by which cells overlap, so that no light shows between them
const HOURS_SHOWN = [0, 6, 12, 18, 24] as const;

/** The residual averaged in cells: column by column, hour by hour. */
interface Cells {
  readonly columns: number;
  readonly rows: number;
  readonly means: Float64Array;
  readonly from: Instant;
  /** Milliseconds of a column. */
  readonly wide: number;
  /** Hours of a lunar day. */
  readonly lunarDay: number;
}

function binned(samples: Samples, longitude: Degrees, plot: number): Cells {
  const { times, values, step } = samples;
  const lunarDay = 360 / lunisolarRates(samples.from).tau;
  const tau = wrapDegrees(lunisolarLongitudes(samples.from).tau + longitude);
  const day = lunarDay * HOUR;
  const from = samples.from - (tau / 360) * day;
  const days = Math.max(1, Math.ceil((samples.to - from) / day));
  const together = Math.max(1, Math.ceil((1.6 * days) / plot));
  const columns = Math.ceil(days / together);
  const rows = Math.max(4, Math.min(36, Math.floor(day / step)));
  const sums = new Float64Array(columns * rows);
  const counts = new Float64Array(columns * rows);
  for (let i = 0; i < times.length; i++) {
    const value = values[i] as number;
    if (Number.isNaN(value)) continue;
    const turns = ((times[i] as number) - from) / day;
    const whole = Math.floor(turns);
    const row = Math.min(rows - 1, Math.floor((turns - whole) * rows));
    const cell = Math.floor(whole / together) * rows + row;
    sums[cell] = (sums[cell] as number) + value;
    counts[cell] = (counts[cell] as number) + 1;
  }
  return {
    columns,
    rows,
    means: sums.map((sum, i) => sum / (counts[i] as number)),
    from,
    wide: together * day,
    lunarDay,
  };
}

/** The picture without its frame. */
export function drawResidualRaster(input: ResidualRasterInput, options: PictureOptions): Picture {
  const { width, theme, narrow } = readOptions(options);
  const { longitude = 0 } = input;
  if (!(longitude >= -180 && longitude <= 360)) {
    throw new InputError(
      'OUT_OF_RANGE',
      'longitude',
      `expected degrees from -180 to 360, got ${describe(longitude)}`,
    );
  }
  const samples = readSamples(input.residuals);
  const left = 44;
  const plot = width - left - 14;
  const cells = binned(samples, longitude, plot);
  const sizes = Array.from(cells.means, Math.abs).filter((value) => !Number.isNaN(value));
  const reach = scaleLinear()
    .domain([0, (quantile(sizes, 0.98) ?? 0) || 0.001])
    .nice(4)
    .domain()[1] as number;
  const colours = Array.from({ length: CLASSES }, (_, i) => interpolateCividis(i / (CLASSES - 1)));
  const classOf = scaleQuantize()
    .domain([-reach, reach])
    .range(colours.map((_, i) => i));

  const notes = wrapNote(
    'date along, hour of the lunar day up; light: more water than predicted; blank: no data',
    width - 16,
  );
  const top = headHeight(notes) + 8;
  const tall = narrow ? 180 : 216;
  const x = scaleUtc()
    .domain([cells.from, cells.from + cells.columns * cells.wide])
    .range([left, left + plot]);
  const y = scaleLinear()
    .domain([0, cells.lunarDay])
    .range([top + tall, top]);
  const cellWidth = plot / cells.columns;
  const cellHeight = tall / cells.rows;

  const paths = colours.map(() => pathRound(1));
  for (let column = 0; column < cells.columns; column++) {
    let row = 0;
    while (row < cells.rows) {
      const mean = cells.means[column * cells.rows + row] as number;
      const first = row++;
      if (Number.isNaN(mean)) continue;
      const kind = classOf(mean);
      // Cells of one colour above each other are one rectangle.
      while (row < cells.rows && classOf(cells.means[column * cells.rows + row] as number) === kind)
        row++;
      const bottom = top + tall - first * cellHeight;
      (paths[kind] as ReturnType<typeof pathRound>).rect(
        left + column * cellWidth,
        bottom - (row - first) * cellHeight - SEAM,
        cellWidth + SEAM,
        (row - first) * cellHeight + SEAM,
      );
    }
  }
  const body: Child[] = [
    element('rect', { class: 'line-grid', x: left, y: top, width: plot, height: tall }),
    element(
      'g',
      {},
      paths.map((path, i) => {
        const d = path.toString();
        return d !== '' && element('path', { fill: colours[i], d });
      }),
    ),
  ];
  for (const hour of HOURS_SHOWN) {
    body.push(
      element('line', { class: 'line-muted', x1: left - 4, x2: left, y1: y(hour), y2: y(hour) }),
      element(
        'text',
        { class: 'muted small', x: left - 7, y: y(hour) + 4, 'text-anchor': 'end' },
        `${hour} h`,
      ),
    );
  }
  const ticks = x.ticks(narrow ? 4 : 9);
  for (const tick of ticks) {
    const at = x(tick);
    body.push(
      element('line', { class: 'line-muted', x1: at, x2: at, y1: top + tall, y2: top + tall + 4 }),
      element(
        'text',
        { class: 'muted small', x: at, y: top + tall + 16, 'text-anchor': 'middle' },
        tickText(tick, samples.to - samples.from),
      ),
    );
  }
  const legend = drawLegend(colours, classOf, left, top + tall + 34, Math.min(plot, 420));
  body.push(legend);
  let bottom = top + tall + 59;
  const foot = `begins ${new Date(samples.from).getUTCFullYear()}, UTC; 0 h is the Moon’s lower transit ${input.longitude === undefined ? 'at Greenwich' : 'here'}`;
  for (const text of wrapNote(foot, width - left - 8)) {
    bottom += 15;
    body.push(element('text', { class: 'muted small', x: left, y: bottom }, text));
  }
  bottom += 4;
  for (const text of leftOverTexts(input.leftOver ?? [])) {
    bottom += 15;
    body.push(element('text', { class: 'ink small', x: left, y: bottom }, text));
  }
  return {
    width,
    height: bottom + 8,
    title: cleanText(input.title ?? 'What is not tide'),
    note: notes,
    body,
    theme,
  };
}

/** Months by name, a year where it begins; days in a short record. */
function tickText(tick: Date, span: number): string {
  if (span < 80 * DAY) return utcFormat('%-d %b')(tick);
  return utcFormat(tick.getUTCMonth() === 0 ? '%Y' : '%b')(tick);
}

/** `left over: near 57.968°/h, 9 mm, likely M4`. */
export function leftOverTexts(list: readonly LeftOver[]): string[] {
  return list.map(({ speed, amplitude, likely }) => {
    const guess = likely === undefined ? '' : `, likely ${cleanText(likely, 20)}`;
    return `left over: near ${format('.3f')(speed)}°/h, ${millimetres(amplitude)} mm${guess}`;
  });
}

function drawLegend(
  colours: readonly string[],
  classOf: { thresholds(): number[] },
  x: number,
  y: number,
  wide: number,
): Child {
  const each = (wide - 40) / colours.length;
  return [
    colours.map((fill, i) =>
      element('rect', { fill, x: x + i * each, y, width: each + 0.3, height: 10 }),
    ),
    classOf
      .thresholds()
      .map((edge, i) =>
        element(
          'text',
          { class: 'muted tiny', x: x + (i + 1) * each, y: y + 22, 'text-anchor': 'middle' },
          signedMillimetres(edge),
        ),
      ),
    element('text', { class: 'muted small', x: x + colours.length * each + 8, y: y + 9 }, 'mm'),
  ];
}

/**
 * Draws what is not tide as a raster: date along x, hour of the lunar day along y, colour the mean residual of the cell on a
 * scale that is legible without colour vision, with a legend in millimetres and the short list of what is left over.
 *
 * @param input - Residuals in metres; NaN stays blank. Nothing is written to.
 * @param options - Width in pixels, theme.
 * @returns SVG.
 * @throws InputError `OUT_OF_RANGE` paths `longitude`, `options.width`; ComputationError `TOO_FEW_SAMPLES` under two samples.
 * @example
 * const residuals = uniformSeries({ start: '2031-06-01T00:00Z', step: HOUR, values: new Float64Array(200) });
 * residualRasterSvg({ residuals, leftOver: [{ speed: 57.968, amplitude: 0.009, likely: 'M4' }] }).includes('near 57.968°/h'); // true
 * @public
 */
export function residualRasterSvg(
  input: ResidualRasterInput,
  options: PictureOptions = {},
): string {
  return standalone(drawResidualRaster(input, options));
}
