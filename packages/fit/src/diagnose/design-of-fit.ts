/**
 * The design and the rows of a fit that is at hand, from what its result says. Columns of covariates are not in it.
 * @module
 */
import type { HarmonicConstants } from '@staithe/core';
import type { Design } from '../design.js';
import { pose } from '../problem.js';
import { type FitRecord, readRecord } from '../record.js';
import { type Rows, rowsOf } from '../rows.js';
import type { Borrowing, FitOptions, HarmonicFit } from '../types.js';
import { residualSeries } from './residual-samples.js';

/** A fit posed again. */
export interface PosedFit {
  readonly design: Design;
  readonly record: FitRecord;
  /** With the weights of a resistant fit; the right-hand side is the residual. */
  readonly rows: Rows;
}

function borrowingsOf({ constituents }: HarmonicConstants): Borrowing[] {
  return constituents.flatMap((child): Borrowing[] => {
    const parent = constituents.find(({ name }) => name === child.borrowedFrom);
    if (!parent) return [];
    return [
      {
        name: child.name,
        from: parent.name,
        amplitudeRatio: parent.amplitude > 0 ? child.amplitude / parent.amplitude : 0,
        phaseLagDifference: child.phaseLag - parent.phaseLag,
      },
    ];
  });
}

function optionsOf({ constants, sideLines }: HarmonicFit): FitOptions {
  const { argumentModel, nodalModel, nodalHold, nodalLatitude, constituents } = constants;
  return {
    constituents: constituents.flatMap(({ name, borrowedFrom }) => (borrowedFrom ? [] : [name])),
    borrow: borrowingsOf(constants),
    secularRate: constants.secularRate !== undefined,
    steps: constants.steps?.map(({ at }) => at),
    argumentModel,
    nodalModel,
    nodalHold: typeof nodalHold === 'object' ? 'span-middle' : nodalHold,
    place: nodalLatitude === undefined ? undefined : { name: '', latitude: nodalLatitude },
    sideLines: sideLines?.map(({ name }) => name),
  };
}

/**
 * @param fit - With residuals.
 * @throws InputError `MISSING`, path `fit.residuals`.
 */
export function posedAgain(fit: HarmonicFit): PosedFit {
  const { times, values, step, weights } = residualSeries(fit);
  const sampling = fit.residuals?.sampling;
  const series = step > 0 ? { start: times[0] as number, step, values } : { times, values };
  const record = readRecord(sampling ? { ...series, sampling } : series, undefined, true);
  const { choosing, selection } = pose(optionsOf(fit), record, [], sampling);
  const design = choosing.designFor(selection.taken);
  return { design, record, rows: weights ? { ...rowsOf(record), weights } : rowsOf(record) };
}
