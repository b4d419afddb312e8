import Flatbush from 'flatbush';
import type { Point } from '../point.ts';
import { pointDistance } from '../point.ts';
import { segmentEnd, segmentStart } from '../segment.ts';
import type { Chain } from './chain.ts';

/** A gap between two loose ends: its middle and its width, m. */
export type Gap = { readonly at: Point; readonly size: number };

/** Loose ends farther apart than this share of the drawing's diagonal, or than the width, are not taken for a gap. */
const widestShare = 0.01;
const widest = 1e-3; // m

/** Near gaps between the loose ends of open chains, narrowest first. Each end is matched with its nearest neighbour at most once. */
export function nearGaps(open: readonly Chain[], diagonal: number): Gap[] {
  const ends = open.flatMap(({ segments }) => {
    const first = segments[0];
    const last = segments.at(-1);
    return first && last ? [segmentStart(first), segmentEnd(last)] : [];
  });
  if (ends.length < 2) return [];
  const index = new Flatbush(ends.length);
  for (const p of ends) index.add(p.x, p.y, p.x, p.y);
  index.finish();
  const most = Math.min(widest, diagonal * widestShare);
  const pairs: { a: number; b: number; size: number }[] = [];
  ends.forEach((p, a) => {
    for (const b of index.neighbors(p.x, p.y, 4, most)) {
      const q = ends[b];
      if (q && b > a) pairs.push({ a, b, size: pointDistance(p, q) });
    }
  });
  pairs.sort((x, y) => x.size - y.size || x.a - y.a || x.b - y.b);
  const taken = new Set<number>();
  const gaps: Gap[] = [];
  for (const { a, b, size } of pairs) {
    const [p, q] = [ends[a], ends[b]];
    if (taken.has(a) || taken.has(b) || !p || !q) continue;
    taken.add(a).add(b);
    gaps.push({ at: { x: (p.x + q.x) / 2, y: (p.y + q.y) / 2 }, size });
  }
  return gaps;
}
