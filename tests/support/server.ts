import { randomBytes, randomUUID } from 'node:crypto';
import { rmSync } from 'node:fs';
import http from 'node:http';
import path from 'node:path';
import { pino } from 'pino';
import request from 'supertest';
import { openDatabase } from '../../db/database.ts';
import { createApp } from '../../server/app.ts';
import { createPasswords } from '../../server/auth/passwords.ts';
import { createTokens } from '../../server/auth/token.ts';
import { readConfig } from '../../server/config.ts';
import { startFakeS3 } from '../../server/dev/fake-s3.mjs';
import { createDrawingReader } from '../../server/drawings/reader.ts';
import { createFileStore } from '../../server/files/store.ts';
import type { Services } from '../../server/services.ts';
import { createCutFiles } from '../../server/take-away/cut-files.ts';
import type { AnswerOf, Endpoint } from '../../shared/endpoint.ts';
import { sessionEndpoints } from '../../shared/sessions.ts';
import { testDatabase, type TestDatabase } from './database.ts';

export type Answer<T> = {
  readonly status: number;
  readonly body: T;
  readonly problem: {
    code?: string;
    detail?: string;
    errors?: { pointer: string; detail: string }[];
    retryAfter?: number;
  };
  readonly headers: Readonly<Record<string, string>>;
  readonly version: number;
  readonly bytes: Buffer;
};

export type Asked = {
  readonly params?: Readonly<Record<string, string>>;
  readonly query?: Readonly<Record<string, string | number>>;
  readonly body?: unknown;
  /** Row version for If-Match; left out where the endpoint asks for one, none is sent. */
  readonly version?: number;
  /** Idempotency-Key; null sends none, left out a new one is made where the endpoint asks for one. */
  readonly key?: string | null;
  readonly file?: { readonly name: string; readonly bytes: Uint8Array };
  readonly headers?: Readonly<Record<string, string>>;
};

export type Caller = {
  call<E extends Endpoint>(endpoint: E, asked?: Asked): Promise<Answer<NonNullable<AnswerOf<E>>>>;
};

export type TestServer = {
  readonly services: Services;
  readonly database: TestDatabase;
  readonly server: http.Server;
  readonly stranger: Caller;
  signIn(mail: string, password?: string): Promise<Caller>;
  /** Keys of all files in the bucket. */
  storedKeys(): Promise<string[]>;
  close(): Promise<void>;
};

/** The password of every account the tests make. */
export const testPassword = 'a password for tests';

/** The product on a database and bucket of its own, with every answer checked against its schema. */
export async function startTestServer(change: Partial<Services> = {}): Promise<TestServer> {
  const database = await testDatabase();
  const folder = `test-files/${randomBytes(6).toString('hex')}`;
  const bucket = await startFakeS3({ folder });
  const config = readConfig({
    ...bucket.env,
    DATABASE_URL: database.appUrl,
    SESSION_SECRET: randomBytes(48).toString('base64url'),
    WEB_FOLDER: '',
  });
  const { database: drizzled, close: closePool } = openDatabase(config.databaseUrl, () => undefined);
  const files = createFileStore(config.s3);
  const passwords = createPasswords(4);
  const drawings = createDrawingReader();
  const cutFiles = createCutFiles();
  const services: Services = {
    database: drizzled,
    files,
    passwords,
    tokens: createTokens(config.sessionSecret),
    drawings,
    cutFiles,
    log: pino({ level: 'silent' }),
    now: () => new Date(),
    secure: false,
    webFolder: null,
    demoPassword: null,
    version: 'test',
    closing: () => false,
    checkAnswers: true,
    ...change,
  };
  const server = http.createServer(createApp(services));
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
  return {
    services,
    database,
    server,
    stranger: callerOn(server, null),
    signIn: async (mail, password = testPassword) => {
      const signedIn = await callerOn(server, null).call(sessionEndpoints.signIn, { body: { mail, password } });
      if (signedIn.status !== 200) throw new Error(`${mail} could not sign in: ${JSON.stringify(signedIn.problem)}`);
      return callerOn(server, cookieFrom(signedIn));
    },
    storedKeys: async () => {
      const keys: string[] = [];
      for await (const { key } of files.list()) keys.push(key);
      return keys.sort();
    },
    close: async () => {
      await new Promise<void>((resolve) => {
        server.close(() => resolve());
        server.closeAllConnections();
      });
      await Promise.all([passwords.close(), drawings.close(), cutFiles.close(), closePool()]);
      files.close();
      await bucket.stop();
      rmSync(path.join(import.meta.dirname, '../../.house', folder), { recursive: true, force: true });
      await database.drop();
    },
  };
}

export function cookieFrom({ headers }: Pick<Answer<unknown>, 'headers'>): string {
  // supertest types the header as one string; it is a list of them
  const set = headers['set-cookie'] as unknown as string[] | undefined;
  return set?.[0]?.split(';')[0] ?? '';
}

/** Calls endpoints as they are described, with whatever headers they ask for unless told otherwise. */
export function callerOn(server: http.Server, cookie: string | null): Caller {
  return {
    call: async (endpoint, asked = {}) => {
      const { params = {}, query = {}, body, version, file, headers = {} } = asked;
      const url = endpoint.path.replace(/:(\w+)/g, (_, name: string) => encodeURIComponent(params[name] ?? ''));
      const method = endpoint.method.toLowerCase() as 'get' | 'post' | 'put' | 'patch' | 'delete'; // the same five
      let sent = request(server)[method](url).query(query);
      if (cookie) sent = sent.set('Cookie', cookie);
      if (version !== undefined) sent = sent.set('If-Match', `"${version}"`);
      const key = asked.key === undefined ? (endpoint.idempotencyKey ? randomUUID() : null) : asked.key;
      if (key !== null) sent = sent.set('Idempotency-Key', key);
      for (const [name, value] of Object.entries(headers)) sent = sent.set(name, value);
      if (endpoint.bytes) sent = sent.buffer(true).parse(intoBuffer);
      if (file && endpoint.file) {
        sent = sent.field('data', JSON.stringify(body)).attach(endpoint.file.field, Buffer.from(file.bytes), file.name);
      } else if (body !== undefined) sent = sent.send(body as object);
      const response = await sent;
      const isProblem = response.type === 'application/problem+json';
      const parsed: unknown =
        isProblem && Buffer.isBuffer(response.body) ? JSON.parse(response.body.toString()) : response.body;
      return {
        status: response.status,
        // what the server answered: the tests look at it
        body: parsed as never,
        problem: (isProblem ? parsed : {}) as Answer<unknown>['problem'],
        headers: response.headers,
        version: Number(/^"(\d+)"$/.exec(response.headers.etag ?? '')?.[1] ?? Number.NaN),
        bytes: Buffer.isBuffer(response.body) ? response.body : Buffer.alloc(0),
      };
    },
  };
}

function intoBuffer(response: request.Response, done: (error: Error | null, body: Buffer) => void): void {
  const chunks: Buffer[] = [];
  response.on('data', (chunk: Buffer) => chunks.push(chunk));
  response.on('end', () => done(null, Buffer.concat(chunks)));
}
