import { defineProject } from 'vitest/config';

// Tests read the sources of the sibling packages (tsconfig "paths"), so they need no build.
export default defineProject({
  resolve: { tsconfigPaths: true },
  test: { name: 'constituents', include: ['test/**/*.test.ts'] },
});
