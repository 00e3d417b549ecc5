/**
 * The packed tarballs in .packed/, as the checks and consumers find them.
 */
import { existsSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { packages, root } from '../gate/packages.mjs';

/** Where the tarballs lie. */
export const packed = join(root, '.packed');

/** Each package with its tarball: { name, folder, entries, path, bytes }. Ends the run when one has not been packed. */
export function tarballs() {
  return packages().map(({ name, folder, manifest, entries }) => {
    const flat = name.replace('@', '').replace('/', '-');
    const path = join(packed, `${flat}-${manifest.version}.tgz`);
    if (!existsSync(path)) {
      console.error(`${name}: expected ${path}, got none; run: npm run pack`);
      process.exit(1);
    }
    return { name, folder, entries, path, bytes: readFileSync(path) };
  });
}
