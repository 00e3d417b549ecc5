/**
 * Pictures of the docs: the comb of a constituent's lines, its loop of f and u, the twelve dots of a yearly sheet, and how
 * yearly constants swing. Strings of SVG over d3-scale and d3-shape; colours follow the page.
 */
import type { NodalPoint, SideLine, YearlySheetRow } from '@staithe/nodal';
import { scaleLinear, scaleSqrt } from 'd3-scale';
import { curveLinearClosed, line } from 'd3-shape';

const STYLE = `<style>
text { font: 11px system-ui, sans-serif; fill: currentColor }
.axis { stroke: currentColor; stroke-opacity: .35; fill: none }
.main { stroke: currentColor; stroke-width: 2.5; fill: none }
.side { stroke: #0b6e99; stroke-width: 2; fill: none }
.other { stroke: #b35900; stroke-width: 1.5; stroke-dasharray: 4 3; fill: none }
.dot { fill: #0b6e99 }
</style>`;

/** A picture with its style. */
export function svg(width: number, height: number, label: string, body: string): string {
  return `<svg xmlns="http://www.w3.org/2000/svg" viewBox="0 0 ${width} ${height}" role="img" aria-label="${label}" style="max-width:${width}px;color:#24303a">${STYLE}${body}</svg>`;
}

export const at = (value: number): string => value.toFixed(1);
export const text = (x: number, y: number, words: string, anchor = 'middle'): string =>
  `<text x="${at(x)}" y="${at(y)}" text-anchor="${anchor}">${words}</text>`;

/** The lines of a group: their distance from the main line along x (turns a year), their size upwards (root scale). */
export function combSvg(name: string, lines: readonly SideLine[]): string {
  const [width, height, foot] = [460, 180, 140];
  // Turns a year of p and N′ at J2000.
  const place = ({ perigee, node }: SideLine): number => perigee * 0.11303 + node * 0.05373;
  const reach = Math.max(0.15, ...lines.map((one) => Math.abs(place(one)))) * 1.15;
  const x = scaleLinear([-reach, reach], [30, width - 30]);
  const y = scaleSqrt([0, 1], [foot, 24]);
  const teeth = lines.map((one, i) => {
    const style = i === 0 ? 'main' : one.degree === 3 ? 'other' : 'side';
    return `<path class="${style}" d="M${at(x(place(one)))} ${foot}V${at(y(Math.abs(one.ratio)))}"/>`;
  });
  const ticks = x.ticks(5).map((t) => text(x(t), foot + 16, t.toFixed(2)));
  const axis = `<path class="axis" d="M20 ${foot}H${width - 20}"/>`;
  const caption = text(
    width / 2,
    height - 6,
    'turns a year beside the main line; height: root of the share',
  );
  return svg(width, height, `Lines of ${name}`, axis + teeth.join('') + ticks.join('') + caption);
}

/** f and u as a closed loop over a nodal cycle in the plane of (f cos u, f sin u); the cross marks f = 1, u = 0. */
export function loopSvg(
  name: string,
  loops: readonly { readonly label: string; readonly points: readonly NodalPoint[] }[],
): string {
  const [size, foot] = [340, 290];
  const across = ({ f, u }: NodalPoint): number => f * Math.cos((u * Math.PI) / 180);
  const up = ({ f, u }: NodalPoint): number => f * Math.sin((u * Math.PI) / 180);
  const all = loops.flatMap(({ points }) => points);
  const reach =
    1.2 * Math.max(0.01, ...all.map((p) => Math.max(Math.abs(across(p) - 1), Math.abs(up(p)))));
  const x = scaleLinear([1 - reach, 1 + reach], [50, foot + 20]);
  const y = scaleLinear([-reach, reach], [foot, 20]);
  const draw = line<NodalPoint>(
    (p) => x(across(p)),
    (p) => y(up(p)),
  )
    .curve(curveLinearClosed)
    .digits(1);
  const paths = loops.map(({ points }, i) => {
    return `<path class="${i === 0 ? 'side' : 'other'}" d="${draw(points) ?? ''}"/>`;
  });
  const cross = `<path class="axis" d="M50 ${at(y(0))}H${foot + 20}M${at(x(1))} 20V${foot}"/>`;
  const below = x.ticks(4).map((t) => text(x(t), foot + 16, x.tickFormat(4)(t)));
  const beside = y.ticks(4).map((t) => text(44, y(t) + 4, y.tickFormat(4)(t), 'end'));
  const caption = text(size / 2, size - 4, loops.map(({ label }) => label).join('; dashed: '));
  const axes = text(foot + 20, foot + 32, 'f cos u', 'end') + text(54, 16, 'f sin u', 'start');
  const label = `f and u of ${name}`;
  return svg(size, size, label, [cross, ...paths, ...below, ...beside, axes, caption].join(''));
}

/** One row of a yearly sheet: twelve dots on a scale of their own, f printed at the extremes. */
export function dotsSvg(row: YearlySheetRow): string {
  const [width, height] = [300, 48];
  const x = scaleLinear([0, 11], [20, width - 50]);
  const y = scaleLinear([row.lowest.f, row.highest.f], [height - 18, 18]);
  const dots = row.months.map(({ f }, m) => {
    return `<circle class="dot" cx="${at(x(m))}" cy="${at(y(f))}" r="3"/>`;
  });
  const mark = (point: NodalPoint, below: boolean): string => {
    return text(x(row.months.indexOf(point)), y(point.f) + (below ? 15 : -7), point.f.toFixed(3));
  };
  const body = dots.join('') + mark(row.lowest, true) + mark(row.highest, false);
  return svg(width, height, `f of ${row.name}`, body);
}

/** Yearly amplitudes over their mean, a panel a constituent, a line a nodal model. */
export function swingSvg(
  curves: readonly {
    readonly name: string;
    readonly model: string;
    readonly shares: readonly number[];
  }[],
  firstYear: number,
): string {
  const names = [...new Set(curves.map(({ name }) => name))];
  const [width, panel] = [620, 190];
  const x = scaleLinear([0, (curves[0]?.shares.length ?? 2) - 1], [50, width - 140]);
  const panels = names.map((name, i) => {
    const own = curves.filter((curve) => curve.name === name);
    const reach =
      Math.max(...own.flatMap(({ shares }) => shares.map((v) => Math.abs(v - 1)))) * 1.15;
    const y = scaleLinear([1 - reach, 1 + reach], [(i + 1) * panel - 30, i * panel + 24]);
    const draw = line<number>(
      (_, k) => x(k),
      (v) => y(v),
    ).digits(1);
    const paths = own.map(({ model, shares }) => {
      const style = model === 'none' ? 'other' : model === 'potential' ? 'main' : 'side';
      return `<path class="${style}" d="${draw(shares) ?? ''}"/>`;
    });
    const ticks = y
      .ticks(4)
      .map(
        (t) =>
          `${text(44, y(t) + 4, `${t > 1 ? '+' : ''}${((t - 1) * 100).toFixed(0)} %`, 'end')}<path class="axis" d="M50 ${at(y(t))}H${width - 140}"/>`,
      );
    return (
      text(50, i * panel + 14, `${name}: amplitude of each year beside its mean`, 'start') +
      ticks.join('') +
      paths.join('')
    );
  });
  const years = x.ticks(6).map((t) => text(x(t), names.length * panel - 8, String(firstYear + t)));
  const legend = [
    ['main', 'potential'],
    ['side', 'Schureman'],
    ['other', 'no correction'],
  ].map(
    ([style, words], i) =>
      `<path class="${style}" d="M${width - 128} ${40 + 18 * i}h18"/>${text(width - 104, 44 + 18 * i, words as string, 'start')}`,
  );
  return svg(
    width,
    names.length * panel,
    'Yearly amplitudes under three nodal models',
    panels.join('') + years.join('') + legend.join(''),
  );
}
