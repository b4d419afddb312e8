import { bytesAsLatin } from './bytes.ts';
import { DrawingRefusal } from './refusal.ts';

/** The group codes and values of a DXF in order. Text values are still undecoded bytes; see `nameDecode`. */
export type Tags = {
  readonly codes: Int32Array;
  /** Value of tag i, text without the blanks around it. Made when asked for, since most values of a file are never looked at. */
  readonly valueOf: (i: number) => string | number;
  /** Value of tag i where it is plainly a number of a few digits, NaN for anything else: then its text says what it is. */
  readonly numberOf: (i: number) => number;
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

const [tab, newLine, carriageReturn, blank, plus, minus, point, zero, nine] = [9, 10, 13, 32, 43, 45, 46, 48, 57];

function textTags(bytes: Uint8Array): Tags {
  const start = bytes[0] === 0xef && bytes[1] === 0xbb && bytes[2] === 0xbf ? 3 : 0;
  // files end with blank lines, zeros or the end mark of an old system
  let stop = bytes.length;
  while (stop > start && isFiller(bytes[stop - 1] ?? 0)) stop--;
  const lineEnd = bytes.includes(newLine) ? newLine : carriageReturn;
  const text = bytesAsLatin(bytes, 0, stop);
  let codes = new Int32Array(Math.ceil(bytes.length / 12) + 16);
  // where each value starts; it ends before the line end
  let starts = new Int32Array(codes.length);
  let count = 0;
  let at = start;
  let line = 1;
  let cutShort = false;
  while (at < stop) {
    let end = bytes.indexOf(lineEnd, at);
    if (end < 0 || end > stop) end = stop;
    const code = codeIn(bytes, at, end);
    if (end >= stop) {
      // a last 0 without its EOF says nothing more than that the end is missing
      cutShort = code !== 0;
      break;
    }
    if (code === null) throw noCode(text.slice(at, end), line);
    if (count === codes.length) {
      codes = grown(codes);
      starts = grown(starts);
    }
    codes[count] = code;
    starts[count++] = end + 1;
    at = bytes.indexOf(lineEnd, end + 1) + 1;
    if (at === 0) at = stop;
    line += 2;
  }
  const valueOf = (i: number): string => {
    const from = starts[i] ?? stop;
    const to = bytes.indexOf(lineEnd, from);
    return text.slice(from, to < 0 ? stop : to).trim();
  };
  return {
    codes: codes.subarray(0, count),
    valueOf,
    numberOf: (i) => plainNumber(bytes, starts[i] ?? stop, stop, lineEnd),
    placeOf: (i) => `line ${2 * i + 2}`,
    cutShort,
  };
}

function grown(array: Int32Array<ArrayBuffer>): Int32Array<ArrayBuffer> {
  const larger = new Int32Array(2 * array.length);
  larger.set(array);
  return larger;
}

/** Powers of ten that a double holds exactly. */
const powersOfTen = Array.from({ length: 23 }, (_, i) => Number(`1e${i}`));

/**
 * The decimal number a line begins with, or NaN for one with an exponent, of more than 15 digits, or none at all. Of so few digits the quotient of two whole numbers is the
 * nearest double, as Number would give it (Clinger, Proc. PLDI 1990, from memory); read so, a drawing's numbers need no texts of their own.
 */
function plainNumber(bytes: Uint8Array, from: number, stop: number, lineEnd: number): number {
  let i = from;
  while (i < stop && bytes[i] !== lineEnd && isBlank(bytes[i] ?? 0)) i++;
  const sign = bytes[i];
  if (sign === minus || sign === plus) i++;
  let whole = 0;
  // digits at all, those that count, and those behind the point
  let seen = 0;
  let figures = 0;
  let behind = -1;
  for (; i < stop && bytes[i] !== lineEnd; i++) {
    const byte = bytes[i] ?? 0;
    if (byte >= zero && byte <= nine) {
      seen++;
      if (figures > 0 || byte !== zero) figures++;
      whole = 10 * whole + byte - zero;
      if (behind >= 0) behind++;
    } else if (byte === point && behind < 0) behind = 0;
    else break;
  }
  // blanks may follow, but nothing else
  while (i < stop && bytes[i] !== lineEnd && isBlank(bytes[i] ?? 0)) i++;
  if ((i < stop && bytes[i] !== lineEnd) || seen === 0 || figures > 15 || behind > 22) return Number.NaN;
  const size = behind > 0 ? whole / (powersOfTen[behind] ?? 1) : whole;
  return sign === minus ? -size : size;
}

const isFiller = (byte: number): boolean => byte <= blank;

/** The group code on a line: a whole number of at most four digits between blanks, or null. */
function codeIn(bytes: Uint8Array, from: number, to: number): number | null {
  let i = from;
  let end = to;
  while (i < end && isBlank(bytes[i] ?? 0)) i++;
  while (end > i && isBlank(bytes[end - 1] ?? 0)) end--;
  const negative = bytes[i] === minus;
  if (negative) i++;
  if (end - i < 1 || end - i > 4) return null;
  let code = 0;
  for (; i < end; i++) {
    const digit = bytes[i] ?? 0;
    if (digit < zero || digit > nine) return null;
    code = 10 * code + digit - zero;
  }
  return negative ? -code : code;
}

const isBlank = (byte: number): boolean => byte === blank || byte === tab || byte === carriageReturn;

const noCode = (line: string, number: number): DrawingRefusal =>
  new DrawingRefusal(
    `Line ${number} should hold a DXF group code but reads "${shown(line)}". The file is damaged or no DXF; export it again.`,
  );

const shown = (text: string): string =>
  text
    .trim()
    .slice(0, 40)
    .replace(/[^\x20-\x7e]/g, '?');

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
          value = bytesAsLatin(bytes, at, end).trim();
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
  const numberOf = (i: number): number => {
    const value = values[i];
    return typeof value === 'number' ? value : Number.NaN;
  };
  return {
    codes: Int32Array.from(codes),
    valueOf: (i) => values[i] ?? '',
    numberOf,
    placeOf: (i) => `byte ${places[i] ?? bytes.length}`,
    cutShort,
  };
}
