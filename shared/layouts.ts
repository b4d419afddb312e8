import { z } from 'zod';
import {
  partsPlaced,
  type LayoutPart,
  type LayoutProblem,
  type PlacedPart,
  type PlateOutline,
} from '../strategy/path/plate/index.ts';
import {
  idSchema,
  instantSchema,
  listOf,
  nameSchema,
  personSchema,
  pointSchema,
  quantity,
  versionSchema,
} from './basics.ts';
import { endpoint } from './endpoint.ts';
import { limits } from './limits.ts';
import { contourSchema, segmentSchema } from './parts.ts';

/** What is cut from: a sheet of a size, a plate in the yard, or a remnant as it was drawn. */
export const layoutPlateSchema = z.discriminatedUnion('kind', [
  z.strictObject({
    kind: z.literal('rectangle'),
    width: quantity(0.01, 50, '10 mm to 50 m'),
    height: quantity(0.01, 20, '10 mm to 20 m'),
  }),
  z.strictObject({ kind: z.literal('plate'), plateId: z.uuid('Choose the plate.') }),
  z.strictObject({ kind: z.literal('remnant'), partId: z.uuid('Choose the remnant’s drawing.') }),
]);
export type LayoutPlate = z.output<typeof layoutPlateSchema>;

const shift = quantity(-60, 60, '−60 to 60 m');

export const placementSchema = z.strictObject({
  number: z.number().int().min(1).max(9999),
  partId: idSchema,
  /** Lower left corner of the box around the piece as it lies, from the plate's lower left corner, m. */
  at: z.strictObject({ x: shift, y: shift }),
  turn: quantity(-2 * Math.PI, 2 * Math.PI, '−360° to 360°'),
  mirrored: z.boolean(),
});
export type PlacementWire = z.output<typeof placementSchema>;

/** A contour on a plate: `<placement>.<contour>`. */
const contourIdSchema = z.string().regex(/^\d{1,4}\.\w{1,20}$/);

const layoutFields = {
  name: nameSchema,
  plate: layoutPlateSchema,
  kerfWidth: quantity(0, 0.01, '0 to 10 mm'),
  /** Steel that stays between two kerfs, and between a kerf and the plate's edge. */
  clearance: quantity(0, 0.5, '0 to 500 mm'),
  edgeMargin: quantity(0, 0.5, '0 to 500 mm'),
  placements: z
    .array(placementSchema)
    .max(limits.placements, `At most ${limits.placements} pieces lie on one plate.`)
    .refine((all) => new Set(all.map(({ number }) => number)).size === all.length, 'Each piece has its own number.'),
  /** The cut order by hand: every contour once, what lies inside before what lies around it. Null computes it. */
  order: z.array(contourIdSchema).max(limits.layoutContours).nullable(),
};
export const layoutFormSchema = z.strictObject(layoutFields);
export type LayoutForm = z.output<typeof layoutFormSchema>;

/** A part as a layout needs it. */
export const laidPartSchema = z.object({ id: idSchema, name: z.string(), contours: z.array(contourSchema) });

export const outlineSchema = z.object({
  edge: z.array(segmentSchema),
  openings: z.array(z.array(segmentSchema)),
  width: z.number(), // m
  height: z.number(), // m
  /** Tag of the plate or name of the remnant's drawing. */
  of: z.string().nullable(),
});

const problemSchema = z.object({
  kind: z.enum(['overlap', 'near', 'outside', 'edge']),
  placements: z.array(z.number().int()),
  at: pointSchema,
  why: z.string(),
}) satisfies z.ZodType<LayoutProblem>;

export const layoutSchema = z.object({
  id: idSchema,
  version: versionSchema,
  ...layoutFields,
  outline: outlineSchema,
  /** Each part that lies on the plate, once. */
  parts: z.array(laidPartSchema),
  order: z.array(z.string()),
  orderBy: z.enum(['computed', 'hand']),
  problems: z.array(problemSchema),
  /** There are more problems than are listed. */
  moreProblems: z.boolean(),
  travel: z.number(), // m, way without cutting
  cutLength: z.number(), // m
  changedAt: instantSchema,
  changedBy: personSchema,
  cornerPlans: z.array(
    z.object({
      id: idSchema,
      strategyName: z.string(),
      revisionNumber: z.number().int(),
      /** The version of the layout that it was made for. */
      layoutVersion: z.number().int(),
      changedAt: instantSchema,
    }),
  ),
});
export type Layout = z.infer<typeof layoutSchema>;

export const layoutSummarySchema = z.object({
  id: idSchema,
  name: z.string(),
  width: z.number(), // m
  height: z.number(), // m
  of: z.string().nullable(),
  pieces: z.number().int(),
  problems: z.number().int(),
  travel: z.number(), // m
  changedAt: instantSchema,
  changedBy: personSchema,
});
export type LayoutSummary = z.infer<typeof layoutSummarySchema>;

type LaidPart = z.infer<typeof laidPartSchema>;

/** A part as strategy/ lays it. */
export const laidPart = ({ id, name, contours }: LaidPart): LayoutPart => ({
  id,
  name,
  contours: contours.map((one) => ({ id: one.id, role: one.role, parent: one.parent, contour: one })),
});

/** All pieces as they lie; the parts must be there. */
export const laidOut = (parts: readonly LaidPart[], placements: readonly PlacementWire[]): PlacedPart[] =>
  partsPlaced(parts.map(laidPart), placements);

/** The outline strategy/ checks against, from what the server answered. */
export const outlineOf = ({ edge, openings, width, height }: z.infer<typeof outlineSchema>): PlateOutline => ({
  edge: { segments: edge },
  openings: openings.map((segments) => ({ segments })),
  box: { minX: 0, minY: 0, maxX: width, maxY: height },
});

/** The plate's edge and openings as closed paths, for a drawing. */
export const outlinePaths = ({ edge, openings }: Pick<z.infer<typeof outlineSchema>, 'edge' | 'openings'>) =>
  [edge, ...openings].map((segments) => ({ segments }));

/** An outline as it goes over the wire. */
export const wireOutline = ({ edge, openings, box }: PlateOutline, of: string | null): Layout['outline'] => ({
  edge: [...edge.segments],
  openings: openings.map(({ segments }) => [...segments]),
  width: box.maxX - box.minX,
  height: box.maxY - box.minY,
  of,
});

const layoutParams = z.object({ layoutId: idSchema });

export const layoutEndpoints = {
  list: endpoint({
    method: 'GET',
    path: '/api/layouts',
    summary: 'Plate layouts',
    access: 'layout.read',
    answer: listOf(layoutSummarySchema),
  }),
  get: endpoint({
    method: 'GET',
    path: '/api/layouts/:layoutId',
    summary: 'A plate layout with its parts, its cut order and what is wrong with it',
    access: 'layout.read',
    params: layoutParams,
    answer: layoutSchema,
  }),
  add: endpoint({
    method: 'POST',
    path: '/api/layouts',
    summary: 'Begin a plate layout',
    access: 'layout.write',
    body: z.strictObject({ id: idSchema, ...layoutFields }),
    answer: layoutSchema,
  }),
  change: endpoint({
    method: 'PUT',
    path: '/api/layouts/:layoutId',
    summary: 'Lay the plate out anew',
    access: 'layout.write',
    params: layoutParams,
    body: layoutFormSchema,
    answer: layoutSchema,
    ifMatch: true,
  }),
};
