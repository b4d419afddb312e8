import { SaxesParser } from 'saxes';
import { bytesAsLatin, nameDecode } from './bytes.ts';
import { drawingLimits } from './limits.ts';
import { DrawingRefusal } from './refusal.ts';

/** An element of an SVG: its name and attributes without their prefixes, what is in it, and where it stands. */
export type SvgNode = {
  readonly name: string;
  readonly attributes: Readonly<Record<string, string>>;
  readonly children: SvgNode[];
  /** Text directly in it. */
  text: string;
  readonly line: number;
};

export type SvgTree = {
  readonly root: SvgNode;
  /** The file stops before all its elements are ended. */
  readonly cutShort: boolean;
  /** Entities are named in it; they are never resolved, whatever they stand for. */
  readonly entities: boolean;
};

/** Elements within elements. */
const deepest = 100;
/** Characters given to the parser at a time. */
const portion = 65_536;

/** Elements whose text matters. */
const textual: ReadonlySet<string> = new Set(['style']);

/**
 * The elements of an SVG file. Nothing outside the file is ever read, its document type and entities are passed over, and what is not well-formed is refused with its
 * line (DrawingRefusal); only an end that is missing is taken as it is.
 */
export function svgTree(bytes: Uint8Array): SvgTree {
  const parser = new SaxesParser({ xmlns: false, position: true });
  let root: SvgNode | null = null;
  const open: SvgNode[] = [];
  let elements = 0;
  let ending = false;
  let cutShort = false;
  let entities = false;

  parser.on('error', (error) => {
    if (/undefined entity/.test(error.message)) entities = true;
    else if (ending && root !== null) cutShort = true;
    else throw new DrawingRefusal(sentence(error.message, parser.line));
  });
  parser.on('opentag', ({ name, attributes }) => {
    if (++elements > drawingLimits.entities) {
      throw new DrawingRefusal(`The drawing holds more than ${drawingLimits.entities} elements. Draw the part alone.`);
    }
    if (open.length >= deepest) {
      throw new DrawingRefusal(
        `Line ${parser.line} holds elements within elements more than ${deepest} deep. Export the drawing again, without groups.`,
      );
    }
    const plain: Record<string, string> = {};
    for (const key of Object.keys(attributes)) plain[localName(key)] ??= attributes[key] ?? '';
    const node: SvgNode = { name: localName(name), attributes: plain, children: [], text: '', line: parser.line };
    open.at(-1)?.children.push(node);
    root ??= node;
    open.push(node);
  });
  parser.on('closetag', () => {
    open.pop();
  });
  const addText = (text: string) => {
    const node = open.at(-1);
    if (node && textual.has(node.name)) node.text += text;
  };
  parser.on('text', addText);
  parser.on('cdata', addText);
  parser.on('doctype', (text) => {
    if (/<!ENTITY/.test(text)) entities = true;
  });

  const mark = bytes[0] === 0xef && bytes[1] === 0xbb && bytes[2] === 0xbf ? 3 : 0;
  let end = bytes.length;
  while (end > mark && (bytes[end - 1] === 0 || bytes[end - 1] === 0x1a)) end--;
  for (let at = mark; at < end; at += portion) parser.write(bytesAsLatin(bytes, at, Math.min(end, at + portion)));
  ending = true;
  parser.close();
  if (root === null) throw new DrawingRefusal('The file holds no SVG element. It is damaged; export it again.');
  return { root, cutShort, entities };
}

/** A name of the file as its writer meant it. */
export const svgName = (text: string): string => nameDecode(text).trim().slice(0, 120);

const localName = (name: string): string => name.slice(name.lastIndexOf(':') + 1);

function sentence(message: string, line: number): string {
  const what = message
    .replace(/^\d+:\d+:\s*/, '')
    .replace(/[^\x20-\x7e]/g, '?')
    .replace(/\.$/, '')
    .slice(0, 80);
  return `Line ${line} of the SVG is not well-formed: ${what}. The file is damaged; export it again.`;
}
