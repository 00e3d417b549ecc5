/**
 * What a drifting clock does to a record: for each species whose tide is firm the slope of its curve times how far the
 * record has come, −1/2 to +1/2. The coefficient is the drift over the record in minutes.
 * @module
 */
import { TILE } from '@staithe/basis/kernels';
import { HOUR, MINUTE, type Progress } from '@staithe/core';
import { columnsBuffer, type Design, designTiles, headCount } from '../design.js';
import { disc95, pairErrors } from '../errors-of.js';
import type { Estimate } from '../estimate.js';
import { lineNoiseOf, whiteOf } from '../noise-of.js';
import type { FitRecord } from '../record.js';
import type { Rows } from '../rows.js';
import { inverseGram } from '../solve.js';

/** A species and its column: metres a minute of drift, one value a time. */
export interface DriftColumn {
  readonly species: number;
  readonly values: Float64Array;
}

const speciesAt = ({ basis }: Design, j: number): number => basis.multipliers[6 * j] as number;

/** The species from 1 on, each with the places of its constituents in the basis. */
function speciesOf(design: Design): Map<number, number[]> {
  const out = new Map<number, number[]>();
  for (let j = 0; j < design.fitted; j++) {
    const species = speciesAt(design, j);
    if (species > 0) out.set(species, [...(out.get(species) ?? []), j]);
  }
  return out;
}

/** Species whose largest constituent stands beyond its 95 % region. */
function* firmSpecies(found: Estimate): Generator<Progress, Map<number, number[]>, void> {
  const { design, factor, scaled } = found.solved;
  const count = design.order.length;
  const head = headCount(design);
  const solution = found.solutions[0] as Float64Array;
  const size = (j: number): number => {
    const [a, b] = [solution[head + 2 * j] as number, solution[head + 2 * j + 1] as number];
    return a * a + b * b;
  };
  const all = [...speciesOf(design)].map(([species, members]) => ({
    species,
    members,
    best: members.reduce((most, j) => (size(j) > size(most) ? j : most)),
  }));
  const rows = found.blocks[0] as Rows;
  const residual = (found.residuals[0] as readonly Float64Array[])[0] as Float64Array;
  const white = whiteOf(rows, residual, count, found.resistant);
  const wanted = all.map(({ best }) => 1 + best);
  const noise = yield* lineNoiseOf(design, rows, residual, white, wanted, found.resistant);
  const inverse = inverseGram(factor, scaled);
  const firm = all.filter(({ best }, i) => {
    const { density, bins } = noise[i] as (typeof noise)[number];
    const at = head + 2 * best;
    const read = (row: number, column: number): number =>
      density * (inverse[(at + row) * count + at + column] as number);
    const [a, b] = [solution[at] as number, solution[at + 1] as number];
    const { radius95 } = pairErrors(a, b, read(0, 0), read(0, 1), read(1, 1), disc95(bins));
    return size(best) > radius95 * radius95;
  });
  return new Map(firm.sort((a, b) => a.species - b.species).map((s) => [s.species, s.members]));
}

/**
 * @param found - The fit of the tide.
 * @param record - Of it.
 * @returns One column a species with a firm tide, in order; 0 where no sample takes part.
 */
export function* driftColumns(
  found: Estimate,
  record: FitRecord,
): Generator<Progress, DriftColumn[], void> {
  const { design } = found.solved;
  const solution = found.solutions[0] as Float64Array;
  const head = headCount(design);
  const species = yield* firmSpecies(found);
  const out = [...species.keys()].map(
    (one): DriftColumn => ({ species: one, values: new Float64Array(record.times.length) }),
  );
  const buffer = columnsBuffer(design);
  const middle = (record.from + record.to) / 2;
  const length = record.to - record.from;
  let done = 0;
  const rows = { ...(found.blocks[0] as Rows), slope: true as const };
  for (const { indices, n } of designTiles(design, rows, buffer)) {
    for (const { species: one, values } of out) {
      for (const j of species.get(one) as number[]) {
        for (let k = head + 2 * j; k < head + 2 * j + 2; k++) {
          const weight = (solution[k] as number) * (MINUTE / HOUR);
          for (let i = 0; i < n; i++) {
            const at = indices[i] as number;
            values[at] = (values[at] as number) + weight * (buffer[k * TILE + i] as number);
          }
        }
      }
      for (let i = 0; i < n; i++) {
        const at = indices[i] as number;
        values[at] = ((values[at] as number) * ((record.times[at] as number) - middle)) / length;
      }
    }
    done += n;
    yield { done, total: record.samples, stage: 'slopes' };
  }
  return out;
}
