import type { defineConfig } from 'tsup';

/** The build of a package: by default of its one entry, src/index.ts. */
export declare function packageBuild(entry?: string[]): ReturnType<typeof defineConfig>;
