import { readFileSync } from 'node:fs';
import path from 'node:path';

/** Everything the server is told from outside, read once. */
export type Config = {
  readonly databaseUrl: string;
  readonly s3: {
    readonly endpoint: string | undefined;
    readonly region: string;
    readonly bucket: string;
    readonly credentials: { readonly accessKeyId: string; readonly secretAccessKey: string } | undefined;
  };
  readonly host: string;
  readonly port: number;
  readonly tls: { readonly cert: Buffer; readonly key: Buffer } | null;
  readonly sessionSecret: string;
  /** The exported web app; null serves the API alone. */
  readonly webFolder: string | null;
  /** Set when, and only when, the demo plants were filled into a private cluster. */
  readonly demoPassword: string | null;
  readonly logLevel: string;
};

export type Environment = Readonly<Record<string, string | undefined>>;

/** The configuration, or an Error that names every variable that is missing or wrong. */
export function readConfig(env: Environment): Config {
  const wrong: string[] = [];
  const needed = (name: string): string => {
    const value = env[name];
    if (!value) wrong.push(`${name} is not set`);
    return value ?? '';
  };
  const port = Number(env.PORT ?? 8080);
  if (!Number.isInteger(port) || port < 0 || port > 65_535) wrong.push(`PORT ${env.PORT} is outside 0 to 65535`);
  const sessionSecret = needed('SESSION_SECRET');
  // HS256 wants a key as long as its hash (RFC 7518, 3.2).
  if (sessionSecret && Buffer.byteLength(sessionSecret) < 32) wrong.push('SESSION_SECRET is shorter than 32 bytes');
  if (Boolean(env.TLS_CERT) !== Boolean(env.TLS_KEY)) wrong.push('TLS_CERT and TLS_KEY go together');
  if (Boolean(env.S3_ACCESS_KEY_ID) !== Boolean(env.S3_SECRET_ACCESS_KEY)) {
    wrong.push('S3_ACCESS_KEY_ID and S3_SECRET_ACCESS_KEY go together');
  }
  const host = env.HOST || '127.0.0.1';
  if (!env.TLS_CERT && !['127.0.0.1', '::1', 'localhost'].includes(host)) {
    wrong.push(`HOST ${host} is reachable from outside, which needs TLS_CERT and TLS_KEY`);
  }
  const config: Config = {
    databaseUrl: needed('DATABASE_URL'),
    s3: {
      endpoint: env.S3_ENDPOINT || undefined,
      region: env.S3_REGION || 'us-east-1',
      bucket: needed('S3_BUCKET'),
      // Without keys the SDK looks where its own chain says: instance roles and the like.
      credentials:
        env.S3_ACCESS_KEY_ID && env.S3_SECRET_ACCESS_KEY
          ? { accessKeyId: env.S3_ACCESS_KEY_ID, secretAccessKey: env.S3_SECRET_ACCESS_KEY }
          : undefined,
    },
    host,
    port,
    tls:
      env.TLS_CERT && env.TLS_KEY ? { cert: fileOf('TLS_CERT', env, wrong), key: fileOf('TLS_KEY', env, wrong) } : null,
    sessionSecret,
    webFolder: env.WEB_FOLDER === '' ? null : path.resolve(env.WEB_FOLDER ?? 'dist'),
    demoPassword: env.DEMO_PASSWORD || null,
    logLevel: env.LOG_LEVEL || 'info',
  };
  if (wrong.length > 0) throw new Error(`The server can’t start: ${wrong.join('; ')}.`);
  return config;
}

function fileOf(name: string, env: Environment, wrong: string[]): Buffer {
  try {
    return readFileSync(env[name] ?? '');
  } catch {
    wrong.push(`${name} names a file that can’t be read`);
    return Buffer.alloc(0);
  }
}
