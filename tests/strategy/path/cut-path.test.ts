import { describe, expect, it } from 'vitest';
import type { CornerInsert, CutContour, CutPathRequest } from '../../../strategy/path/compensation/index.ts';
import { cutPathOf } from '../../../strategy/path/compensation/index.ts';
import type { CutRun } from '../../../strategy/path/cut-path.ts';
import type { Contour, Point, Segment } from '../../../strategy/path/index.ts';
import {
  arcOf,
  circleOf,
  contourCorners,
  contourReverse,
  cornerOfPath,
  lineBetween,
  loopAt,
  pathLength,
  pointDistance,
  segmentDistance,
  segmentEnd,
  segmentPointDistance,
  segmentStart,
} from '../../../strategy/path/index.ts';

const kerf = 1.6e-3;
const polygon = (points: readonly Point[]): Contour => ({
  segments: points.map((p, i) => lineBetween(p, points[(i + 1) % points.length] ?? p)),
});
const plate = polygon([
  { x: 0, y: 0 },
  { x: 0.3, y: 0 },
  { x: 0.3, y: 0.2 },
  { x: 0, y: 0.2 },
]);
const outline: CutContour = { id: '1', name: 'outline 1', contour: plate, role: 'outer', parent: null };
const bore = (id: string, x: number, radius: number): CutContour => ({
  id,
  name: `hole ${id}`,
  contour: contourReverse({ segments: [circleOf({ x, y: 0.1 }, radius)] }),
  role: 'hole',
  parent: '1',
});
const request = (change: Partial<CutPathRequest> = {}): CutPathRequest => ({
  contours: [outline],
  inserts: [],
  kerfWidth: kerf,
  outside: { kind: 'sharp', limit: 10 },
  leadIn: { shape: { kind: 'line' }, needed: 8e-3, craterRadius: 4e-3, clearance: 2e-3 },
  plate: null,
  ...change,
});
const loops: CornerInsert[] = contourCorners(plate).map((corner) => ({
  contourId: '1',
  index: corner.index,
  name: `the loop of corner c1-${corner.index}`,
  kind: 'path',
  as: 'loop',
  segments: loopAt({ ...corner, point: cornerOfPath(corner, kerf) }, 5e-3).segments,
}));
const cutOf = (run: CutRun): Segment[] => run.pieces.flatMap((piece) => (piece.kind === 'dwell' ? [] : piece.segments));
/** Widest gap between what is cut one after another, and before a wait, m. */
function widestGap(run: CutRun): number {
  let at = run.pierce;
  let widest = 0;
  for (const piece of run.pieces) {
    if (piece.kind === 'dwell') widest = Math.max(widest, pointDistance(at, piece.at));
    else
      for (const segment of piece.segments) {
        widest = Math.max(widest, pointDistance(at, segmentStart(segment)));
        at = segmentEnd(segment);
      }
  }
  return widest;
}

describe('the path of a cut', () => {
  it('runs from the pierce along the lead-in, round the contour with its loops, back to where it began', () => {
    const { path, problems } = cutPathOf(request({ inserts: loops }));
    expect(problems).toEqual([]);
    const [run] = path.runs;
    expect(run?.pieces.map(({ kind }) => kind)).toEqual([
      'lead-in',
      ...['contour', 'loop', 'contour', 'loop', 'contour', 'loop', 'contour', 'loop', 'contour'],
    ]);
    if (!run) return;
    expect(widestGap(run)).toBeLessThan(1e-12);
    const [leadIn, ...rest] = run.pieces;
    const cut = rest.flatMap((piece) => (piece.kind === 'dwell' ? [] : piece.segments));
    const start =
      leadIn?.kind === 'lead-in' ? segmentEnd(leadIn.segments[0] ?? lineBetween(run.pierce, run.pierce)) : run.pierce;
    expect(pointDistance(segmentEnd(cut.at(-1) ?? lineBetween(run.pierce, run.pierce)), start)).toBeLessThan(1e-12);
    const loopLength = loops.reduce((sum, loop) => sum + (loop.kind === 'path' ? pathLength(loop.segments) : 0), 0);
    expect(pathLength(cut)).toBeCloseTo(2 * (0.3 + 0.2) + 8 * (kerf / 2) + loopLength, 12);
    // the cut leaves the finished edge alone: half a kerf away all round
    for (const segment of cutOf(run)) {
      for (const edge of plate.segments) {
        expect(segmentPointDistance(edge, segmentStart(segment))).toBeGreaterThanOrEqual(kerf / 2 - 1e-12);
      }
    }
  });

  it('cuts holes before the outline around them, whatever order the drawing has them in', () => {
    const { path } = cutPathOf(request({ contours: [outline, bore('2', 0.1, 0.03), bore('3', 0.2, 0.02)] }));
    expect(path.runs.map(({ name }) => name)).toEqual(['hole 2', 'hole 3', 'outline 1']);
  });

  it('waits with the beam off in the corner of the path where a dwell was planned', () => {
    const dwell: CornerInsert = {
      contourId: '1',
      index: 2,
      name: 'the dwell of corner c1-2',
      kind: 'dwell',
      duration: 3,
    };
    const [run] = cutPathOf(request({ inserts: [dwell] })).path.runs;
    const waits = run?.pieces.filter((piece) => piece.kind === 'dwell');
    expect(waits).toHaveLength(1);
    const [wait] = waits ?? [];
    expect(wait?.duration).toBe(3);
    expect(wait && pointDistance(wait.at, { x: 0.3 + kerf / 2, y: 0.2 + kerf / 2 })).toBeLessThan(1e-12);
    expect(run && widestGap(run)).toBeLessThan(1e-12);
  });

  it('cuts past the start only when asked to', () => {
    const length = (overcut?: number) =>
      pathLength(
        cutOf(
          cutPathOf(request(overcut === undefined ? {} : { overcut })).path.runs[0] ?? {
            contourId: '',
            name: '',
            pierce: { x: 0, y: 0 },
            pieces: [],
          },
        ),
      );
    expect(length(2e-3) - length()).toBeCloseTo(2e-3, 12);
    expect(() => cutPathOf(request({ overcut: -1e-3 }))).toThrow(RangeError);
  });

  it('takes a round instead of the corner, and a wait at the place it is planned for', () => {
    const arc = arcOf({ x: 0.295, y: 0.195 }, 5e-3 + kerf / 2, 0, Math.PI / 2);
    const round: CornerInsert = {
      contourId: '1',
      index: 2,
      name: 'the round of corner c1-2',
      kind: 'path',
      as: 'contour',
      segments: [arc],
    };
    // a millimetre past the corner at the upper left
    const at = { x: -kerf / 2, y: 0.199 };
    const dwell: CornerInsert = {
      contourId: '1',
      index: 3,
      name: 'the dwell of corner c1-3',
      kind: 'dwell',
      duration: 1,
      at,
    };
    const { path, problems } = cutPathOf(request({ inserts: [round, dwell] }));
    expect(problems).toEqual([]);
    const [run] = path.runs;
    if (!run) throw new Error('nothing is cut');
    expect(widestGap(run)).toBeLessThan(1e-12);
    expect(run.pieces.map(({ kind }) => kind)).toEqual(['lead-in', 'contour', 'dwell', 'contour']);
    const length = pathLength(run.pieces.flatMap((piece) => (piece.kind === 'contour' ? piece.segments : [])));
    expect(length).toBeCloseTo(1 + 8 * (kerf / 2) - (2 - Math.PI / 2) * (5e-3 + kerf / 2), 12);
  });

  it('says which treatment found no path, and cuts the contour without it', () => {
    const astray: CornerInsert = {
      contourId: '1',
      index: 2,
      name: 'the loop of corner c1-2',
      kind: 'path',
      as: 'loop',
      segments: loopAt(
        { point: { x: 0.4, y: 0.2 }, incoming: { x: 0, y: 1 }, outgoing: { x: -1, y: 0 }, angle: 1.5 },
        5e-3,
      ).segments,
    };
    const { path, problems } = cutPathOf(request({ inserts: [astray] }));
    expect(path.runs).toHaveLength(1);
    expect(problems).toMatchObject([
      {
        kind: 'corner',
        leftOut: false,
        why: 'the loop of corner c1-2 is left out: the path of outline 1 does not come there',
      },
    ]);
  });

  it('keeps lead-ins off loops, those of other contours too', () => {
    const { path } = cutPathOf(request({ inserts: loops, starts: { 1: { x: 0.3, y: -0.01 } } }));
    const [run] = path.runs;
    if (!run) throw new Error('nothing is cut');
    const leadIn = run.pieces[0]?.kind === 'lead-in' ? run.pieces[0].segments : [];
    for (const piece of run.pieces) {
      if (piece.kind !== 'loop') continue;
      for (const a of leadIn) {
        for (const b of piece.segments) {
          expect(segmentDistance(a, b).distance).toBeGreaterThan(kerf + 2e-3 - 1e-9);
        }
      }
    }
  });

  it('names what is narrower than the kerf: a hole is left out, a gap between contours is said', () => {
    const slit = bore('2', 0.1, 6e-4);
    const wide = bore('3', 0.2, 0.03);
    const island: CutContour = {
      id: '4',
      name: 'island 4',
      contour: { segments: [circleOf({ x: 0.2, y: 0.1 }, 0.03 - 1.2e-3)] },
      role: 'island',
      parent: '3',
    };
    const { path, problems } = cutPathOf(request({ contours: [outline, slit, wide, island] }));
    const narrow = problems.filter(({ kind }) => kind === 'narrow');
    expect(narrow.map(({ why, leftOut }) => ({ why, leftOut }))).toEqual([
      { why: 'hole 2 at (100.0 mm, 100.0 mm) is narrower than the kerf: 1.2 mm against 1.6 mm', leftOut: true },
      expect.objectContaining({ leftOut: false }),
    ]);
    expect(narrow[1]?.why).toMatch(
      /^the gap between island 4 and hole 3 at \(.*\) is narrower than the kerf: 1\.2 mm against 1\.6 mm$/,
    );
    expect(path.runs.map(({ name }) => name)).not.toContain('hole 2');
  });

  it('says where and how far it runs outside the plate, and cuts the contour all the same', () => {
    const box = { minX: 0, minY: -0.05, maxX: 0.4, maxY: 0.2003 };
    const { path, problems } = cutPathOf(request({ plate: box }));
    expect(path.runs).toHaveLength(1);
    // on the left edge; nearer to the upper one, but not as bad
    expect(problems).toEqual([
      {
        contourId: '1',
        kind: 'plate',
        at: { x: 0, y: 0 },
        why: expect.stringMatching(
          /^outline 1 lies on the plate's edge at .*: its cut runs outside the plate by 0\.8 mm$/,
        ) as string,
        leftOut: false,
      },
    ]);
    const [near] = cutPathOf(request({ plate: { ...box, minX: -0.05 } })).problems;
    expect(near?.kind).toBe('plate');
    expect(near?.why).toMatch(/^outline 1 is 0\.3 mm from the plate's edge .* nearer than half a kerf: .* by 0\.5 mm$/);
    // its lower left part is missing: 20 mm over, where it has nothing to be pierced in
    const [over] = cutPathOf(request({ plate: { ...box, minX: 0.02 } })).problems;
    expect(over?.why).toMatch(/^outline 1 reaches 20(\.0+)? mm over the plate's edge .* by 20\.8 mm$/);
    expect(cutPathOf(request({ plate: { ...box, minX: -0.05, maxY: 0.2008 } })).problems).toEqual([]);
  });

  it('says that it runs into an opening of a remnant, of the part once and not of all holes in it', () => {
    const edge = polygon([
      { x: -0.1, y: -0.1 },
      { x: 0.5, y: -0.1 },
      { x: 0.5, y: 0.4 },
      { x: -0.1, y: 0.4 },
    ]);
    const opening = (x: number) => contourReverse({ segments: [circleOf({ x, y: 0.1 }, 0.05)] });
    const problemsWith = (x: number) =>
      cutPathOf(
        request({ contours: [bore('2', 0.25, 0.02), outline], plate: { edge, openings: [opening(x)] } }),
      ).problems.filter(({ kind }) => kind === 'plate');
    expect(problemsWith(0.351)).toEqual([]);
    expect(problemsWith(0.3505).map(({ why }) => why)).toEqual([
      expect.stringMatching(
        /^outline 1 is 0\.5 mm from an opening in the plate at \(300\.0 mm, 100\.0 mm\), .* by 0\.3 mm$/,
      ),
    ]);
    // the opening reaches into the part and over a piece of its hole
    expect(problemsWith(0.305).map(({ contourId }) => contourId)).toEqual(['1']);
    // within the part the hole alone meets it
    expect(problemsWith(0.21).map(({ contourId }) => contourId)).toEqual(['2']);
  });

  it('eases about the corner where an inside corner beside it cuts the planned stretch short', () => {
    const ease = { before: 5e-3, after: 5e-3, feedShare: 0.4, powerShare: 0.5 };
    // the stretch is planned to begin and end beside the path
    const stretch = { from: { x: 0.295, y: -0.01 }, to: { x: 0.31, y: 5e-3 }, ...ease };
    const insert: CornerInsert = {
      contourId: '1',
      index: 1,
      name: 'the ease of corner c1-1',
      kind: 'ease',
      ...stretch,
    };
    const { path, problems } = cutPathOf(request({ inserts: [insert] }));
    expect(problems).toEqual([]);
    const eased = path.runs.flatMap(({ pieces }) =>
      pieces.flatMap((piece) => (piece.kind === 'dwell' || piece.feedShare === undefined ? [] : [piece])),
    );
    expect(pathLength(eased.flatMap(({ segments }) => segments))).toBeCloseTo(10e-3, 9);
    expect(Math.min(...eased.map(({ powerShare = 1 }) => powerShare))).toBeCloseTo(1 - 0.5 * (15 / 16), 9);
    const elsewhere = { ...insert, index: 77 };
    expect(cutPathOf(request({ inserts: [elsewhere] })).problems.map(({ kind }) => kind)).toEqual(['corner']);
  });
});
