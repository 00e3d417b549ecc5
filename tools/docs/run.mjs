/**
 * Makes the API pages in docs/api from the doc comments of all packages. A warning is an error, and so is a broken link.
 */
import { spawnSync } from 'node:child_process';
import { conclude, packages, root } from '../gate/packages.mjs';
import { brokenLinks } from './links.mjs';

// A command has nothing to import; what the umbrella gives stands with the package it comes from.
const UMBRELLA = 'staithe';
const libraries = packages().filter(
  ({ entries, folder }) => entries.length > 0 && folder !== UMBRELLA,
);
const folders = libraries.map(({ folder }) => `packages/${folder}`);
// A package's types refer to the declarations of the floors below, which may not be made yet.
const types = spawnSync('tsc', ['-b', ...folders], { cwd: root, stdio: 'inherit' });
if (types.status !== 0) process.exit(types.status ?? 1);
const entries = folders.flatMap((folder) => ['--entryPoints', folder]);
const { status } = spawnSync('typedoc', ['--logLevel', 'Warn', ...entries], {
  cwd: root,
  stdio: 'inherit',
});
if (status !== 0) process.exit(status ?? 1);
const pages = spawnSync(
  'tsx',
  ['--tsconfig', 'tsconfig.test.json', 'tools/docs/constituent-pages.ts', 'docs/api/constituents'],
  { cwd: root, stdio: 'inherit' },
);
if (pages.status !== 0) process.exit(pages.status ?? 1);
conclude(brokenLinks(), `${folders.length} packages documented in docs/api`);
