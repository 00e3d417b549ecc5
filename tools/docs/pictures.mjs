/** Writes the picture of docs/currents.md, or with --check tells whether it would change. */
import { spawnSync } from 'node:child_process';
import { join } from 'node:path';
import { root } from '../gate/packages.mjs';

const tsx = join(root, 'node_modules', '.bin', 'tsx');
const draw = ['--tsconfig', 'tsconfig.test.json', 'tools/docs/current-ellipse.ts'];
const target = 'docs/pictures/current-ellipse.svg';
const { status } = spawnSync(tsx, [...draw, target, ...process.argv.slice(2)], {
  cwd: root,
  stdio: 'inherit',
});
process.exit(status ?? 1);
