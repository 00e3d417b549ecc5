/** The one build recipe of all packages: ESM and CommonJS, each with its own types, from one source. */
import { defineConfig } from 'tsup';

export function packageBuild(entry = ['src/index.ts']) {
  return defineConfig({
    entry,
    format: ['esm', 'cjs'],
    dts: true,
    sourcemap: false,
    clean: true,
    target: 'es2022',
    platform: 'neutral',
    tsconfig: 'tsconfig.build.json',
  });
}
