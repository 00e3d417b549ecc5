import { defineConfig } from 'vitest/config';

export default defineConfig({
  test: {
    projects: ['packages/*', 'test-vectors', 'tools', 'demo'],
    coverage: { provider: 'v8', include: ['packages/*/src/**'], reporter: ['text-summary'] },
  },
});
