import type { CornerPlan, PlannedCorner } from '@/shared/corner-plans.ts';
import { pointDistance, segmentEnd, segmentStart, type Point, type Segment } from '@/strategy/path/index.ts';
import type { CutPath, CutPiece, CutRun } from '@/strategy/path/cut-path.ts';

const roleNames = { outer: 'outline', hole: 'hole', island: 'island' } as const;

type PlanContour = CornerPlan['part']['contours'][number];

type PathOf = Pick<CornerPlan, 'part' | 'corners'> & Partial<Pick<CornerPlan, 'layout'>>;

/**
 * The cut along the finished edges in order: what lies deeper within the part first, from the plate's lower left corner on the nearest next; each corner
 * with the loop or the wait that the plan gives it. Without lead-ins: where a contour is drawn to begin, its cut begins.
 */
export function planPath({ part, corners, layout = null }: PathOf): CutPath {
  const byContour = new Map<string, PlannedCorner[]>();
  for (const corner of corners) {
    const known = byContour.get(corner.contourId);
    if (known) known.push(corner);
    else byContour.set(corner.contourId, [corner]);
  }
  // a layout's contours come in its own order of cutting
  const contours = layout ? part.contours.filter(({ segments }) => segments.length > 0) : inOrder(part.contours);
  return { runs: contours.map((contour) => runOf(contour, byContour.get(contour.id) ?? [])) };
}

function inOrder(contours: readonly PlanContour[]): PlanContour[] {
  const left = new Set(contours.filter(({ segments }) => segments.length > 0));
  const order: PlanContour[] = [];
  let at: Point = { x: -Infinity, y: -Infinity };
  while (left.size > 0) {
    const deepest = Math.max(...Array.from(left, ({ depth }) => depth));
    let next: PlanContour | null = null;
    let least = Infinity;
    for (const contour of left) {
      if (contour.depth !== deepest) continue;
      const start = beginning(contour.segments);
      const distance = Number.isFinite(at.x) ? pointDistance(at, start) : start.x + start.y;
      if (next && distance >= least) continue;
      next = contour;
      least = distance;
    }
    if (!next) break;
    left.delete(next);
    order.push(next);
    at = beginning(next.segments);
  }
  return order;
}

const beginning = (segments: readonly Segment[]): Point => {
  const [first] = segments;
  return first ? segmentStart(first) : { x: 0, y: 0 };
};

function runOf({ id, role, segments }: PlanContour, corners: readonly PlannedCorner[]): CutRun {
  // the planner names corners c{contour}-{segment that begins there}
  const treated = new Map(corners.map((corner) => [corner.id, corner]));
  const pieces: CutPiece[] = [];
  let straight: Segment[] = [];
  const close = () => {
    if (straight.length > 0) pieces.push({ kind: 'contour', segments: straight });
    straight = [];
  };
  segments.forEach((segment, i) => {
    straight.push(segment);
    // the corner stands at the start of the segment after
    const corner = treated.get(`c${id}-${(i + 1) % segments.length}`);
    if (!corner || (corner.loop === null && corner.dwell === null)) return;
    close();
    if (corner.loop) pieces.push({ kind: 'loop', segments: corner.loop.segments });
    else if (corner.dwell !== null) pieces.push({ kind: 'dwell', at: segmentEnd(segment), duration: corner.dwell });
  });
  close();
  return { contourId: id, name: `${roleNames[role]} ${id}`, pierce: beginning(segments), pieces };
}
