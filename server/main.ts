import { readFileSync, realpathSync } from 'node:fs';
import http from 'node:http';
import https from 'node:https';
import type { AddressInfo } from 'node:net';
import { fileURLToPath, URL } from 'node:url';
import { sql } from 'drizzle-orm';
import { pino, type Logger } from 'pino';
import { openDatabase, type Database } from '../db/database.ts';
import { limits } from '../shared/limits.ts';
import { createApp } from './app.ts';
import { createPasswords } from './auth/passwords.ts';
import { createTokens } from './auth/token.ts';
import { readConfig, type Config, type Environment } from './config.ts';
import { createDrawingReader } from './drawings/reader.ts';
import { createFileStore } from './files/store.ts';
import { sweepStrayFiles } from './files/sweep.ts';
import type { Services } from './services.ts';
import { createCutFiles } from './take-away/cut-files.ts';

/** From the signal until the process is gone at the latest, ms. */
const longestGoodbye = 10_000;
const sweepEvery = 3600 * 1000;

export type Serving = { readonly address: string; stop(): Promise<void> };

/** Opens everything, listens, and closes it all in reverse order on SIGINT or SIGTERM. */
export async function serve(env: Environment = process.env): Promise<Serving> {
  const config = readConfig(env);
  const log = pino({ level: config.logLevel });
  const opened: (() => unknown)[] = [];
  let closing = false;

  const close = async () => {
    for (const one of opened.reverse()) await one();
  };
  try {
    const { database, close: closeDatabase } = openDatabase(config.databaseUrl, (error) =>
      log.warn({ err: error }, 'a database connection was lost'),
    );
    opened.push(closeDatabase);
    await refuseTooPowerfulRole(database);
    const services = servicesFor(config, database, log, () => closing);
    opened.push(
      () => services.files.close(),
      () => services.passwords.close(),
      () => services.drawings.close(),
      () => services.cutFiles.close(),
    );

    const sweep = () => void sweepAll(services);
    const timer = setInterval(sweep, sweepEvery);
    timer.unref();
    opened.push(() => clearInterval(timer));
    sweep();

    const app = createApp(services);
    const server = config.tls ? https.createServer(config.tls, app) : http.createServer(app);
    // A client that dribbles its request holds a socket, not for ever.
    server.requestTimeout = 60_000;
    server.headersTimeout = 15_000;
    await listen(server, config);
    opened.push(() => stopListening(server));

    const address = addressOf(server, config);
    const stop = async () => {
      if (closing) return;
      closing = true; // the health says so from here on
      const late = setTimeout(() => {
        log.error('closing took too long');
        process.exit(1);
      }, longestGoodbye);
      late.unref();
      await close();
      clearTimeout(late);
    };
    for (const signal of ['SIGINT', 'SIGTERM'] as const) {
      process.once(signal, () => void stop().then(() => process.exit(0)));
    }
    return { address, stop };
  } catch (error) {
    await close();
    throw error;
  }
}

function servicesFor(config: Config, database: Database, log: Logger, closing: () => boolean): Services {
  return {
    database,
    files: createFileStore(config.s3),
    passwords: createPasswords(),
    tokens: createTokens(config.sessionSecret),
    drawings: createDrawingReader(),
    cutFiles: createCutFiles(),
    log,
    now: () => new Date(),
    secure: config.tls !== null,
    webFolder: config.webFolder,
    demoPassword: config.demoPassword,
    version: versionOfThis(),
    closing,
    checkAnswers: false,
  };
}

/** What keeps plants apart does not hold for a role that owns the tables or may pass over row security. */
export async function refuseTooPowerfulRole(database: Database): Promise<void> {
  const { rows } = await database.execute<{ name: string; free: boolean; owns: boolean; ready: boolean }>(sql`
    select current_user as name, rolsuper or rolbypassrls as free,
      exists (
        select 1 from pg_class where relnamespace = 'public'::regnamespace and relkind in ('r', 'p')
          and pg_has_role(current_user, relowner, 'USAGE')
      ) as owns,
      to_regclass('public.plants') is not null as ready
    from pg_roles where rolname = current_user
  `);
  const role = rows[0];
  if (!role?.ready) throw new Error('The database has no tables yet: migrate it first (db/migrate.ts).');
  if (role.free || role.owns) {
    throw new Error(
      `The role ${role.name} of DATABASE_URL may pass over row-level security. Give the application a role of its own that owns nothing.`,
    );
  }
}

async function sweepAll(services: Services): Promise<void> {
  const { database, files, log, now } = services;
  try {
    await database.execute(sql`select sweep_expired(${limits.idempotencySeconds}, ${limits.signInWindowSeconds})`);
    const removed = await sweepStrayFiles(database, files, now());
    if (removed > 0) log.info({ removed }, 'stray files were removed');
  } catch (error) {
    log.warn({ err: error }, 'the sweep did not finish; the next one tries again');
  }
}

function listen(server: http.Server, { host, port }: Config): Promise<void> {
  return new Promise((resolve, reject) => {
    server.once('error', reject);
    server.listen(port, host, () => {
      server.off('error', reject);
      resolve();
    });
  });
}

/** Takes no more, lets what is running finish. */
function stopListening(server: http.Server): Promise<void> {
  return new Promise((resolve) => {
    // A connection that was busy and is kept open afterwards would hold us until its browser lets go.
    const sweep = setInterval(() => server.closeIdleConnections(), 50);
    server.close(() => {
      clearInterval(sweep);
      resolve();
    });
  });
}

function addressOf(server: http.Server, { tls, host }: Config): string {
  const { port } = server.address() as AddressInfo; // a TCP server's address is never a string
  const name = host.includes(':') ? `[${host}]` : host;
  return `${tls ? 'https' : 'http'}://${name}:${port}`;
}

function versionOfThis(): string {
  const text = readFileSync(new URL('../package.json', import.meta.url), 'utf8');
  const { version } = JSON.parse(text) as { version: string }; // our own file
  return version;
}

// Run as a program?
if (process.argv[1] && realpathSync(process.argv[1]) === fileURLToPath(import.meta.url)) {
  try {
    const { address } = await serve();
    console.log(`Cinderpath is at ${address}`);
  } catch (error) {
    console.error(error instanceof Error ? error.message : error);
    process.exit(1);
  }
}
