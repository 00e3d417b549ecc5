/**
 * The options of a fit, for `fit` and `report`.
 * @module
 */
import { describe, type HarmonicConstants, InputError } from '@staithe/core';
import type { Borrowing, FitOptions } from '@staithe/fit';
import type { GaugeRecord } from '@staithe/gauge';
import type { Command } from 'commander';
import { readMoment, type Zone } from './local-time.js';
import { choiceOf, listOf, numberOf, textOf } from './options.js';

/** What people say of a fit. */
export interface FitFlags {
  readonly place?: string;
  readonly latitude?: number;
  readonly longitude?: number;
  readonly constituents?: string[];
  readonly borrow?: Borrowing[];
  readonly steps?: string[];
  readonly secularRate?: true;
  readonly argumentModel?: NonNullable<FitOptions['argumentModel']>;
  readonly nodalModel?: NonNullable<FitOptions['nodalModel']>;
  readonly nodalHold?: NonNullable<FitOptions['nodalHold']>;
  readonly errorModel?: NonNullable<FitOptions['errorModel']>;
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

/** Adds the options of a fit. */
export function withFit(command: Command): Command {
  const choice = (flag: string, value: string, choices: readonly string[], text: string): void => {
    command.option(`${flag} <${value}>`, `${text}: ${choices.join(', ')}`, choiceOf(flag, choices));
  };
  command
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
    )
    .option(
      '--steps <TIMES>',
      'when the zero moved, apart by commas: 2031-09-18T10:30Z',
      listOf('--steps'),
    )
    .option('--secular-rate', 'fit a secular rate of mean level as well');
  choice('--argument-model', 'MODEL', ['iers2010', 'schureman1940'], 'longitudes of Moon and Sun');
  choice('--nodal-model', 'MODEL', ['potential', 'schureman1940', 'none'], 'f and u');
  choice('--nodal-hold', 'RULE', ['continuous', 'span-middle', 'calendar-year'], 'how f and u run');
  choice('--error-model', 'MODEL', ['residual-spectrum', 'independent'], 'noise behind the errors');
  return command;
}

function placeOf({ place, latitude, longitude }: FitFlags): HarmonicConstants['place'] {
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

/** The options as `fitHarmonics` takes them. */
export function fitOptionsOf(flags: FitFlags, zone: Zone): Omit<FitOptions, 'datum' | 'source'> {
  const place = placeOf(flags);
  return {
    ...(place ? { place } : {}),
    constituents: flags.constituents,
    borrow: flags.borrow,
    steps: flags.steps?.map((text) => readMoment(text, zone, '--steps')),
    secularRate: flags.secularRate,
    argumentModel: flags.argumentModel,
    nodalModel: flags.nodalModel,
    nodalHold: flags.nodalHold,
    errorModel: flags.errorModel,
  };
}

/** Datum and source of the constants, from the record and its file. */
export function originOf(record: GaugeRecord, file: string): Pick<FitOptions, 'datum' | 'source'> {
  return {
    datum: record.datum,
    source: file === '-' ? undefined : `fitted to ${file.replace(/^.*[\\/]/, '')}`,
  };
}
