import { and, asc, eq, isNull, sql } from 'drizzle-orm';
import { v7 as newId } from 'uuid';
import type { Transaction } from '../../db/database.ts';
import { memberships } from '../../db/schema/memberships.ts';
import { users } from '../../db/schema/users.ts';
import { limits } from '../../shared/limits.ts';
import { peopleEndpoints, type Member } from '../../shared/people.ts';
import { AppError, notFound } from '../errors.ts';
import { note } from '../record/note.ts';
import type { Mount } from '../route.ts';

export function peopleRoutes({ route, services }: Mount): void {
  route(peopleEndpoints.list, async ({ tx }) => ({ body: { items: await members(tx) } }));

  route(
    peopleEndpoints.add,
    // Hashing takes a good part of a second: not while a transaction is open.
    async ({ body }) => ({ value: await services.passwords.hash(body.password) }),
    async ({ tx, actor, body, prepared: passwordHash }) => {
      const mail = body.mail.toLowerCase();
      const account = await accountFor(tx, { mail, name: body.name, passwordHash });
      const [known] = await tx.select().from(memberships).where(eq(memberships.userId, account.userId));
      if (known) throw new AppError('already-there', `${mail} belongs to this plant already.`);
      await tx.insert(memberships).values({
        plantId: actor.plantId,
        id: body.id,
        userId: account.userId,
        role: body.role,
        mayApprove: body.mayApprove,
      });
      await note(
        tx,
        actor,
        'member.added',
        { kind: 'member', id: body.id },
        {
          userId: account.userId,
          role: body.role,
          mayApprove: body.mayApprove,
        },
      );
      const member = await memberOf(tx, body.id);
      return { body: member, version: member.version, status: 201 };
    },
  );

  route(peopleEndpoints.change, async ({ tx, actor, params, body, unchanged }) => {
    // All leads in one order: two who end each other at once must see each other.
    const leads = await tx
      .select({ id: memberships.id })
      .from(memberships)
      .where(and(eq(memberships.role, 'lead'), isNull(memberships.endedAt)))
      .orderBy(asc(memberships.id))
      .for('update');
    const [row] = await tx.select().from(memberships).where(eq(memberships.id, params.memberId)).for('update');
    if (!row) throw notFound('There is no such person in this plant');
    unchanged(row.version);
    const role = body.role ?? row.role;
    const ended = body.ended ?? row.endedAt !== null;
    const isLead = row.role === 'lead' && row.endedAt === null;
    if (isLead && (role !== 'lead' || ended) && leads.length < 2) {
      throw new AppError('wrong-state', 'The plant would be without a lead. Make somebody else a lead first.');
    }
    await tx
      .update(memberships)
      .set({
        role,
        mayApprove: body.mayApprove ?? row.mayApprove,
        endedAt: ended ? (row.endedAt ?? sql`now()`) : null,
        version: row.version + 1,
      })
      .where(eq(memberships.id, row.id));
    await note(
      tx,
      actor,
      'member.changed',
      { kind: 'member', id: row.id },
      {
        userId: row.userId,
        from: { role: row.role, mayApprove: row.mayApprove, ended: row.endedAt !== null },
        to: { role, mayApprove: body.mayApprove ?? row.mayApprove, ended },
      },
    );
    const member = await memberOf(tx, row.id);
    return { body: member, version: member.version };
  });
}

const columns = {
  id: memberships.id,
  userId: memberships.userId,
  version: memberships.version,
  name: users.name,
  mail: users.mail,
  role: memberships.role,
  mayApprove: memberships.mayApprove,
  endedAt: memberships.endedAt,
};

type Row = Omit<Member, 'endedAt'> & { endedAt: Date | null };

const present = ({ id, userId, version, name, mail, role, mayApprove, endedAt }: Row): Member => ({
  id,
  userId,
  version,
  name,
  mail,
  role,
  mayApprove,
  endedAt: endedAt?.toISOString() ?? null,
});

async function members(tx: Transaction): Promise<Member[]> {
  const rows = await tx
    .select(columns)
    .from(memberships)
    .innerJoin(users, eq(users.id, memberships.userId))
    .orderBy(asc(users.name), asc(memberships.id))
    .limit(limits.listRows);
  return rows.map(present);
}

async function memberOf(tx: Transaction, id: string): Promise<Member> {
  const [row] = await tx
    .select(columns)
    .from(memberships)
    .innerJoin(users, eq(users.id, memberships.userId))
    .where(eq(memberships.id, id));
  if (!row) throw notFound();
  return present(row);
}

/** The account of a mail address; a new one when there is none. Accounts belong to no plant, so a function of the owner's does it. */
async function accountFor(
  tx: Transaction,
  { mail, name, passwordHash }: { mail: string; name: string; passwordHash: string },
): Promise<{ userId: string; isNew: boolean }> {
  const { rows } = await tx.execute<{ user_id: string; is_new: boolean }>(
    sql`select * from account_for(${newId()}::uuid, ${mail}, ${name}, ${passwordHash})`,
  );
  const row = rows[0];
  if (!row) throw new Error('account_for gave no row');
  return { userId: row.user_id, isNew: row.is_new };
}
