/**
 * Runs a checker over every packed tarball, two at a time: `check.mjs publint` or `check.mjs attw`. The tarballs are also
 * read for what must never ship: tests, sources, workspace versions.
 */
import { execFile, execFileSync } from 'node:child_process';
import { promisify } from 'node:util';
import { conclude } from '../gate/packages.mjs';
import { tarballs } from './tarballs.mjs';

const run = promisify(execFile);
const checkers = {
  publint: (path) => ['publint', ['run', path, '--strict']],
  attw: (path) => ['attw', [path, '--profile', 'node16', '--no-emoji', '--no-color']],
};
const which = process.argv[2];
const checker = checkers[which];
if (!checker) throw new Error(`expected publint or attw, got ${which}`);

const findings = [];
// A command has no types to be wrong.
const queue = tarballs().filter(({ entries }) => which === 'publint' || entries.length > 0);
const count = queue.length;

/** Complaints about what a tarball holds. */
function unwanted({ name, path }) {
  const listed = execFileSync('tar', ['-tzf', path], { encoding: 'utf8' }).trim().split('\n');
  const manifest = execFileSync('tar', ['-xzOf', path, 'package/package.json'], {
    encoding: 'utf8',
  });
  return [
    ...listed
      .filter((file) => /^package\/(src|test|bench|etc|tsconfig|tsup)/.test(file))
      .map((file) => `${name}: ships ${file}`),
    ...(listed.includes('package/LICENSE') ? [] : [`${name}: ships no LICENSE`]),
    ...(manifest.includes('workspace:') ? [`${name}: ships a workspace: version`] : []),
  ];
}

async function work() {
  for (let next = queue.shift(); next; next = queue.shift()) {
    if (which === 'publint') findings.push(...unwanted(next));
    try {
      await run(...checker(next.path));
    } catch (error) {
      findings.push(`${next.name}:\n${error.stdout}${error.stderr}`);
    }
  }
}
await Promise.all([work(), work()]);
conclude(findings, `${which}: ${count} tarballs are sound`);
