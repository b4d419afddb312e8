import { bytesAsLatin } from './bytes.ts';
import { DrawingRefusal } from './refusal.ts';

/** The group codes and values of a DXF in order. Text values are still undecoded bytes; see `nameDecode`. */
export type Tags = {
  readonly codes: readonly number[];
  readonly values: readonly (string | number)[];
  /** Where the value of tag i stands, for a sentence: "line 214" or "byte 1042". */
  readonly placeOf: (i: number) => string;
  /** The file stops in the middle of a tag. */
  readonly cutShort: boolean;
};

/** The 22 bytes that open a binary DXF. */
const binaryMark = [
  0x41, 0x75, 0x74, 0x6f, 0x43, 0x41, 0x44, 0x20, 0x42, 0x69, 0x6e, 0x61, 0x72, 0x79, 0x20, 0x44, 0x58, 0x46, 0x0d,
  0x0a, 0x1a, 0x00,
];

/** Whether the bytes are a binary DXF. */
export const isBinaryDxf = (bytes: Uint8Array): boolean => binaryMark.every((byte, i) => bytes[i] === byte);

/** Tags of a DXF, text or binary. Throws DrawingRefusal where the pairs of group code and value break. */
export const tagsOf = (bytes: Uint8Array): Tags => (isBinaryDxf(bytes) ? binaryTags(bytes) : textTags(bytes));

function textTags(bytes: Uint8Array): Tags {
  const start = bytes[0] === 0xef && bytes[1] === 0xbb && bytes[2] === 0xbf ? 3 : 0;
  const text = bytesAsLatin(bytes, start);
  const lines = text.includes('\n') ? text.split(/\r*\n/) : text.split('\r');
  while (lines.length > 0 && /^[\s\0\x1a]*$/.test(lines.at(-1) ?? '')) lines.pop();
  const codes: number[] = [];
  const values: string[] = [];
  for (let i = 0; i + 1 < lines.length; i += 2) {
    const code = (lines[i] ?? '').trim();
    if (!/^-?\d{1,4}$/.test(code)) {
      throw new DrawingRefusal(
        `Line ${i + 1} should hold a DXF group code but reads "${shown(code)}". The file is damaged or no DXF; export it again.`,
      );
    }
    codes.push(Number(code));
    values.push(lines[i + 1] ?? '');
  }
  return {
    codes,
    values,
    placeOf: (i) => `line ${2 * i + 2}`,
    cutShort: lines.length % 2 === 1 && (lines.at(-1) ?? '').trim() !== '0',
  };
}

const shown = (text: string): string => text.slice(0, 40).replace(/[^\x20-\x7e]/g, '?');

type Kind = 'text' | 'double' | 'int16' | 'int32' | 'int64' | 'bool' | 'chunk';

/** Kind of a group code's value in a binary file, by the ranges of the DXF reference ("Group code value types"). */
function kindOf(code: number): Kind {
  if (code === 1004 || (code >= 310 && code <= 319)) return 'chunk';
  if (code === 1071) return 'int32';
  if (between(code, 10, 59) || between(code, 110, 149) || between(code, 210, 239) || between(code, 460, 469))
    return 'double';
  if (between(code, 1010, 1059)) return 'double';
  if (between(code, 60, 79) || between(code, 170, 179) || between(code, 270, 289) || between(code, 370, 389))
    return 'int16';
  if (between(code, 400, 409) || between(code, 1060, 1070)) return 'int16';
  if (between(code, 90, 99) || between(code, 420, 429) || between(code, 440, 459)) return 'int32';
  if (between(code, 160, 169)) return 'int64';
  if (between(code, 290, 299)) return 'bool';
  return 'text';
}

const between = (code: number, low: number, high: number): boolean => code >= low && code <= high;

function binaryTags(bytes: Uint8Array): Tags {
  const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength);
  const codes: number[] = [];
  const values: (string | number)[] = [];
  const places: number[] = [];
  let at = binaryMark.length;
  // the oldest form has codes of one byte: then the first tag, 0 SECTION, has its S right behind the zero
  const wide = bytes[at + 1] === 0;
  let cutShort = false;
  try {
    while (at < bytes.length) {
      let code: number;
      if (wide) {
        code = view.getInt16(at, true);
        at += 2;
      } else {
        code = view.getUint8(at++);
        if (code === 255) {
          code = view.getInt16(at, true);
          at += 2;
        }
      }
      const place = at;
      let value: string | number;
      switch (kindOf(code)) {
        case 'double':
          value = view.getFloat64(at, true);
          at += 8;
          break;
        case 'int16':
          value = view.getInt16(at, true);
          at += 2;
          break;
        case 'int32':
          value = view.getInt32(at, true);
          at += 4;
          break;
        case 'int64':
          value = Number(view.getBigInt64(at, true));
          at += 8;
          break;
        case 'bool':
          value = view.getUint8(at++);
          break;
        case 'chunk':
          value = '';
          at += 1 + view.getUint8(at);
          break;
        case 'text': {
          let end = at;
          while (end < bytes.length && bytes[end] !== 0) end++;
          if (end === bytes.length) throw new RangeError('text without end');
          value = bytesAsLatin(bytes, at, end);
          at = end + 1;
        }
      }
      if (code < -5 || code > 1071) {
        throw new DrawingRefusal(
          `Byte ${place} should follow a DXF group code but ${code} is none. The binary file is damaged; export it again.`,
        );
      }
      codes.push(code);
      values.push(value);
      places.push(place);
      if (code === 0 && value === 'EOF') break;
    }
  } catch (error) {
    // DataView throws RangeError past the end: the file stops in the middle of a tag
    if (!(error instanceof RangeError)) throw error;
    cutShort = true;
  }
  return { codes, values, placeOf: (i) => `byte ${places[i] ?? bytes.length}`, cutShort };
}
