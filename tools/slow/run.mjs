/**
 * Runs the long versions of the checks: every other module in this folder (or those named), one after another. Their
 * results are kept with their date in docs/accuracy.md.
 */
import { spawnSync } from 'node:child_process';
import { readdirSync } from 'node:fs';
import { join } from 'node:path';
import { conclude, root } from '../gate/packages.mjs';

const asked = process.argv.slice(2);
const scripts = readdirSync(join(root, 'tools/slow'))
  .filter((file) => /\.(mjs|ts)$/.test(file) && file !== 'run.mjs')
  .filter((file) => asked.length === 0 || asked.some((part) => file.includes(part)));

const findings = [];
for (const file of scripts) {
  const began = performance.now();
  console.log(`\ntools/slow/${file}`);
  const { status } = spawnSync('tsx', ['--tsconfig', 'tsconfig.test.json', `tools/slow/${file}`], {
    cwd: root,
    stdio: 'inherit',
  });
  console.log(`(${((performance.now() - began) / 1000).toFixed(1)} s)`);
  if (status !== 0) findings.push(`tools/slow/${file}: ended with ${status}`);
}
conclude(findings, `${scripts.length} long checks passed`);
