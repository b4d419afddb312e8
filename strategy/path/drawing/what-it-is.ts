import { bytesAsLatin } from './bytes.ts';
import { isBinaryDxf } from './tags.ts';

/** A sentence for a file that is plainly something other than a DXF, or null. Told by content, never by the name. */
export function whatItIs(bytes: Uint8Array): string | null {
  if (isBinaryDxf(bytes)) return null;
  const head = bytesAsLatin(bytes, 0, Math.min(bytes.length, 4096));
  const text = head.replace(/^\xef\xbb\xbf/, '').trimStart();
  if (
    /^(<\?xml[^>]*>\s*)?(<!--[\s\S]*?-->\s*)*(<!DOCTYPE svg[^>]*>\s*)?<svg[\s>]/i.test(text) ||
    (text.startsWith('<') && /<svg[\s>]/i.test(text))
  ) {
    return 'This file is an SVG picture; only DXF drawings are taken so far. Export the part as DXF.';
  }
  if (/^AC10\d\d/.test(head) && bytes.slice(0, 64).includes(0)) return 'This file is a DWG; export the drawing as DXF.';
  if (head.startsWith('%PDF')) return 'This file is a PDF; export the drawing as DXF.';
  if (head.startsWith('\x89PNG') || head.startsWith('\xff\xd8\xff') || head.startsWith('GIF8')) {
    return 'This file is a picture of pixels, which has no contours; export the drawing as DXF.';
  }
  if (head.startsWith('PK\x03\x04')) return 'This file is a ZIP archive; unpack it and take the DXF inside.';
  if (/^(\xff\xfe|\xfe\xff)/.test(head))
    return 'This file is UTF-16 text; a DXF is plain or UTF-8 text. Export the drawing again.';
  // a DXF begins with a pair 0 / SECTION, possibly after comments (999)
  if (/^\s*(999\s*[\r\n]+[^\r\n]*[\r\n]+\s*)*0\s*[\r\n]+\s*SECTION\s*[\r\n]/.test(text)) return null;
  return 'This file is not a DXF: it does not begin with the pair 0, SECTION. Export the part as DXF.';
}
