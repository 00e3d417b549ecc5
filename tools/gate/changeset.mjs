/**
 * The change is described for users: there is a changeset, each one names packages of this workspace and says something, or
 * the versions were just raised (a CHANGELOG.md whose newest heading is the version in package.json).
 */
import { existsSync, readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { conclude, packages, root } from './packages.mjs';

const findings = [];
const all = packages();
const names = new Set(all.map(({ name }) => name));
const files = readdirSync(join(root, '.changeset')).filter(
  (file) => file.endsWith('.md') && file !== 'README.md',
);
for (const file of files) {
  const text = readFileSync(join(root, '.changeset', file), 'utf8');
  const [, head, body] = /^---\n([\s\S]*?)\n---\n([\s\S]*)$/.exec(text) ?? [];
  if (!body?.trim()) {
    findings.push(`.changeset/${file}: expected packages between --- lines and a text for users`);
    continue;
  }
  for (const line of head.split('\n')) {
    const [, name] = /^['"]?([^'"]+)['"]?: (?:major|minor|patch)$/.exec(line) ?? [];
    if (!names.has(name)) findings.push(`.changeset/${file}: no package is meant by ${line}`);
  }
}
const released = all.filter(({ directory, manifest }) => {
  const path = join(directory, 'CHANGELOG.md');
  const newest = existsSync(path) ? /^## (\S+)/m.exec(readFileSync(path, 'utf8'))?.[1] : undefined;
  return newest === manifest.version;
});
if (files.length === 0 && released.length < all.length) {
  findings.push('expected a changeset, got none; run: npm run changeset');
}
conclude(findings, `${files.length} changesets, ${released.length} packages just released`);
