/**
 * Runs the benches: every module in packages/*\/bench (or those whose path holds one of the arguments), one after another.
 * With BENCH_SMALL=1 each does little work, enough to show that it runs.
 */
import { spawnSync } from 'node:child_process';
import { existsSync, readdirSync } from 'node:fs';
import { join } from 'node:path';
import { conclude, packages, root } from '../gate/packages.mjs';

const asked = process.argv.slice(2);
const benches = packages()
  .flatMap(({ folder, directory }) => {
    const path = join(directory, 'bench');
    return (existsSync(path) ? readdirSync(path) : []).map(
      (file) => `packages/${folder}/bench/${file}`,
    );
  })
  .filter((path) => /\.(ts|mjs)$/.test(path))
  .filter((path) => asked.length === 0 || asked.some((part) => path.includes(part)));

const findings = [];
for (const path of benches) {
  console.log(`\n${path}`);
  // tsx reads the sources of the sibling packages by the paths of this configuration.
  const { status } = spawnSync('tsx', ['--tsconfig', 'tsconfig.test.json', path], {
    cwd: root,
    stdio: 'inherit',
  });
  if (status !== 0) findings.push(`${path}: ended with ${status}`);
}
if (benches.length === 0) findings.push('expected a bench, got none');
conclude(findings, `${benches.length} benches ran`);
