import { z } from 'zod';
import { planVariants, type CornersFare } from '../strategy/estimate/compare.ts';
import type { PlanEstimate } from '../strategy/estimate/plan-estimate.ts';
import { idSchema, versionSchema } from './basics.ts';
import { endpoint } from './endpoint.ts';

const moneySchema = z.discriminatedUnion('kind', [
  z.object({
    kind: z.literal('ok'),
    currency: z.string(),
    machine: z.number().nullable(),
    oxygen: z.number().nullable(),
    electricity: z.number().nullable(),
    total: z.number(),
  }),
  z.object({ kind: z.literal('none'), why: z.string() }),
]);

/** What a plan's cut costs; see `planEstimate`. */
export const planEstimateSchema = z.object({
  time: z.object({
    pierce: z.number(),
    cut: z.number(),
    loop: z.number(),
    dwell: z.number(),
    restart: z.number(),
    rapid: z.number(),
    height: z.number(),
    loading: z.number(),
    total: z.number(),
  }), // s
  hiddenLoading: z.number(), // s
  length: z.object({ cut: z.number(), loop: z.number(), rapid: z.number() }), // m
  pierces: z.number().int(),
  oxygen: z.object({ pierces: z.number(), cutting: z.number(), total: z.number(), normalVolume: z.number() }), // kg, m³
  laser: z.object({ pierces: z.number(), cutting: z.number(), total: z.number() }), // J
  heat: z.object({ pierces: z.number().nullable(), cutting: z.number(), total: z.number() }), // J
  ledger: z.object({
    absorbed: z.number(),
    oxidation: z.number(),
    melt: z.number(),
    inPlate: z.number(),
    rest: z.number(),
    absorption: z.number().nullable(),
    cautions: z.array(z.string()),
  }), // J
  background: z.object({ mean: z.number(), highest: z.number() }).nullable(), // K
  money: moneySchema,
}) satisfies z.ZodType<PlanEstimate>;

export const cornersFareSchema = z.object({
  loops: z.number().int(),
  dwells: z.number().int(),
  eases: z.number().int(),
  rounds: z.number().int(),
  overLimit: z.number().int(),
  hottestReturn: z.number().nullable(), // K
}) satisfies z.ZodType<CornersFare>;

export const variantEstimateSchema = z.object({
  variant: z.enum(planVariants),
  /** Number of the strategy revision it is planned with. */
  revision: z.number().int(),
  estimate: planEstimateSchema,
  corners: cornersFareSchema,
  /** What is not as it should be, in sentences: contours that can't be cut and are not counted, a ledger that does not close. */
  cautions: z.array(z.string()),
});

export const planComparisonSchema = z.object({
  /** Of the corner plan that this is of. */
  version: versionSchema,
  variants: z.array(variantEstimateSchema),
  /** Ways that there is nothing to say of, and why. */
  missing: z.array(z.object({ variant: z.enum(planVariants), why: z.string() })),
});
export type PlanComparison = z.infer<typeof planComparisonSchema>;

export const estimateEndpoints = {
  plan: endpoint({
    method: 'GET',
    path: '/api/corner-plans/:planId/estimate',
    summary: 'What a corner plan costs, beside the untreated cut, loops everywhere and the revision before',
    access: 'rate.read',
    params: z.object({ planId: idSchema }),
    answer: planComparisonSchema,
  }),
};
