/**
 * Holds every package to its size budget (budgets.json): two lines each, everything and the smallest useful import, and the
 * bundle tests: an import that must not bring the tables of another package, two imports that must cost the same.
 * Bytes are measured from the packed tarballs as npm installs them.
 */
import { readFileSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { sandbox } from '../consumers/sandbox.mjs';
import { conclude, packages } from '../gate/packages.mjs';
import { measure } from './measure.mjs';

const file = join(dirname(fileURLToPath(import.meta.url)), 'budgets.json');
const budgets = JSON.parse(readFileSync(file, 'utf8'));
const folder = sandbox();
// A command has nothing to import.
const libraries = packages().filter(({ entries }) => entries.length > 0);
const here = new Set(libraries.map(({ name }) => name));
const findings = [];

/** Bytes as kB with two digits. */
const kilobytes = (bytes) => `${(bytes / 1000).toFixed(2)} kB`;

/** The package of an import statement. */
const packageOf = (statement) => /'((?:@[^/']+\/)?[^/']+)/.exec(statement)[1];

/** Measures an import, or notes why that failed. */
async function sizeOf(statement) {
  try {
    return await measure(statement, folder);
  } catch (error) {
    findings.push(`${statement}: ${error.message}`);
    return undefined;
  }
}

for (const { import: statement, limit, without = [] } of budgets.imports) {
  if (!here.has(packageOf(statement))) continue;
  const size = await sizeOf(statement);
  if (size === undefined) continue;
  const { bytes, inputs } = size;
  console.log(`${kilobytes(bytes).padStart(9)} of ${kilobytes(limit).padStart(9)}  ${statement}`);
  if (bytes >= limit)
    findings.push(`${statement}: expected < ${kilobytes(limit)}, got ${kilobytes(bytes)}`);
  for (const name of without) {
    if (inputs.has(name))
      findings.push(`${statement}: brings ${inputs.get(name)} bytes of ${name}`);
  }
}
for (const { imports, within } of budgets.alike) {
  if (!imports.every((statement) => here.has(packageOf(statement)))) continue;
  const sizes = [];
  for (const statement of imports) sizes.push((await sizeOf(statement))?.bytes ?? Number.NaN);
  const apart = Math.max(...sizes) - Math.min(...sizes);
  console.log(
    `${kilobytes(apart).padStart(9)} of ${kilobytes(within).padStart(9)}  between ${imports.join(' and ')}`,
  );
  if (!(apart <= within)) findings.push(`${imports.join(' and ')}: ${kilobytes(apart)} apart`);
}
for (const name of here) {
  const lines = budgets.imports.filter(({ import: s }) => s.endsWith(`from '${name}'`));
  const whole = lines.filter(({ import: s }) => s.startsWith('* '));
  if (whole.length === 0 || lines.length === whole.length) {
    findings.push(
      `${name}: expected two budget lines or more (everything, smallest), got ${lines.length}`,
    );
  }
}
conclude(
  findings,
  `${budgets.imports.length} imports, ${budgets.alike.length} pair: within budget`,
);
