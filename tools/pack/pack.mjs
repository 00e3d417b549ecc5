/**
 * Packs every package into .packed/ as it would be published: pnpm writes versions for the workspace's own dependencies.
 */
import { execFile } from 'node:child_process';
import { mkdirSync, rmSync } from 'node:fs';
import { promisify } from 'node:util';
import { packages } from '../gate/packages.mjs';
import { packed } from './tarballs.mjs';

const run = promisify(execFile);
rmSync(packed, { recursive: true, force: true });
mkdirSync(packed, { recursive: true });
const all = packages();
for (const { directory } of all) {
  await run('pnpm', ['pack', '--pack-destination', packed], { cwd: directory });
}
console.log(`${all.length} packages packed`);
