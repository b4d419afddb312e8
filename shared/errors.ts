import { z } from 'zod';

/** Every way the API says no. The list is closed: a screen may switch on it. */
export const problemCodes = {
  'bad-request': { status: 400, title: 'The request could not be read' },
  'invalid-fields': { status: 400, title: 'Some fields are not right' },
  'key-missing': { status: 400, title: 'An Idempotency-Key is needed' },
  'signed-out': { status: 401, title: 'You are not signed in' },
  'wrong-credentials': { status: 401, title: 'Mail address or password is wrong' },
  'not-allowed': { status: 403, title: 'Your role does not allow this' },
  'own-work': { status: 403, title: 'Somebody else must decide this' },
  'not-found': { status: 404, title: 'There is nothing here' },
  'wrong-state': { status: 409, title: 'That is not possible in this state' },
  'already-there': { status: 409, title: 'That exists already' },
  overlap: { status: 409, title: 'An approved strategy covers part of this range' },
  'in-progress': { status: 409, title: 'The same request is still running' },
  stale: { status: 412, title: 'Somebody changed this meanwhile' },
  'too-large': { status: 413, title: 'The file is too large' },
  'bad-drawing': { status: 422, title: 'The drawing could not be read' },
  'no-cut-path': { status: 422, title: 'This plan has no cut path' },
  'bad-photo': { status: 422, title: 'The picture could not be read' },
  'key-reused': { status: 422, title: 'This Idempotency-Key belongs to another request' },
  'version-missing': { status: 428, title: 'If-Match is needed' },
  'too-many': { status: 429, title: 'Too many tries' },
  'server-error': { status: 500, title: 'Something went wrong here' },
  unavailable: { status: 503, title: 'The service is not ready' },
} as const satisfies Record<string, { status: number; title: string }>;

export type ProblemCode = keyof typeof problemCodes;

/** Problem body after RFC 9457. `errors` points at fields with JSON pointers (RFC 6901). */
export const problemSchema = z.object({
  type: z.string(),
  title: z.string(),
  status: z.number().int(),
  code: z.enum(Object.keys(problemCodes) as [ProblemCode, ...ProblemCode[]]), // Object.keys loses the key type
  detail: z.string(),
  instance: z.string().optional(),
  errors: z.array(z.object({ pointer: z.string(), detail: z.string() })).optional(),
  retryAfter: z.number().optional(),
});
export type Problem = z.infer<typeof problemSchema>;
