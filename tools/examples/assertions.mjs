/**
 * What the trailing comment of an example claims, and whether a value meets it.
 */
import ts from 'typescript';

/**
 * Reads a claim: a JavaScript literal (number, string, boolean, null, undefined, array, object, a typed array as
 * `Float64Array.of(1, 2)` or, as Node shows it, `Float64Array(2) [1, 2]`), or `throws CODE`.
 *
 * @returns { throws: 'CODE' } or { value }, or undefined when the text is neither.
 */
export function parseClaim(text) {
  const thrown = /^throws ([A-Z][A-Z0-9_]*)$/.exec(text.trim());
  if (thrown) return { throws: thrown[1] };
  const plain = text.trim().replace(/\b[A-Z]\w*Array(?:\(\d+\))? \[/g, '[');
  const source = ts.createSourceFile('claim.ts', `(${plain})`, ts.ScriptTarget.Latest);
  const [statement, ...rest] = source.statements;
  if (source.parseDiagnostics.length > 0 || rest.length > 0) return undefined;
  if (!statement || !ts.isExpressionStatement(statement)) return undefined;
  try {
    return { value: literal(statement.expression.expression) };
  } catch {
    return undefined;
  }
}

const WORDS = { undefined, NaN: Number.NaN, Infinity: Number.POSITIVE_INFINITY };
const ARRAYS = { Float64Array, Float32Array, Int8Array, Int32Array, Uint8Array, Uint32Array };

/** The value of a literal expression. Throws on anything else. */
function literal(node) {
  if (ts.isNumericLiteral(node)) return Number(node.text);
  if (ts.isStringLiteralLike(node)) return node.text;
  if (node.kind === ts.SyntaxKind.TrueKeyword) return true;
  if (node.kind === ts.SyntaxKind.FalseKeyword) return false;
  if (node.kind === ts.SyntaxKind.NullKeyword) return null;
  if (ts.isIdentifier(node) && node.text in WORDS) return WORDS[node.text];
  if (ts.isPrefixUnaryExpression(node) && node.operator === ts.SyntaxKind.MinusToken) {
    return -literal(node.operand);
  }
  if (ts.isArrayLiteralExpression(node)) return node.elements.map(literal);
  if (ts.isObjectLiteralExpression(node)) {
    return Object.fromEntries(
      node.properties.map((property) => {
        if (!ts.isPropertyAssignment(property)) throw new Error('not a literal');
        return [property.name.text, literal(property.initializer)];
      }),
    );
  }
  if (ts.isCallExpression(node) && ts.isPropertyAccessExpression(node.expression)) {
    const { expression, name } = node.expression;
    const kind = ts.isIdentifier(expression) ? ARRAYS[expression.text] : undefined;
    if (kind && name.text === 'of') return kind.from(node.arguments.map(literal));
  }
  throw new Error('not a literal');
}

/**
 * Deep equality of plain data: numbers to the last bit (NaN equals NaN, and 0 equals -0), the same keys, the same
 * lengths. An array literal also stands for a typed array.
 */
export function meets(actual, expected) {
  if (typeof actual !== 'object' || typeof expected !== 'object' || !actual || !expected) {
    return actual === expected || (Number.isNaN(actual) && Number.isNaN(expected));
  }
  const list = (value) => Array.isArray(value) || ArrayBuffer.isView(value);
  if (list(actual) !== list(expected)) return false;
  if (ArrayBuffer.isView(expected) && actual.constructor !== expected.constructor) return false;
  const keys = Object.keys(expected);
  return (
    Object.keys(actual).length === keys.length &&
    keys.every((key) => Object.hasOwn(actual, key) && meets(actual[key], expected[key]))
  );
}
