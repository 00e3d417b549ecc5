/**
 * The whole job on two invented places, end to end: npm run demo.
 *
 * Builds the packages where that is still to do, makes the records with everything that goes wrong in them, reads, checks,
 * fits, predicts, asks for windows and levels, writes a report, and holds all of it against the truth that the generator
 * knows. Leaves with 1 where the strongest constituent is not what it should be.
 */
import { mkdirSync } from 'node:fs';
import { buildWhereStale } from './steps/build.mjs';
import { out, row, seconds, shown } from './steps/terminal.mjs';

const began = performance.now();
const built = buildWhereStale();
row(
  'build',
  built ? 'the packages' : 'nothing to do: the packages are newer than their sources',
  began,
);

// The packages can be imported only now.
const { makeDemoRecords } = await import('./generate/records.mjs');
const { harbour } = await import('./steps/harbour.mjs');
const { lagoon } = await import('./steps/lagoon.mjs');
const { caution } = await import('@staithe/report');

mkdirSync(out, { recursive: true });
const making = performance.now();
const { files, truth } = makeDemoRecords();
row('make', 'thirteen months of two places that do not exist, every fault written down', making);

const complaints = [
  ...(await harbour(files, truth['quenby-haven'])),
  ...(await lagoon(files, truth['merrowby-lagoon'])),
];

console.log(`\n${caution('heights')}\n${caution('levels')}\n`);
row('report', `${shown('quenby-haven.html')}: open it in a browser`);
row('files', `${shown('')}: records, constants, predictions, tables, windows, levels`);
row('done', `in ${seconds(began)}`);
for (const complaint of complaints) console.error(complaint);
process.exitCode = complaints.length > 0 ? 1 : 0;
