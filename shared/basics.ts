import { z } from 'zod';
import { limits } from './limits.ts';

export const idSchema = z.uuid();
export const nameSchema = z.string().trim().min(1, 'A name is needed.').max(limits.name);
export const wordsSchema = z.string().trim().max(limits.words);
export const instantSchema = z.iso.datetime({ offset: true });
/** Row version; travels as the ETag and comes back in If-Match. */
export const versionSchema = z.number().int().positive();

/** A finite number with bounds in SI; `shown` is how a person reads the range. */
export function quantity(min: number, max: number, shown: string) {
  const within = `Must be within ${shown}.`;
  return z.number(`Give a number: ${shown}.`).min(min, within).max(max, within);
}

/** Whole micrometres of plate thickness. */
export const thicknessSchema = z
  .number({ error: 'Give a thickness within 1 to 60 mm.' })
  .int('Thickness is kept in whole micrometres.')
  .min(limits.thicknessMin, 'Thickness must be within 1 to 60 mm.')
  .max(limits.thicknessMax, 'Thickness must be within 1 to 60 mm.');

export const pointSchema = z.object({ x: z.number(), y: z.number() });

export const personSchema = z.object({ id: idSchema, name: z.string() });
export type Person = z.infer<typeof personSchema>;

export const listOf = <T extends z.ZodType>(item: T) => z.object({ items: z.array(item) });
