/**
 * The options of a fit, for `fit`, `report` and `currents`.
 * @module
 */
import { describe, type HarmonicConstants, InputError } from '@staithe/core';
import type { Borrowing, CurrentFitOptions, FitOptions } from '@staithe/fit';
import type { GaugeRecord } from '@staithe/gauge';
import type { Command } from 'commander';
import { readMoment, type Zone } from './local-time.js';
import { choiceOf, listOf, numberOf, textOf, wholeOf } from './options.js';

/** What people say of any fit, of heights or of currents. */
export interface ModelFlags {
  readonly place?: string;
  readonly latitude?: number;
  readonly longitude?: number;
  readonly constituents?: string[];
  readonly borrow?: Borrowing[];
  readonly argumentModel?: NonNullable<FitOptions['argumentModel']>;
  readonly nodalModel?: NonNullable<FitOptions['nodalModel']>;
  readonly nodalHold?: NonNullable<FitOptions['nodalHold']>;
  readonly weighting?: NonNullable<FitOptions['weighting']>;
  readonly curve?: Curve;
  readonly cutoff?: number;
}

type Curve = NonNullable<NonNullable<FitOptions['resistant']>['curve']>;

/** What people say of a fit of heights. */
export interface FitFlags extends ModelFlags {
  readonly steps?: string[];
  readonly secularRate?: true;
  readonly errorModel?: NonNullable<FitOptions['errorModel']>;
  readonly redrawBy?: NonNullable<NonNullable<FitOptions['redraw']>['by']>;
  readonly draws?: number;
  readonly seed?: number;
}

/** `K2:S2:0.27:3.5` apart by commas: name, parent, ratio of amplitudes, difference of phase lags. */
function borrowingsOf(text: string): Borrowing[] {
  return listOf('--borrow')(text).map((rule) => {
    const [name = '', from = '', ratio = '', difference = '', ...more] = rule.split(':');
    const amplitudeRatio = Number(ratio);
    const phaseLagDifference = Number(difference);
    const isWhole = [name, from, ratio, difference].every((part) => part.trim() !== '');
    if (isWhole && more.length === 0 && Number.isFinite(amplitudeRatio + phaseLagDifference)) {
      return { name, from, amplitudeRatio, phaseLagDifference };
    }
    const expected = 'expected name:parent:ratio:degrees like K2:S2:0.27:3.5';
    throw new InputError('BAD_NUMBER', '--borrow', `${expected}, got ${describe(rule)}`);
  });
}

function withChoice(
  command: Command,
  flag: string,
  value: string,
  choices: readonly string[],
  text: string,
): Command {
  const told = `${text}: ${choices.join(', ')}`;
  return command.option(`${flag} <${value}>`, told, choiceOf(flag, choices));
}

/** Adds where the record is from and which lines are fitted. */
export function withLines(command: Command): Command {
  return command
    .option('--place <NAME>', 'name of the place', textOf('--place'))
    .option(
      '--latitude <DEGREES>',
      'north positive; with it the lines of degree 3 enter f and u',
      numberOf('--latitude', -90, 90, 'degrees'),
    )
    .option('--longitude <DEGREES>', 'east positive', numberOf('--longitude', -180, 360, 'degrees'))
    .option(
      '--constituents <NAMES>',
      'apart by commas: M2,S2,K1; what the record can tell apart if absent',
      listOf('--constituents'),
    )
    .option(
      '--borrow <RULES>',
      'lines that the record cannot tell apart: K2:S2:0.27:3.5 (name, parent, ratio of H, difference of G)',
      borrowingsOf,
    );
}

/** Adds the models, the weighting and the error models of a fit. */
export function withModels(command: Command, errorModels: readonly string[]): Command {
  const choice = (flag: string, value: string, choices: readonly string[], text: string): void => {
    withChoice(command, flag, value, choices, text);
  };
  choice('--argument-model', 'MODEL', ['iers2010', 'schureman1940'], 'longitudes of Moon and Sun');
  choice('--nodal-model', 'MODEL', ['potential', 'schureman1940', 'none'], 'f and u');
  choice('--nodal-hold', 'RULE', ['continuous', 'span-middle', 'calendar-year'], 'how f and u run');
  choice(
    '--weighting',
    'RULE',
    ['equal', 'resistant'],
    'whether samples that stand out count for less',
  );
  choice('--curve', 'CURVE', ['biweight', 'huber'], 'of a resistant weighting');
  command.option(
    '--cutoff <SCALES>',
    'where that curve turns down, in scales of what is left; 8, or 1.345 of huber, if absent',
    numberOf('--cutoff', 0.5, 100, 'scales'),
  );
  return withChoice(command, '--error-model', 'MODEL', errorModels, 'noise behind the errors');
}

/** Adds the options of a fit of heights. */
export function withFit(command: Command): Command {
  withLines(command)
    .option(
      '--steps <TIMES>',
      'when the zero moved, apart by commas: 2031-09-18T10:30Z',
      listOf('--steps'),
    )
    .option('--secular-rate', 'fit a secular rate of mean level as well');
  withModels(command, ['residual-spectrum', 'independent', 'redrawn']);
  withChoice(
    command,
    '--redraw-by',
    'RULE',
    ['phases', 'blocks'],
    'how what is left is drawn anew for redrawn errors',
  );
  return command
    .option(
      '--draws <COUNT>',
      'how often, 20 to 10000; 200 if absent',
      wholeOf('--draws', 20, 10_000),
    )
    .option(
      '--seed <NUMBER>',
      'with which random numbers; 1 if absent',
      wholeOf('--seed', -Infinity, Infinity),
    );
}

function placeOf({ place, latitude, longitude }: ModelFlags): HarmonicConstants['place'] {
  if (place === undefined) {
    if (latitude === undefined && longitude === undefined) return undefined;
    throw new InputError('MISSING', '--place', 'expected a name beside the position, got nothing');
  }
  return {
    name: place,
    ...(latitude === undefined ? {} : { latitude }),
    ...(longitude === undefined ? {} : { longitude }),
  };
}

/** Refuses an option that says nothing without another one. */
function needs(flag: string, value: unknown, other: string, got: string | undefined): void {
  if (value === undefined) return;
  const told = got ?? 'nothing';
  throw new InputError('CONFLICT', flag, `expected ${other} beside it, got ${told}`);
}

/** The options that every fit takes. */
export function modelOptionsOf(flags: ModelFlags): Omit<CurrentFitOptions, 'source'> {
  const place = placeOf(flags);
  const { weighting, curve, cutoff } = flags;
  if (weighting !== 'resistant') {
    needs('--curve', curve, '--weighting resistant', weighting);
    needs('--cutoff', cutoff, '--weighting resistant', weighting);
  }
  return {
    ...(place ? { place } : {}),
    constituents: flags.constituents,
    borrow: flags.borrow,
    argumentModel: flags.argumentModel,
    nodalModel: flags.nodalModel,
    nodalHold: flags.nodalHold,
    weighting,
    resistant: weighting === 'resistant' ? { curve, cutoff } : undefined,
  };
}

/** The options as `fitHarmonics` takes them. */
export function fitOptionsOf(flags: FitFlags, zone: Zone): Omit<FitOptions, 'datum' | 'source'> {
  const { errorModel, redrawBy: by, draws, seed } = flags;
  if (errorModel !== 'redrawn') {
    needs('--redraw-by', by, '--error-model redrawn', errorModel);
    needs('--draws', draws, '--error-model redrawn', errorModel);
    needs('--seed', seed, '--error-model redrawn', errorModel);
  }
  return {
    ...modelOptionsOf(flags),
    steps: flags.steps?.map((text) => readMoment(text, zone, '--steps')),
    secularRate: flags.secularRate,
    errorModel,
    redraw: errorModel === 'redrawn' ? { by, draws, seed } : undefined,
  };
}

/** Where constants come from, by the name of the file. */
export const sourceOf = (file: string): string | undefined =>
  file === '-' ? undefined : `fitted to ${file.replace(/^.*[\\/]/, '')}`;

/** Datum and source of the constants, from the record and its file. */
export function originOf(record: GaugeRecord, file: string): Pick<FitOptions, 'datum' | 'source'> {
  return {
    datum: record.datum,
    source: sourceOf(file),
  };
}
