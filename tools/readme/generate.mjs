/**
 * Writes the API section of every package README, between <!-- api --> and <!-- /api -->, from the doc comments of what its
 * entries export: a table of functions, and the constants and types by name. `--check` only tells whether they are up to
 * date. A README without the section gets one at its end.
 */
import { existsSync, readFileSync, writeFileSync } from 'node:fs';
import { dirname, join, resolve } from 'node:path';
import ts from 'typescript';
import { conclude, packages } from '../gate/packages.mjs';

const check = process.argv.includes('--check');
const SECTION = /<!-- api -->[\s\S]*?<!-- \/api -->/;

const all = packages();
const parsed = new Map();
function parse(path) {
  if (!parsed.has(path)) {
    const text = readFileSync(path, 'utf8');
    parsed.set(path, ts.createSourceFile(path, text, ts.ScriptTarget.Latest, true));
  }
  return parsed.get(path);
}

/** The module that a re-export names: a file of the same package, or the entry of another package of the family. */
function moduleAt(path, specifier) {
  if (specifier.startsWith('.')) return resolve(dirname(path), specifier).replace(/\.js$/, '.ts');
  const other = all.find(({ name }) => name === specifier);
  return other && join(other.directory, 'src', 'index.ts');
}

/** The declaration that a re-export leads to: its kind and the first sentence of its doc comment. */
function describe(path, name) {
  for (const statement of parse(path).statements) {
    if (ts.isExportDeclaration(statement) && statement.moduleSpecifier) {
      const element = statement.exportClause?.elements?.find((e) => e.name.text === name);
      if (!element) continue;
      const target = moduleAt(path, statement.moduleSpecifier.text);
      return target && describe(target, (element.propertyName ?? element.name).text);
    }
    const declarations = ts.isVariableStatement(statement)
      ? statement.declarationList.declarations
      : [statement];
    if (!declarations.some((d) => d.name?.text === name)) continue;
    return { kind: kindOf(statement), summary: summaryOf(statement) };
  }
  return undefined;
}

function kindOf(statement) {
  if (ts.isFunctionDeclaration(statement)) return 'function';
  if (ts.isClassDeclaration(statement)) return 'class';
  return ts.isVariableStatement(statement) ? 'constant' : 'type';
}

/** The first sentence of a doc comment, on one line. */
function summaryOf(statement) {
  const [doc] = ts.getJSDocCommentsAndTags(statement);
  const text = (ts.getTextOfJSDocComment(doc?.comment) ?? '').split('\n\n')[0].replace(/\s+/g, ' ');
  const plain = text.replace(/\{@link (\S+?)\}/g, '`$1`').replaceAll('|', '\\|');
  return /^.*?[.:?](?= [A-Z]|$)/.exec(plain)?.[0].replace(/:$/, '.') ?? plain;
}

/** The section of one package. */
function sectionOf({ directory, name, entries }) {
  const lines = [];
  for (const { subpath, source } of entries) {
    const index = join(directory, source);
    const own = subpath === '.' ? name : `${name}/${subpath.slice(2)}`;
    const exported = parse(index)
      .statements.filter((s) => ts.isExportDeclaration(s) && s.exportClause?.elements)
      // A subpath that passes on another package is documented there.
      .filter((s) => subpath === '.' || s.moduleSpecifier?.text.startsWith('.'))
      .flatMap((s) => s.exportClause.elements.map((e) => e.name.text));
    const found = exported.map((what) => ({ what, ...describe(index, what) }));
    if (found.length === 0) continue;
    const functions = found.filter(({ kind }) => kind === 'function' || kind === 'class');
    const list = (kind) =>
      found
        .filter((f) => f.kind === kind)
        .map(({ what }) => `\`${what}\``)
        .join(', ');
    lines.push('', `From \`${own}\`:`, '');
    if (functions.length > 0) lines.push('| Function | What it does |', '| --- | --- |');
    for (const { what, summary } of functions) lines.push(`| \`${what}\` | ${summary} |`);
    if (list('constant')) lines.push('', `Constants: ${list('constant')}.`);
    if (list('type')) lines.push('', `Types: ${list('type')}.`);
  }
  return ['<!-- api -->', ...lines.slice(1), '<!-- /api -->'].join('\n');
}

const findings = [];
let written = 0;
for (const entry of all) {
  const path = join(entry.directory, 'README.md');
  // A command has no API.
  if (!existsSync(path) || entry.entries.length === 0) continue;
  const text = readFileSync(path, 'utf8');
  const section = sectionOf(entry);
  const wanted = SECTION.test(text)
    ? text.replace(SECTION, () => section)
    : `${text.trimEnd()}\n\n## API\n\n${section}\n`;
  if (wanted === text) continue;
  if (check) {
    findings.push(
      `packages/${entry.folder}/README.md: the API section is out of date; run: node tools/readme/generate.mjs`,
    );
    continue;
  }
  writeFileSync(path, wanted);
  written += 1;
}
conclude(findings, check ? 'the API sections are up to date' : `${written} READMEs written`);
