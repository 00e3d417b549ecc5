/**
 * The version of this package.
 * @module
 */
import { readFileSync } from 'node:fs';

/** From the manifest, which stands above the source and above the built file alike. */
export function ownVersion(): string {
  // The built file is dist/staithe.js, the source src/version.ts: both one folder below it.
  const manifest = readFileSync(new URL('../package.json', import.meta.url), 'utf8');
  return (JSON.parse(manifest) as { version: string }).version;
}
