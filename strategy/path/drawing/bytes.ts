/** Windows-1252 at 0x80..0x9F, where it differs from ISO 8859-1. Five codes are unassigned and stay as they are. */
const windows1252 = [
  0x20ac, 0x81, 0x201a, 0x0192, 0x201e, 0x2026, 0x2020, 0x2021, 0x02c6, 0x2030, 0x0160, 0x2039, 0x0152, 0x8d, 0x017d,
  0x8f, 0x90, 0x2018, 0x2019, 0x201c, 0x201d, 0x2022, 0x2013, 0x2014, 0x02dc, 0x2122, 0x0161, 0x203a, 0x0153, 0x9d,
  0x017e, 0x0178,
];

/** Each byte as the character of the same number: enough to find lines and numbers, names are decoded later. */
export function bytesAsLatin(bytes: Uint8Array, from = 0, to = bytes.length): string {
  // a call takes only so many arguments
  const chunk = 8192;
  let text = '';
  for (let i = from; i < to; i += chunk) {
    // a typed array is as good a list of arguments as an array, only the compiler's library does not say so; spreading one is ten times slower
    text += String.fromCharCode.apply(null, bytes.subarray(i, Math.min(to, i + chunk)) as unknown as number[]);
  }
  return text;
}

/** A name as its writer meant it: UTF-8 when the bytes are valid UTF-8, windows-1252 otherwise, and \U+XXXX escapes resolved. */
export function nameDecode(latin: string): string {
  const plain = /^[\x20-\x7e]*$/.test(latin) ? latin : (utf8Decode(latin) ?? windowsDecode(latin));
  return plain.replace(/\\U\+([0-9A-Fa-f]{4})/g, (_, hex: string) => String.fromCharCode(parseInt(hex, 16)));
}

function windowsDecode(latin: string): string {
  return Array.from(latin, (c) => {
    const code = c.charCodeAt(0);
    return code >= 0x80 && code <= 0x9f ? String.fromCharCode(windows1252[code - 0x80] ?? code) : c;
  }).join('');
}

function utf8Decode(latin: string): string | null {
  let text = '';
  for (let i = 0; i < latin.length;) {
    const lead = latin.charCodeAt(i++);
    if (lead < 0x80) {
      text += String.fromCharCode(lead);
      continue;
    }
    const more =
      lead >= 0xf0 && lead <= 0xf4 ? 3 : lead >= 0xe0 && lead < 0xf0 ? 2 : lead >= 0xc2 && lead < 0xe0 ? 1 : 0;
    if (more === 0) return null;
    let code = lead & (0x3f >> more);
    for (let k = 0; k < more; k++) {
      const next = latin.charCodeAt(i++);
      if (!((next & 0xc0) === 0x80)) return null;
      code = (code << 6) | (next & 0x3f);
    }
    if (code > 0x10ffff) return null;
    text += String.fromCodePoint(code);
  }
  return text;
}
