/**
 * Sets the workspace up on a machine that has Node and npm and nothing else. Uses no dependency.
 * Does nothing when the installed packages already belong to the lock file.
 */
import { spawnSync } from 'node:child_process';
import { createHash } from 'node:crypto';
import { existsSync, readFileSync, writeFileSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';

const root = join(dirname(fileURLToPath(import.meta.url)), '..', '..');
const PNPM = 'pnpm@12.21.0';
const stamp = join(root, 'node_modules', '.staithe-setup');

/** A digest of all that decides what an install makes. */
function wanted() {
  const hash = createHash('sha256');
  for (const file of ['pnpm-lock.yaml', 'package.json', 'pnpm-workspace.yaml']) {
    hash.update(readFileSync(join(root, file)));
  }
  return hash.digest('hex');
}

/** Installs the workspace when it is not installed yet, or was installed from another lock file. */
export function setup() {
  const want = wanted();
  if (existsSync(stamp) && readFileSync(stamp, 'utf8') === want) return;
  const [major, minor] = process.versions.node.split('.').map(Number);
  if (major < 20 || (major === 20 && minor < 19)) {
    console.error(`Node: expected 20.19 or newer, got ${process.versions.node}`);
    process.exit(1);
  }
  console.log('Setting up: installing the workspace with pnpm (once) …');
  const result = spawnSync('npx', ['--yes', PNPM, 'install', '--frozen-lockfile'], {
    cwd: root,
    stdio: ['ignore', 'inherit', 'inherit'],
  });
  if (result.status !== 0) process.exit(result.status ?? 1);
  writeFileSync(stamp, want);
}

if (process.argv[1] === fileURLToPath(import.meta.url)) setup();
