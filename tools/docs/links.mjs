/**
 * Finds links that lead nowhere: `{@link name}` in doc comments to a name that no package exports (TypeDoc does not tell
 * when it joins packages), and relative links of Markdown files to a file that is not there.
 */
import { existsSync, readFileSync } from 'node:fs';
import { dirname, join, relative } from 'node:path';
import { documents, exportsOf, sourcesOf } from '../examples/collect.mjs';
import { packages, root } from '../gate/packages.mjs';

/** Every broken link, a line each. */
export function brokenLinks() {
  return [...inComments(), ...inDocuments()];
}

function inComments() {
  const all = packages();
  const known = new Set(
    all.flatMap(({ directory, entries }) =>
      entries.flatMap(({ source }) => [...exportsOf(join(directory, source), '').keys()]),
    ),
  );
  return all
    .flatMap(({ directory }) => sourcesOf(directory))
    .flatMap((path) => {
      const text = readFileSync(path, 'utf8');
      const isHere = (name) =>
        new RegExp(`\\b(function\\*?|const|interface|type|class) ${name}\\b`).test(text);
      return [...text.matchAll(/\{@link\s+([A-Za-z_]\w*)/g)]
        .filter(([, name]) => !known.has(name) && !isHere(name))
        .map(([, name]) => `${relative(root, path)}: {@link ${name}}: no package exports it`);
    });
}

function inDocuments() {
  const tops = ['DEVELOPERS.md', 'CONTRIBUTING.md', 'SECURITY.md'].map((name) => join(root, name));
  return [...tops, ...documents()].filter(existsSync).flatMap((path) => {
    const links = readFileSync(path, 'utf8').matchAll(/\]\((?!https?:|mailto:|#)([^)#\s]+)/g);
    return [...links]
      .filter(([, target]) => !existsSync(join(dirname(path), target)))
      .map(([, target]) => `${relative(root, path)}: links to ${target}, which is not there`);
  });
}
