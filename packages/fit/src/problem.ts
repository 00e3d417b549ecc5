/**
 * The problem that the options and the record pose: which constituents, which columns, which rows.
 * @module
 */
import { type Basis, makeBasis } from '@staithe/basis';
import type { Constituent } from '@staithe/constituents';
import { type Sampling, toInstant } from '@staithe/core';
import type { CovariateColumn } from './covariates.js';
import { type Design, makeDesign } from './design.js';
import { middleOf } from './document.js';
import { type Borrowed, readBorrowings, readChoice, readSteps } from './read-options.js';
import type { RecordSummary } from './record.js';
import { select, type Selection } from './select.js';
import { type FreeLine, readSideLines, withoutFreed } from './side-lines.js';
import { type Choosing, parentsOf } from './solvable.js';
import type { Candidate, FitOptions } from './types.js';

/** What is to be solved, before any pass over the data. */
export interface Problem {
  readonly options: FitOptions;
  readonly record: RecordSummary;
  readonly borrowed: readonly Borrowed[];
  readonly covariates: readonly CovariateColumn[];
  readonly selection: Selection;
  readonly freed: readonly FreeLine[];
  readonly choosing: Choosing;
}

/** Whether the choice of constituents is ours. */
export function isOurs({ constituents }: FitOptions): boolean {
  return constituents === undefined || constituents === 'resolvable';
}

/** The design of a list of constituents. */
export function designOf(
  taken: readonly Constituent[],
  borrowed: readonly Borrowed[],
  given: number,
  record: RecordSummary,
  options: FitOptions,
  sampling: Sampling | undefined,
  freed: readonly FreeLine[] = [],
): Design {
  const nodalHold = readChoice(options.nodalHold, 'options.nodalHold', [
    'continuous',
    'span-middle',
    'calendar-year',
  ]);
  const nodalModel = options.nodalModel ?? 'potential';
  const fitted = [...taken, ...freed.map(({ column }) => column)];
  const basis: Basis = makeBasis({
    constituents: [...fitted, ...borrowed.map(({ of }) => of)],
    argumentModel: options.argumentModel,
    nodalModel,
    nodalHold: nodalHold === 'span-middle' ? { heldAt: middleOf(record) } : nodalHold,
    nodalLatitude: nodalModel === 'potential' ? options.place?.latitude : undefined,
    sampling,
  });
  const folds = borrowed.map(({ parent, rule }, i) => ({
    child: fitted.length + i,
    parent: taken.findIndex(({ name }) => name === parent.name),
    ratio: rule.amplitudeRatio,
    difference: rule.phaseLagDifference,
  }));
  const rateFrom = options.secularRate ? toInstant(middleOf(record)) : undefined;
  const steps = readSteps(options.steps, record.from, record.to);
  const whole = withoutFreed(basis, freed);
  return makeDesign(whole, fitted.length, folds, rateFrom, steps, given, freed.length);
}

/** Poses the problem of a record. */
export function pose(
  options: FitOptions,
  record: RecordSummary,
  covariates: readonly CovariateColumn[],
  sampling: Sampling | undefined,
): Problem {
  const borrowed = readBorrowings(options.borrow);
  const freed = readSideLines(options, record);
  const selection = select(options, record, borrowed, freed);
  const choosing: Choosing = {
    record,
    parents: new Set([...parentsOf(borrowed), ...freed.map(({ of }) => of.name)]),
    ours: isOurs(options),
    designFor: (taken) =>
      designOf(taken, borrowed, covariates.length, record, options, sampling, freed),
  };
  return { options, record, borrowed, covariates, selection, freed, choosing };
}

/** All that was considered, the borrowed ones last. */
export function candidatesOf(selection: Selection, borrowed: readonly Borrowed[]): Candidate[] {
  return [
    ...selection.candidates,
    ...borrowed.map(
      ({ of, parent, rule }): Candidate => ({
        name: of.name,
        decision: 'borrowed',
        reason: `${rule.amplitudeRatio} of ${parent.name}, ${rule.phaseLagDifference}° behind it`,
        beside: parent.name,
      }),
    ),
  ];
}
