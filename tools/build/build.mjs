/**
 * Builds every package, lower floors first: pnpm orders them by their dependencies.
 */
import { spawnSync } from 'node:child_process';
import { packages, root } from '../gate/packages.mjs';

const filters = packages().flatMap(({ name }) => ['--filter', name]);
const result = spawnSync(
  'pnpm',
  [
    '--recursive',
    '--workspace-concurrency',
    '2',
    '--reporter',
    'append-only',
    ...filters,
    'run',
    'build',
  ],
  { cwd: root, encoding: 'utf8', maxBuffer: 1 << 26 },
);
// The builder's chatter helps only where a build fails.
if (result.status !== 0) process.stderr.write(`${result.stdout}\n${result.stderr}`);
else console.log(`${filters.length / 2} packages built`);
process.exit(result.status ?? 1);
