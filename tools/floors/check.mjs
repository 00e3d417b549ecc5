/**
 * Checks the floors of all packages: no import upwards or sideways, only declared dependencies, every declared dependency
 * used, no Node built-in in a library, no cycle between packages or between the modules of one.
 */
import { existsSync, readdirSync, readFileSync, statSync } from 'node:fs';
import { dirname, join, relative } from 'node:path';
import ts from 'typescript';
import { conclude, packages, root } from '../gate/packages.mjs';
import { findCycle, judgeImport, packageOf } from './graph.mjs';

const floors = JSON.parse(readFileSync(join(root, 'tools/floors/floors.json'), 'utf8'));
const top = JSON.parse(readFileSync(join(root, 'package.json'), 'utf8'));
const rootDependencies = new Set(Object.keys(top.devDependencies));
const findings = [];
const packageGraph = new Map();
const moduleGraph = new Map();
let files = 0;

/** Every module under a folder. */
function modulesIn(folder) {
  if (!existsSync(folder)) return [];
  return readdirSync(folder, { recursive: true })
    .map((name) => join(folder, name))
    .filter((path) => /\.(ts|mts|mjs|js)$/.test(path) && statSync(path).isFile());
}

/** What a module imports, type imports and import() included; `erased` marks those that leave no trace at run time. */
function importsOf(path) {
  const source = ts.createSourceFile(path, readFileSync(path, 'utf8'), ts.ScriptTarget.Latest);
  const found = [];
  const visit = (node) => {
    if ((ts.isImportDeclaration(node) || ts.isExportDeclaration(node)) && node.moduleSpecifier) {
      found.push({ specifier: node.moduleSpecifier.text, erased: isErased(node) });
    } else if (ts.isCallExpression(node) && node.expression.kind === ts.SyntaxKind.ImportKeyword) {
      const [argument] = node.arguments;
      if (argument && ts.isStringLiteralLike(argument)) {
        found.push({ specifier: argument.text, erased: false });
      }
    } else if (ts.isImportTypeNode(node) && ts.isLiteralTypeNode(node.argument)) {
      found.push({ specifier: node.argument.literal.text, erased: true });
    }
    ts.forEachChild(node, visit);
  };
  visit(source);
  return found;
}

/** True for an import or export of types alone. */
function isErased(node) {
  if (ts.isExportDeclaration(node)) {
    if (node.isTypeOnly) return true;
    return node.exportClause !== undefined && ts.isNamedExports(node.exportClause)
      ? node.exportClause.elements.every((e) => e.isTypeOnly)
      : false;
  }
  const clause = node.importClause;
  if (!clause) return false;
  if (clause.isTypeOnly) return true;
  const names = clause.namedBindings;
  if (clause.name || !names || !ts.isNamedImports(names)) return false;
  return names.elements.length > 0 && names.elements.every((e) => e.isTypeOnly);
}

for (const { folder, directory, name, manifest } of packages()) {
  const from = {
    folder,
    name,
    dependencies: new Set([
      ...Object.keys(manifest.dependencies ?? {}),
      ...Object.keys(manifest.peerDependencies ?? {}),
    ]),
    devDependencies: new Set(Object.keys(manifest.devDependencies ?? {})),
  };
  packageGraph.set(name, [...from.dependencies]);
  const used = new Set();
  for (const [part, places] of [
    ['src', ['src']],
    ['test', ['test', 'bench']],
  ]) {
    for (const path of places.flatMap((place) => modulesIn(join(directory, place)))) {
      files += 1;
      const links = [];
      for (const { specifier, erased } of importsOf(path)) {
        if (part === 'src') used.add(packageOf(specifier));
        const wrong = judgeImport({ from, part, specifier }, floors, rootDependencies);
        if (wrong) findings.push(`${relative(root, path)}: ${wrong}`);
        if (!specifier.startsWith('.')) continue;
        const target = join(dirname(path), specifier);
        const inside = part === 'src' ? directory : root;
        const sibling =
          target.startsWith(join(root, 'packages')) && !target.startsWith(`${directory}/`);
        if (sibling || relative(inside, target).startsWith('..')) {
          findings.push(`${relative(root, path)}: reaches out of its package by ${specifier}`);
        }
        if (!erased) links.push(target.replace(/\.js$/, '.ts'));
      }
      moduleGraph.set(path, links);
    }
  }
  for (const dependency of from.dependencies) {
    if (!used.has(dependency)) findings.push(`packages/${folder}: declares ${dependency}, unused`);
    const version = manifest.dependencies?.[dependency];
    if (/^(@staithe\/|staithe$)/.test(dependency) && version !== 'workspace:^') {
      findings.push(`packages/${folder}: expected workspace:^ for ${dependency}, got ${version}`);
    }
  }
}

for (const [what, graph] of [
  ['packages', packageGraph],
  ['modules', moduleGraph],
]) {
  const cycle = findCycle(graph);
  if (cycle) {
    const names = cycle.map((node) => (what === 'modules' ? relative(root, node) : node));
    findings.push(`a cycle of ${what}: ${names.join(' -> ')}`);
  }
}
conclude(findings, `${packageGraph.size} packages, ${files} modules: every import goes down`);
