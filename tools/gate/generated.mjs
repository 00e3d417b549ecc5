/**
 * Runs every generator of generated.json with --check: each makes its files in memory and fails when one on disk differs.
 * A generator that is listed and missing is a finding; so is a script called generate.mjs that is not listed.
 */
import { spawnSync } from 'node:child_process';
import { existsSync, readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { conclude, root } from './packages.mjs';

const listed = JSON.parse(readFileSync(join(root, 'tools/gate/generated.json'), 'utf8'));
const findings = [];
for (const { what, script } of listed) {
  if (!existsSync(join(root, script))) {
    findings.push(`${what}: expected ${script}, got none`);
    continue;
  }
  const { status, stdout, stderr } = spawnSync(process.execPath, [script, '--check'], {
    cwd: root,
    encoding: 'utf8',
  });
  if (status === 0) console.log(`${what}: clean`);
  else findings.push(`${what}: ${stdout}${stderr}`.trimEnd());
}
for (const folder of readdirSync(join(root, 'tools'))) {
  const script = `tools/${folder}/generate.mjs`;
  if (existsSync(join(root, script)) && !listed.some((entry) => entry.script === script)) {
    findings.push(`${script}: is not listed in tools/gate/generated.json`);
  }
}
conclude(findings, `${listed.length} generators: nothing to write`);
