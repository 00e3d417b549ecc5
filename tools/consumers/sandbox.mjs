/**
 * A folder outside the workspace with the consumers in it and the packed tarballs installed by npm, as a user would have
 * them. Made once for one set of tarballs.
 */
import { execFileSync } from 'node:child_process';
import { createHash } from 'node:crypto';
import {
  cpSync,
  existsSync,
  mkdirSync,
  readdirSync,
  readFileSync,
  rmSync,
  writeFileSync,
} from 'node:fs';
import { tmpdir } from 'node:os';
import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { tarballs } from '../pack/tarballs.mjs';

const here = dirname(fileURLToPath(import.meta.url));

/** The folders of the consumers. */
export function consumers() {
  return readdirSync(here).filter((name) => existsSync(join(here, name, 'package.json')));
}

/** Makes the sandbox, or finds it made; returns its path. */
export function sandbox() {
  const packs = tarballs();
  const manifests = consumers().map((name) =>
    readFileSync(join(here, name, 'package.json'), 'utf8'),
  );
  const digest = createHash('sha256');
  for (const { bytes } of packs) digest.update(bytes);
  for (const text of manifests) digest.update(text);
  const want = digest.digest('hex');
  const folder = join(
    tmpdir(),
    `staithe-consumers-${createHash('sha256').update(here).digest('hex').slice(0, 8)}`,
  );
  const stamp = join(folder, '.made-of');
  if (!existsSync(stamp) || readFileSync(stamp, 'utf8') !== want) {
    rmSync(folder, { recursive: true, force: true });
    mkdirSync(folder, { recursive: true });
    install(
      folder,
      packs,
      manifests.map((text) => JSON.parse(text)),
    );
    writeFileSync(stamp, want);
  }
  for (const name of consumers()) {
    cpSync(join(here, name), join(folder, name), { recursive: true });
    cpSync(join(here, 'shared'), join(folder, name), { recursive: true });
  }
  return folder;
}

/** One npm install for all of them: the tarballs for every package of the family, also where one needs another. */
function install(folder, packs, manifests) {
  const own = Object.fromEntries(packs.map(({ name, path }) => [name, `file:${path}`]));
  const manifest = {
    name: 'staithe-consumers',
    private: true,
    dependencies: own,
    devDependencies: Object.assign({}, ...manifests.map((m) => m.devDependencies ?? {})),
    overrides: Object.fromEntries(packs.map(({ name }) => [name, `$${name}`])),
  };
  writeFileSync(join(folder, 'package.json'), JSON.stringify(manifest, null, 2));
  const flags = [
    '--no-audit',
    '--no-fund',
    '--no-package-lock',
    '--ignore-scripts',
    '--loglevel=error',
  ];
  execFileSync('npm', ['install', ...flags], {
    cwd: folder,
    stdio: ['ignore', 'ignore', 'inherit'],
  });
}
