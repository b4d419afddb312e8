import { z } from 'zod';
import type { FocusScale, MachineProfile, Nozzle } from '../strategy/machine.ts';
import { idSchema, instantSchema, listOf, nameSchema, personSchema, quantity, versionSchema } from './basics.ts';
import { endpoint } from './endpoint.ts';
import { limits } from './limits.ts';

const mm = 1e-3;
const bar = 1e5;

export const focusScaleSchema = z
  .strictObject({
    reference: z.enum(['plate', 'nozzle']),
    offset: quantity(-100 * mm, 100 * mm, '−100 to 100 mm'),
    slope: quantity(-20, 20, '−20 to 20').refine((slope) => Math.abs(slope) >= 0.01, {
      error: 'A slope of nearly zero would move nothing.',
    }),
    minDial: quantity(-200 * mm, 200 * mm, '−200 to 200 mm'),
    maxDial: quantity(-200 * mm, 200 * mm, '−200 to 200 mm'),
  })
  .refine((scale) => scale.minDial < scale.maxDial, {
    path: ['maxDial'],
    error: 'The greatest dial number must be above the least.',
  }) satisfies z.ZodType<FocusScale>;

export const machineProfileSchema = z.strictObject({
  source: z
    .strictObject({
      maxPower: quantity(100, 60_000, '0.1 to 60 kW'),
      minPower: quantity(0, 20_000, '0 to 20 kW'),
      wavelength: quantity(0.3e-6, 12e-6, '0.3 to 12 µm'),
      riseTime: quantity(0, 5e-3, '0 to 5 ms'),
      minFrequency: quantity(0.1, 100_000, '0.1 to 100 000 Hz'),
      maxFrequency: quantity(0.1, 100_000, '0.1 to 100 000 Hz'),
      minDuty: quantity(0, 1, '0 to 100 %'),
    })
    .refine((source) => source.minPower < source.maxPower, {
      path: ['minPower'],
      error: 'The least power must be below the greatest.',
    })
    .refine((source) => source.minFrequency < source.maxFrequency, {
      path: ['maxFrequency'],
      error: 'The greatest frequency must be above the least.',
    }),
  optics: z.strictObject({
    coreDiameter: quantity(1e-6, 2e-3, '1 µm to 2 mm'),
    halfAngle: quantity(1e-3, 0.5, '1 to 500 mrad'),
    collimatorFocalLength: quantity(10 * mm, 1000 * mm, '10 to 1000 mm'),
    focusingFocalLength: quantity(10 * mm, 1000 * mm, '10 to 1000 mm'),
  }),
  focusScale: focusScaleSchema,
  standoff: z
    .strictObject({ min: quantity(0, 100 * mm, '0 to 100 mm'), max: quantity(0.1 * mm, 200 * mm, '0.1 to 200 mm') })
    .refine((range) => range.min < range.max, {
      path: ['max'],
      error: 'The greatest standoff must be above the least.',
    }),
  oxygen: z
    .strictObject({
      minPressure: quantity(0, 10 * bar, '0 to 10 bar'),
      maxPressure: quantity(0.05 * bar, 30 * bar, '0.05 to 30 bar'),
    })
    .refine((range) => range.minPressure < range.maxPressure, {
      path: ['maxPressure'],
      error: 'The greatest pressure must be above the least.',
    }),
  axes: z.strictObject({
    maxFeed: quantity(1 * mm, 10, '0.06 to 600 m/min'),
    acceleration: quantity(0.01, 100, '0.01 to 100 m/s²'),
    jerk: quantity(0.1, 10_000, '0.1 to 10 000 m/s³'),
  }),
  bed: z.strictObject({
    length: quantity(0.1, 50, '0.1 to 50 m'),
    width: quantity(0.1, 20, '0.1 to 20 m'),
    shuttleTable: z.boolean(),
  }),
  // not in profiles that were kept before there were these two; null where nobody knows
  heights: z
    .strictObject({
      travel: quantity(0, 0.5, '0 to 500 mm').nullish(),
      speed: quantity(1 * mm, 5, '0.06 to 300 m/min').nullish(),
      acceleration: quantity(0.01, 100, '0.01 to 100 m/s²').nullish(),
    })
    .optional(),
  loading: z
    .strictObject({
      time: quantity(0, 36_000, '0 to 10 h').nullish(),
      exchange: quantity(0, 3600, '0 to 1 h').nullish(),
    })
    .optional(),
  smallestArc: quantity(0, 50 * mm, '0 to 50 mm'),
}) satisfies z.ZodType<MachineProfile>;

export const machineRevisionSchema = z.object({
  id: idSchema,
  number: z.number().int().positive(),
  profile: machineProfileSchema,
  note: z.string(),
  madeAt: instantSchema,
  madeBy: personSchema,
});

export const machineSchema = z.object({
  id: idSchema,
  version: versionSchema,
  name: z.string(),
  /** Newest revision first. */
  revisions: z.array(machineRevisionSchema),
});
export type Machine = z.infer<typeof machineSchema>;
export type MachineRevision = z.infer<typeof machineRevisionSchema>;

export const nozzleFormSchema = z.strictObject({
  type: z.enum(['single', 'double']),
  diameter: quantity(0.3 * mm, 10 * mm, '0.3 to 10 mm'),
}) satisfies z.ZodType<Nozzle>;

export const nozzleSchema = z.object({
  id: idSchema,
  name: z.string(),
  type: nozzleFormSchema.shape.type,
  diameter: z.number(), // m
});
export type NozzleRow = z.infer<typeof nozzleSchema>;

/** Steel as ordered: `group` is what a strategy is made for, `name` what the certificate says. */
export const gradeSchema = z.object({ id: idSchema, name: z.string(), group: z.string() });
export type Grade = z.infer<typeof gradeSchema>;

/** What changed at the machine, and why. */
export const machineNoteSchema = z.string().trim().max(limits.note);

const machineParams = z.object({ machineId: idSchema });

export const machineEndpoints = {
  list: endpoint({
    method: 'GET',
    path: '/api/machines',
    summary: 'Machines with their revisions',
    access: 'machine.read',
    answer: listOf(machineSchema),
  }),
  get: endpoint({
    method: 'GET',
    path: '/api/machines/:machineId',
    summary: 'One machine',
    access: 'machine.read',
    params: machineParams,
    answer: machineSchema,
  }),
  add: endpoint({
    method: 'POST',
    path: '/api/machines',
    summary: 'Add a machine with its first revision',
    access: 'machine.write',
    body: z.strictObject({
      id: idSchema,
      revisionId: idSchema,
      name: nameSchema,
      profile: machineProfileSchema,
      note: machineNoteSchema.default(''),
    }),
    answer: machineSchema,
  }),
  revise: endpoint({
    method: 'POST',
    path: '/api/machines/:machineId/revisions',
    summary: 'Write a machine’s next revision',
    access: 'machine.write',
    params: machineParams,
    body: z.strictObject({ id: idSchema, profile: machineProfileSchema, note: machineNoteSchema.default('') }),
    answer: machineSchema,
    ifMatch: true,
  }),
};

export const nozzleEndpoints = {
  list: endpoint({
    method: 'GET',
    path: '/api/nozzles',
    summary: 'Nozzles in the drawer',
    access: 'machine.read',
    answer: listOf(nozzleSchema),
  }),
  add: endpoint({
    method: 'POST',
    path: '/api/nozzles',
    summary: 'Add a nozzle',
    access: 'nozzle.write',
    body: z.strictObject({ id: idSchema, name: nameSchema, ...nozzleFormSchema.shape }),
    answer: nozzleSchema,
  }),
};

export const gradeEndpoints = {
  list: endpoint({
    method: 'GET',
    path: '/api/grades',
    summary: 'Grades and their groups',
    access: 'grade.read',
    answer: listOf(gradeSchema),
  }),
  add: endpoint({
    method: 'POST',
    path: '/api/grades',
    summary: 'Add a grade',
    access: 'grade.write',
    body: z.strictObject({ id: idSchema, name: nameSchema, group: nameSchema }),
    answer: gradeSchema,
  }),
};
