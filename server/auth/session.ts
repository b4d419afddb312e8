import { sql } from 'drizzle-orm';
import type { CookieOptions, Request, Response } from 'express';
import type { Database } from '../../db/database.ts';
import type { Actor, Role } from '../../shared/policy.ts';
import { AppError } from '../errors.ts';
import type { Tokens } from './token.ts';

/** Who is asking, in which plant, by which session. */
export type SignedIn = {
  readonly actor: Actor;
  readonly userName: string;
  readonly mail: string;
  readonly plantName: string;
  readonly expiresAt: Date;
  /** SHA-256 of the session's random id: the key of its row. */
  readonly tokenHash: string;
};

type ActorRow = {
  user_id: string | null;
  user_name: string;
  mail: string;
  plant_id: string;
  plant_name: string;
  role: Role;
  may_approve: boolean;
  expires_at: Date | string;
};

/** The database, or a transaction in it. */
export type Asked = Pick<Database, 'execute'>;

/** Who is behind a session's hash now, or null: role and membership are read afresh for every request. */
export async function signedInBy(database: Asked, tokenHash: string): Promise<SignedIn | null> {
  const { rows } = await database.execute<ActorRow>(sql`select * from session_actor(${tokenHash})`);
  const row = rows[0];
  if (!row?.user_id) return null;
  return {
    actor: { userId: row.user_id, plantId: row.plant_id, role: row.role, mayApprove: row.may_approve },
    userName: row.user_name,
    mail: row.mail,
    plantName: row.plant_name,
    expiresAt: new Date(row.expires_at),
    tokenHash,
  };
}

/** The session of a request's cookie; 401 without. */
export async function signedInOf(
  request: Request,
  { database, tokens, secure }: { database: Asked; tokens: Tokens; secure: boolean },
): Promise<SignedIn> {
  const token = cookieOf(request, secure);
  const hash = token === null ? null : await tokens.hashOf(token);
  const found = hash === null ? null : await signedInBy(database, hash);
  if (!found) throw new AppError('signed-out', 'Sign in first.');
  return found;
}

/** The `__Host-` name makes the browser insist on TLS, the whole host and no other; plain loopback can't have it. */
const cookieName = (secure: boolean) => (secure ? '__Host-cinderpath' : 'cinderpath');

const cookieOptions = (secure: boolean): CookieOptions => ({ httpOnly: true, sameSite: 'strict', secure, path: '/' });

export function cookieOf(request: Request, secure: boolean): string | null {
  const jar = request.cookies as Record<string, unknown>; // cookie-parser's, typed as any
  const value = jar[cookieName(secure)];
  return typeof value === 'string' ? value : null;
}

export function setCookie(response: Response, token: string, expires: Date, secure: boolean): void {
  response.cookie(cookieName(secure), token, { ...cookieOptions(secure), expires });
}

export function clearCookie(response: Response, secure: boolean): void {
  response.clearCookie(cookieName(secure), cookieOptions(secure));
}
