import http from 'node:http';
import type { AddressInfo } from 'node:net';
import type { Express } from 'express';
import type { AnswerOf, BodyOf, Endpoint } from '../../shared/endpoint.ts';

/** A caller of the API on this machine, signed in by its cookie. */
export type Client = {
  call<E extends Endpoint>(
    endpoint: E,
    given?: {
      params?: Record<string, string>;
      body?: BodyOf<E>;
      version?: number;
      file?: { name: string; bytes: Uint8Array };
    },
  ): Promise<AnswerOf<E>>;
  /** The answer, or null when there is nothing (404). */
  find<E extends Endpoint>(endpoint: E, params: Record<string, string>): Promise<AnswerOf<E> | null>;
};

export class CallFailed extends Error {
  readonly status: number;
  constructor(what: string, status: number, body: string) {
    super(`${what} answered ${status}: ${body}`);
    this.status = status;
  }
}

/** Serves the app on a port of loopback that nobody is told of. */
export async function listenPrivately(app: Express): Promise<{ base: string; close(): Promise<void> }> {
  const server = http.createServer(app);
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
  const { port } = server.address() as AddressInfo; // a TCP server's address is never a string
  return {
    base: `http://127.0.0.1:${port}`,
    close: () =>
      new Promise((resolve) => {
        server.close(() => resolve());
        server.closeAllConnections();
      }),
  };
}

export function createClient(base: string): Client {
  let cookie = '';

  const call: Client['call'] = async (endpoint, { params = {}, body, version, file } = {}) => {
    const path = endpoint.path.replace(/:(\w+)/g, (_, name: string) => encodeURIComponent(params[name] ?? ''));
    const headers: Record<string, string> = cookie ? { cookie } : {};
    if (version !== undefined) headers['if-match'] = `"${version}"`;
    if (endpoint.idempotencyKey) headers['idempotency-key'] = keyFor(endpoint, path, body);
    let payload: string | FormData | undefined;
    if (file && endpoint.file) {
      payload = new FormData();
      payload.set('data', JSON.stringify(body));
      payload.set(endpoint.file.field, new Blob([Buffer.from(file.bytes)]), file.name);
    } else if (body !== undefined) {
      payload = JSON.stringify(body);
      headers['content-type'] = 'application/json';
    }
    const response = await fetch(base + path, {
      method: endpoint.method,
      headers,
      ...(payload === undefined ? {} : { body: payload }),
    });
    const set = response.headers.getSetCookie()[0];
    if (set) cookie = set.split(';')[0] ?? '';
    const text = await response.text();
    if (!response.ok) throw new CallFailed(`${endpoint.method} ${path}`, response.status, text);
    // The server answers by this endpoint's schema; null where it promises none.
    return (text === '' ? null : JSON.parse(text)) as AnswerOf<typeof endpoint>;
  };

  return {
    call,
    find: async (endpoint, params) => {
      try {
        return await call(endpoint, { params });
      } catch (error) {
        if (error instanceof CallFailed && error.status === 404) return null;
        throw error;
      }
    },
  };
}

/** The same thing to be done has the same key, so that a seed that was interrupted and starts again does nothing twice. */
function keyFor(endpoint: Endpoint, path: string, body: unknown): string {
  const id = typeof body === 'object' && body !== null && 'id' in body ? String(body.id) : '';
  return `demo-${endpoint.method}-${path}-${id}`.slice(0, 255);
}
