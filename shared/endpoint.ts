import { z } from 'zod';
import type { Action } from './policy.ts';

export type Method = 'GET' | 'POST' | 'PUT' | 'PATCH' | 'DELETE';

/**
 * One route of the API, said once: the server mounts it, the client calls it, OpenAPI describes it, the tests walk it.
 * `answer` null means 204. `file` names the multipart field that carries a file.
 */
export type Endpoint<
  P extends z.ZodType = z.ZodType,
  Q extends z.ZodType = z.ZodType,
  B extends z.ZodType | null = z.ZodType | null,
  A extends z.ZodType | null = z.ZodType | null,
> = {
  readonly method: Method;
  readonly path: `/api/${string}`;
  readonly summary: string;
  /** 'anyone' needs no sign-in. */
  readonly access: 'anyone' | Action;
  readonly params: P;
  readonly query: Q;
  readonly body: B;
  readonly answer: A;
  /** The change names the row version it was made from: 428 without, 412 when stale. */
  readonly ifMatch: boolean;
  /** The request creates or decides: 400 without a key, the first answer again for a repeated one. */
  readonly idempotencyKey: boolean;
  readonly file: { readonly field: string; readonly maxBytes: number; readonly required: boolean } | null;
  /** The answer is bytes, not JSON. */
  readonly bytes: boolean;
};

export const nothing = z.object({});

type Given<P extends z.ZodType, Q extends z.ZodType, B extends z.ZodType | null, A extends z.ZodType | null> = Pick<
  Endpoint<P, Q, B, A>,
  'method' | 'path' | 'summary' | 'access' | 'answer'
> & {
  params?: P;
  query?: Q;
  body?: B;
  ifMatch?: boolean;
  file?: Endpoint['file'];
  bytes?: boolean;
  idempotencyKey?: boolean;
};

/** An endpoint with the usual rules: a POST takes an Idempotency-Key unless it says otherwise. */
export function endpoint<
  A extends z.ZodType | null,
  P extends z.ZodType = typeof nothing,
  Q extends z.ZodType = typeof nothing,
  B extends z.ZodType | null = null,
>(given: Given<P, Q, B, A>): Endpoint<P, Q, B, A> {
  return {
    ifMatch: false,
    file: null,
    bytes: false,
    idempotencyKey: given.method === 'POST',
    ...given,
    params: given.params ?? (nothing as unknown as P), // the default type parameter is exactly this schema
    query: given.query ?? (nothing as unknown as Q), // likewise
    body: given.body ?? (null as B), // likewise
  };
}

export type ParamsOf<E> =
  E extends Endpoint<infer P, z.ZodType, z.ZodType | null, z.ZodType | null> ? z.infer<P> : never;
export type QueryOf<E> =
  E extends Endpoint<z.ZodType, infer Q, z.ZodType | null, z.ZodType | null> ? z.input<Q> : never;
export type BodyOf<E> =
  E extends Endpoint<z.ZodType, z.ZodType, infer B, z.ZodType | null>
    ? B extends z.ZodType
      ? z.input<B>
      : undefined
    : never;
export type AnswerOf<E> =
  E extends Endpoint<z.ZodType, z.ZodType, z.ZodType | null, infer A>
    ? A extends z.ZodType
      ? z.output<A>
      : null
    : never;
