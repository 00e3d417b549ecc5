import { defineProject } from 'vitest/config';

export default defineProject({
  resolve: { tsconfigPaths: true },
  test: { name: 'demo', include: ['test/**/*.test.{ts,mjs}'] },
});
