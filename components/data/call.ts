import { v7 as uuidv7 } from 'uuid';
import type { z } from 'zod';
import type { AnswerOf, BodyOf, Endpoint, ParamsOf, QueryOf } from '@/shared/endpoint.ts';
import { problemSchema } from '@/shared/errors.ts';
import { Attempts } from './attempts.ts';
import { ApiProblem, lostConnection, unreadableAnswer } from './problem.ts';

/** A new id, made here so that a repeated request makes nothing twice. */
export const newId = (): string => uuidv7();

/** Present only where the endpoint has any: `nothing`'s keys are not known one by one. */
type Params<E> = string extends keyof ParamsOf<E> ? { params?: undefined } : { params: ParamsOf<E> };
type Body<E> = BodyOf<E> extends undefined ? { body?: undefined } : { body: BodyOf<E> };

export type CallOptions<E> = Params<E> &
  Body<E> & {
    query?: QueryOf<E>;
    /** For endpoints that carry a file. */
    file?: File | null;
    /** Row version this change was made from (If-Match). */
    version?: number;
    /** Idempotency key; made and kept by itself when left out. */
    key?: string;
    signal?: AbortSignal;
  };

/** The same without the endpoint's types, for the inside. */
type Loose = Pick<CallOptions<Endpoint>, 'file' | 'version' | 'key' | 'signal'> & {
  readonly params?: unknown;
  readonly query?: unknown;
  readonly body?: unknown;
};

const attempts = new Attempts(newId);

/**
 * The answer of one endpoint, parsed at the door. Throws `ApiProblem` for every way to say no, a lost connection included.
 * RangeError where the caller forgot what the endpoint asks for.
 */
export async function apiCall<E extends Endpoint>(endpoint: E, options: CallOptions<E>): Promise<AnswerOf<E>> {
  const response = await send(endpoint, options);
  if (endpoint.answer === null) return null as AnswerOf<E>; // a null answer schema is typed null by AnswerOf
  const parsed = endpoint.answer.safeParse(await jsonOf(response));
  if (!parsed.success) throw unreadableAnswer(response.status, parsed.error);
  return parsed.data as AnswerOf<E>; // the endpoint's own schema has just said so
}

/** The file of an endpoint that answers with bytes, and the name it wants to be saved under. Throws as `apiCall`. */
export async function apiFile<E extends Endpoint>(
  endpoint: E,
  options: CallOptions<E>,
): Promise<{ readonly bytes: Blob; readonly name: string }> {
  const response = await send(endpoint, options);
  const name = /filename="?([^";]+)/.exec(response.headers.get('content-disposition') ?? '')?.[1];
  try {
    return { bytes: await response.blob(), name: name ?? 'file' };
  } catch (cause) {
    throw lostConnection(cause); // the answer broke off on its way
  }
}

/** Address of a GET endpoint, for an image or a download. */
export function apiAddress<E extends Endpoint>(endpoint: E, options: { query?: QueryOf<E> } & Params<E>): string {
  return addressOf(endpoint, options);
}

function addressOf(endpoint: Endpoint, options: Loose): string {
  const params = asRecord(options.params);
  const path = endpoint.path.replace(/:(\w+)/g, (_, name: string) => {
    const value = params[name];
    if (typeof value !== 'string') throw new RangeError(`${endpoint.path} needs ${name}`);
    return encodeURIComponent(value);
  });
  const query = Object.entries(asRecord(options.query)).flatMap(([name, value]) =>
    (typeof value === 'string' && value !== '') || typeof value === 'number' ? [[name, String(value)]] : [],
  );
  return query.length === 0 ? path : `${path}?${new URLSearchParams(query).toString()}`;
}

async function send(endpoint: Endpoint, options: Loose): Promise<Response> {
  const address = addressOf(endpoint, options);
  const headers: Record<string, string> = { accept: 'application/json' };
  if (endpoint.ifMatch) {
    if (options.version === undefined) throw new RangeError(`${endpoint.path} needs the version it was made from`);
    headers['if-match'] = `"${options.version}"`;
  }

  const data = endpoint.body === null ? undefined : JSON.stringify(options.body);
  const file = options.file ?? null;
  const fingerprint = [endpoint.method, address, headers['if-match'], data, fileFingerprint(file)].join('\n');
  if (endpoint.idempotencyKey) headers['idempotency-key'] = options.key ?? attempts.keyFor(fingerprint);

  let body: string | FormData | undefined = data;
  if (endpoint.file !== null) {
    body = new FormData();
    if (data !== undefined) body.set('data', data);
    if (file !== null) body.set(endpoint.file.field, file, file.name);
  } else if (data !== undefined) {
    headers['content-type'] = 'application/json';
  }

  let response: Response;
  try {
    response = await fetch(address, {
      method: endpoint.method,
      headers,
      body,
      credentials: 'same-origin',
      signal: options.signal,
    });
  } catch (cause) {
    if (options.signal?.aborted === true) throw cause;
    throw lostConnection(cause);
  }
  if (response.ok) {
    attempts.settle(fingerprint);
    return response;
  }
  const problem = await problemOf(response);
  // Did the server only say "not yet" or fall over? Then what became of the request is open still.
  const open = problem.code === 'in-progress' || problem.status >= 500;
  if (!open) attempts.settle(fingerprint);
  throw problem;
}

async function problemOf(response: Response): Promise<ApiProblem> {
  const parsed = problemSchema.safeParse(await response.json().catch(() => null));
  if (parsed.success) return new ApiProblem(parsed.data);
  // A proxy between here and the server answers in its own words when the server is away.
  if (response.status >= 502 && response.status <= 504) return lostConnection(parsed.error);
  return unreadableAnswer(response.status, parsed.error);
}

async function jsonOf(response: Response): Promise<unknown> {
  let text: string;
  try {
    text = await response.text();
  } catch (cause) {
    throw lostConnection(cause); // the answer broke off on its way
  }
  try {
    const value: unknown = JSON.parse(text);
    return value;
  } catch (cause) {
    throw unreadableAnswer(response.status, cause);
  }
}

const fileFingerprint = (file: File | null): string =>
  file === null ? '' : `${file.name} ${file.size} ${file.lastModified}`;

function asRecord(value: unknown): Record<string, unknown> {
  return typeof value === 'object' && value !== null ? { ...value } : {};
}

/** Whether a value is what an endpoint's schema takes; for what is read back from the device. */
export function parsedOr<S extends z.ZodType>(schema: S, value: unknown): z.output<S> | null {
  const parsed = schema.safeParse(value);
  return parsed.success ? parsed.data : null;
}
