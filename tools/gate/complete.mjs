/**
 * Every package that the floors name (tools/floors/floors.json) is there, with an entry, a README and complete metadata.
 */
import { existsSync, readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { conclude, packages, root } from './packages.mjs';

const floors = JSON.parse(readFileSync(join(root, 'tools/floors/floors.json'), 'utf8'));
const findings = [];
const here = packages();

for (const folder of Object.keys(floors.packages)) {
  if (!here.some((p) => p.folder === folder)) {
    findings.push(`packages/${folder}: expected src/index.ts, got none`);
  }
}
for (const folder of readdirSync(join(root, 'packages'))) {
  if (!(folder in floors.packages))
    findings.push(`packages/${folder}: has no floor in floors.json`);
}
for (const { folder, directory, manifest } of here) {
  const say = (text) => findings.push(`packages/${folder}: ${text}`);
  for (const file of ['README.md', 'LICENSE', 'tsconfig.json', 'tsup.config.ts', 'test']) {
    if (!existsSync(join(directory, file))) say(`expected ${file}, got none`);
  }
  if (!manifest.description) say('package.json has no description');
  if (!(manifest.keywords?.length > 2)) say('package.json has fewer than three keywords');
  if (manifest.repository?.directory !== `packages/${folder}`) say('repository.directory is wrong');
  if (manifest.publishConfig?.access !== 'public') say('publishConfig.access is not public');
  if (manifest.publishConfig?.provenance !== true) say('publishConfig.provenance is not true');
  if (manifest.engines?.node !== '>=20.19') say('engines.node is not >=20.19');
  if (!manifest.files?.includes('dist')) say('files does not list dist');
  if (manifest.main ?? manifest.module) say('main and module have no place beside exports');
  if (!existsSync(join(directory, 'README.md'))) continue;
  const lines = readFileSync(join(directory, 'README.md'), 'utf8').split('\n').length - 1;
  if (lines > 120) say(`README.md has ${lines} lines, expected at most 120`);
}
const cited = /^version: (.+)$/m.exec(readFileSync(join(root, 'CITATION.cff'), 'utf8'))?.[1];
const released = here.find(({ name }) => name === 'staithe')?.manifest.version;
if (released !== undefined && cited !== released) {
  findings.push(`CITATION.cff: expected version ${released}, got ${cited}`);
}
conclude(findings, `${here.length} packages are whole`);
