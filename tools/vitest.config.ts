import { defineProject } from 'vitest/config';

export default defineProject({
  resolve: { tsconfigPaths: true },
  test: { name: 'tools', include: ['test/**/*.test.{ts,mjs}'] },
});
