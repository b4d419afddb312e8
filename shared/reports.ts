import { z } from 'zod';
import {
  idSchema,
  instantSchema,
  listOf,
  personSchema,
  thicknessSchema,
  versionSchema,
  wordsSchema,
} from './basics.ts';
import { endpoint } from './endpoint.ts';
import { limits } from './limits.ts';

/** What an operator can see going wrong. */
export const troubleKinds = [
  'erupted',
  'not through',
  'corner burnt',
  'cut lost',
  'nozzle or window damaged',
  'something else',
] as const;

export const reportNewSchema = z.strictObject({
  id: idSchema,
  revisionId: idSchema,
  machineId: idSchema,
  plateId: idSchema.nullable(),
  kind: z.enum(troubleKinds),
  words: wordsSchema,
  /** As the operator believes the plate was, µm. */
  thickness: thicknessSchema.nullable().default(null),
});

export const reportSchema = z.object({
  id: idSchema,
  version: versionSchema,
  kind: z.enum(troubleKinds),
  words: z.string(),
  by: personSchema,
  at: instantSchema,
  strategy: z.object({ id: idSchema, name: z.string() }),
  revision: z.object({ id: idSchema, number: z.number().int() }),
  machine: z.object({ id: idSchema, name: z.string() }),
  plateTag: z.string().nullable(),
  photo: z.object({ width: z.number().int(), height: z.number().int() }).nullable(),
  /** Null while open. */
  closed: z.object({ by: personSchema, at: instantSchema, words: z.string() }).nullable(),
});
export type Report = z.infer<typeof reportSchema>;

const reportParams = z.object({ reportId: idSchema });

export const reportEndpoints = {
  list: endpoint({
    method: 'GET',
    path: '/api/reports',
    summary: 'What went wrong',
    access: 'report.read',
    answer: listOf(reportSchema),
  }),
  get: endpoint({
    method: 'GET',
    path: '/api/reports/:reportId',
    summary: 'One report',
    access: 'report.read',
    params: reportParams,
    answer: reportSchema,
  }),
  photo: endpoint({
    method: 'GET',
    path: '/api/reports/:reportId/photo',
    summary: 'The report’s picture',
    access: 'report.read',
    params: reportParams,
    answer: null,
    bytes: true,
  }),
  add: endpoint({
    method: 'POST',
    path: '/api/reports',
    summary: 'It went wrong: tell the engineers, with a picture when there is one',
    access: 'report.write',
    /** Travels as the multipart field `data`, JSON. */
    body: reportNewSchema,
    answer: reportSchema,
    file: { field: 'photo', maxBytes: limits.photoBytes, required: false },
  }),
  close: endpoint({
    method: 'POST',
    path: '/api/reports/:reportId/close',
    summary: 'Close a report with what was found',
    access: 'report.read',
    params: reportParams,
    body: z.strictObject({ words: wordsSchema.min(1, 'Say what was found.') }),
    answer: reportSchema,
    ifMatch: true,
  }),
};
