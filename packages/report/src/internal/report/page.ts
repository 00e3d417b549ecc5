/**
 * The page: its style, its parts, and pictures in two widths.
 * @module
 */
import { type Child, element, type Markup } from '../markup.js';
import { inPage, type Picture, pictureCss } from '../picture.js';

/** Width of pictures on a screen and on paper, and on a phone. */
const WIDE = 760;
const NARROW = 360;

const PAGE =
  ':root{color-scheme:light dark;--page:#eef2f4;--sheet:#fff;--text:#16242e;--soft:#586773;--rule:#d5dde3;--bar:#14608c;--warn:#8a5f00;--warned:#fdf3d8}' +
  '@media screen and (prefers-color-scheme:dark){:root{--page:#0a1015;--sheet:#10181f;--text:#e3ebf0;--soft:#9aaab5;--rule:#2d3b46;--bar:#74bdea;--warn:#e6b84a;--warned:#2a2310}}' +
  '*{box-sizing:border-box}' +
  'body{margin:0;background:var(--page);color:var(--text);font:16px/1.5 system-ui,-apple-system,"Segoe UI",Roboto,"Noto Sans",sans-serif;overflow-wrap:break-word}' +
  'main{max-width:824px;margin:0 auto;background:var(--sheet);padding:24px 32px}' +
  'h1{font-size:28px;line-height:1.2;margin:0 0 4px}h2{font-size:20px;line-height:1.3;margin:40px 0 8px;padding-top:12px;border-top:2px solid var(--rule)}h3{font-size:16px;margin:20px 0 4px}' +
  'h2 b{color:var(--bar);margin-right:.5em}' +
  'p,ul,ol{margin:8px 0}li{margin:4px 0}.soft{color:var(--soft);font-size:14px}' +
  '.caution{border-left:4px solid var(--warn);background:var(--warned);padding:8px 12px;font-size:14px}' +
  'figure{margin:12px 0;break-inside:avoid}figure svg{display:block;max-width:100%;height:auto}figure svg.narrow{display:none}' +
  '.scroll{overflow-x:auto}table{border-collapse:collapse;font-size:14px;font-variant-numeric:tabular-nums;width:100%}' +
  'th,td{text-align:left;vertical-align:top;padding:3px 10px 3px 0;border-bottom:1px solid var(--rule)}th{font-weight:600;color:var(--soft)}' +
  '.number{text-align:right;white-space:nowrap}tr.group th{padding-top:12px;color:var(--text)}' +
  '.bar{display:inline-block;height:10px;background:var(--bar);min-width:1px}.bars{width:110px}' +
  '.mono{font-family:ui-monospace,Menlo,Consolas,monospace;font-size:13px;overflow-wrap:anywhere}' +
  '.days{columns:2;column-gap:32px;list-style:none;padding:0;font-size:14px;font-variant-numeric:tabular-nums}.days li{break-inside:avoid;display:flex;gap:8px;margin:0;padding:3px 0}.days b{flex:0 0 98px;font-weight:600;white-space:nowrap}' +
  'nav{display:flex;flex-wrap:wrap;gap:4px 16px;font-size:14px;margin:12px 0}a{color:var(--bar)}' +
  '@media screen and (max-width:640px){main{padding:16px 15px}h1{font-size:24px}h2{font-size:18px}figure svg.wide{display:none}figure svg.narrow{display:block}.bars,.aside{display:none}.days{columns:1}table{font-size:13px}th,td{padding-right:8px}}' +
  '@page{size:A4;margin:14mm 16mm}' +
  '@media print{body{background:#fff;font-size:10.5pt}main{max-width:none;padding:0}nav{display:none}h2,h3,h2+p{break-after:avoid}p,li,tr,.whole,.caution{break-inside:avoid}tr.group{break-after:avoid}.caution{break-before:avoid}.low svg{max-height:168mm;width:auto;margin:0 auto}table,.days,.soft,.caution{font-size:9pt}.bar{print-color-adjust:exact;-webkit-print-color-adjust:exact}svg{print-color-adjust:exact;-webkit-print-color-adjust:exact}}';

/** The style of the page and of its pictures. */
export const pageCss = (): string => PAGE + pictureCss();

/** One of the questions. */
export interface Question {
  readonly title: string;
  readonly body: Child;
}

/** A picture at both widths; the page shows the one that fits. `low`: on paper it shares its sheet with a table. */
export function figure(draw: (options: { width: number }) => Picture, paper?: 'low'): Markup {
  const at = (width: number, name: string): Markup => {
    const { markup } = inPage(draw({ width }));
    return { markup: markup.replace('class="staithe-picture', `class="${name} staithe-picture`) };
  };
  return element('figure', { class: paper }, at(WIDE, 'wide'), at(NARROW, 'narrow'));
}

export const paragraph = (...text: Child[]): Markup => element('p', {}, ...text);
export const soft = (...text: Child[]): Markup => element('p', { class: 'soft' }, ...text);
export const cautionBox = (text: string): Markup => element('p', { class: 'caution' }, text);
export const bullets = (items: readonly Child[]): Child =>
  items.length > 0 &&
  element(
    'ul',
    {},
    items.map((item) => element('li', {}, item)),
  );

/** A cell: `number` cells stand right. */
export interface Column {
  readonly head: string;
  readonly class?: string;
}

/** A table; `whole` stays on one sheet of paper. */
export function table(
  columns: readonly Column[],
  rows: readonly (readonly Child[])[],
  whole: boolean = true,
): Markup {
  const cells = (name: string, row: readonly Child[]): Child =>
    row.map((cell, i) => element(name, { class: columns[i]?.class }, cell));
  return element(
    'div',
    { class: whole ? 'scroll whole' : 'scroll' },
    element(
      'table',
      {},
      element(
        'thead',
        {},
        element(
          'tr',
          {},
          cells(
            'th',
            columns.map(({ head }) => head),
          ),
        ),
      ),
      element(
        'tbody',
        {},
        rows.map((row) => element('tr', {}, cells('td', row))),
      ),
    ),
  );
}
