import type { CornerPlan } from '../../shared/corner-plans.ts';
import { laidOut } from '../../shared/layouts.ts';
import { drawingReadingSchema } from '../../shared/parts.ts';
import type { CornerPlanRequest } from '../../strategy/corners/index.ts';
import type { PlacedPart } from '../../strategy/path/plate/index.ts';
import { laidPartOf, outlineFrom, wireOutlineOf } from '../layouts/present.ts';
import type { PartGeometry, WholeLayout } from '../layouts/repository.ts';

type WireContour = CornerPlan['part']['contours'][number];

/** What corners are planned of: a part with skeleton around it, or the pieces of a layout on their plate. */
export type Planned = {
  readonly id: string;
  readonly name: string;
  /** In the order of cutting; `said` is how a sentence calls a contour, where its role and id don't do. */
  readonly contours: readonly (WireContour & { readonly said?: string })[];
  readonly plate: NonNullable<CornerPlanRequest['plate']>;
  readonly layout: Omit<NonNullable<CornerPlan['layout']>, 'newest'> | null;
  /** The pieces of a layout as they lie; null for a part. */
  readonly placed: readonly PlacedPart[] | null;
};

export function plannedPart({ id, name, reading }: PartGeometry, skeleton: CornerPlan['skeleton']): Planned {
  const { bounds, contours } = drawingReadingSchema.parse(reading);
  return {
    id,
    name,
    // what lies inside is cut before what lies around it: an island before its hole, holes before the outline
    contours: [...contours].sort((a, b) => b.depth - a.depth),
    plate: {
      min: { x: bounds.min.x - skeleton.left, y: bounds.min.y - skeleton.below },
      max: { x: bounds.max.x + skeleton.right, y: bounds.max.y + skeleton.above },
    },
    layout: null,
    placed: null,
  };
}

export function plannedLayout(whole: WholeLayout): Planned {
  const { layout, version } = whole;
  const parts = whole.parts.map(laidPartOf);
  const drawn = new Map(parts.flatMap((part) => part.contours.map((one) => [`${part.id} ${one.id}`, one] as const)));
  const placed = laidOut(parts, whole.placements);
  const lies = new Map(
    placed.flatMap(({ partId, contours }) => contours.map((one) => [one.id, { ...one, partId }] as const)),
  );
  return {
    id: layout.id,
    name: layout.name,
    contours: version.cutOrder.flatMap((id) => {
      const own = lies.get(id);
      if (!own) return [];
      const { depth = 0, layer = '' } = drawn.get(`${own.partId} ${own.contourId}`) ?? {};
      const { role, parent, contour, name } = own;
      return [{ id, depth, role, parent, layer, segments: [...contour.segments], said: name }];
    }),
    plate: outlineFrom(whole),
    placed,
    layout: { id: layout.id, version: version.version, outline: wireOutlineOf(whole) },
  };
}
