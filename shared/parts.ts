import { z } from 'zod';
import type { Segment } from '../strategy/path/segment.ts';
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

export const drawingUnits = ['mm', 'cm', 'dm', 'm', 'km', 'µm', 'inch', 'foot', 'yard', 'mil', 'px'] as const;

export const segmentSchema = z.discriminatedUnion('kind', [
  z.object({ kind: z.literal('line'), start: pointSchema, end: pointSchema }),
  z.object({
    kind: z.literal('arc'),
    centre: pointSchema,
    radius: z.number(),
    startAngle: z.number(),
    sweep: z.number(),
  }),
]) satisfies z.ZodType<Segment>;

export const contourSchema = z.object({
  id: z.string(),
  /** 0 an outline, 1 a hole, 2 an island in a hole, … */
  depth: z.number().int(),
  role: z.enum(['outer', 'hole', 'island']),
  parent: z.string().nullable(),
  layer: z.string(),
  segments: z.array(segmentSchema),
});

/** What a person must decide before the drawing is taken. */
export const drawingQuestionSchema = z.discriminatedUnion('kind', [
  z.object({
    kind: z.literal('unit'),
    why: z.string(),
    /** Size of the drawing under each reading, m. */
    readings: z.array(z.object({ unit: z.enum(drawingUnits), width: z.number(), height: z.number() })),
  }),
  z.object({
    kind: z.literal('gaps'),
    why: z.string(),
    gaps: z.array(z.object({ at: pointSchema, size: z.number() })),
    /** The tolerance that would close them, m. */
    closesAt: z.number(),
  }),
]);

/** Something left out or repaired: how often, where the first times, and the largest of its sizes (a gap's width, a length), m. */
const notedSchema = z.object({
  what: z.string(),
  count: z.number().int(),
  at: z.array(pointSchema).default([]),
  largest: z.number().nullable().default(null),
});

export const drawingReadingSchema = z.object({
  unit: z.enum(drawingUnits).nullable(),
  gapTolerance: z.number(), // m
  bounds: z.object({ min: pointSchema, max: pointSchema }),
  contours: z.array(contourSchema),
  openChains: z.array(z.object({ layer: z.string(), length: z.number(), segments: z.array(segmentSchema) })),
  layers: z.array(z.object({ name: z.string(), pieces: z.number().int(), taken: z.boolean() })),
  /** Named and not part of the geometry: text, dimensions, hatches. */
  leftOut: z.array(notedSchema),
  repaired: z.array(notedSchema),
  /** Geometry that was left out, so that it can be shown where it was: of layers not taken, page rectangles. */
  aside: z.array(z.object({ what: z.string(), segments: z.array(segmentSchema) })).default([]),
  /** Largest distance between a curve and the arcs that stand for it, m. */
  deviation: z.number(),
  /** Places where contours cross each other or themselves: such a drawing is no part yet. */
  crossings: z.array(pointSchema).default([]),
  /** Places where more than two pieces meet: there the way on was chosen. */
  branches: z.array(pointSchema).default([]),
  /** So many pieces touch each other that overlaps and crossings are not all found. */
  tooDense: z.boolean().default(false),
  questions: z.array(drawingQuestionSchema),
});
export type DrawingReadingWire = z.infer<typeof drawingReadingSchema>;

/** A person's answers; travel as the multipart field `data`, JSON. */
export const drawingAnswersSchema = z.strictObject({
  unit: z.enum(drawingUnits).optional(),
  gapTolerance: quantity(1e-9, 5e-3, '0.000001 to 5 mm').optional(),
  layers: z.array(z.string().max(255)).max(1000).optional(),
});
export type DrawingAnswers = z.infer<typeof drawingAnswersSchema>;

export const partSchema = z.object({
  id: idSchema,
  version: versionSchema,
  name: z.string(),
  fileName: z.string(),
  fileBytes: z.number().int(),
  sha256: z.string(),
  reading: drawingReadingSchema,
  addedAt: instantSchema,
  addedBy: personSchema,
  cornerPlans: z.array(
    z.object({ id: idSchema, strategyName: z.string(), revisionNumber: z.number().int(), changedAt: instantSchema }),
  ),
});
export type Part = z.infer<typeof partSchema>;

export const partSummarySchema = z.object({
  id: idSchema,
  name: z.string(),
  fileName: z.string(),
  width: z.number(), // m
  height: z.number(), // m
  outlines: z.number().int(),
  holes: z.number().int(),
  addedAt: instantSchema,
  addedBy: personSchema,
  cornerPlans: z.number().int(),
});
export type PartSummary = z.infer<typeof partSummarySchema>;

const partParams = z.object({ partId: idSchema });
const drawingFile = { field: 'drawing', maxBytes: limits.drawingBytes, required: true } as const;

export const partEndpoints = {
  list: endpoint({
    method: 'GET',
    path: '/api/parts',
    summary: 'Parts',
    access: 'part.read',
    answer: listOf(partSummarySchema),
  }),
  get: endpoint({
    method: 'GET',
    path: '/api/parts/:partId',
    summary: 'A part with its contours',
    access: 'part.read',
    params: partParams,
    answer: partSchema,
  }),
  file: endpoint({
    method: 'GET',
    path: '/api/parts/:partId/file',
    summary: 'The original drawing, as it came',
    access: 'part.read',
    params: partParams,
    answer: null,
    bytes: true,
  }),
  /** Reads and forgets: nothing is stored. */
  read: endpoint({
    method: 'POST',
    path: '/api/drawings/read',
    summary: 'Read a drawing and say what it holds and what must be asked',
    access: 'part.write',
    body: drawingAnswersSchema,
    answer: drawingReadingSchema,
    file: drawingFile,
    idempotencyKey: false,
  }),
  add: endpoint({
    method: 'POST',
    path: '/api/parts',
    summary: 'Keep a drawing as a part',
    access: 'part.write',
    body: z.strictObject({ id: idSchema, name: nameSchema, answers: drawingAnswersSchema }),
    answer: partSchema,
    file: drawingFile,
  }),
};
