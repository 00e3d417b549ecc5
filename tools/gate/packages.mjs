/**
 * The packages of this workspace, as every tool of the gate sees them. Uses no dependency.
 */
import { existsSync, readdirSync, readFileSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';

/** The top folder of the repository. */
export const root = join(dirname(fileURLToPath(import.meta.url)), '..', '..');

/**
 * What the published packages are, in the order of their folders: `folder` under packages/, `directory` in full, `name`,
 * `manifest`, and `entries`: the subpath ('.' or './sky'), its source and its built files.
 * A folder without src/index.ts is not a package yet and is left out; tools/gate/complete.mjs names those.
 */
export function packages() {
  return readdirSync(join(root, 'packages'))
    .sort()
    .map((folder) => ({ folder, directory: join(root, 'packages', folder) }))
    .filter(({ directory }) => existsSync(join(directory, 'src', 'index.ts')))
    .map(({ folder, directory }) => {
      const manifest = JSON.parse(readFileSync(join(directory, 'package.json'), 'utf8'));
      return { folder, directory, name: manifest.name, manifest, entries: entriesOf(manifest) };
    });
}

/** The code entries of an exports map, data files left out. */
function entriesOf(manifest) {
  return Object.entries(manifest.exports ?? {})
    .filter(([, target]) => typeof target === 'object' && target.import?.types !== undefined)
    .map(([subpath, target]) => ({
      subpath,
      source: target.import.default.replace('./dist/', 'src/').replace(/\.js$/, '.ts'),
      types: target.import.types,
      module: target.import.default,
      common: target.require?.default,
    }));
}

/** Ends a tool: prints the findings and leaves with 1, or prints what was found good. */
export function conclude(findings, good) {
  for (const finding of findings) console.error(finding);
  if (findings.length > 0) {
    console.error(`${findings.length} finding${findings.length === 1 ? '' : 's'}`);
    process.exit(1);
  }
  console.log(good);
}
