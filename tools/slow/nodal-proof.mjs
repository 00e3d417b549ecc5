/**
 * The tide of an ephemeris, 1993 to 2011, fitted one year at a time under each nodal model: how constant the constants are.
 */
import { loadVector } from '@staithe/test-vectors';
import { yearlyScatter } from '../test/reference/yearly-fits.ts';
import { writeFileSync } from 'node:fs';
import { recordLong } from '../accuracy/long.mjs';
import { swingSvg } from '../docs/drawing.ts';
import { root } from '../gate/packages.mjs';

const vector = 'ephemeris-yearly-fits';
const { cases: proof } = loadVector(vector);
const years = Array.from({ length: proof.years }, (_, i) => i);
const models = ['potential', 'schureman1940', 'none'];
const results = Object.fromEntries(
  models.map((model) => [model, yearlyScatter(proof, years, model)]),
);

const row = (model, name) => results[model].find((entry) => entry.name === name);
console.log('name    amplitude, mm | % and ° from the mean: potential, schureman1940, none');
for (const { name, amplitude } of results.potential) {
  const cells = models.map((model) => {
    const found = row(model, name);
    if (!found) return '      -       -';
    const { amplitudeStrays, phaseLagStrays } = found;
    return `${(amplitudeStrays * 100).toFixed(3).padStart(7)} ${phaseLagStrays.toFixed(3).padStart(7)}`;
  });
  console.log(
    `${name.padEnd(6)} ${(amplitude * 1000).toFixed(3).padStart(8)} | ${cells.join(' | ')}`,
  );
}

for (const { names, amplitude, phaseLag } of Object.values(proof.limits)) {
  const own = results.potential.filter(({ name }) => names.includes(name));
  const common = {
    package: 'fit',
    vector,
    compared: `${names.join(', ')}; all years 1993 to 2011; typical is the least`,
    cases: names.length * proof.years,
  };
  const shares = own.map(({ amplitudeStrays }) => amplitudeStrays * 100);
  recordLong({
    ...common,
    capability: 'yearly amplitudes under potential, departure from their mean',
    worst: Math.max(...shares),
    typical: Math.min(...shares),
    tolerance: amplitude * 100,
    unit: '%',
  });
  const lags = own.map(({ phaseLagStrays }) => phaseLagStrays);
  recordLong({
    ...common,
    capability: 'yearly phase lags under potential, departure from their mean',
    worst: Math.max(...lags),
    typical: Math.min(...lags),
    tolerance: phaseLag,
    unit: 'degrees',
  });
}
const swing = (name) => row('none', name).amplitudeStrays;
if (!(swing('M2') > 0.035 && swing('O1') > 0.17)) {
  throw new Error(
    `expected M2 to swing by 3.7 % and O1 by 18 % under none, got ${swing('M2')}, ${swing('O1')}`,
  );
}

const curves = ['M2', 'O1'].flatMap((name) =>
  models.map((model) => ({ name, model, shares: row(model, name).shares })),
);
const picture = 'docs/pictures/nodal-proof.svg';
writeFileSync(`${root}/${picture}`, swingSvg(curves, new Date(proof.from).getUTCFullYear()));
console.log(`wrote ${picture}`);
