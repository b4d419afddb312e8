import { z } from 'zod';
import { instantSchema, listOf } from './basics.ts';
import { endpoint } from './endpoint.ts';

export const recordEntrySchema = z.object({
  sequence: z.number().int(),
  at: instantSchema,
  actorId: z.string().nullable(),
  actorName: z.string().nullable(),
  /** What was done, e.g. `revision.approved`. */
  event: z.string(),
  subject: z.object({ kind: z.string(), id: z.string() }),
  facts: z.record(z.string(), z.unknown()),
  hash: z.string(),
});
export type RecordEntry = z.infer<typeof recordEntrySchema>;

export const recordEndpoints = {
  list: endpoint({
    method: 'GET',
    path: '/api/record',
    summary: 'Who decided what, newest first',
    access: 'record.read',
    query: z.object({ before: z.coerce.number().int().positive().optional() }),
    answer: listOf(recordEntrySchema),
  }),
  verify: endpoint({
    method: 'GET',
    path: '/api/record/check',
    summary: 'Recompute the record’s hash chain',
    access: 'record.read',
    answer: z.object({
      entries: z.number().int(),
      broken: z.object({ sequence: z.number().int(), why: z.string() }).nullable(),
    }),
  }),
};

export const healthEndpoints = {
  health: endpoint({
    method: 'GET',
    path: '/api/health',
    summary: 'Whether the service and its database answer',
    access: 'anyone',
    answer: z.object({
      ok: z.boolean(),
      database: z.enum(['ok', 'down']),
      files: z.enum(['ok', 'down']),
      version: z.string(),
    }),
  }),
  openapi: endpoint({
    method: 'GET',
    path: '/api/openapi.json',
    summary: 'This description',
    access: 'anyone',
    answer: z.record(z.string(), z.unknown()),
  }),
};
