import { z } from 'zod';
import type { CornerRules, CutConditions } from '../strategy/corners/rules.ts';
import type { PierceInterval } from '../strategy/pierce/fit.ts';
import type { Stage, StageQuantities } from '../strategy/pierce/stage.ts';
import {
  idSchema,
  instantSchema,
  listOf,
  nameSchema,
  personSchema,
  quantity,
  thicknessSchema,
  versionSchema,
  wordsSchema,
} from './basics.ts';
import { endpoint } from './endpoint.ts';
import { houseRuleVerdictSchema } from './house-rules.ts';
import { limits } from './limits.ts';
import { nozzleSchema } from './machines.ts';

const mm = 1e-3;
const bar = 1e5;
const degree = Math.PI / 180;
const kelvin = 273.15;

const standoff = quantity(0.1 * mm, 50 * mm, '0.1 to 50 mm');
const focusPosition = quantity(-60 * mm, 60 * mm, '−60 to +60 mm');
const peakPower = quantity(1, 60_000, '1 W to 60 kW');
const duty = quantity(0.001, 1, '0.1 to 100 %');
const pulseFrequency = quantity(0.1, 100_000, '0.1 to 100 000 Hz').nullable();
const oxygenPressure = quantity(0, 30 * bar, '0 to 30 bar');

const continuousIsDutyOne = {
  path: ['pulseFrequency'],
  error: 'Without a frequency the power is continuous, and then duty is 100 %.',
};

export const stageQuantitiesSchema = z
  .strictObject({ standoff, focusPosition, peakPower, duty, pulseFrequency, oxygenPressure })
  .refine(
    (at) => at.pulseFrequency !== null || at.duty === 1,
    continuousIsDutyOne,
  ) satisfies z.ZodType<StageQuantities>;

export const stageSchema = z
  .strictObject({
    duration: quantity(0.001, 600, '0.001 to 600 s'),
    from: stageQuantitiesSchema,
    to: stageQuantitiesSchema,
  })
  .refine((stage) => (stage.from.pulseFrequency === null) === (stage.to.pulseFrequency === null), {
    path: ['to', 'pulseFrequency'],
    error: 'A stage is pulsed throughout or continuous throughout.',
  }) satisfies z.ZodType<Stage>;

export const cutConditionsSchema = z
  .strictObject({
    feed: quantity(1e-4, 1, '0.006 to 60 m/min'),
    peakPower,
    duty,
    pulseFrequency,
    oxygenPressure,
    standoff,
    focusPosition,
    kerfWidth: quantity(0.05 * mm, 5 * mm, '0.05 to 5 mm'),
    heatIntoPlate: quantity(1e4, 1e8, '0.01 to 100 J per mm² of cut face'),
  })
  .refine((at) => at.pulseFrequency !== null || at.duty === 1, continuousIsDutyOne) satisfies z.ZodType<CutConditions>;

export const cornerRulesSchema = z.strictObject({
  treatBelowAngle: quantity(1 * degree, 180 * degree, '1 to 180°'),
  returnExcessLimit: quantity(1, 1200, '1 to 1200 K'),
  loop: z
    .strictObject({
      allowed: z.boolean(),
      radius: quantity(0.2 * mm, 200 * mm, '0.2 to 200 mm'),
      minExtension: quantity(0.1 * mm, 200 * mm, '0.1 to 200 mm'),
      maxExtension: quantity(0.1 * mm, 500 * mm, '0.1 to 500 mm'),
      clearance: quantity(0, 50 * mm, '0 to 50 mm'),
    })
    .refine((loop) => loop.minExtension <= loop.maxExtension, {
      path: ['maxExtension'],
      error: 'The longest extension must not be below the shortest.',
    }),
  dwell: z.strictObject({
    allowed: z.boolean(),
    maxDuration: quantity(0.1, 120, '0.1 to 120 s'),
    restart: quantity(0, 60, '0 to 60 s'),
  }),
  // not in strategies that were kept before there were these: then they are not allowed, and burn-back is not judged
  ease: z
    .strictObject({
      allowed: z.boolean(),
      length: quantity(0.1 * mm, 100 * mm, '0.1 to 100 mm'),
      feedShare: quantity(0.05, 1, '5 to 100 %'),
      powerShare: quantity(0.05, 1, '5 to 100 %'),
    })
    .optional(),
  round: z
    .strictObject({
      allowed: z.boolean(),
      radius: quantity(0.05 * mm, 50 * mm, '0.05 to 50 mm'),
      tolerance: quantity(0.01 * mm, 5 * mm, '0.01 to 5 mm'),
    })
    .optional(),
  burnBack: z
    .strictObject({
      judged: z.boolean(),
      limit: quantity(0.05 * mm, 20 * mm, '0.05 to 20 mm'),
      // between thin foil and bulk steel in oxygen
      ignition: quantity(1233, 1644, '960 to 1370 °C'),
    })
    .optional(),
}) satisfies z.ZodType<CornerRules>;

export const thicknessRangeSchema = z
  .strictObject({ min: thicknessSchema, max: thicknessSchema })
  .refine((range) => range.min < range.max, { path: ['max'], error: 'The range must end above where it begins.' });

/** Everything an engineer decides. Never changes once submitted. */
export const strategyContentSchema = z.strictObject({
  machineRevisionId: idSchema,
  gradeGroup: nameSchema,
  gas: z.literal('oxygen'),
  nozzleId: idSchema,
  /** Half-open [min, max), µm. */
  thickness: thicknessRangeSchema,
  /** Hottest plate the strategy is good for, K. */
  hottestPlate: quantity(kelvin + 20, kelvin + 600, '20 to 600 °C'),
  cut: cutConditionsSchema,
  stages: z
    .array(stageSchema)
    .min(1, 'A pierce has at least one stage.')
    .max(limits.stages, `At most ${limits.stages} stages.`),
  cornerRules: cornerRulesSchema,
});
export type StrategyContent = z.infer<typeof strategyContentSchema>;

const noneOr = <T extends z.ZodType>(ok: T) =>
  z.discriminatedUnion('kind', [
    z.object({ kind: z.literal('ok'), value: ok }),
    z.object({ kind: z.literal('none'), why: z.string() }),
  ]);

const rangeSchema = z.object({ least: z.number().nullable(), most: z.number().nullable() });

/** How sure a fitted model is of breakthrough (s) and reserve; null for an end at which the hole is not through within the routine. */
const intervalSchema = z.discriminatedUnion('kind', [
  z.object({
    kind: z.literal('ok'),
    breakthrough: rangeSchema,
    reserve: rangeSchema,
    slowest: z.object({ breakthrough: z.number().nullable(), reserve: z.number().nullable() }).nullable(),
  }),
  z.object({ kind: z.literal('none'), why: z.string() }),
]) satisfies z.ZodType<PierceInterval>;

/** What the model says for one plate temperature. */
export const conditionSchema = z.object({
  plateTemperature: z.number(), // K
  thickness: z.number(), // m, the one judged
  breakthrough: noneOr(z.number()), // s
  reserve: noneOr(z.number()),
  /** Null where no fit to the machine's test cuts was used. */
  interval: intervalSchema.nullable().default(null),
  trace: z.object({ time: z.array(z.number()), depth: z.array(z.number()) }), // s, m
  stalls: z.array(z.object({ stage: z.number().int(), time: z.number(), depth: z.number(), why: z.string() })),
});
export type Condition = z.infer<typeof conditionSchema>;

export const checkSchema = z.object({
  id: z.string(),
  state: z.enum(['ok', 'caution', 'wrong']),
  sentence: z.string(),
});
export type Check = z.infer<typeof checkSchema>;

/** The model's whole answer for a revision: reserve at the thickest; crater and eruption the worst of thinnest and thickest, cold and hot. */
export const predictionSchema = z.object({
  modelVersion: z.string(),
  routineTime: z.number(), // s
  cold: conditionSchema,
  hot: conditionSchema,
  craterRadius: z.number(), // m
  eruptionIndex: z.number(),
  energy: z.number(), // J, emitted by the laser over the routine
  meanPower: z.number(), // W
  peakPower: z.number(), // W
  oxygenUsed: z.number(), // kg
  // null in what was stored before these were kept: submitted content and its prediction never change
  pulses: z.number().nullable().default(null),
  heatLeft: z.number().nullable().default(null), // J, in the thickest cold plate
  heatPerThickness: z.number().nullable().default(null), // J/m, most of all plates: what warms the lead-in
  /** Eruption index of each stage, the worst of all plates. */
  eruptions: z.array(z.number()).nullable().default(null),
  checks: z.array(checkSchema),
});
export type Prediction = z.infer<typeof predictionSchema>;

export const revisionStates = ['draft', 'inReview', 'returned', 'approved', 'superseded', 'withdrawn'] as const;
export type RevisionState = (typeof revisionStates)[number];

export const reviewSchema = z.object({
  id: idSchema,
  verdict: z.enum(['submitted', 'approved', 'returned', 'withdrawn', 'superseded']),
  by: personSchema,
  at: instantSchema,
  words: z.string(),
});

export const revisionSchema = z.object({
  id: idSchema,
  version: versionSchema,
  strategyId: idSchema,
  strategyName: z.string(),
  number: z.number().int().positive(),
  state: z.enum(revisionStates),
  content: strategyContentSchema,
  prediction: predictionSchema,
  /** What the plant's rules say: of a draft today, of what was handed in as they stood then. */
  houseRules: z.array(houseRuleVerdictSchema),
  machine: z.object({ id: idSchema, name: z.string(), revisionNumber: z.number().int() }),
  nozzle: nozzleSchema,
  touchedBy: z.array(personSchema),
  changedAt: instantSchema,
  /** What happened to it, oldest first. */
  reviews: z.array(reviewSchema),
});
export type Revision = z.infer<typeof revisionSchema>;

/** A strategy as a row in a list: enough to draw its core and say where it stands. */
export const strategySummarySchema = z.object({
  id: idSchema,
  name: z.string(),
  machine: z.object({ id: idSchema, name: z.string() }),
  gradeGroup: z.string(),
  thickness: z.object({ min: z.number().int(), max: z.number().int() }),
  /** The newest revision. */
  latest: z.object({
    id: idSchema,
    number: z.number().int(),
    state: z.enum(revisionStates),
    changedAt: instantSchema,
    changedBy: personSchema,
    reserveCold: z.number().nullable(),
    reserveHot: z.number().nullable(),
    /** Depth reached at each stage's end on a cold plate, as a share of the thickness: the core's bands. */
    bands: z.array(z.number()),
  }),
  approved: z.object({ id: idSchema, number: z.number().int() }).nullable(),
  openReports: z.number().int(),
});
export type StrategySummary = z.infer<typeof strategySummarySchema>;

export const strategySchema = z.object({
  id: idSchema,
  version: versionSchema,
  name: z.string(),
  /** Newest first. */
  revisions: z.array(revisionSchema),
});
export type Strategy = z.infer<typeof strategySchema>;

const strategyParams = z.object({ strategyId: idSchema });
const revisionParams = z.object({ revisionId: idSchema });
const decision = z.strictObject({ words: wordsSchema.default('') });

export const strategyEndpoints = {
  list: endpoint({
    method: 'GET',
    path: '/api/strategies',
    summary: 'Strategies of this plant',
    access: 'strategy.read',
    answer: listOf(strategySummarySchema),
  }),
  get: endpoint({
    method: 'GET',
    path: '/api/strategies/:strategyId',
    summary: 'A strategy with its revisions',
    access: 'strategy.read',
    params: strategyParams,
    answer: strategySchema,
  }),
  add: endpoint({
    method: 'POST',
    path: '/api/strategies',
    summary: 'Begin a strategy with its first draft',
    access: 'strategy.write',
    body: z.strictObject({ id: idSchema, revisionId: idSchema, name: nameSchema, content: strategyContentSchema }),
    answer: strategySchema,
  }),
  draft: endpoint({
    method: 'POST',
    path: '/api/strategies/:strategyId/revisions',
    summary: 'Begin the next draft from a revision',
    access: 'strategy.write',
    params: strategyParams,
    body: z.strictObject({ id: idSchema, fromRevisionId: idSchema }),
    answer: revisionSchema,
    ifMatch: true,
  }),
};

export const revisionEndpoints = {
  get: endpoint({
    method: 'GET',
    path: '/api/revisions/:revisionId',
    summary: 'One revision',
    access: 'strategy.read',
    params: revisionParams,
    answer: revisionSchema,
  }),
  save: endpoint({
    method: 'PUT',
    path: '/api/revisions/:revisionId',
    summary: 'Save a draft’s content; the server computes the prediction',
    access: 'strategy.write',
    params: revisionParams,
    body: z.strictObject({ content: strategyContentSchema }),
    answer: revisionSchema,
    ifMatch: true,
  }),
  judge: endpoint({
    method: 'POST',
    path: '/api/revisions/judge',
    summary: 'What the house rules in force say of content that is not saved',
    access: 'strategy.write',
    body: z.strictObject({ content: strategyContentSchema }),
    answer: listOf(houseRuleVerdictSchema),
    idempotencyKey: false, // it changes nothing
  }),
  submit: endpoint({
    method: 'POST',
    path: '/api/revisions/:revisionId/submit',
    summary: 'Hand a draft in for review',
    access: 'strategy.write',
    params: revisionParams,
    body: decision,
    answer: revisionSchema,
    ifMatch: true,
  }),
  approve: endpoint({
    method: 'POST',
    path: '/api/revisions/:revisionId/approve',
    summary: 'Approve what was seen; a former approval of the same strategy is superseded',
    access: 'review.decide',
    params: revisionParams,
    body: decision,
    answer: revisionSchema,
    ifMatch: true,
  }),
  giveBack: endpoint({
    method: 'POST',
    path: '/api/revisions/:revisionId/return',
    summary: 'Return a revision in review with the reason',
    access: 'review.decide',
    params: revisionParams,
    body: z.strictObject({ words: wordsSchema.min(1, 'Say what must change.') }),
    answer: revisionSchema,
    ifMatch: true,
  }),
  withdraw: endpoint({
    method: 'POST',
    path: '/api/revisions/:revisionId/withdraw',
    summary: 'Withdraw an approved revision with the reason',
    access: 'review.decide',
    params: revisionParams,
    body: z.strictObject({ words: wordsSchema.min(1, 'Say why it is withdrawn.') }),
    answer: revisionSchema,
    ifMatch: true,
  }),
};

export const reviewEndpoints = {
  list: endpoint({
    method: 'GET',
    path: '/api/reviews',
    summary: 'Revisions waiting for a decision',
    access: 'review.read',
    answer: listOf(
      strategySummarySchema.extend({
        submittedAt: instantSchema,
        submittedBy: personSchema,
        touchedBy: z.array(personSchema),
      }),
    ),
  }),
};
