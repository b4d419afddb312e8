import { sql } from 'drizzle-orm';
import express, { type Request, type Response, type Router } from 'express';
import { createHash } from 'node:crypto';
import { z } from 'zod';
import { inPlant, type Transaction } from '../db/database.ts';
import { idempotencyKeys } from '../db/schema/idempotency-keys.ts';
import type { AnswerOf, Endpoint, Method, ParamsOf } from '../shared/endpoint.ts';
import { limits } from '../shared/limits.ts';
import { can, type Actor } from '../shared/policy.ts';
import { signedInOf, type SignedIn } from './auth/session.ts';
import { AppError, databaseFault, notFound } from './errors.ts';
import { sha256Of } from './files/store.ts';
import { readUpload, type UploadedFile } from './files/upload.ts';
import type { Services } from './services.ts';

/** What a request brought, read by the endpoint's own schemas. */
export type Given<E extends Endpoint> = {
  readonly params: ParamsOf<E>;
  readonly query: z.output<E['query']>;
  readonly body: E['body'] extends z.ZodType ? z.output<E['body']> : null;
  readonly file: UploadedFile | null;
  readonly services: Services;
};

export type OpenCall<E extends Endpoint> = Given<E> & { readonly request: Request; readonly response: Response };

export type PlantCall<E extends Endpoint> = Given<E> & {
  readonly actor: Actor;
  readonly signedIn: SignedIn;
  readonly response: Response;
};

export type Call<E extends Endpoint, P = null> = PlantCall<E> & {
  readonly tx: Transaction;
  /** 412 unless the caller saw this version of the row. */
  readonly unchanged: (version: number) => void;
  readonly prepared: P;
};

export type Reply<E extends Endpoint> =
  | { readonly body: AnswerOf<E>; readonly version?: number; readonly status?: number }
  /** Fetched after the transaction: a slow bucket must hold no connection. */
  | { readonly bytes: () => Promise<Uint8Array>; readonly contentType: string; readonly saveAs?: string };

/** Work before the transaction (reading a drawing, storing a file), undone when nothing comes of it. */
export type Prepare<E extends Endpoint, P> = (call: PlantCall<E>) => Promise<{ value: P; undo?: () => Promise<void> }>;

export type Mount = {
  readonly services: Services;
  /** For anyone. */
  readonly open: <E extends Endpoint>(endpoint: E, act: (call: OpenCall<E>) => Promise<Reply<E>>) => void;
  /** For a signed-in person whose role allows it, in one transaction that sees their plant. */
  readonly route: {
    <E extends Endpoint>(endpoint: E, act: (call: Call<E>) => Promise<Reply<E>>): void;
    <E extends Endpoint, P>(endpoint: E, prepare: Prepare<E, P>, act: (call: Call<E, P>) => Promise<Reply<E>>): void;
  };
};

export function mountOn(router: Router, services: Services): Mount {
  const mount = (endpoint: Endpoint, handle: (request: Request, response: Response) => Promise<void>) => {
    const method = endpoint.method.toLowerCase() as Lowercase<Method>; // the string type is lost by lowering
    router[method](endpoint.path, handle);
  };
  return {
    services,
    open: (endpoint, act) => {
      mount(endpoint, async (request, response) => {
        const given = await read(endpoint, request, response, services);
        await send(endpoint, await act({ ...given, request, response }), response, services);
      });
    },
    route: <E extends Endpoint, P>(
      endpoint: E,
      ...steps: [(call: Call<E, P>) => Promise<Reply<E>>] | [Prepare<E, P>, (call: Call<E, P>) => Promise<Reply<E>>]
    ) => {
      const [prepare, act] = steps.length === 2 ? steps : [undefined, steps[0]];
      mount(endpoint, async (request, response) => {
        const signedIn = await signedInOf(request, services);
        const { actor } = signedIn;
        // 'anyone' is mounted by `open`; whoever mounts it here asks for a session on top.
        const verdict = endpoint.access === 'anyone' ? can(actor, 'session.use') : can(actor, endpoint.access);
        if (!verdict.ok) throw new AppError(verdict.code, verdict.why);
        const seen = endpoint.ifMatch ? versionsSeen(request) : null;
        const key = endpoint.idempotencyKey ? keyOf(request) : null;
        const given = await read(endpoint, request, response, services);
        const call: PlantCall<E> = { ...given, actor, signedIn, response };
        const prepared = await prepare?.(call);
        let acted = false;
        const inTransaction = async (tx: Transaction): Promise<Reply<E>> => {
          const repeated = key === null ? null : { key, fingerprint: fingerprint(endpoint, request, given) };
          const former = repeated ? await formerAnswer(tx, actor, repeated) : null;
          if (former) {
            acted = false;
            // Stored from a Reply of this very endpoint: the fingerprint says so.
            return { ...former, body: former.body as AnswerOf<E> };
          }
          acted = true;
          let compared = false;
          const unchanged = (version: number) => {
            compared = true;
            if (!seen?.includes(version))
              throw new AppError('stale', 'Somebody changed this since you read it. Read it again.');
          };
          const reply = await act({ ...call, tx, unchanged, prepared: prepared?.value as P }); // absent only where P is null
          if (endpoint.ifMatch && !compared) throw new Error(`${endpoint.path} never compared If-Match`);
          if (repeated && 'body' in reply) await keepAnswer(tx, actor, repeated, reply);
          return reply;
        };
        let reply: Reply<E>;
        try {
          const how = endpoint.method === 'GET' ? 'read' : 'change';
          reply = await twice(() => inPlant(services.database, actor.plantId, inTransaction, how));
        } catch (error) {
          // The connection broke, perhaps after the commit? Then what was prepared may be needed: the sweep will know.
          if (!databaseFault(error)?.code.startsWith('08')) await undo(prepared, services);
          throw error;
        }
        if (!acted) await undo(prepared, services);
        await send(endpoint, reply, response, services);
      });
    },
  };
}

/** Takes back what was prepared. A failure here is logged, since the answer is decided already, and the sweep tries again. */
async function undo(prepared: { undo?: () => Promise<void> } | undefined, services: Services): Promise<void> {
  try {
    await prepared?.undo?.();
  } catch (error) {
    services.log.warn({ err: error }, 'what was prepared for a request could not be taken back');
  }
}

/** Runs a transaction, and once more when PostgreSQL gave it up in favour of another (deadlock, serialization). */
async function twice<T>(run: () => Promise<T>): Promise<T> {
  try {
    return await run();
  } catch (error) {
    const code = databaseFault(error)?.code;
    if (code === '40P01' || code === '40001') return run();
    throw error;
  }
}

async function read<E extends Endpoint>(
  endpoint: E,
  request: Request,
  response: Response,
  services: Services,
): Promise<Given<E>> {
  // An id that is no id can't be anything's.
  const params = endpoint.params.safeParse(request.params);
  if (!params.success) throw notFound();
  const query = parse(endpoint.query, request.query);
  const { file, data } = await readBody(endpoint, request, response);
  if (endpoint.file?.required && !file) {
    throw new AppError('invalid-fields', 'A file is needed.', {
      errors: [{ pointer: `/${endpoint.file.field}`, detail: 'Choose a file.' }],
    });
  }
  return {
    // The schemas are the endpoint's own, whose output these types name.
    params: params.data as ParamsOf<E>,
    query: query as z.output<E['query']>,
    body: (endpoint.body ? parse(endpoint.body, data) : null) as Given<E>['body'],
    file,
    services,
  };
}

async function readBody(
  endpoint: Endpoint,
  request: Request,
  response: Response,
): Promise<{ file: UploadedFile | null; data: unknown }> {
  if (endpoint.file && request.is('multipart/form-data')) return readUpload(request, response, endpoint.file);
  if (!endpoint.body) return { file: null, data: undefined };
  if (!request.is('application/json')) throw new AppError('bad-request', 'Send the body as application/json.');
  await new Promise<void>((resolve, reject) => {
    json(request, response, (error?: unknown) => {
      if (!error) resolve();
      else reject(error instanceof Error ? error : new Error('the body could not be read', { cause: error }));
    });
  });
  return { file: null, data: request.body as unknown }; // typed as any by Express
}

const json = express.json({ limit: limits.jsonBytes, type: 'application/json' });

/** The value read by the schema, or 400 with a JSON pointer to each field that is wrong. */
export function parse<S extends z.ZodType>(schema: S, value: unknown): z.output<S> {
  const read = schema.safeParse(value);
  if (read.success) return read.data;
  const errors = fieldsOf(read.error.issues).slice(0, 50);
  throw new AppError('invalid-fields', errors[0]?.detail ?? 'Some fields are not right.', { errors });
}

type Issue = z.core.$ZodIssue;

function fieldsOf(
  issues: readonly Issue[],
  before: readonly PropertyKey[] = [],
): { pointer: string; detail: string }[] {
  return issues.flatMap((issue) => {
    const path = [...before, ...issue.path];
    if (issue.code === 'invalid_union' && issue.errors.length > 0) {
      // Of several shapes that don't fit, the nearest is the one that was meant.
      const nearest = issue.errors.reduce((best, one) => (one.length < best.length ? one : best));
      return fieldsOf(nearest, path);
    }
    if (issue.code === 'unrecognized_keys') {
      return issue.keys.map((key) => ({ pointer: pointerOf([...path, key]), detail: 'This field is not known here.' }));
    }
    return [{ pointer: pointerOf(path), detail: issue.message }];
  });
}

/** JSON pointer (RFC 6901). */
const pointerOf = (path: readonly PropertyKey[]) =>
  path.map((step) => `/${String(step).replaceAll('~', '~0').replaceAll('/', '~1')}`).join('');

/** Row versions named in If-Match. `*` names none, so it is no answer to "which did you see?". */
function versionsSeen(request: Request): number[] {
  const header = request.get('If-Match')?.trim();
  if (!header || header === '*') {
    throw new AppError('version-missing', 'Say in If-Match which version you saw: the ETag of your last read.');
  }
  // Weak tags never match strongly (RFC 9110, 8.8.3.2).
  return [...header.matchAll(/(W\/)?"([^"]*)"/g)]
    .filter((tag) => !tag[1] && /^\d+$/.test(tag[2] ?? ''))
    .map((tag) => Number(tag[2]));
}

function keyOf(request: Request): string {
  const key = request.get('Idempotency-Key')?.trim();
  if (!key) throw new AppError('key-missing', 'Send an Idempotency-Key, a new one for each thing to be done.');
  if (key.length > 255 || !/^[\x21-\x7e]+$/.test(key)) {
    throw new AppError('bad-request', 'An Idempotency-Key has at most 255 visible ASCII characters.');
  }
  return key;
}

/** SHA-256 of all that makes the request what it is. */
function fingerprint(endpoint: Endpoint, request: Request, given: Given<Endpoint>): string {
  const parts = [
    endpoint.method,
    endpoint.path,
    given.params,
    given.body,
    request.get('If-Match') ?? null,
    given.file ? sha256Of(given.file.bytes) : null,
  ];
  return createHash('sha256').update(JSON.stringify(parts)).digest('hex');
}

type Repeated = { readonly key: string; readonly fingerprint: string };
type Former = { readonly body: unknown; readonly version?: number; readonly status: number };

/**
 * The answer given to this key before, or null when there is none. The lock lasts as long as the transaction: a second request with the
 * key finds it taken, and one whose server died leaves neither lock nor answer behind.
 */
async function formerAnswer(tx: Transaction, actor: Actor, { key, fingerprint }: Repeated): Promise<Former | null> {
  const { rows } = await tx.execute<{ free: boolean }>(
    sql`select pg_try_advisory_xact_lock(hashtextextended(${`${actor.plantId} ${actor.userId} ${key}`}, 1)) as free`,
  );
  if (!rows[0]?.free) throw new AppError('in-progress', 'This request is being worked on already.', { retryAfter: 1 });
  const [kept] = await tx
    .select()
    .from(idempotencyKeys)
    .where(
      sql`${idempotencyKeys.userId} = ${actor.userId} and ${idempotencyKeys.key} = ${key}
        and ${idempotencyKeys.at} > now() - make_interval(secs => ${limits.idempotencySeconds})`,
    );
  if (!kept) return null;
  if (kept.fingerprint !== fingerprint) {
    throw new AppError('key-reused', 'Another request was sent with this Idempotency-Key.');
  }
  return {
    body: kept.answer,
    status: kept.status,
    ...(kept.answerVersion === null ? {} : { version: kept.answerVersion }),
  };
}

async function keepAnswer(
  tx: Transaction,
  actor: Actor,
  { key, fingerprint }: Repeated,
  reply: { readonly body: unknown; readonly version?: number; readonly status?: number },
): Promise<void> {
  const kept = {
    fingerprint,
    status: reply.status ?? 200,
    answerVersion: reply.version ?? null,
    answer: reply.body,
    at: sql`now()`,
  };
  await tx
    .insert(idempotencyKeys)
    .values({ plantId: actor.plantId, userId: actor.userId, key, ...kept })
    // One older than its time is in the way until it is swept.
    .onConflictDoUpdate({ target: [idempotencyKeys.plantId, idempotencyKeys.userId, idempotencyKeys.key], set: kept });
}

async function send<E extends Endpoint>(
  endpoint: E,
  reply: Reply<E>,
  response: Response,
  services: Services,
): Promise<void> {
  if ('bytes' in reply) {
    const bytes = await reply.bytes();
    if (reply.saveAs) response.attachment(reply.saveAs);
    response.type(reply.contentType).send(Buffer.from(bytes));
    return;
  }
  if (reply.version !== undefined) response.set('ETag', `"${reply.version}"`);
  if (!endpoint.answer) {
    response.status(204).end();
    return;
  }
  if (services.checkAnswers) {
    const checked = endpoint.answer.safeParse(reply.body);
    if (!checked.success) {
      throw new Error(
        `the answer of ${endpoint.method} ${endpoint.path} is not what it promises: ${checked.error.message}`,
      );
    }
  }
  response.status(reply.status ?? 200).json(reply.body);
}
