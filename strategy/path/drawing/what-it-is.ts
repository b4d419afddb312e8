import { bytesAsLatin } from './bytes.ts';
import { isBinaryDxf } from './tags.ts';

/** What a file is, told by its content and never by its name; a sentence for what is plainly neither DXF nor SVG. */
export type FileKind =
  { readonly kind: 'dxf' } | { readonly kind: 'svg' } | { readonly kind: 'other'; readonly why: string };

export function whatItIs(bytes: Uint8Array): FileKind {
  if (isBinaryDxf(bytes)) return { kind: 'dxf' };
  const head = bytesAsLatin(bytes, 0, Math.min(bytes.length, 4096));
  const text = head.replace(/^\xef\xbb\xbf/, '').trimStart();
  const why = otherKind(bytes, head);
  if (why) return { kind: 'other', why };
  if (text.startsWith('<')) return xmlKind(bytes);
  if (beginsAsDxf(text)) return { kind: 'dxf' };
  return {
    kind: 'other',
    why: 'This file is neither a DXF, which begins with the pair 0, SECTION, nor an SVG. Export the part as DXF or SVG.',
  };
}

/** A DXF begins with the pair 0, SECTION, possibly after comments (999). */
function beginsAsDxf(text: string): boolean {
  const lines = text.split(/\r\n|\n|\r/).map((line) => line.trim());
  let at = 0;
  while (lines[at] === '999') at += 2;
  return lines[at] === '0' && lines[at + 1] === 'SECTION';
}

/** Bytes in which the root element must begin, after comments and the document type. */
const prologBytes = 262_144;

function xmlKind(bytes: Uint8Array): FileKind {
  const text = bytesAsLatin(bytes, 0, Math.min(bytes.length, prologBytes));
  const name = rootName(text);
  if (name?.toLowerCase() === 'svg') return { kind: 'svg' };
  const what = name ? `an XML file of another kind (its first element is "${name.slice(0, 40)}")` : 'no SVG';
  return { kind: 'other', why: `This file is ${what}. Export the part as DXF or SVG.` };
}

/** Name of the first element without its prefix; null when there is none. */
function rootName(text: string): string | null {
  let at = text.indexOf('<');
  while (at >= 0) {
    let end = -1;
    if (text.startsWith('<!--', at)) end = text.indexOf('-->', at);
    else if (text.startsWith('<?', at)) end = text.indexOf('?>', at);
    else if (text.startsWith('<!', at)) {
      // a document type may hold declarations between brackets
      const [close, bracket] = [text.indexOf('>', at), text.indexOf('[', at)];
      end = bracket >= 0 && bracket < close ? text.indexOf(']', bracket) : close;
    } else return /^<(?:[\w.-]{1,60}:)?([A-Za-z][\w.-]{0,60})[\s/>]/.exec(text.slice(at, at + 130))?.[1] ?? null;
    if (end < 0) return null;
    at = text.indexOf('<', end);
  }
  return null;
}

function otherKind(bytes: Uint8Array, head: string): string | null {
  if (/^AC10\d\d/.test(head) && bytes.slice(0, 64).includes(0)) return 'This file is a DWG; export the drawing as DXF.';
  if (head.startsWith('%PDF')) return 'This file is a PDF; export the drawing as DXF.';
  if (head.startsWith('\x89PNG') || head.startsWith('\xff\xd8\xff') || head.startsWith('GIF8')) {
    return 'This file is a picture of pixels, which has no contours; export the drawing as DXF.';
  }
  if (head.startsWith('PK\x03\x04')) return 'This file is a ZIP archive; unpack it and take the DXF inside.';
  if (head.startsWith('\x1f\x8b')) return 'This file is compressed; unpack it and take the drawing inside.';
  if (/^(\xff\xfe|\xfe\xff)/.test(head))
    return 'This file is UTF-16 text; a DXF or SVG is plain or UTF-8 text. Export the drawing again.';
  return null;
}
