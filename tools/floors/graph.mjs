/**
 * The rules of the floors, as functions of plain data: which imports of a package are allowed, and whether there is a cycle.
 */
import { builtinModules } from 'node:module';

const builtins = new Set(builtinModules);

/** The package part of a module name: '@staithe/core/x' gives '@staithe/core'; undefined for a relative one. */
export function packageOf(specifier) {
  if (specifier.startsWith('.') || specifier.startsWith('/')) return undefined;
  if (specifier.startsWith('node:')) return specifier;
  return specifier
    .split('/')
    .slice(0, specifier.startsWith('@') ? 2 : 1)
    .join('/');
}

/**
 * What is wrong with one import, or undefined.
 *
 * @param use - `from`: the importing package { folder, name, dependencies, devDependencies };
 *   `part`: 'src', or 'test' for tests, benches and configuration; `specifier`.
 * @param floors - { packages: folder to floor, nodeBuiltinsAllowed }.
 * @param rootDependencies - What the top package.json declares: for tests only.
 */
export function judgeImport({ from, part, specifier }, floors, rootDependencies = new Set()) {
  const target = packageOf(specifier);
  if (target === undefined || target === from.name) return undefined;
  if (target.startsWith('node:') || builtins.has(target)) {
    if (part !== 'src' || floors.nodeBuiltinsAllowed.includes(from.folder)) return undefined;
    return `imports ${specifier}, a part of Node`;
  }
  if (target === '@staithe/test-vectors') {
    return part === 'src' ? 'imports the test vectors, which do not ship' : undefined;
  }
  const sibling = target === 'staithe' ? 'staithe' : target.replace(/^@staithe\//, '');
  if (target === 'staithe' || target.startsWith('@staithe/')) {
    const own = floors.packages[from.folder];
    const other = floors.packages[sibling];
    if (other === undefined) return `imports ${target}, which has no floor`;
    if (part === 'src' ? other >= own : other > own) {
      return `imports ${target} of floor ${other}, from floor ${own}`;
    }
    // A test reads the sources of its siblings by path, so a lower floor needs no declaration there.
    if (part !== 'src') return undefined;
  }
  if (from.dependencies.has(target)) return undefined;
  if (part !== 'src' && (from.devDependencies.has(target) || rootDependencies.has(target))) {
    return undefined;
  }
  return `imports ${target}, which its package.json does not declare`;
}

/** A cycle in a graph (Map of node to a list of nodes) as a list that ends where it begins, or undefined. */
export function findCycle(graph) {
  const done = new Set();
  const path = [];
  const visit = (node) => {
    const at = path.indexOf(node);
    if (at >= 0) return [...path.slice(at), node];
    if (done.has(node)) return undefined;
    path.push(node);
    for (const next of graph.get(node) ?? []) {
      const cycle = visit(next);
      if (cycle) return cycle;
    }
    path.pop();
    done.add(node);
    return undefined;
  };
  for (const node of graph.keys()) {
    const cycle = visit(node);
    if (cycle) return cycle;
  }
  return undefined;
}
