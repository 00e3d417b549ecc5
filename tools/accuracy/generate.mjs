/**
 * Writes docs/accuracy.md and the accuracy table of README.md from what the tests record; with --check writes nothing and
 * ends with 1 where something would change. Runs the tests that record, unless STAITHE_RECORD names a folder that a run
 * of them has already filled.
 */
import { spawnSync } from 'node:child_process';
import { existsSync, mkdtempSync, readdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join, relative } from 'node:path';
import { conclude, root } from '../gate/packages.mjs';
import { readLong } from './long.mjs';
import { accuracyPage, orderRows, parseLines, replaceExcerpt, summaryTable } from './rows.mjs';

const RECORD_CALL = /\brecordAccuracy\(/;
// The recorder's own tests record what no capability backs.
const OF_THE_FRAME = 'test-vectors/test/record.test.ts';

function recordingTests() {
  const packages = readdirSync(join(root, 'packages')).map((name) => join('packages', name));
  return [...packages, 'test-vectors', 'tools', 'demo']
    .map((folder) => join(root, folder, 'test'))
    .filter((folder) => existsSync(folder))
    .flatMap((folder) =>
      readdirSync(folder, { recursive: true, encoding: 'utf8' })
        .filter((name) => /\.test\.(ts|mjs)$/.test(name))
        .map((name) => join(folder, name)),
    )
    .filter((path) => RECORD_CALL.test(readFileSync(path, 'utf8')))
    .map((path) => relative(root, path).replaceAll('\\', '/'))
    .filter((path) => path !== OF_THE_FRAME)
    .sort();
}

function linesOf(folder) {
  return readdirSync(folder)
    .filter((name) => name.endsWith('.jsonl'))
    .flatMap((name) => parseLines(readFileSync(join(folder, name), 'utf8')));
}

function runTests() {
  const tests = recordingTests();
  if (tests.length === 0) return [];
  const folder = mkdtempSync(join(tmpdir(), 'accuracy-'));
  try {
    const vitest = join(root, 'node_modules', 'vitest', 'vitest.mjs');
    const { status, stdout, stderr } = spawnSync(
      process.execPath,
      [vitest, 'run', '--reporter=dot', ...tests],
      { cwd: root, encoding: 'utf8', env: { ...process.env, STAITHE_RECORD: folder } },
    );
    if (status !== 0) {
      conclude([`the tests that record failed:\n${stdout.slice(-4000)}${stderr.slice(-2000)}`], '');
    }
    return linesOf(folder);
  } finally {
    rmSync(folder, { recursive: true });
  }
}

const check = process.argv.includes('--check');
const given = process.env.STAITHE_RECORD;
const { packages: floors } = JSON.parse(
  readFileSync(join(root, 'tools', 'floors', 'floors.json'), 'utf8'),
);
const names = Object.keys(floors);
const rows = orderRows(given ? linesOf(given) : runTests(), names);
const findings = [];
const wanted = new Map([[join(root, 'docs', 'accuracy.md'), accuracyPage(rows, readLong())]]);
const readme = join(root, 'README.md');
try {
  wanted.set(readme, replaceExcerpt(readFileSync(readme, 'utf8'), summaryTable(rows, names)));
} catch (error) {
  findings.push(`README.md: ${error.message}`);
}

for (const [path, text] of wanted) {
  if (existsSync(path) && readFileSync(path, 'utf8') === text) continue;
  if (check) findings.push(`${relative(root, path)}: run node tools/accuracy/generate.mjs`);
  else writeFileSync(path, text);
}
conclude(findings, `${rows.length} comparisons on record`);
