/**
 * Type-checks and executes every example of the doc comments, READMEs and docs, and tests each `// value` in them.
 * Arguments, if any, are parts of paths: `node tools/examples/run.mjs packages/gauge` runs that package's alone.
 */
import { spawnSync } from 'node:child_process';
import { mkdirSync, mkdtempSync, readdirSync, rmSync, writeFileSync } from 'node:fs';
import { join, relative } from 'node:path';
import { pathToFileURL } from 'node:url';
import { inspect } from 'node:util';
import { build } from 'esbuild';
import { conclude, root } from '../gate/packages.mjs';
import { meets } from './assertions.mjs';
import { collectExamples } from './collect.mjs';
import { exampleModule } from './module.mjs';

const only = process.argv.slice(2);
// Inside tools/, so that the workspace's own modules and types resolve as they do for everything else here.
mkdirSync(join(root, 'tools/examples/.made'), { recursive: true });
const made = mkdtempSync(join(root, 'tools/examples/.made/run-'));
process.on('exit', () => rmSync(made, { recursive: true, force: true }));

const findings = [];
const examples = collectExamples()
  .filter(({ where }) => only.length === 0 || only.some((part) => where.includes(part)))
  .map((example, index) => {
    const file = `example-${String(index).padStart(4, '0')}`;
    const specifierFor = (origin) =>
      origin.startsWith('/') ? relative(made, origin).replace(/\.ts$/, '.js') : origin;
    const module = exampleModule(example, specifierFor);
    findings.push(...module.findings);
    if (module.findings.length === 0) writeFileSync(join(made, `${file}.ts`), module.text);
    return { ...example, ...module, file };
  })
  .filter((example) => example.findings.length === 0);

/** Type-checks all modules at once. */
function typeCheck() {
  writeFileSync(
    join(made, 'tsconfig.json'),
    JSON.stringify({
      extends: '../../../../tsconfig.test.json',
      compilerOptions: {
        incremental: false,
        tsBuildInfoFile: null,
        lib: ['ES2022', 'DOM'],
        noUncheckedIndexedAccess: false,
      },
      include: ['*.ts'],
      exclude: [],
      references: [],
    }),
  );
  const result = spawnSync(join(root, 'node_modules/.bin/tsc'), ['-p', made, '--pretty', 'false'], {
    cwd: made,
    encoding: 'utf8',
  });
  // What is wrong in a source itself is the business of the types stage.
  for (const line of result.stdout.split('\n').filter((text) => text.startsWith('example-'))) {
    const example = examples.find(({ file }) => line.includes(`${file}.ts`));
    findings.push(`${example?.where ?? ''}: ${line.replace(/^.*error TS/, 'TS')}`);
  }
}

/** Bundles the modules, sources of the workspace included, so that Node 20 can run them. */
async function bundle() {
  const out = join(made, 'out');
  await build({
    entryPoints: readdirSync(made)
      .filter((name) => name.endsWith('.ts'))
      .map((name) => join(made, name)),
    bundle: true,
    splitting: true,
    format: 'esm',
    platform: 'node',
    target: 'node20',
    outdir: out,
    outExtension: { '.js': '.mjs' },
    tsconfig: join(root, 'tsconfig.base.json'),
    banner: {
      js: "import{createRequire as $r}from'node:module';const require=$r(import.meta.url);",
    },
    logLevel: 'error',
  });
  return out;
}

/** Runs one example. */
async function execute(out, { file, where, claims }) {
  let tested = 0;
  const check = (value, index) => {
    tested += 1;
    const claim = claims[index];
    if (meets(value, claim.value)) return;
    const got = inspect(value, { depth: 6, breakLength: Number.POSITIVE_INFINITY });
    findings.push(`${where}: ${claim.text}: expected ${claim.remark}, got ${got}`);
  };
  const checkThrows = async (work, index) => {
    tested += 1;
    const claim = claims[index];
    try {
      await work();
      findings.push(`${where}: ${claim.text}: expected ${claim.throws} thrown, got no error`);
    } catch (error) {
      if (error?.code === claim.throws) return;
      findings.push(`${where}: ${claim.text}: expected ${claim.throws} thrown, got ${error}`);
    }
  };
  try {
    const { run } = await import(pathToFileURL(join(out, `${file}.mjs`)).href);
    await run(check, checkThrows);
  } catch (error) {
    findings.push(`${where}: ${error?.stack ?? error}`);
    return tested;
  }
  if (tested < claims.length) findings.push(`${where}: ran ${tested} of ${claims.length} claims`);
  return tested;
}

let tested = 0;
if (examples.length > 0) {
  typeCheck();
  try {
    const out = await bundle();
    const log = console.log;
    console.log = () => {};
    for (const example of examples) tested += await execute(out, example);
    console.log = log;
  } catch (error) {
    findings.push(String(error));
  }
}
conclude(findings, `${examples.length} examples, ${tested} values: all as written`);
