import { fitHarmonics, tideCurve, uniformSeries } from 'staithe';
import harbour from './harbour.json' with { type: 'json' };

/** Makes a month's record, fits it, and predicts from the fit: the heights at the instants asked for. */
export function job() {
  const { constants, record, constituents, instants } = harbour;
  const { values } = tideCurve(constants).heights(record);
  const series = uniformSeries({ start: record.start, step: record.step, values });
  const fit = fitHarmonics(series, { constituents });
  const curve = tideCurve(fit.constants);
  return instants.map((instant) => curve.height(instant));
}
