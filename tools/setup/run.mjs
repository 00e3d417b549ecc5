/**
 * Sets the workspace up if that is still to do, then runs a command of it: node tools/setup/run.mjs COMMAND [ARG …].
 * Every npm script goes through here, so each works in a fresh clone.
 */
import { spawnSync } from 'node:child_process';
import { delimiter, dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { setup } from './setup.mjs';

const root = join(dirname(fileURLToPath(import.meta.url)), '..', '..');
setup();
const [command, ...args] = process.argv.slice(2);
const result = spawnSync(command, args, {
  cwd: root,
  stdio: 'inherit',
  env: {
    ...process.env,
    PATH: `${join(root, 'node_modules', '.bin')}${delimiter}${process.env.PATH ?? ''}`,
  },
});
process.exit(result.status ?? 1);
