import type { SvgNode } from './svg-tree.ts';

/** What decides whether and how an element is seen. */
export type SvgStyle = {
  readonly shown: boolean;
  readonly visible: boolean;
  readonly fill: string;
  readonly stroke: string;
};

export const firstStyle: SvgStyle = { shown: true, visible: true, fill: 'black', stroke: 'none' };

type Properties = ReadonlyMap<string, string>;
export type StyleSheet = { readonly rules: readonly Rule[] };
type Rule = { readonly selector: string; readonly weight: number; readonly properties: Properties };

/** Rules read at most. */
const mostRules = 2000;
const wanted: ReadonlySet<string> = new Set(['display', 'visibility', 'fill', 'stroke']);

/** Rules of the style elements: for elements, classes and ids; others (descendants, states, media) are passed over. CSS 2.1, chapter 6. */
export function styleSheet(texts: readonly string[]): StyleSheet {
  const rules: Rule[] = [];
  for (const text of texts) {
    const plain = text.replace(/\/\*[\s\S]*?\*\//g, '');
    for (const block of plain.split('}')) {
      const [selectors, body] = block.split('{');
      if (selectors === undefined || body === undefined || rules.length >= mostRules) continue;
      const properties = propertiesOf(body);
      if (properties.size === 0) continue;
      for (const one of selectors.split(',')) {
        const selector = one.trim();
        if (!/^(\*|[.#]?[\w-]+)$/.test(selector)) continue;
        const weight = selector === '*' ? 0 : selector.startsWith('#') ? 3 : selector.startsWith('.') ? 2 : 1;
        rules.push({ selector, weight, properties });
      }
    }
  }
  // of equal weight the later one counts; sorting keeps their order
  return { rules: rules.sort((a, b) => a.weight - b.weight) };
}

function propertiesOf(text: string): Map<string, string> {
  const found = new Map<string, string>();
  for (const declaration of text.split(';')) {
    const colon = declaration.indexOf(':');
    const name = declaration.slice(0, Math.max(0, colon)).trim().toLowerCase();
    if (!wanted.has(name)) continue;
    found.set(name, cleaned(declaration.slice(colon + 1)));
  }
  return found;
}

const cleaned = (value: string): string =>
  value
    .replace(/!\s*important/i, '')
    .trim()
    .toLowerCase()
    .slice(0, 60);

/** Style of an element within another: attributes, then rules, then its own style attribute. */
export function styleOf(node: SvgNode, parent: SvgStyle, sheet: StyleSheet): SvgStyle {
  const { attributes } = node;
  const own = new Map<string, string>();
  for (const name of wanted) {
    const value = attributes[name];
    if (value !== undefined) own.set(name, cleaned(value));
  }
  if (sheet.rules.length > 0) {
    const classes = new Set((attributes.class ?? '').split(/\s+/).map((name) => `.${name}`));
    for (const { selector, properties } of sheet.rules) {
      const matches =
        selector === '*' || selector === node.name || selector === `#${attributes.id ?? ''}` || classes.has(selector);
      if (matches) for (const [name, value] of properties) own.set(name, value);
    }
  }
  if (attributes.style !== undefined) for (const [name, value] of propertiesOf(attributes.style)) own.set(name, value);
  if (own.size === 0) return parent;
  const inherited = (name: string, otherwise: string): string => {
    const value = own.get(name);
    return value === undefined || value === 'inherit' ? otherwise : value;
  };
  const visibility = own.get('visibility');
  return {
    shown: parent.shown && own.get('display') !== 'none',
    visible:
      visibility === undefined || visibility === 'inherit'
        ? parent.visible
        : visibility !== 'hidden' && visibility !== 'collapse',
    fill: inherited('fill', parent.fill),
    stroke: inherited('stroke', parent.stroke),
  };
}
