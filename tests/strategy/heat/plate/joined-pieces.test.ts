import { describe, expect, it } from 'vitest';
import type { HeatedPiece } from '../../../../strategy/heat/index.ts';
import { midZoneProperties, pathRise } from '../../../../strategy/heat/index.ts';
import { joinedPieces } from '../../../../strategy/heat/plate/joined-pieces.ts';
import type { Segment } from '../../../../strategy/path/index.ts';
import { arcOf, lineBetween, segmentLength, segmentPart } from '../../../../strategy/path/index.ts';

/** J per m of cut and per metre of thickness. */
const perLength = 6.5e6;

/** A segment that is passed slowly at its ends and fast between, in parts: shares of its length with their times, s. */
function passed(segment: Segment, start: number): HeatedPiece[] {
  const shares = [0, 0.02, 0.1, 0.9, 0.98, 1];
  const times = [0, 0.03, 0.06, 1.06, 1.09, 1.12];
  return shares.slice(1).map((share, k) => {
    const [a, from, to] = [shares[k] ?? 0, start + (times[k] ?? 0), start + (times[k + 1] ?? 0)];
    const part = segmentPart(segment, a, share);
    return { segment: part, from, to, powerPerLength: (perLength * segmentLength(part)) / (to - from) };
  });
}

const heatOf = (pieces: readonly HeatedPiece[]): number =>
  pieces.reduce((sum, { from, to, powerPerLength }) => sum + powerPerLength * (to - from), 0);
const edge = lineBetween({ x: 0.01, y: 0.02 }, { x: 0.05, y: 0.045 });
const round = arcOf({ x: 0.03, y: 0.03 }, 0.02, 0.4, -2.1);

describe('pieces of one line or arc joined for the plate', () => {
  it('makes one of an edge that is passed at changing speed, with all its heat', () => {
    for (const segment of [edge, round]) {
      const parts = passed(segment, 3);
      const joined = joinedPieces(parts, 0.06);
      expect(joined).toHaveLength(1);
      expect(segmentLength(joined[0]?.segment ?? edge)).toBeCloseTo(segmentLength(segment), 12);
      expect(heatOf(joined) / heatOf(parts)).toBeCloseTo(1, 12);
      expect([joined[0]?.from, joined[0]?.to]).toEqual([3, parts.at(-1)?.to]);
    }
  });

  it('leaves the plate as warm as the parts do, once seconds have passed', () => {
    const parts = passed(edge, 0);
    const at = { x: 0.02, y: 0.03 };
    const rise = (pieces: readonly HeatedPiece[]) => pathRise(pieces, at, 6, midZoneProperties);
    expect(rise(joinedPieces(parts, 0.06)) / rise(parts)).toBeCloseTo(1, 2);
  });

  it('parts them where the source would be too far off in time', () => {
    expect(joinedPieces(passed(edge, 0), 1e-4).length).toBeGreaterThan(2);
  });

  it('does not join round a corner, over a pause, back along itself or where a metre leaves another heat', () => {
    const [first] = passed(edge, 0);
    if (!first) throw new Error('there is a first part');
    const end = first.segment.kind === 'line' ? first.segment.end : { x: 0, y: 0 };
    const on = passed(edge, 0)[1];
    if (!on) throw new Error('there is a second part');
    const after = (segment: Segment, change: Partial<HeatedPiece> = {}): HeatedPiece => ({ ...on, segment, ...change });
    const turned = after(lineBetween(end, { x: end.x - 0.001, y: end.y + 0.003 }));
    const back = after(lineBetween(end, { x: 0.01, y: 0.02 }));
    const late = after(on.segment, { from: on.from + 1, to: on.to + 1 });
    const cooler = after(on.segment, { powerPerLength: on.powerPerLength / 2 });
    for (const next of [turned, back, late, cooler]) expect(joinedPieces([first, next], 1)).toEqual([first, next]);
    expect(joinedPieces([first, on], 1)).toHaveLength(1);
  });
});
