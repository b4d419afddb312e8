import { z } from 'zod';
import { idSchema, instantSchema } from './basics.ts';
import { endpoint } from './endpoint.ts';
import { limits } from './limits.ts';
import { roles } from './policy.ts';

export const signInSchema = z.strictObject({
  mail: z.string().trim().min(1, 'Type your mail address.').max(limits.mail),
  password: z.string().min(1, 'Type your password.').max(1000),
});

export const membershipSchema = z.object({ plantId: idSchema, plantName: z.string(), role: z.enum(roles) });

export const sessionSchema = z.object({
  user: z.object({ id: idSchema, name: z.string(), mail: z.string() }),
  plant: z.object({ id: idSchema, name: z.string() }),
  role: z.enum(roles),
  mayApprove: z.boolean(),
  memberships: z.array(membershipSchema),
  expiresAt: instantSchema,
});
export type Session = z.infer<typeof sessionSchema>;

/** Whether this server runs on the demo plants, and with which accounts (only then). */
export const welcomeSchema = z.object({
  demo: z
    .object({
      accounts: z.array(z.object({ mail: z.string(), role: z.string(), plant: z.string() })),
      password: z.string(),
    })
    .nullable(),
});

export const sessionEndpoints = {
  welcome: endpoint({
    method: 'GET',
    path: '/api/welcome',
    summary: 'What the sign-in page needs to know',
    access: 'anyone',
    answer: welcomeSchema,
  }),
  signIn: endpoint({
    method: 'POST',
    path: '/api/sessions',
    summary: 'Sign in',
    access: 'anyone',
    body: signInSchema,
    answer: sessionSchema,
    // A repeated sign-in makes another session; storing its answer by key would store a credential.
    idempotencyKey: false,
  }),
  current: endpoint({
    method: 'GET',
    path: '/api/sessions/current',
    summary: 'Who is signed in',
    access: 'session.use',
    answer: sessionSchema,
  }),
  signOut: endpoint({
    method: 'DELETE',
    path: '/api/sessions/current',
    summary: 'Sign out',
    access: 'session.use',
    answer: null,
  }),
  choosePlant: endpoint({
    method: 'PUT',
    path: '/api/sessions/current/plant',
    summary: 'Work in another plant of yours',
    access: 'session.use',
    body: z.strictObject({ plantId: idSchema }),
    answer: sessionSchema,
  }),
};
