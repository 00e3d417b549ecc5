/**
 * staithe currents: how does the stream run here?
 * @module
 */
import { formatInstant, seriesTimes } from '@staithe/core';
import { type CurrentFit, type CurrentFitOptions, fitCurrentsAsync } from '@staithe/fit';
import { caution, currentsText } from '@staithe/report';
import type { Command } from 'commander';
import {
  type CurrentOptions,
  type CurrentsRead,
  readCurrents,
  withCurrents,
} from '../currents-input.js';
import { checkOutput, deliver } from '../deliver.js';
import { inFile } from '../failure.js';
import { sizeRow } from '../findings.js';
import {
  type ModelFlags,
  modelOptionsOf,
  sourceOf,
  withLines,
  withModels,
} from '../fit-options.js';
import { doubtedJson, doubtedRow, heldRow } from '../fit-rows.js';
import { withHelp } from '../help.js';
import { momentText, readZone, type Zone } from '../local-time.js';
import { type CommonOptions, withOutput, withZone, type ZoneOptions } from '../options.js';
import { progress, row } from '../terminal.js';

interface Options extends CommonOptions, CurrentOptions, ModelFlags, ZoneOptions {
  readonly errorModel?: NonNullable<CurrentFitOptions['errorModel']>;
}

/** What is left after the tide: its root mean square in both components, and where it is longest. */
interface Rest {
  readonly typical: number;
  readonly worst: number;
  readonly worstAt: number;
}

function restOf({ residuals, diagnostics }: CurrentFit): Rest {
  const { east, north } = residuals;
  let [worst, at] = [-1, 0];
  east.values.forEach((value, i) => {
    const size = Math.hypot(value, north.values[i] as number);
    if (size > worst) [worst, at] = [size, i];
  });
  return {
    typical: Math.hypot(diagnostics.east.residual.rms, diagnostics.north.residual.rms),
    worst,
    worstAt: seriesTimes(east)[at] as number,
  };
}

const centimetres = (speed: number): string => (speed * 100).toFixed(1);

function rowsOf(read: CurrentsRead, fit: CurrentFit, zone: Zone): string {
  const { typical, worst, worstAt } = restOf(fit);
  return [
    sizeRow(read.size, 'pair'),
    row('found', `times ${read.timeZone}, ${read.kind} in ${read.unit}`),
    ...read.warnings.map(({ message }) => row('note', message)),
    doubtedRow(fit.resistant, 'pair'),
    heldRow(fit.ellipses),
    row(
      'not tide',
      `${centimetres(typical)} cm/s typical, ${centimetres(worst)} cm/s worst (${momentText(worstAt, zone)})`,
    ),
    ...fit.warnings.map(({ message }) => row('note', message)),
  ].join('');
}

function toJson(read: CurrentsRead, fit: CurrentFit): object {
  const { constants, ellipses, principalAxis, diagnostics, warnings } = fit;
  const { due, there, missing, gaps } = read.size;
  const { typical, worst, worstAt } = restOf(fit);
  return {
    constants,
    ellipses,
    principalAxis,
    diagnostics,
    warnings,
    ...doubtedJson(fit),
    notTide: { typical, worst, worstAt: formatInstant(worstAt) },
    record: {
      pairs: due,
      read: there,
      missing,
      gaps,
      unit: read.unit,
      timeZone: read.timeZone,
      warnings: read.warnings,
    },
    caution: caution('currents'),
  };
}

async function run(file: string, options: Options): Promise<number> {
  const zone = readZone(options.zone);
  const rules = await checkOutput(options, [file]);
  const asked = { ...modelOptionsOf(options), errorModel: options.errorModel };
  const work = progress();
  const read = await readCurrents(file, options, work);
  const fit = await inFile(file, () =>
    fitCurrentsAsync(read.record, {
      ...asked,
      source: sourceOf(file),
      onProgress: work.onProgress,
    }),
  );
  work.done();
  await deliver(
    {
      text: `${rowsOf(read, fit, zone)}\n${currentsText(fit)}\n`,
      json: () => toJson(read, fit),
      file: () => [`${JSON.stringify(fit.constants, null, 2)}\n`],
    },
    options,
    rules,
  );
  return 0;
}

/** Adds the command. */
export function addCurrents(program: Command, settle: (exit: number) => void): void {
  const command = program
    .command('currents')
    .argument('<RECORD>', 'a record of currents as CSV, or -');
  withModels(withLines(withCurrents(command)), ['residual-spectrum', 'independent']);
  withOutput(withZone(command), 'write the constants document of the current');
  withHelp(command, {
    question: 'how does the stream run here?',
    have: 'currents.csv, with columns of east and north, or of speed and where it runs to',
    ask: '--east "east (cm/s)" --north "north (cm/s)" --place "Quenby Sound" --write sound.currents.json',
    get: 'the ellipse of each constituent: greatest and least speed, which way it turns, where to and when; the mean current',
    example:
      'staithe currents sound.csv --speed "speed (kn)" --towards "towards (deg)" --place "Quenby Sound"',
  });
  command.action(async (file: string, options: Options) => settle(await run(file, options)));
}
