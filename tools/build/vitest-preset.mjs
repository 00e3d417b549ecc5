/** How the tests of a project run. They read the sources of the sibling packages, so they need no build. */
import { readFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { defineProject } from 'vitest/config';

/** A test may take its time on a busy machine: speed is never judged by a test. */
const PATIENCE = 180000; // ms

const root = new URL('../../', import.meta.url);

/** The paths of tsconfig.base.json as aliases, for modules of every kind: `@staithe/core/*` before `@staithe/*`. */
function aliases() {
  const { compilerOptions } = JSON.parse(readFileSync(new URL('tsconfig.base.json', root), 'utf8'));
  return Object.entries(compilerOptions.paths).map(([pattern, [target]]) => ({
    find: new RegExp(`^${pattern.replace('*', '([^/]+)')}$`),
    replacement: fileURLToPath(new URL(target.replace('*', '$1'), root)),
  }));
}

export function projectTests(name) {
  return defineProject({
    resolve: { alias: aliases() },
    test: {
      name,
      include: ['test/**/*.test.{ts,mjs}'],
      testTimeout: PATIENCE,
      hookTimeout: PATIENCE,
    },
  });
}
