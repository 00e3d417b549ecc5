import { fitHarmonics, parseConstants, tideCurve, uniformSeries } from 'staithe';
import { lunisolarLongitudes } from 'staithe/arguments';

/** The whole job with every type written out, so that a change of a type shows here. */
export function job(document: unknown, instants: readonly string[], quiet?: boolean): number[] {
  const constants = parseConstants(document);
  const record = { start: '2024-03-01T00:00Z', step: 3_600_000, count: 720 };
  const { values }: { readonly values: Float64Array } = tideCurve(constants).heights(record);
  const series = uniformSeries({ start: record.start, step: record.step, values });
  const fit = fitHarmonics(series, {
    constituents: ['M2', 'S2', 'a name of the future'],
    secularRate: quiet,
  });
  const codes: readonly string[] = fit.warnings.map((warning) => warning.code);
  const curve = tideCurve(fit.constants);
  const [first] = curve.turningPoints({ from: record.start, to: new Date(0) });
  const kind: 'high' | 'low' | undefined = first?.kind;
  const moon: number = lunisolarLongitudes({ epochMilliseconds: 0 }).s;
  return [...instants.map((instant) => curve.height(instant)), codes.length, moon, kind ? 1 : 0];
}

// @ts-expect-error a record is no set of constants
tideCurve(uniformSeries({ start: 0, step: 3_600_000, values: [1, 2] }));

// @ts-expect-error a misspelt option is refused
fitHarmonics(uniformSeries({ start: 0, step: 3_600_000, values: [1, 2] }), { constituent: ['M2'] });
