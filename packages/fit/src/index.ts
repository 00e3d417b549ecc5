/**
 * Harmonic analysis by least squares: constants with error bars, and the grounds for each of them.
 * @packageDocumentation
 */
export {
  type ComparedConstant,
  compareConstants,
  type CompareOptions,
  type ConstantsComparison,
} from './compare.js';
export type { ComparisonWarning } from './compare-warnings.js';
export { fitCurrents, fitCurrentsAsync } from './currents/fit-currents.js';
export type { CurrentRecord } from './currents/record.js';
export type { CurrentFit, CurrentFitOptions, FittedEllipse } from './currents/types.js';
export {
  componentsOf,
  type CurrentComponents,
  type CurrentEllipse,
  ellipseFromRotary,
  ellipseOf,
  type Oscillation,
  rotaryOf,
  type RotaryPair,
} from './ellipse.js';
export type { EllipseSigmas } from './ellipse-sigmas.js';
export { clockDrift, clockDriftAsync } from './diagnose/clock-drift.js';
export type { ClockDrift, SpeciesDrift } from './diagnose/drift-verdict.js';
export {
  type GapCost,
  type GapLeverage,
  gapLeverage,
  gapLeverageAsync,
} from './diagnose/gap-leverage.js';
export {
  leftOver,
  leftOverAsync,
  type LeftOverFindings,
  type LeftOverLine,
  type LeftOverOptions,
} from './diagnose/left-over.js';
export { type MonthResidual, residualByMonth } from './diagnose/residual-by-month.js';
export { residualRuns, type ResidualRuns } from './diagnose/residual-runs.js';
export type { YearlyChange, YearlyTrend } from './diagnose/yearly-changes.js';
export {
  type YearlyFits,
  yearlyFits,
  yearlyFitsAsync,
  type YearlyOptions,
} from './diagnose/yearly-fits.js';
export { fitHarmonics, fitHarmonicsAsync } from './fit-harmonics.js';
export { type LeastSquares, leastSquares, type LeastSquaresOptions } from './least-squares.js';
export { type CellFit, type CellGrid, fitMany, fitManyAsync } from './many.js';
export { finishFit, type PartsFit } from './parts/finish.js';
export {
  accumulate,
  accumulateAsync,
  type FitPartial,
  mergePartials,
  type PartRun,
} from './parts/partial.js';
export { type FitPlan, planFit, type PlanOptions } from './parts/plan.js';
export {
  finishErrors,
  mergeResidualPartials,
  residualPass,
  residualPassAsync,
  type ResidualPartial,
} from './parts/residual-pass.js';
export { type PrincipalAxis, principalAxis } from './principal-axis.js';
export type {
  Borrowing,
  Candidate,
  Covariate,
  CovariateResult,
  FitDiagnostics,
  FitOptions,
  FitWarning,
  HarmonicFit,
  RecordFit,
  ResistantWeights,
  SideLineEstimate,
  SideLineResult,
} from './types.js';
export {
  fitTurningPoints,
  fitTurningPointsAsync,
  type TurningPointFit,
  type TurningPointOptions,
  type TurningTimes,
} from './turning-points.js';
export type { TurningPoint } from './turning/read.js';
