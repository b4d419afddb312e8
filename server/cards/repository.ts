import { and, desc, eq, isNull, sql } from 'drizzle-orm';
import type { Transaction } from '../../db/database.ts';
import { approvals } from '../../db/schema/approvals.ts';
import { machineRevisions } from '../../db/schema/machine-revisions.ts';
import { nozzles } from '../../db/schema/nozzles.ts';
import { requests } from '../../db/schema/requests.ts';
import { strategies } from '../../db/schema/strategies.ts';
import { strategyRevisions } from '../../db/schema/strategy-revisions.ts';

/** What a plate is matched by. */
export type Wanted = { readonly machineId: string; readonly gradeGroup: string; readonly nominalThickness: number };

/** The approved strategy whose range holds the nominal thickness: at most one, PostgreSQL sees to that. */
export async function approvedFor(tx: Transaction, { machineId, gradeGroup, nominalThickness }: Wanted) {
  const [row] = await tx
    .select({
      approval: approvals,
      strategy: { id: strategies.id, name: strategies.name },
      revision: { id: strategyRevisions.id, number: strategyRevisions.number, content: strategyRevisions.content },
      machineRevision: { number: machineRevisions.number, profile: machineRevisions.profile },
      nozzle: nozzles,
    })
    .from(approvals)
    .innerJoin(strategies, eq(strategies.id, approvals.strategyId))
    .innerJoin(strategyRevisions, eq(strategyRevisions.id, approvals.revisionId))
    .innerJoin(machineRevisions, eq(machineRevisions.id, strategyRevisions.machineRevisionId))
    .innerJoin(nozzles, eq(nozzles.id, strategyRevisions.nozzleId))
    .where(
      and(
        isNull(approvals.endedAt),
        eq(approvals.machineId, machineId),
        eq(approvals.gradeGroup, gradeGroup),
        eq(approvals.gas, 'oxygen'),
        // The constraint's own expression: its index answers.
        sql`int4range(${approvals.thicknessMin}, ${approvals.thicknessMax}, '[)') @> ${nominalThickness}::integer`,
      ),
    );
  return row ?? null;
}

export type Approved = NonNullable<Awaited<ReturnType<typeof approvedFor>>>;

/** Whether somebody has asked for this strategy already. */
export async function isRequested(
  tx: Transaction,
  { machineId, gradeGroup, nominalThickness }: Wanted,
): Promise<boolean> {
  const [row] = await tx
    .select({ id: requests.id })
    .from(requests)
    .where(
      and(
        eq(requests.machineId, machineId),
        eq(requests.gradeGroup, gradeGroup),
        eq(requests.thickness, nominalThickness),
      ),
    )
    .orderBy(desc(requests.at))
    .limit(1);
  return row !== undefined;
}
