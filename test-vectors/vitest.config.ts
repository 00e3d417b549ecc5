import { defineProject } from 'vitest/config';

export default defineProject({
  resolve: { tsconfigPaths: true },
  test: { name: 'test-vectors', include: ['test/**/*.test.{ts,mjs}'] },
});
