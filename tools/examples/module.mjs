/**
 * Turns one example into a module that runs it and tests each claim.
 */
import ts from 'typescript';
import { parseClaim } from './assertions.mjs';

/**
 * The module of an example: imports on top, the rest in a block of its own inside `run`.
 *
 * @param example - { where, code, scope } of collectExamples.
 * @param specifierFor - How to write a name's origin in an import.
 * @returns { text, claims, findings }: the module, how many claims it tests, and what is wrong with the example itself.
 */
export function exampleModule(example, specifierFor = (origin) => origin) {
  const { code } = example;
  const source = ts.createSourceFile('example.ts', code, ts.ScriptTarget.Latest, true);
  const findings = source.parseDiagnostics.map((d) => {
    return `${example.where}: ${ts.flattenDiagnosticMessageText(d.messageText, ' ')}`;
  });
  const head = [];
  const body = [];
  const claims = [];
  for (const statement of source.statements) {
    if (ts.isImportDeclaration(statement)) {
      head.push(statement.getText(source));
      continue;
    }
    const text = statement.getText(source);
    const remark = remarkAfter(code, statement.end);
    if (remark === undefined || !ts.isExpressionStatement(statement)) {
      body.push(text);
      continue;
    }
    const claim = parseClaim(remark);
    if (claim === undefined) {
      findings.push(`${example.where}: expected a literal or "throws CODE", got // ${remark}`);
      continue;
    }
    const shown = printed(statement.expression).getText(source);
    if (claim.throws) body.push(`await $throws(async () => { ${text} }, ${claims.length});`);
    else body.push(`$check((${shown}), ${claims.length});`);
    claims.push({ ...claim, text: shown, remark });
  }
  if (claims.length === 0 && findings.length === 0) {
    findings.push(`${example.where}: asserts no value; end an expression with // and its value`);
  }
  head.push(...importsFor(source, example.scope, specifierFor));
  const text = [
    ...head,
    'export async function run(',
    '  $check: (value: unknown, claim: number) => void,',
    '  $throws: (work: () => Promise<void>, claim: number) => Promise<void>,',
    '): Promise<void> {',
    '{',
    ...body,
    '}',
    '}',
    '',
  ].join('\n');
  return { text, claims, findings };
}

/** The comment that stands behind a statement on its last line, continued by comment lines under it. */
function remarkAfter(code, end) {
  const match = /^[ \t]*\/\/[ \t]?(.*(?:\n[ \t]*\/\/.*)*)/.exec(code.slice(end));
  return match?.[1].replace(/\n[ \t]*\/\/[ \t]?/g, ' ').trim();
}

/** The argument of console.log(…), or the expression itself. */
function printed(expression) {
  const isLog =
    ts.isCallExpression(expression) &&
    expression.expression.getText() === 'console.log' &&
    expression.arguments.length === 1;
  return isLog ? expression.arguments[0] : expression;
}

/** Imports for the names of the scope that the example uses and does not bring itself. */
function importsFor(source, scope, specifierFor) {
  const used = new Set();
  const own = new Set();
  const visit = (node) => {
    if (ts.isIdentifier(node)) used.add(node.text);
    if (ts.isImportSpecifier(node)) own.add(node.name.text);
    if (
      (ts.isVariableDeclaration(node) || ts.isBindingElement(node)) &&
      ts.isIdentifier(node.name)
    ) {
      own.add(node.name.text);
    }
    ts.forEachChild(node, visit);
  };
  visit(source);
  const wanted = new Map();
  for (const name of used) {
    const origin = scope.get(name);
    if (origin === undefined || own.has(name)) continue;
    wanted.set(origin, [...(wanted.get(origin) ?? []), name]);
  }
  return [...wanted].map(([origin, names]) => {
    return `import { ${names.join(', ')} } from '${specifierFor(origin)}';`;
  });
}
