import { z } from 'zod';
import type { PlateDrive } from '../strategy/motion/plate-clock.ts';
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
  /** Hottest at the measuring place afterwards, K, and how deep the ignition threshold is passed, m. */
  peak: z.number().nullish(),
  burnBack: z.number().nullish(),
  /** How it would be done, in the few numbers its heat follows from: m, s; not in older plans, nor where it does not fit. */
  form: z
    .object({
      loop: z.object({ shape: z.enum(['tangent', 'flat']), radius: z.number(), extension: z.number() }).optional(),
      dwell: z.number().optional(),
      ease: z.object({ length: z.number(), feedShare: z.number(), powerShare: z.number() }).optional(),
      round: z.number().optional(), // radius of the path
    })
    .nullish(),
});

/** Where a figure lies with the calibration's certainty; in its own unit. */
const figureRangeSchema = z.object({ low: z.number(), high: z.number() });

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
  // what follows is null or missing in plans that were made before the plate's own heat was counted
  /** What the plate has warmed to at the measuring place when the cut comes back, before the corner's own edge heats it, K. */
  background: z.number().nullish(),
  /** When cutting along the second edge begins, s from the start of the plate's cut. */
  returnTime: z.number().nullish(),
  /** Hottest at the measuring place afterwards, K. */
  peak: z.number().nullish(),
  /** How far inside the finished tip the peak passes the ignition threshold, m. */
  burnBack: z.number().nullish(),
  /** Null where no calibration of the heat was used. */
  intervals: z
    .object({
      treated: figureRangeSchema.nullish(),
      peak: figureRangeSchema.nullish(),
      burnBack: figureRangeSchema.nullish(),
    })
    .nullish(),
  /** The next best treatment that stays under the limits too, and what it costs more, s; treatment null where there is none, and why. */
  runnerUp: z
    .object({ treatment: z.enum(treatments).nullable(), costsMore: z.number().nullable(), why: z.string() })
    .nullish(),
});
export type PlannedCorner = z.infer<typeof plannedCornerSchema>;

/** What the heat of a cut follows from. */
type HeatLeft = { readonly heatIntoPlate: number; readonly pierceHeat: number | null };

/** Another cut order that comes back later to what is hot; it is taken in the layout. */
export const orderSuggestionSchema = z.object({
  /** Contours in the order of cutting. */
  order: z.array(z.string()),
  why: z.string(),
  rapidTime: z.number(), // s more between the cuts
  addedTime: z.number(), // s of treatments spared
  overLimit: z.number().int(), // corners fewer over a limit
});

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
  /** The straight edge on the plate as it comes and the excess allowed, K: it does not rise with what the cut itself warms. */
  limit: z.number(),
  /** What the time and the heat of the cut follow from, of the strategy revision and its machine: nobody needs access to either to see the cut run. */
  cutting: z.object({
    feed: z.number(), // m/s
    acceleration: z.number(), // m/s²
    jerk: z.number(), // m/s³
    /** Between two cuts, m/s. */
    travel: z.number(),
    /** Routine of one pierce, s. */
    pierce: z.number(),
    kerfWidth: z.number(), // m
    /** What getting the cut going again after a wait costs beside it, s. */
    restart: z.number(),
    /** The head's way up and down: heights of the nozzle above the plate, m. */
    heights: z.object({
      travel: z.number(),
      pierceFrom: z.number(),
      pierceTo: z.number(),
      cut: z.number(),
      speed: z.number(), // m/s
      acceleration: z.number(), // m/s²
      jerk: z.number(), // m/s³
    }),
    /** What the straight cut leaves in the plate, J per m² of cut face, and what a pierce leaves in this one, J; null where the model can't follow it. */
    heatIntoPlate: z.number(),
    pierceHeat: z.number().nullable(),
    /** Of the beam along the straight cut, W: peak × duty; and over one pierce, J. */
    meanPower: z.number(),
    pierceEnergy: z.number(),
    /** Through the nozzle while it cuts, kg/s, and over one pierce, kg. */
    oxygenFlow: z.number(),
    pierceOxygen: z.number(),
    /** Heat the plate gives to the air, W/(m² K) on each face. */
    lossCoefficient: z.number(),
  }) satisfies z.ZodType<PlateDrive & HeatLeft>,
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
    // as for the corners: not in older plans
    /** Highest temperature the plate has at a corner before the corner's own cut, K. */
    highestBackground: z.number().nullish(),
    /** Mean of the plate when the cut ends, K. */
    meanPlateTemperature: z.number().nullish(),
    hottestPeak: z.number().nullish(), // K
    deepestBurnBack: z.number().nullish(), // m
    /** When the last cut ends, s. */
    cutTime: z.number().nullish(),
    orderSuggestions: z.array(orderSuggestionSchema).nullish(),
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
