/**
 * Builds the packages when one has no built files, or some older than its sources.
 * @module
 */
import { spawnSync } from 'node:child_process';
import { existsSync, readdirSync, statSync } from 'node:fs';
import { delimiter, join } from 'node:path';
import { packages } from '../../tools/gate/packages.mjs';
import { root } from './terminal.mjs';

/** Times of change of all files under a folder. */
function changes(folder) {
  if (!existsSync(folder)) return [];
  return readdirSync(folder, { recursive: true, withFileTypes: true })
    .filter((entry) => entry.isFile())
    .map((entry) => statSync(join(entry.parentPath, entry.name)).mtimeMs);
}

/** True where a package is to be built. */
function isStale({ directory }) {
  const built = changes(join(directory, 'dist'));
  return built.length === 0 || Math.max(...changes(join(directory, 'src'))) > Math.min(...built);
}

/** @returns {boolean} Whether there was something to build. */
export function buildWhereStale() {
  if (!packages().some(isStale)) return false;
  const bin = join(root, 'node_modules', '.bin');
  const made = spawnSync(process.execPath, [join(root, 'tools/build/build.mjs')], {
    cwd: root,
    stdio: ['ignore', 'ignore', 'inherit'],
    env: { ...process.env, PATH: `${bin}${delimiter}${process.env.PATH ?? ''}` },
  });
  if (made.status !== 0) {
    console.error('build: expected the packages to build, got the complaint above');
    process.exit(1);
  }
  return true;
}
