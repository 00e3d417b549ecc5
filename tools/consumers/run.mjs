/**
 * Runs every consumer (or those named) in the sandbox by its own `check` script. Those that compute print their heights as
 * a JSON array: each must equal what Node's ESM consumer prints to 1e-12 m.
 */
import { execFileSync, spawnSync } from 'node:child_process';
import { join } from 'node:path';
import { conclude } from '../gate/packages.mjs';
import { consumers, sandbox } from './sandbox.mjs';

/** Metres; the same arithmetic in every engine, with room for one that contracts a multiply and an add. */
const SAME_HEIGHT = 1e-12;
/** The consumer that the others are compared with. */
const REFERENCE = 'node-esm';

const asked = process.argv.slice(2);
const names = [REFERENCE, ...consumers().filter((name) => name !== REFERENCE)].filter(
  (name) => asked.length === 0 || name === REFERENCE || asked.includes(name),
);
const findings = [];
const folder = sandbox();
const env = { ...process.env, CHROMIUM: chromium() };
let reference;

for (const name of names) {
  const began = performance.now();
  const { status, stdout, stderr } = spawnSync('npm', ['run', '--silent', 'check'], {
    cwd: join(folder, name),
    env,
    encoding: 'utf8',
  });
  if (status !== 0) {
    // A bundle is one long line: its beginning is enough.
    const lines = `${stdout}${stderr}`
      .trimEnd()
      .split('\n')
      .map((line) => line.slice(0, 300));
    findings.push(`${name}: ${lines.join('\n')}`);
    continue;
  }
  const seconds = ((performance.now() - began) / 1000).toFixed(1);
  const last = stdout.trim().split('\n').at(-1) ?? '';
  if (!last.startsWith('[')) {
    console.log(`${name}: content (${seconds} s)`);
    continue;
  }
  const heights = JSON.parse(last);
  reference ??= heights;
  const apart = heights.map((height, index) => Math.abs(height - reference[index]));
  const worst = Math.max(...apart);
  const alike = heights.length === reference.length && apart.every((d) => d <= SAME_HEIGHT);
  if (!alike) findings.push(`${name}: expected ${reference}, got ${heights}`);
  console.log(`${name}: ${heights.length} heights, ${worst} m from Node's (${seconds} s)`);
}
conclude(findings, `${names.length} consumers are content`);

/** Chromium's path, or its usual name. */
function chromium() {
  if (process.env.CHROMIUM) return process.env.CHROMIUM;
  for (const name of ['chromium', 'chromium-browser', 'google-chrome']) {
    try {
      return execFileSync('sh', ['-c', `command -v ${name}`], { encoding: 'utf8' }).trim();
    } catch {}
  }
  return 'chromium';
}
