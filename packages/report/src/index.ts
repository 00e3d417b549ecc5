/**
 * Tables and pictures of tidal results: SVG and one self-contained page, without a DOM.
 * @packageDocumentation
 */
export { caution, type CautionKind } from './caution.js';
export { comparisonCsv } from './comparison-csv.js';
export { comparisonText } from './comparison-text.js';
export { constantsText } from './constants-text.js';
export { constantsCsv, type HeightBand, heightsCsv, turningPointsCsv, windowsCsv } from './csv.js';
export { currentsText } from './currents-text.js';
export { type DialsOptions, dialsSvg } from './dials.js';
export { type EllipsesOptions, ellipsesSvg } from './ellipses.js';
export {
  type FoldedRecordInput,
  type FoldedRecordOptions,
  foldedRecordSvg,
} from './folded-record.js';
export type { ShownCurrents, ShownEllipse } from './internal/currents.js';
export type { MonthInput } from './internal/month.js';
export type { PictureOptions } from './internal/picture.js';
export type {
  ReportFit,
  ReportInput,
  ReportOrigin,
  ReportRecord,
  ReportWindows,
} from './internal/report/input.js';
export { type LevelsLadderInput, levelsLadderSvg } from './levels-ladder.js';
export { levelsText } from './levels-text.js';
export { type MonthPictureInput, monthSvg } from './month-picture.js';
export { monthText } from './month-text.js';
export { reportHtml } from './report-html.js';
export { type ResidualRasterInput, residualRasterSvg } from './residual-raster.js';
export type { FlaggedRun, LeftOver, RecordGap, Rung, SkyDay, ZeroStep } from './types.js';
export { type WeekInput, weekSvg } from './week.js';
export { type WindowsInput, windowsText } from './windows-text.js';
