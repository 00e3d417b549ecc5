/**
 * Makes the vector of linear least squares: node tools/vectors/nist.mjs FOLDER, where FOLDER holds the tables named
 * below. Run by hand when a table changes; what it writes is committed.
 */
import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { readTable, sha256, writeVector } from './write.mjs';

const folder = process.argv[2];
if (!folder) throw new Error('expected the folder of the reference tables');
const at = (name) => join(folder, '09_nist_strd', name);

/** Powers of the one predictor from `from` to `to`, or else the predictors as they are beside a constant. */
const MODELS = {
  Longley: { constant: true },
  Norris: { powers: [0, 1] },
  Pontius: { powers: [0, 2] },
  Wampler1: { powers: [0, 5] },
  Wampler2: { powers: [0, 5] },
  Wampler3: { powers: [0, 5] },
  Wampler4: { powers: [0, 5] },
  Wampler5: { powers: [0, 5] },
  Filip: { powers: [0, 10] },
  NoInt1: { powers: [1, 1] },
  NoInt2: { powers: [1, 1] },
};

const { datasets } = JSON.parse(readFileSync(at('certified_values.json'), 'utf8'));

/** Numbers that their shortest text keeps to the last bit; the zeros of the table come as 0.0…E+16. */
const numbers = (texts) => texts.map(Number);

writeVector({
  id: 'nist-strd-linear',
  title:
    'Coefficients and standard errors of the Statistical Reference Datasets, linear regression',
  source:
    'NIST/ITL, Statistical Reference Datasets, linear least squares regression: observations and certified values of Longley (1967), Norris, Pontius, Wampler (1970) 1 to 5, Filip, NoInt1 and NoInt2; certified values computed again from the observations in exact rational arithmetic, 17 digits, and equal to the 15 certified digits where these were at hand (not Filip, NoInt1, NoInt2)',
  kind: 'published',
  unit: 'those of each dataset',
  licence: 'Work of the US Government, public domain in the USA; cite NIST/ITL',
  sourceSha256: sha256(at('certified_values.json')),
  tolerance: {
    rel: 5e-15,
    abs: 1e-13,
    why: 'certified to 15 digits, the recomputed values agree within 4.4e-15; where 0 is certified the observations, rounded to doubles, leave up to 7e-15',
  },
  notes: [
    'Columns: 1 and the predictors (constant), or the powers from powers[0] to powers[1] of the one predictor.',
    'Rounding the decimals to doubles and multiplying the powers up in doubles moves the exact answer (worst coefficient, worst standard error or residual sigma; relative, where 0 is certified absolute): Longley 1.9e-15, 6.8e-16; Norris 1.1e-14, 9.9e-15; Pontius 3.1e-14, 1.5e-14; Wampler2 6.3e-14, 7.0e-16; Filip 1.3e-8, 3.4e-9; the others not at all. In exact rational arithmetic.',
  ],
  cases: Object.entries(MODELS).map(([name, model]) => {
    const rows = readTable(at(`${name}.csv`));
    const predictors = model.powers
      ? [Object.keys(rows[0])[1]]
      : Object.keys(rows[0]).filter((key) => key !== 'y');
    const known = datasets[name];
    return {
      name,
      ...model,
      y: numbers(rows.map((row) => row.y)),
      predictors: predictors.map((key) => numbers(rows.map((row) => row[key]))),
      coefficients: numbers(known.exact_beta),
      sigmas: numbers(known.exact_se),
      residualSigma: Number(known.exact_residual_sd),
      degreesOfFreedom: known.dof,
    };
  }),
});
