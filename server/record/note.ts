import { sql } from 'drizzle-orm';
import type { Transaction } from '../../db/database.ts';
import type { Actor } from '../../shared/policy.ts';

/** What the record can be about. */
export type Subject = {
  readonly kind:
    | 'member'
    | 'machine'
    | 'nozzle'
    | 'grade'
    | 'strategy'
    | 'revision'
    | 'plate'
    | 'request'
    | 'part'
    | 'layout'
    | 'cornerPlan'
    | 'report'
    | 'houseRule'
    | 'rates';
  readonly id: string;
};

/**
 * Adds to the plant's record, in the transaction of the change. To be called last: from here to the commit, others who add to the
 * record wait. Facts name people by id.
 */
export async function note(
  tx: Transaction,
  actor: Actor,
  event: string,
  subject: Subject,
  facts: Readonly<Record<string, unknown>> = {},
): Promise<void> {
  // The columns are written out: the application's role may write no others.
  await tx.execute(sql`
    insert into record (plant_id, actor_id, event, subject_kind, subject_id, facts)
    values (${actor.plantId}, ${actor.userId}, ${event}, ${subject.kind}, ${subject.id}, ${JSON.stringify(facts)}::jsonb)
  `);
}
