import { z } from 'zod';
import { idSchema, instantSchema, listOf, quantity, thicknessSchema, versionSchema } from './basics.ts';
import { endpoint } from './endpoint.ts';
import { limits } from './limits.ts';

export const surfaces = ['bright', 'mill scale', 'rust', 'primer'] as const;

export const tagSchema = z.string().trim().min(1, 'Type the plate’s tag.').max(limits.tag);

const plateFields = {
  tag: tagSchema,
  gradeId: z.uuid('Choose the grade.'),
  heatNumber: z.string().trim().max(60),
  nominalThickness: thicknessSchema,
  measuredThickness: thicknessSchema.nullable(),
  surface: z.enum(surfaces),
  certificate: z.string().trim().max(200),
  length: quantity(0.01, 50, '10 mm to 50 m').nullable(),
  width: quantity(0.01, 20, '10 mm to 20 m').nullable(),
};

export const plateFormSchema = z.strictObject(plateFields);

export const plateSchema = z.object({
  id: idSchema,
  version: versionSchema,
  ...plateFields,
  grade: z.object({ id: idSchema, name: z.string(), group: z.string() }),
  changedAt: instantSchema,
});
export type Plate = z.infer<typeof plateSchema>;

const plateParams = z.object({ plateId: idSchema });

export const plateEndpoints = {
  list: endpoint({
    method: 'GET',
    path: '/api/plates',
    summary: 'Plates in the yard',
    access: 'plate.read',
    query: z.object({ tag: z.string().max(limits.tag).optional() }),
    answer: listOf(plateSchema),
  }),
  get: endpoint({
    method: 'GET',
    path: '/api/plates/:plateId',
    summary: 'One plate',
    access: 'plate.read',
    params: plateParams,
    answer: plateSchema,
  }),
  add: endpoint({
    method: 'POST',
    path: '/api/plates',
    summary: 'Book a plate in',
    access: 'plate.write',
    body: z.strictObject({ id: idSchema, ...plateFields }),
    answer: plateSchema,
  }),
  change: endpoint({
    method: 'PUT',
    path: '/api/plates/:plateId',
    summary: 'Correct a plate',
    access: 'plate.write',
    params: plateParams,
    body: plateFormSchema,
    answer: plateSchema,
    ifMatch: true,
  }),
};
