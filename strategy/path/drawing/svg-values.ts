import type { Affine } from './affine.ts';
import { affineCompose, identity } from './affine.ts';

const number = String.raw`[+-]?(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d+)?`;
const lengthPattern = new RegExp(`^\\s*(${number})\\s*(px|mm|cm|in|pt|pc|q|em|ex|rem|%)?\\s*$`, 'i');

/** CSS pixels a unit: 96 to the inch, by definition (CSS Values and Units, section 6.2). Letters are as wide as by default, 16 px and half of it. */
const pixels: Readonly<Record<string, number>> = {
  '': 1,
  px: 1,
  in: 96,
  cm: 96 / 2.54,
  mm: 96 / 25.4,
  q: 96 / 101.6,
  pt: 96 / 72,
  pc: 16,
  em: 16,
  rem: 16,
  ex: 8,
};

export type SvgLength = { readonly value: number; readonly unit: string };

/** A length as written, or null when it is none. */
export function svgLength(text: string | undefined): SvgLength | null {
  const match = text === undefined ? null : lengthPattern.exec(text);
  if (!match) return null;
  return { value: Number(match[1]), unit: (match[2] ?? '').toLowerCase() };
}

/** The length in pixels; shares are of `whole`. */
export function svgPixels(text: string | undefined, whole: number): number | null {
  const length = svgLength(text);
  if (!length) return null;
  return length.unit === '%' ? (length.value / 100) * whole : length.value * (pixels[length.unit] ?? 1);
}

/** Numbers in a list parted by blanks or commas. */
export function svgNumbers(text: string): number[] {
  return (text.match(new RegExp(number, 'g')) ?? []).map(Number);
}

/** The map of a transform attribute, first the last of its list; null when it is not understood. SVG 1.1, section 7.6. */
export function svgTransform(text: string | undefined): Affine | null {
  let map: Affine = identity;
  let rest = (text ?? '').trim();
  if (rest === 'none') return identity;
  while (rest !== '') {
    const match = /^([a-zA-Z]+)\s*\(([^()]*)\)[\s,]*/.exec(rest);
    if (!match) return null;
    const own = oneTransform(match[1] ?? '', svgNumbers(match[2] ?? ''));
    if (!own) return null;
    map = affineCompose(map, own);
    rest = rest.slice(match[0].length);
  }
  return map;
}

function oneTransform(name: string, values: readonly number[]): Affine | null {
  const [p, q, r, s, t, u] = values;
  if (p === undefined) return null;
  const radians = (p * Math.PI) / 180;
  switch (name) {
    case 'matrix':
      return q === undefined || r === undefined || s === undefined || t === undefined || u === undefined
        ? null
        : { a: p, b: q, c: r, d: s, e: t, f: u };
    case 'translate':
      return { ...identity, e: p, f: q ?? 0 };
    case 'scale':
      return { ...identity, a: p, d: q ?? p };
    case 'rotate': {
      const turn = {
        ...identity,
        a: Math.cos(radians),
        b: Math.sin(radians),
        c: -Math.sin(radians),
        d: Math.cos(radians),
      };
      const [x, y] = [q ?? 0, r ?? 0];
      return affineCompose({ ...identity, e: x, f: y }, affineCompose(turn, { ...identity, e: -x, f: -y }));
    }
    case 'skewX':
      return { ...identity, c: Math.tan(radians) };
    case 'skewY':
      return { ...identity, b: Math.tan(radians) };
    default:
      return null;
  }
}

export type Viewport = { readonly width: number; readonly height: number };

/** The map from a viewBox to the viewport it is fitted into, and the viewport within. SVG 1.1, sections 7.7 and 7.8. */
export function viewBoxMap(
  viewBox: string | undefined,
  fitting: string | undefined,
  port: Viewport,
): { map: Affine; inner: Viewport } {
  const [x, y, width, height] = svgNumbers(viewBox ?? '');
  if (x === undefined || y === undefined || !(width && width > 0) || !(height && height > 0)) {
    return { map: identity, inner: port };
  }
  const [across, down] = [port.width / width, port.height / height];
  const inner = { width, height };
  const words = (fitting ?? '').trim().split(/\s+/);
  if (words.includes('none')) return { map: { a: across, b: 0, c: 0, d: down, e: -x * across, f: -y * down }, inner };
  const scale = words.includes('slice') ? Math.max(across, down) : Math.min(across, down);
  const align = words.find((word) => /^x(Min|Mid|Max)Y(Min|Mid|Max)$/.test(word)) ?? 'xMidYMid';
  const share = (word: string) => (word === 'Min' ? 0 : word === 'Max' ? 1 : 0.5);
  const left = share(align.slice(1, 4)) * (port.width - width * scale);
  const top = share(align.slice(5, 8)) * (port.height - height * scale);
  return { map: { a: scale, b: 0, c: 0, d: scale, e: left - x * scale, f: top - y * scale }, inner };
}
