/** Reads SVG and HTML as XML: what does not parse fails the test. */
import { expect } from 'vitest';
import { XMLParser, XMLValidator } from 'fast-xml-parser';

export interface Node {
  readonly name: string;
  readonly attributes: Readonly<Record<string, string>>;
  readonly children: readonly Node[];
  /** Text of this element and all below it. */
  readonly text: string;
}

type Raw = Record<string, unknown>;

function toNode(raw: Raw): Node {
  const name = Object.keys(raw).find((key) => key !== ':@') as string;
  if (name === '#text') return { name, attributes: {}, children: [], text: String(raw['#text']) };
  const children = (raw[name] as Raw[]).map(toNode);
  const attributes = (raw[':@'] ?? {}) as Record<string, string>;
  return { name, attributes, children, text: children.map(({ text }) => text).join('') };
}

export function parse(markup: string): Node {
  const text = markup.replace(/^<!doctype html>\n/, '');
  const valid = XMLValidator.validate(text);
  if (valid !== true) throw new Error(JSON.stringify(valid.err));
  const parser = new XMLParser({
    preserveOrder: true,
    ignoreAttributes: false,
    attributeNamePrefix: '',
    parseTagValue: false,
    parseAttributeValue: false,
    trimValues: false,
    processEntities: true,
    htmlEntities: true,
  });
  const [root] = parser.parse(text) as Raw[];
  return toNode(root as Raw);
}

/** All elements with a name, in order. */
export function all(node: Node, name: string): Node[] {
  return node.children.flatMap((child) => [
    ...(child.name === name ? [child] : []),
    ...all(child, name),
  ]);
}

export const withClass = (nodes: readonly Node[], name: string): Node[] =>
  nodes.filter(({ attributes }) => (attributes['class'] ?? '').split(' ').includes(name));

export const number = (node: Node | undefined, key: string): number =>
  Number(node?.attributes[key]);

/** |actual - expected| <= tolerance, in the unit of both. */
export function expectNear(actual: number, expected: number, tolerance: number): void {
  expect(Math.abs(actual - expected), `${actual} beside ${expected}`).toBeLessThanOrEqual(
    tolerance,
  );
}
