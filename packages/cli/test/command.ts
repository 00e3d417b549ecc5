/**
 * Runs the command as people do: a process of its own. The sources are bundled once for a test file, so that a start takes
 * 0.2 s. The host's zone is set to one that no test asks for: it must not matter.
 */
import { type ChildProcess, spawn, type SpawnOptions } from 'node:child_process';
import { chmodSync, copyFileSync, mkdtempSync, realpathSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { build } from 'esbuild';
import { afterAll, beforeAll } from 'vitest';

const here = fileURLToPath(new URL('..', import.meta.url));

export interface Outcome {
  readonly code: number | null;
  readonly out: string;
  readonly err: string;
}

export interface Bench {
  /** A folder for files of the tests. */
  readonly folder: string;
  /** A path in it. */
  readonly path: (name: string) => string;
  /** Writes a file and gives its path. */
  readonly put: (name: string, text: string) => string;
  readonly start: (args: readonly string[], options?: SpawnOptions) => ChildProcess;
  readonly run: (
    args: readonly string[],
    stdin?: string,
    options?: SpawnOptions,
  ) => Promise<Outcome>;
}

/** Bundles the command before the tests of a file and clears up after them. */
export function useCommand(): Bench {
  const folder = realpathSync(mkdtempSync(join(tmpdir(), 'staithe-cli-')));
  chmodSync(folder, 0o755);
  const program = join(folder, 'program', 'dist', 'staithe.mjs');
  beforeAll(async () => {
    await build({
      entryPoints: [join(here, 'src/index.ts')],
      outfile: program,
      bundle: true,
      platform: 'node',
      format: 'esm',
      tsconfig: join(here, 'tsconfig.json'),
      banner: {
        js: "import { createRequire } from 'node:module'; const require = createRequire(import.meta.url);",
      },
      logLevel: 'error',
    });
    copyFileSync(join(here, 'package.json'), join(folder, 'program', 'package.json'));
  }, 60_000);
  afterAll(() => rmSync(folder, { recursive: true, force: true }));

  const path = (name: string): string => join(folder, name);
  const start: Bench['start'] = (args, options = {}) =>
    spawn(process.execPath, [program, ...args], {
      cwd: folder,
      ...options,
      env: { ...process.env, TZ: 'Asia/Kathmandu', ...options.env },
    });
  return {
    folder,
    path,
    start,
    put(name, text) {
      writeFileSync(path(name), text);
      return path(name);
    },
    run: (args, stdin, options) =>
      new Promise((resolve, reject) => {
        const child = start(args, options);
        let [out, err] = ['', ''];
        child.stdout?.setEncoding('utf8').on('data', (text: string) => (out += text));
        child.stderr?.setEncoding('utf8').on('data', (text: string) => (err += text));
        child.on('error', reject);
        child.on('close', (code) => resolve({ code, out, err }));
        child.stdin?.end(stdin ?? '');
      }),
  };
}
