import type { Logger } from 'pino';
import type { Database } from '../db/database.ts';
import type { Passwords } from './auth/passwords.ts';
import type { Tokens } from './auth/token.ts';
import type { DrawingReader } from './drawings/reader.ts';
import type { FileStore } from './files/store.ts';
import type { CutFiles } from './take-away/cut-files.ts';

/** What the routes work with, made once by whoever starts the server. */
export type Services = {
  readonly database: Database;
  readonly files: FileStore;
  readonly passwords: Passwords;
  readonly tokens: Tokens;
  readonly drawings: DrawingReader;
  readonly cutFiles: CutFiles;
  readonly log: Logger;
  readonly now: () => Date;
  /** Cookies for TLS only, and the headers that go with it. */
  readonly secure: boolean;
  readonly webFolder: string | null;
  readonly demoPassword: string | null;
  readonly version: string;
  /** True once the server is on its way out: it finishes what it has and takes no more. */
  readonly closing: () => boolean;
  /** Parse every answer by its schema; a test's server does. */
  readonly checkAnswers: boolean;
};
