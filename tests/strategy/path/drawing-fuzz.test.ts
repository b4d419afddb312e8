import { existsSync, readdirSync, readFileSync } from 'node:fs';
import path from 'node:path';
import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { drawingRead } from '../../../strategy/path/drawing/index.ts';
import { contourArea, pointDistance, segmentEnd, segmentStart } from '../../../strategy/path/index.ts';
import {
  arc,
  circle,
  insert,
  makeDxf,
  polyline,
  rectangle,
  ring,
  spline,
  text,
} from '../../support/drawings/make-dxf.ts';
import { runs } from '../../support/runs.ts';

/** Real drawings by other people stand beside the project. */
const besides = path.join(import.meta.dirname, '../../../../shared/drawings');
const filesIn = (folder: string) => readdirSync(folder).filter((name) => /\.(dxf|svg)$/.test(name));
const own = path.join(import.meta.dirname, '../../support/drawings');

/** What a careless hand, a broken transfer or a hostile one makes of bytes. */
type Harm =
  | { readonly kind: 'byte'; readonly at: number; readonly value: number }
  | { readonly kind: 'cut'; readonly at: number }
  | { readonly kind: 'twice'; readonly at: number; readonly length: number }
  | { readonly kind: 'gone'; readonly at: number; readonly length: number }
  | { readonly kind: 'word'; readonly at: number; readonly word: string };

const words = [
  '1e12',
  '-1e308',
  'NaN',
  'Infinity',
  '1,5',
  '0',
  '-1',
  '9999999',
  '\0',
  '<',
  '">',
  '0\nINSERT\n',
  'url(#a)',
  'e999',
];
const share = fc.integer({ min: 0, max: 9999 });
const harm: fc.Arbitrary<Harm> = fc.oneof(
  {
    weight: 4,
    arbitrary: fc.record({ kind: fc.constant('byte' as const), at: share, value: fc.integer({ min: 0, max: 255 }) }),
  },
  { weight: 1, arbitrary: fc.record({ kind: fc.constant('cut' as const), at: share }) },
  {
    weight: 1,
    arbitrary: fc.record({ kind: fc.constant('twice' as const), at: share, length: fc.integer({ min: 1, max: 400 }) }),
  },
  {
    weight: 2,
    arbitrary: fc.record({ kind: fc.constant('gone' as const), at: share, length: fc.integer({ min: 1, max: 400 }) }),
  },
  {
    weight: 3,
    arbitrary: fc.record({ kind: fc.constant('word' as const), at: share, word: fc.constantFrom(...words) }),
  },
);

function harmed(bytes: Uint8Array, harms: readonly Harm[]): Uint8Array {
  let now = bytes;
  for (const one of harms) {
    const at = Math.floor((one.at / 10_000) * now.length);
    switch (one.kind) {
      case 'byte':
        now = now.slice();
        now[at] = one.value;
        break;
      case 'cut':
        now = now.slice(0, at);
        break;
      case 'twice':
        now = joined(now.slice(0, at + one.length), now.slice(at));
        break;
      case 'gone':
        now = joined(now.slice(0, at), now.slice(at + one.length));
        break;
      case 'word': {
        // in place of the line that stands there
        const from = now.lastIndexOf(10, at) + 1;
        const to = now.indexOf(10, at);
        now = joined(now.slice(0, from), new TextEncoder().encode(one.word), now.slice(to < 0 ? now.length : to));
      }
    }
  }
  return now;
}

const joined = (...parts: readonly Uint8Array[]): Uint8Array => Uint8Array.from(parts.flatMap((part) => [...part]));

/** Read or refused with a sentence: contours are closed, finite and nested, and every note has its places within the limits. */
function isSound(bytes: Uint8Array): 'read' | 'refused' {
  const result = drawingRead(bytes);
  if (result.kind === 'none') {
    expect(result.why).toMatch(/^[A-Z].{20,}\.$/s);
    return 'refused';
  }
  for (const { contour, depth, parent } of result.contours) {
    expect(Number.isFinite(contourArea(contour))).toBe(true);
    expect(depth === 0).toBe(parent === null);
    contour.segments.forEach((segment, i) => {
      const next = contour.segments[(i + 1) % contour.segments.length];
      if (next)
        expect(pointDistance(segmentEnd(segment), segmentStart(next))).toBeLessThanOrEqual(
          2 * result.gapTolerance + 1e-9,
        );
    });
  }
  for (const { at } of result.leftOut) for (const { x, y } of at) expect(Number.isFinite(x + y)).toBe(true);
  for (const { at } of result.repaired) expect(Number.isFinite(at.x + at.y)).toBe(true);
  expect(result.crossings.length).toBeLessThanOrEqual(100);
  return 'read';
}

function fuzz(drawings: readonly Uint8Array[], count: number): Record<'read' | 'refused', number> {
  const seen = { read: 0, refused: 0 };
  const spoilt = fc.record({
    which: fc.nat(drawings.length - 1),
    harms: fc.array(harm, { minLength: 1, maxLength: 4 }),
  });
  fc.assert(
    fc.property(fc.noBias(spoilt), ({ which, harms }) => {
      seen[isSound(harmed(drawings[which] ?? new Uint8Array(), harms))]++;
    }),
    { numRuns: count },
  );
  return seen;
}

const knots = [0, 0, 0, 0, 1, 2, 2, 2, 2];
const ours = [
  makeDxf({
    version: 'AC1021',
    units: 1,
    layers: [{ name: 'CUT' }, { name: 'NOTES', off: true }],
    blocks: [
      { name: 'B', entities: [circle([0, 0], 2, '0'), insert('C', [1, 1])] },
      { name: 'C', entities: [arc([0, 0], 1, 10, 350, '0')] },
    ],
    entities: [
      ...ring(rectangle(0, 0, 30, 20)),
      ...ring(rectangle(30, 0, 12, 20)),
      insert(
        'B',
        [8, 8],
        [
          [41, -2],
          [42, 1],
          [50, 33],
          [70, 2],
          [44, 6],
        ],
      ),
      polyline([
        [2, 2, 0.5],
        [4, 2],
        [4, 4, -0.2],
      ]),
      spline(3, knots, [
        [10, 2],
        [12, 8],
        [15, 8],
        [18, 2],
        [20, 3],
      ]),
      text([1, -4], 'PLATE'),
    ],
  }),
  new TextEncoder().encode(
    `<svg width="80mm" height="60mm" viewBox="0 0 80 60">\n<style>.a{fill:none;stroke:red}</style>\n<g class="a" transform="translate(5 5)\n rotate(3)">\n<path d="M0 0H40V30\nC 30 40 10 40 0 30Z\nM5 5a3 3 0 1 1 0 .1z"/>\n<rect x="50" y="5" width="10" height="8" rx="2"/>\n<circle id="c" cx="20" cy="15" r="4"/><use href="#c" x="9"/>\n</g></svg>`,
  ),
];

describe('a harmed drawing', () => {
  it('of our own is read or refused with a sentence, whatever became of it', () => {
    const drawings = [...ours, ...filesIn(own).map((name) => new Uint8Array(readFileSync(path.join(own, name))))];
    const seen = fuzz(drawings, runs(500, 20_000));
    expect(seen.read).toBeGreaterThan(20);
    expect(seen.refused).toBeGreaterThan(20);
  });

  it.skipIf(!existsSync(besides))('by other people is read or refused with a sentence, whatever became of it', () => {
    // the largest take long to copy, and hold nothing that the others don't
    const drawings = filesIn(besides)
      .map((name) => new Uint8Array(readFileSync(path.join(besides, name))))
      .filter(({ length }) => length < 120_000);
    expect(drawings.length).toBeGreaterThan(20);
    const seen = fuzz(drawings, runs(120, 20_000));
    expect(seen.read + seen.refused).toBe(runs(120, 20_000));
  });
});
