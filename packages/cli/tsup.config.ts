import { defineConfig } from 'tsup';

// A command and nothing to import: one ESM file, no declarations.
export default defineConfig({
  entry: { staithe: 'src/index.ts' },
  format: ['esm'],
  dts: false,
  sourcemap: false,
  clean: true,
  target: 'es2022',
  platform: 'node',
  tsconfig: 'tsconfig.build.json',
});
