import { z } from 'zod';
import { idSchema, instantSchema, listOf, nameSchema, versionSchema } from './basics.ts';
import { endpoint } from './endpoint.ts';
import { limits } from './limits.ts';
import { roles } from './policy.ts';

export const passwordSchema = z
  .string()
  .min(limits.passwordMin, `At least ${limits.passwordMin} characters.`)
  .refine((text) => new TextEncoder().encode(text).length <= limits.passwordMaxBytes, {
    error: `At most ${limits.passwordMaxBytes} bytes.`,
  });

export const memberSchema = z.object({
  id: idSchema, // the membership's
  userId: idSchema,
  version: versionSchema,
  name: z.string(),
  mail: z.string(),
  role: z.enum(roles),
  mayApprove: z.boolean(),
  endedAt: instantSchema.nullable(),
});
export type Member = z.infer<typeof memberSchema>;

export const memberNewSchema = z.strictObject({
  id: idSchema,
  name: nameSchema,
  mail: z.email('Give a mail address.').max(limits.mail),
  role: z.enum(roles),
  mayApprove: z.boolean().default(false),
  /** First password, handed over in person; ignored when the person has an account already. */
  password: passwordSchema,
});

export const memberChangeSchema = z.strictObject({
  role: z.enum(roles).optional(),
  mayApprove: z.boolean().optional(),
  ended: z.boolean().optional(),
});

export const peopleEndpoints = {
  list: endpoint({
    method: 'GET',
    path: '/api/people',
    summary: 'Everybody of this plant',
    access: 'people.manage',
    answer: listOf(memberSchema),
  }),
  add: endpoint({
    method: 'POST',
    path: '/api/people',
    summary: 'Add a person to this plant',
    access: 'people.manage',
    body: memberNewSchema,
    answer: memberSchema,
  }),
  change: endpoint({
    method: 'PATCH',
    path: '/api/people/:memberId',
    summary: 'Change a person’s role or grant, or end the membership',
    access: 'people.manage',
    params: z.object({ memberId: idSchema }),
    body: memberChangeSchema,
    answer: memberSchema,
    ifMatch: true,
  }),
};
