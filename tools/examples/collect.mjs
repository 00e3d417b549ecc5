/**
 * Finds the examples: every `@example` of the doc comments in packages/*\/src and every block of TypeScript in the READMEs
 * and docs. Each comes as { where, code, scope }: where it stands, what it says, and which names it may use unimported.
 */
import { existsSync, readdirSync, readFileSync } from 'node:fs';
import { join, relative } from 'node:path';
import ts from 'typescript';
import { packages, root } from '../gate/packages.mjs';

/** The sources of a package, tests left out. */
export function sourcesOf(directory) {
  return readdirSync(join(directory, 'src'), { recursive: true })
    .filter((name) => name.endsWith('.ts') && !name.startsWith('generated'))
    .sort()
    .map((name) => join(directory, 'src', name));
}

/** The names an index module or any other module exports, types included, each with the module to import it from. */
export function exportsOf(path, specifier) {
  const source = ts.createSourceFile(path, readFileSync(path, 'utf8'), ts.ScriptTarget.Latest);
  const names = new Map();
  for (const statement of source.statements) {
    if (ts.isExportDeclaration(statement) && statement.exportClause) {
      for (const element of statement.exportClause.elements ?? []) {
        names.set(element.name.text, specifier);
      }
    } else if (statement.modifiers?.some((m) => m.kind === ts.SyntaxKind.ExportKeyword)) {
      const declared = ts.isVariableStatement(statement)
        ? statement.declarationList.declarations
        : [statement];
      for (const { name } of declared) if (name) names.set(name.text, specifier);
    }
  }
  return names;
}

/** The `@example` tags of one module. */
function examplesIn(path) {
  const text = readFileSync(path, 'utf8');
  const source = ts.createSourceFile(path, text, ts.ScriptTarget.Latest, true);
  const found = [];
  const seen = new Set();
  const visit = (node) => {
    for (const tag of ts.getJSDocTags(node)) {
      if (tag.tagName.text !== 'example' || seen.has(tag.pos)) continue;
      seen.add(tag.pos);
      const line = source.getLineAndCharacterOfPosition(tag.pos).line + 1;
      found.push({ line, code: unfence(ts.getTextOfJSDocComment(tag.comment) ?? '') });
    }
    ts.forEachChild(node, visit);
  };
  visit(source);
  return found;
}

/** The code inside a fence, or the text itself when there is none. */
function unfence(text) {
  const fenced = [...text.matchAll(/^```(?:ts|typescript)?\n([\s\S]*?)^```/gm)];
  return fenced.length > 0 ? fenced.map((m) => m[1]).join('\n') : text;
}

/** All Markdown that people read as documentation. */
export function documents() {
  const found = [join(root, 'README.md')];
  for (const { directory } of packages()) found.push(join(directory, 'README.md'));
  const docs = join(root, 'docs');
  const names = existsSync(docs) ? readdirSync(docs, { recursive: true }).sort() : [];
  for (const name of names) {
    if (name.endsWith('.md') && !name.startsWith('api/')) found.push(join(docs, name));
  }
  return found.filter((path) => existsSync(path));
}

/** The blocks fenced as ts in one document. */
function blocksIn(path) {
  const text = readFileSync(path, 'utf8');
  return [...text.matchAll(/^```(?:ts|typescript)[ \t]*\n([\s\S]*?)^```/gm)].map((match) => ({
    line: text.slice(0, match.index).split('\n').length,
    code: match[1],
  }));
}

/** The names that a package exports, each with the entry to import it from: the root where it has it. */
function exportsOfPackage({ directory, name, entries }) {
  const names = new Map();
  for (const { subpath, source } of [...entries].reverse()) {
    const specifier = subpath === '.' ? name : `${name}/${subpath.slice(2)}`;
    const path = join(directory, source);
    if (!existsSync(path)) continue;
    for (const [exported, from] of exportsOf(path, specifier)) names.set(exported, from);
  }
  return names;
}

/** Every example of the repository. */
export function collectExamples() {
  const all = packages();
  const given = join(root, 'tools/examples/given.ts');
  const ofPackages = new Map(all.map((entry) => [entry.name, exportsOfPackage(entry)]));
  const examples = [];
  for (const { directory, name, manifest } of all) {
    const ofPackage = exportsOf(given, given);
    for (const from of ['@staithe/core', ...Object.keys(manifest.dependencies ?? {}), name]) {
      for (const [exported, origin] of ofPackages.get(from) ?? []) ofPackage.set(exported, origin);
    }
    for (const path of sourcesOf(directory)) {
      const scope = new Map([...exportsOf(path, path), ...ofPackage]);
      for (const { line, code } of examplesIn(path)) {
        examples.push({ where: `${relative(root, path)}:${line}`, path, code, scope });
      }
    }
  }
  for (const path of documents()) {
    for (const { line, code } of blocksIn(path)) {
      examples.push({ where: `${relative(root, path)}:${line}`, path, code, scope: new Map() });
    }
  }
  return examples;
}
