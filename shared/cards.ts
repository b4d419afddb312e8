import { z } from 'zod';
import { idSchema, instantSchema, listOf, nameSchema, personSchema, thicknessSchema, wordsSchema } from './basics.ts';
import { endpoint } from './endpoint.ts';
import { plateSchema, tagSchema } from './plates.ts';
import { cutConditionsSchema, checkSchema, stageQuantitiesSchema } from './strategies.ts';
import { focusScaleSchema, nozzleSchema } from './machines.ts';

/** The number to type at this machine for a focus position, m; none when the dial doesn't reach it. */
export const dialSchema = z.discriminatedUnion('kind', [
  z.object({ kind: z.literal('ok'), typed: z.number() }),
  z.object({ kind: z.literal('none'), why: z.string() }),
]);

const onTheDial = z.object({ ...stageQuantitiesSchema.shape, dial: dialSchema });

const estimateSchema = z.object({
  plateTemperature: z.number(), // K
  breakthrough: z.number().nullable(), // s
  reserve: z.number().nullable(),
  why: z.string().nullable(),
});

export const cardSchema = z.object({
  asOf: instantSchema,
  machine: z.object({ id: idSchema, name: z.string() }),
  plate: plateSchema.nullable(),
  /** What was asked for when no plate was found by tag. */
  gradeGroup: z.string(),
  nominalThickness: z.number().int(), // µm
  match: z.discriminatedUnion('kind', [
    z.object({
      kind: z.literal('approved'),
      strategy: z.object({ id: idSchema, name: z.string() }),
      revision: z.object({ id: idSchema, number: z.number().int(), approvedAt: instantSchema, approvedBy: z.string() }),
      machineRevision: z.object({ number: z.number().int(), newest: z.number().int(), focusScale: focusScaleSchema }),
      nozzle: nozzleSchema.omit({ id: true }),
      thickness: z.object({ min: z.number().int(), max: z.number().int() }),
      hottestPlate: z.number(), // K
      /** Said before the numbers. */
      cautions: z.array(checkSchema),
      stages: z.array(z.object({ duration: z.number(), from: onTheDial, to: onTheDial })),
      cut: z.object({ ...cutConditionsSchema.shape, dial: dialSchema }),
      /** For this plate's own thickness. */
      routineTime: z.number(),
      thicknessUsed: z.number(), // m
      cold: estimateSchema,
      hot: estimateSchema,
      craterRadius: z.number(), // m, hot plate
      bands: z.array(z.number()),
      cornerPlans: z.array(
        z.object({
          id: idSchema,
          /** Null for the plan of a plate layout. */
          partId: idSchema.nullable(),
          /** Name of the part or of the layout. */
          partName: z.string(),
          corners: z.number().int(),
          loops: z.number().int(),
          dwells: z.number().int(),
          addedTime: z.number(),
        }),
      ),
    }),
    z.object({ kind: z.literal('none'), why: z.string(), requested: z.boolean() }),
  ]),
});
export type Card = z.infer<typeof cardSchema>;

/** Either a plate's tag, or grade group and thickness when the plate isn't booked in. */
export const cardQuerySchema = z.union([
  z.object({ machineId: idSchema, tag: tagSchema }),
  z.object({ machineId: idSchema, gradeGroup: nameSchema, thickness: z.coerce.number().pipe(thicknessSchema) }),
]);

export const requestSchema = z.object({
  id: idSchema,
  machine: z.object({ id: idSchema, name: z.string() }),
  gradeGroup: z.string(),
  thickness: z.number().int(), // µm
  plateTag: z.string().nullable(),
  words: z.string(),
  by: personSchema,
  at: instantSchema,
  /** An approved strategy exists by now. */
  answered: z.boolean(),
});
export type StrategyRequest = z.infer<typeof requestSchema>;

export const cardEndpoints = {
  get: endpoint({
    method: 'GET',
    path: '/api/card',
    summary: 'The plate card: which strategy is approved for this plate on this machine',
    access: 'card.read',
    query: cardQuerySchema,
    answer: cardSchema,
  }),
};

export const requestEndpoints = {
  list: endpoint({
    method: 'GET',
    path: '/api/requests',
    summary: 'Plates that had no approved strategy',
    access: 'request.read',
    answer: listOf(requestSchema),
  }),
  add: endpoint({
    method: 'POST',
    path: '/api/requests',
    summary: 'Ask the engineers for a strategy',
    access: 'request.write',
    body: z.strictObject({
      id: idSchema,
      machineId: idSchema,
      gradeGroup: nameSchema,
      thickness: thicknessSchema,
      plateId: idSchema.nullable(),
      words: wordsSchema.default(''),
    }),
    answer: requestSchema,
  }),
};
