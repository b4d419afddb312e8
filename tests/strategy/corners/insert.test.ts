import { describe, expect, it } from 'vitest';
import type { CornerPlanRequest, CornerTreatment } from '../../../strategy/corners/index.ts';
import { cornerInsert, cornerPlan } from '../../../strategy/corners/index.ts';
import type { Contour } from '../../../strategy/path/index.ts';
import {
  arcOf,
  easedShare,
  lineBetween,
  pathLength,
  pointDistance,
  segmentEnd,
  segmentLength,
  segmentStart,
} from '../../../strategy/path/index.ts';
import { cutPathOf } from '../../../strategy/path/compensation/index.ts';

/** A plate of 100 mm with a sharp corner, a chamfer of 0.7 mm, a fillet of 0.8 mm and a bow, cut off at the fourth corner. */
const plate: Contour = {
  segments: [
    lineBetween({ x: 0, y: 0 }, { x: 0.0995, y: 0 }),
    lineBetween({ x: 0.0995, y: 0 }, { x: 0.1, y: 0.0005 }),
    lineBetween({ x: 0.1, y: 0.0005 }, { x: 0.1, y: 0.0992 }),
    arcOf({ x: 0.0992, y: 0.0992 }, 8e-4, 0, Math.PI / 2),
    lineBetween({ x: 0.0992, y: 0.1 }, { x: 0, y: 0.1 }),
    lineBetween({ x: 0, y: 0.1 }, { x: 0, y: 0 }),
  ],
};
const request: CornerPlanRequest = {
  contours: [{ id: '1', contour: plate, role: 'outer' }],
  plate: null,
  rules: {
    treatBelowAngle: 2,
    returnExcessLimit: 1000,
    loop: { allowed: true, radius: 4e-3, minExtension: 2e-3, maxExtension: 0.03, clearance: 2e-3 },
    dwell: { allowed: true, maxDuration: 5, restart: 1 },
    ease: { allowed: true, length: 5e-3, feedShare: 0.4, powerShare: 0.4 },
    round: { allowed: true, radius: 2e-3, tolerance: 1e-3 },
  },
  cut: {
    feed: 0.012,
    peakPower: 4000,
    duty: 1,
    pulseFrequency: null,
    oxygenPressure: 7e4,
    standoff: 1e-3,
    focusPosition: 5e-3,
    kerfWidth: 8e-4,
    heatIntoPlate: 1.1e7,
  },
  profile: { axes: { maxFeed: 1, acceleration: 2, jerk: 50 }, smallestArc: 1e-3 },
  thickness: 0.019,
  plateTemperature: 293.15,
};

/** The cut path with every corner treated so, where it can be. */
function cutWith(treatment: CornerTreatment, rules = request.rules) {
  const ids = cornerPlan(request).corners.map(({ id }) => id);
  const { corners } = cornerPlan({
    ...request,
    rules,
    overrides: Object.fromEntries(ids.map((id) => [id, treatment])),
  });
  const inserts = corners.flatMap((corner) => cornerInsert(corner) ?? []);
  const { path, problems } = cutPathOf({
    contours: [{ id: '1', name: 'outline 1', contour: plate, role: 'outer', parent: null }],
    inserts,
    kerfWidth: request.cut.kerfWidth,
    outside: { kind: 'sharp', limit: 10 },
    leadIn: { shape: { kind: 'line' }, needed: 6e-3, craterRadius: 3e-3, clearance: 2e-3 },
    plate: null,
  });
  const pieces = path.runs.flatMap((run) => run.pieces);
  return { corners, inserts, problems, pieces };
}

describe('what corners put into the path of a contour', () => {
  it('are its four corners, two of them rounded by the drawing', () => {
    expect(cornerPlan(request).corners.map(({ id, drawn }) => [id, drawn !== null])).toEqual([
      ['c1-0', false],
      ['c1-1', true],
      ['c1-3', true],
      ['c1-5', false],
    ]);
  });

  it('is found on the path beside it, loops of sharp and of rounded corners alike, and all joins up', () => {
    const { inserts, problems, pieces } = cutWith('loop');
    expect(inserts).toHaveLength(4);
    expect(problems).toEqual([]);
    expect(pieces.filter(({ kind }) => kind === 'loop')).toHaveLength(4);
    const segments = pieces.flatMap((piece) => (piece.kind === 'dwell' ? [] : piece.segments));
    segments.slice(1).forEach((segment, i) => {
      const before = segments[i];
      if (before) expect(pointDistance(segmentEnd(before), segmentStart(segment))).toBeLessThan(1e-7);
    });
  });

  it('waits on the path, at a rounded corner where its arc ends', () => {
    const { inserts, problems, pieces } = cutWith('dwell', { ...request.rules, returnExcessLimit: 10 });
    expect(inserts.map(({ kind }) => kind)).toEqual(['dwell', 'dwell', 'dwell', 'dwell']);
    const waits = pieces.flatMap((piece) => (piece.kind === 'dwell' ? [piece] : []));
    // a chamfer has no arc to end: its wait is named as left out rather than put beside the path
    expect(waits.length + problems.length).toBe(4);
    for (const wait of waits) {
      const insert = inserts.find((one) => one.kind === 'dwell' && pointDistance(one.at, wait.at) < 1e-7);
      expect(insert).toBeDefined();
    }
    expect(waits.length).toBeGreaterThanOrEqual(3);
  });

  it('replaces sharp corners by arcs half a kerf beside the round, and leaves rounded ones as drawn', () => {
    const { inserts, problems, pieces } = cutWith('round');
    expect(inserts.map(({ index }) => index)).toEqual([0, 5]);
    expect(problems).toEqual([]);
    const radii = pieces.flatMap((piece) =>
      piece.kind === 'contour' ? piece.segments.flatMap((s) => (s.kind === 'arc' ? [s.radius] : [])) : [],
    );
    expect(radii.filter((r) => Math.abs(r - 2.4e-3) < 1e-9)).toHaveLength(2);
    expect(radii.filter((r) => Math.abs(r - 1.2e-3) < 1e-9)).toHaveLength(1);
  });

  it('eases the path into each corner and out of it in even steps, without changing where it runs', () => {
    const { corners, problems, pieces } = cutWith('ease');
    expect(problems).toEqual([]);
    const cut = pieces.flatMap((piece) => (piece.kind === 'contour' ? [piece] : []));
    const lengthOf = (some: typeof cut) => some.reduce((sum, { segments }) => sum + pathLength(segments), 0);
    const eased = cut.filter(({ feedShare }) => feedShare !== undefined);
    const planned = corners.flatMap(({ ease }) => (ease ? [ease] : []));
    expect(planned).toHaveLength(4);
    const round = lengthOf(eased) - planned.reduce((sum, { before, after }) => sum + before + after, 0);
    // the arc of the fillet and the chamfer lie between
    expect(round).toBeGreaterThan(0);
    expect(round).toBeLessThan(4e-3);
    // 0.4 of the feed in the corner, half a step before it 1/16 of the way back to the whole
    expect(Math.min(...eased.map(({ feedShare = 1 }) => feedShare))).toBeCloseTo(0.4, 9);
    expect(Math.max(...eased.map(({ feedShare = 1 }) => feedShare))).toBeCloseTo(1 - 0.6 / 16, 9);
    for (const { feedShare, powerShare } of eased) expect(powerShare).toBe(feedShare);
    const plain = cutWith('leave').pieces.flatMap((piece) => (piece.kind === 'contour' ? [piece] : []));
    expect(lengthOf(cut)).toBeCloseTo(lengthOf(plain), 9);
    // as much time as the plan's own steps take at their feeds, of a sharp corner
    const sharp = corners.find(({ id }) => id === 'c1-5')?.ease;
    const tip = corners.find(({ id }) => id === 'c1-5')?.pathPoint;
    if (!sharp || !tip) throw new Error('corner c1-5 is not eased');
    const beside = eased.filter(({ segments }) =>
      segments.every(
        (one) => pointDistance(segmentStart(one), tip) < 6e-3 && pointDistance(segmentEnd(one), tip) < 6e-3,
      ),
    );
    const slowly = (some: readonly { length: number; share: number }[]) =>
      some.reduce((sum, { length, share }) => sum + length / share, 0);
    expect(
      slowly(beside.map(({ segments, feedShare = 1 }) => ({ length: pathLength(segments), share: feedShare }))),
    ).toBeCloseTo(
      slowly(sharp.pieces.map((one) => ({ length: segmentLength(one.segment), share: easedShare(one.eased, 0.4) }))),
      9,
    );
  });
});
