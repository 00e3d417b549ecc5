/** How the tests of a project run. They read the sources of the sibling packages (tsconfig "paths"), so they need no build. */
import { defineProject } from 'vitest/config';

/** A test may take its time on a busy machine: speed is never judged by a test. */
const PATIENCE = 180000; // ms

export function projectTests(name) {
  return defineProject({
    resolve: { tsconfigPaths: true },
    test: {
      name,
      include: ['test/**/*.test.{ts,mjs}'],
      testTimeout: PATIENCE,
      hookTimeout: PATIENCE,
    },
  });
}
