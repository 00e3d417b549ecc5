/**
 * Bundles the job for a place that has the language and nothing else, and runs it in one: no Node, no DOM, no timers.
 */
import { createContext, runInContext } from 'node:vm';
import { build } from 'esbuild';

const { outputFiles, metafile } = await build({
  entryPoints: ['job.js'],
  bundle: true,
  minify: true,
  format: 'iife',
  globalName: 'worker',
  platform: 'neutral',
  mainFields: ['browser', 'module', 'main'],
  target: 'es2022',
  metafile: true,
  write: false,
});
const outside = Object.values(metafile.outputs).flatMap(({ imports }) => imports);
if (outside.length > 0) throw new Error(`imports ${outside.map(({ path }) => path).join(', ')}`);
const bare = createContext({}, { codeGeneration: { strings: false, wasm: false } });
runInContext(outputFiles[0].text, bare);
console.log(runInContext('JSON.stringify(worker.job())', bare));
