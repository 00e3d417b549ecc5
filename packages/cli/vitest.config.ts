import { defineProject } from 'vitest/config';

// Tests read the sources of the sibling packages (tsconfig "paths"), so they need no build.
export default defineProject({
  resolve: { tsconfigPaths: true },
  // Each test starts processes, and other projects want the processor at the same time.
  test: { name: 'cli', include: ['test/**/*.test.ts'], testTimeout: 60_000 },
});
