/**
 * Writes the demo's records and truths into a folder: `node demo/generate/write.mjs FOLDER`.
 * @module
 */
import { mkdirSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { makeDemoRecords } from './records.mjs';

const folder = process.argv[2];
if (folder === undefined) {
  console.error(
    'folder: expected one to write into, as in `node demo/generate/write.mjs records`, got none',
  );
  process.exit(2);
}
mkdirSync(folder, { recursive: true });
for (const { name, text } of makeDemoRecords().files) {
  writeFileSync(join(folder, name), text);
  console.log(`wrote     ${join(folder, name)}`);
}
