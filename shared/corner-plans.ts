import { z } from 'zod';
import { idSchema, instantSchema, personSchema, pointSchema, quantity, versionSchema } from './basics.ts';
import { endpoint } from './endpoint.ts';
import { outlineSchema } from './layouts.ts';
import { contourSchema, segmentSchema } from './parts.ts';
import { revisionStates } from './strategies.ts';

export const treatments = ['loop', 'dwell', 'ease', 'round', 'leave'] as const;
export type Treatment = (typeof treatments)[number];

/** Plate around the part: free skeleton on each side, m. */
export const skeletonSchema = z.strictObject({
  left: quantity(0, 20, '0 to 20 000 mm'),
  right: quantity(0, 20, '0 to 20 000 mm'),
  below: quantity(0, 20, '0 to 20 000 mm'),
  above: quantity(0, 20, '0 to 20 000 mm'),
});

export const cornerOptionSchema = z.object({
  treatment: z.enum(treatments),
  fits: z.boolean(),
  returnTemperature: z.number().nullable(), // K
  addedTime: z.number().nullable(), // s
  why: z.string(),
  /** Where what stands in a loop's way is, m; plans computed before it was kept have none. */
  at: pointSchema.nullable().default(null),
});

export const plannedCornerSchema = z.object({
  id: z.string(),
  contourId: z.string(),
  at: pointSchema,
  angle: z.number(), // rad, inside the part
  convex: z.boolean(),
  treatment: z.enum(treatments),
  why: z.string(),
  chosenBy: z.enum(['rule', 'person']),
  /** Return temperature without a treatment, with it, and of a straight edge at this feed, K. */
  untreated: z.number(),
  treated: z.number(),
  straightEdge: z.number(),
  addedTime: z.number(), // s; below 0 where a round spares the stop
  dwell: z.number().nullable(), // s
  /** Path over which feed and mean power fall to these shares in the corner and rise again, m; older plans have none. */
  ease: z
    .object({
      before: z.number(),
      after: z.number(),
      feedShare: z.number(),
      powerShare: z.number(),
      segments: z.array(segmentSchema),
    })
    .nullish(),
  /** The arc that stands for the corner, its radius and what it is off the drawing, m. */
  round: z.object({ radius: z.number(), deviation: z.number(), finished: z.array(segmentSchema) }).nullish(),
  /** Something may go wrong though the treatment is as good as any: the slug can tip. */
  caution: z.string().nullish(),
  loop: z
    .object({
      shape: z.enum(['tangent', 'flat']).optional(),
      radius: z.number(),
      extension: z.number(),
      length: z.number(),
      slugArea: z.number(),
      segments: z.array(segmentSchema),
      /** Outline of what falls, m; empty when the kerf takes it all. */
      slug: z.array(segmentSchema).default([]),
    })
    .nullable(),
  options: z.array(cornerOptionSchema),
  /** Still above the limit, or refused: said on the drawing. */
  trouble: z.string().nullable(),
});
export type PlannedCorner = z.infer<typeof plannedCornerSchema>;

export const cornerPlanSchema = z.object({
  id: idSchema,
  version: versionSchema,
  /**
   * What is planned: a part, or a layout with its pieces as they lie. With its contours: an operator reads the plan's drawing, and has no access
   * to parts. A layout's are in the order of cutting, each called `<placement>.<contour>`.
   */
  part: z.object({ id: idSchema, name: z.string(), contours: z.array(contourSchema) }),
  /** Of a layout: the version that was planned and the newest there is, and the plate. */
  layout: z
    .object({
      id: idSchema,
      version: z.number().int(),
      newest: z.number().int(),
      outline: outlineSchema,
    })
    .nullable()
    .default(null),
  revision: z.object({
    id: idSchema,
    number: z.number().int(),
    strategyId: idSchema,
    strategyName: z.string(),
    state: z.enum(revisionStates),
    approved: z.boolean(),
  }),
  thickness: z.number(), // m
  plateTemperature: z.number(), // K
  skeleton: skeletonSchema,
  overrides: z.record(z.string(), z.enum(treatments)),
  limit: z.number(), // K
  /** What the time of the cut follows from, of the strategy revision and its machine: nobody needs access to either to see the cut run. */
  cutting: z.object({
    feed: z.number(), // m/s
    acceleration: z.number(), // m/s²
    jerk: z.number(), // m/s³
    /** Between two cuts, m/s. */
    travel: z.number(),
    /** Routine of one pierce, s. */
    pierce: z.number(),
    kerfWidth: z.number(), // m
  }),
  corners: z.array(plannedCornerSchema),
  totals: z.object({
    corners: z.number().int(),
    loops: z.number().int(),
    dwells: z.number().int(),
    eases: z.number().int().optional(),
    rounds: z.number().int().optional(),
    trouble: z.number().int(),
    addedTime: z.number(), // s
    addedLength: z.number(), // m
    addedOxygen: z.number(), // kg
    hottestUntreated: z.number().nullable(), // K
    hottestTreated: z.number().nullable(), // K
  }),
  changedAt: instantSchema,
  changedBy: personSchema,
});
export type CornerPlan = z.infer<typeof cornerPlanSchema>;

const planParams = z.object({ planId: idSchema });
const choices = {
  plateTemperature: quantity(273.15, 900, '0 to 626 °C'),
  thickness: quantity(1e-3, 60e-3, '1 to 60 mm'),
  /** Around a part; a layout has its own plate, and nothing beside it counts. */
  skeleton: skeletonSchema,
  overrides: z.record(z.string().max(40), z.enum(treatments)),
};

export const cornerPlanEndpoints = {
  get: endpoint({
    method: 'GET',
    path: '/api/corner-plans/:planId',
    summary: 'A corner plan',
    access: 'card.read',
    params: planParams,
    answer: cornerPlanSchema,
  }),
  add: endpoint({
    method: 'POST',
    path: '/api/corner-plans',
    summary: 'Plan the corners of a part or of a plate layout with a strategy revision',
    access: 'cornerPlan.write',
    body: z
      .strictObject({
        id: idSchema,
        partId: idSchema.optional(),
        layoutId: idSchema.optional(),
        revisionId: idSchema,
        ...choices,
      })
      .refine(({ partId, layoutId }) => (partId === undefined) !== (layoutId === undefined), {
        message: 'Name a part or a layout, one of the two.',
        path: ['partId'],
      }),
    answer: cornerPlanSchema,
  }),
  redo: endpoint({
    method: 'PUT',
    path: '/api/corner-plans/:planId',
    summary: 'Plan again with other choices',
    access: 'cornerPlan.write',
    params: planParams,
    body: z.strictObject({ revisionId: idSchema, ...choices }),
    answer: cornerPlanSchema,
    ifMatch: true,
  }),
};
