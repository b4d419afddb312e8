import type { Contour } from '../contour.ts';
import { contourBox, contourReverse, contourRotate, contourShift } from '../contour.ts';
import type { Box, Point } from '../point.ts';
import { boxUnion, emptyBox } from '../point.ts';
import type { Segment } from '../segment.ts';
import { arcOf, lineBetween } from '../segment.ts';

/** A contour of a part's own drawing. */
export type PartContour = {
  readonly id: string;
  readonly role: 'outer' | 'hole' | 'island';
  /** The contour around it. */
  readonly parent: string | null;
  readonly contour: Contour;
};

export type LayoutPart = { readonly id: string; readonly name: string; readonly contours: readonly PartContour[] };

/** Where one piece of a part lies on a plate. */
export type Placement = {
  /** Stays with the piece whatever is done to the others: 1, 2, 3 … */
  readonly number: number;
  readonly partId: string;
  /** Lower left corner of the box around the piece as it lies, from the plate's lower left corner, m. */
  readonly at: Point;
  /** Counter-clockwise, rad; after mirroring. */
  readonly turn: number;
  /** Turned over about its vertical axis. */
  readonly mirrored: boolean;
};

/** A contour as it lies on the plate. */
export type PlacedContour = {
  /** `<placement>.<contour>`, such as `3.2`. */
  readonly id: string;
  readonly placement: number;
  readonly contourId: string;
  readonly role: PartContour['role'];
  /** Id on the plate of the contour around it within its part. */
  readonly parent: string | null;
  readonly contour: Contour;
  readonly box: Box;
  /** As a sentence calls it: "hole 2 of part 3, bracket". */
  readonly name: string;
};

export type PlacedPart = {
  readonly number: number;
  readonly partId: string;
  /** As a sentence calls it: "part 3, bracket". */
  readonly name: string;
  readonly contours: readonly PlacedContour[];
  readonly box: Box;
};

const roleName = { outer: 'outline', hole: 'hole', island: 'island' } as const;

/**
 * A part's contours as they lie on the plate, m: mirrored, turned, then shifted so that their box begins at the placement's corner.
 * Outlines stay counter-clockwise and holes clockwise when mirrored. Throws RangeError for a part without contours.
 */
export function partPlaced(part: LayoutPart, placement: Placement): PlacedPart {
  const { number, at } = placement;
  const lying = partLying(part, placement);
  const name = `part ${number}, ${part.name}`;
  const by = { x: at.x - lying.box.minX, y: at.y - lying.box.minY };
  const counts = { outer: 0, hole: 0, island: 0 };
  const several = part.contours.filter(({ role }) => role === 'outer').length > 1;
  const contours = part.contours.map(({ id, role, parent }, i): PlacedContour => {
    const contour = contourShift(lying.contours[i] ?? { segments: [] }, by);
    counts[role]++;
    const which = role === 'outer' && !several ? '' : ` ${counts[role]}`;
    return {
      id: `${number}.${id}`,
      placement: number,
      contourId: id,
      role,
      parent: parent === null ? null : `${number}.${parent}`,
      contour,
      box: contourBox(contour),
      name: `${roleName[role]}${which} of ${name}`,
    };
  });
  return { number, partId: part.id, name, contours, box: boxOf(contours.map(({ contour }) => contour)) };
}

/** Width and height of the box around a part as it would lie, m. */
export function partSize(
  part: LayoutPart,
  lies: Pick<Placement, 'turn' | 'mirrored'>,
): { width: number; height: number } {
  const { box } = partLying(part, lies);
  return { width: box.maxX - box.minX, height: box.maxY - box.minY };
}

/** All placements of a layout as they lie. Throws RangeError for a placement of a part that is not among them. */
export function partsPlaced(parts: readonly LayoutPart[], placements: readonly Placement[]): PlacedPart[] {
  const known = new Map(parts.map((part) => [part.id, part]));
  return placements.map((placement) => {
    const part = known.get(placement.partId);
    if (!part) throw new RangeError(`placement ${placement.number} is of a part that is not there`);
    return partPlaced(part, placement);
  });
}

function partLying(part: LayoutPart, { turn, mirrored }: Pick<Placement, 'turn' | 'mirrored'>) {
  if (part.contours.length === 0) throw new RangeError(`part ${part.name} has no contour`);
  const contours = part.contours.map(({ contour }) => contourRotate(mirrored ? contourMirror(contour) : contour, turn));
  return { contours, box: boxOf(contours) };
}

const boxOf = (contours: readonly Contour[]): Box =>
  contours.reduce((box, contour) => boxUnion(box, contourBox(contour)), emptyBox);

/** Turned over about the y axis; travelled the other way, so that the part stays on the left. */
function contourMirror(contour: Contour): Contour {
  return contourReverse({ segments: contour.segments.map(segmentMirror) });
}

function segmentMirror(segment: Segment): Segment {
  const over = (p: Point) => ({ x: -p.x, y: p.y });
  if (segment.kind === 'line') return lineBetween(over(segment.start), over(segment.end));
  const { centre, radius, startAngle, sweep } = segment;
  return arcOf(over(centre), radius, Math.PI - startAngle, -sweep);
}
