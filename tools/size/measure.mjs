/**
 * What an import costs: the bytes of a bundle, minified by esbuild and compressed by gzip -9.
 */
import { gzipSync } from 'node:zlib';
import { build } from 'esbuild';

/**
 * Bundles an import as an application would.
 *
 * @param statement - The names and the module: `{ height } from '@staithe/x'` or `* from '@staithe/x'`.
 * @param folder - Where the packages are installed.
 * @returns { bytes, inputs }: the size, and how many bytes of the bundle (before compression) each package gave.
 */
export async function measure(statement, folder) {
  const { outputFiles, metafile } = await build({
    stdin: { contents: `export ${statement};`, resolveDir: folder },
    bundle: true,
    minify: true,
    format: 'esm',
    platform: 'neutral',
    mainFields: ['browser', 'module', 'main'],
    target: 'es2022',
    metafile: true,
    write: false,
    absWorkingDir: folder,
    logLevel: 'error',
  });
  const inputs = new Map();
  for (const { inputs: parts } of Object.values(metafile.outputs)) {
    for (const [path, { bytesInOutput }] of Object.entries(parts)) {
      const name = /.*node_modules\/((?:@[^/]+\/)?[^/]+)/.exec(path)?.[1];
      if (name && bytesInOutput > 0) inputs.set(name, (inputs.get(name) ?? 0) + bytesInOutput);
    }
  }
  return { bytes: gzipSync(outputFiles[0].contents, { level: 9 }).length, inputs };
}
