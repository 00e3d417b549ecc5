import { packages } from './tools/gate/packages.mjs';

const ofPackages = Object.fromEntries(
  packages().map(({ folder, entries, manifest }) => [
    `packages/${folder}`,
    {
      entry: [
        ...new Set([
          'src/index.ts',
          ...entries.map(({ source }) => source.replace('./', '')),
          ...Object.values(manifest.bin ?? {}).map((path) => {
            return path.replace(/^(\.\/)?dist\//, 'src/').replace(/\.[cm]?js$/, '.ts');
          }),
        ]),
        'test/**/*.test.ts',
        'test/**/*.test-d.ts',
        'bench/**/*.{ts,mjs}',
      ],
      project: ['src/**/*.ts', 'test/**/*.ts', 'bench/**/*.{ts,mjs}'],
      // The check values stand on core: if its tests declared them, the two would stand in a circle.
      ...(folder === 'core' ? { ignoreDependencies: ['@staithe/test-vectors'] } : {}),
    },
  ]),
);

export default {
  // A type that a module names in its own signatures is exported for its readers.
  ignoreExportsUsedInFile: { interface: true, type: true },
  workspaces: {
    '.': {
      project: ['*.{js,ts}'],
      // Commands that npm scripts and .ci/run start by way of tools/setup/run.mjs, where knip does not look.
      ignoreDependencies: [
        '@arethetypeswrong/cli',
        '@biomejs/biome',
        '@changesets/cli',
        'publint',
        'tsx',
        'typedoc',
      ],
    },
    ...ofPackages,
    'test-vectors': {
      entry: ['src/index.ts', 'test/**/*.test.ts'],
      project: ['src/**/*.ts', 'test/**/*.ts'],
    },
    tools: {
      entry: [
        '*/*.mjs',
        'examples/given.ts',
        'docs/constituent-pages.ts',
        'docs/current-ellipse.ts',
        'test/**/*.test.{ts,mjs}',
      ],
      // The consumers are projects of their own: they run in a sandbox outside the workspace.
      project: ['**/*.{ts,mjs}', '!consumers/*/**'],
    },
    demo: {
      entry: ['*.mjs', 'generate/write.mjs', 'test/**/*.test.{ts,mjs}'],
      project: ['**/*.{ts,mjs}'],
    },
  },
};
