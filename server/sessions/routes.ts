import { sql } from 'drizzle-orm';
import { demoAccounts } from '../../db/demo/people.ts';
import { limits } from '../../shared/limits.ts';
import type { Role } from '../../shared/policy.ts';
import { sessionEndpoints, type Session } from '../../shared/sessions.ts';
import { networkOf } from '../auth/network.ts';
import { clearCookie, cookieOf, setCookie, signedInBy, type Asked, type SignedIn } from '../auth/session.ts';
import { AppError, notFound } from '../errors.ts';
import type { Mount } from '../route.ts';
import type { Services } from '../services.ts';

export function sessionRoutes({ open, route, services }: Mount): void {
  const { database, passwords, tokens, secure, now } = services;

  open(sessionEndpoints.welcome, async () => ({
    body: {
      demo:
        services.demoPassword === null
          ? null
          : {
              accounts: demoAccounts.map(({ mail, role, plant }) => ({ mail, role, plant })),
              password: services.demoPassword,
            },
    },
  }));

  open(sessionEndpoints.signIn, async ({ body, request, response }) => {
    const mail = body.mail.toLowerCase();
    const account = tokens.keyOf('account', mail);
    const attempts = await database.execute<{ wait_seconds: number | null }>(sql`
      select wait_seconds from sign_in_begin(${account}, ${tokens.keyOf('address', networkOf(request.ip))},
        ${limits.signInFailuresByAccount}, ${limits.signInFailuresByAddress}, ${limits.signInWindowSeconds})
    `);
    const wait = attempts.rows[0]?.wait_seconds;
    if (wait) throw tooMany(wait);

    const found = await database.execute<{ user_id: string | null; password_hash: string | null }>(
      sql`select * from sign_in_account(${mail})`,
    );
    const { user_id: userId = null, password_hash: hash = null } = found.rows[0] ?? {};
    const right = await passwords.matches(body.password, hash);
    if (!right || userId === null) throw wrongCredentials();

    const expiresAt = new Date(now().getTime() + limits.sessionSeconds * 1000);
    const session = await tokens.make(expiresAt);
    const opened = await database.execute<{ ok: boolean }>(
      sql`select sign_in_open(${userId}::uuid, ${account}, ${session.hash}, ${limits.sessionSeconds}) as ok`,
    );
    // Known, but of no plant any more: nobody's business who asks.
    if (!opened.rows[0]?.ok) throw wrongCredentials();
    await endFormer(services, cookieOf(request, secure));
    const signedIn = await signedInBy(database, session.hash);
    if (!signedIn) throw wrongCredentials();
    setCookie(response, session.token, signedIn.expiresAt, secure);
    return { body: await present(database, signedIn) };
  });

  route(sessionEndpoints.current, async ({ tx, signedIn }) => ({ body: await present(tx, signedIn) }));

  route(sessionEndpoints.signOut, async ({ tx, signedIn, response }) => {
    await tx.execute(sql`select session_end(${signedIn.tokenHash})`);
    clearCookie(response, secure);
    return { body: null };
  });

  route(sessionEndpoints.choosePlant, async ({ tx, signedIn, body, response }) => {
    const session = await tokens.make(signedIn.expiresAt);
    const moved = await tx.execute<{ ok: boolean }>(
      sql`select session_move(${signedIn.tokenHash}, ${body.plantId}::uuid, ${session.hash}) as ok`,
    );
    const next = moved.rows[0]?.ok ? await signedInBy(tx, session.hash) : null;
    if (!next) throw notFound('You belong to no such plant');
    setCookie(response, session.token, next.expiresAt, secure);
    return { body: await present(tx, next) };
  });
}

const tooMany = (seconds: number) =>
  new AppError('too-many', 'Too many sign-ins failed for this account or from this address.', { retryAfter: seconds });
const wrongCredentials = () => new AppError('wrong-credentials', 'Type both again; capitals count in the password.');

/** Signing in again with a session at hand ends that one: nobody comes back to it. */
async function endFormer({ database, tokens }: Services, token: string | null): Promise<void> {
  const hash = token === null ? null : await tokens.hashOf(token);
  if (hash !== null) await database.execute(sql`select session_end(${hash})`);
}

async function present(database: Asked, signedIn: SignedIn): Promise<Session> {
  const { actor, userName, mail, plantName, expiresAt, tokenHash } = signedIn;
  const { rows } = await database.execute<{ plant_id: string; plant_name: string; role: Role }>(
    sql`select * from session_memberships(${tokenHash})`,
  );
  return {
    user: { id: actor.userId, name: userName, mail },
    plant: { id: actor.plantId, name: plantName },
    role: actor.role,
    mayApprove: actor.mayApprove,
    memberships: rows.map((row) => ({ plantId: row.plant_id, plantName: row.plant_name, role: row.role })),
    expiresAt: expiresAt.toISOString(),
  };
}
