import { eq } from 'drizzle-orm';
import type { Transaction } from '../../db/database.ts';
import { cornerPlans } from '../../db/schema/corner-plans.ts';
import { machineRevisions } from '../../db/schema/machine-revisions.ts';
import { machines } from '../../db/schema/machines.ts';
import { parts } from '../../db/schema/parts.ts';
import { strategies } from '../../db/schema/strategies.ts';
import { strategyRevisions } from '../../db/schema/strategy-revisions.ts';
import type { BlockFrameForm } from '../../shared/take-away.ts';
import { plannedLayout, plannedPart } from '../corner-plans/planned.ts';
import { findLayout } from '../layouts/repository.ts';
import { namesOf } from '../people/names.ts';

/** All that a plan's files are made of. */
export async function findTakenPlan(tx: Transaction, planId: string) {
  const [row] = await tx
    .select({
      plan: cornerPlans,
      part: { id: parts.id, name: parts.name, reading: parts.reading },
      revision: strategyRevisions,
      strategyName: strategies.name,
      machine: { name: machines.name, revision: machineRevisions.number },
      frame: { unit: machines.blockUnit, header: machines.blockHeader, footer: machines.blockFooter },
    })
    .from(cornerPlans)
    .leftJoin(parts, eq(parts.id, cornerPlans.partId))
    .innerJoin(strategyRevisions, eq(strategyRevisions.id, cornerPlans.revisionId))
    .innerJoin(strategies, eq(strategies.id, strategyRevisions.strategyId))
    .innerJoin(machineRevisions, eq(machineRevisions.id, strategyRevisions.machineRevisionId))
    .innerJoin(machines, eq(machines.id, machineRevisions.machineId))
    .where(eq(cornerPlans.id, planId));
  if (!row) return null;
  const { plan, part } = row;
  const layout = plan.layoutId === null ? null : await findLayout(tx, plan.layoutId, plan.layoutVersion ?? undefined);
  const planned = layout ? plannedLayout(layout) : part && plannedPart(part, plan.skeleton);
  if (!planned) throw new Error(`corner plan ${planId} is of nothing`);
  const names = await namesOf(tx);
  return { ...row, planned, plannedBy: names(row.plan.changedBy).name };
}

export type TakenPlan = NonNullable<Awaited<ReturnType<typeof findTakenPlan>>>;

export async function findBlockFrame(tx: Transaction, machineId: string) {
  const [row] = await tx
    .select({
      version: machines.version,
      unit: machines.blockUnit,
      header: machines.blockHeader,
      footer: machines.blockFooter,
    })
    .from(machines)
    .where(eq(machines.id, machineId));
  return row ?? null;
}

/** The machine's next version. */
export async function writeBlockFrame(
  tx: Transaction,
  machine: { readonly id: string; readonly version: number },
  { unit, header, footer }: BlockFrameForm,
): Promise<void> {
  await tx
    .update(machines)
    .set({ blockUnit: unit, blockHeader: header, blockFooter: footer, version: machine.version + 1 })
    .where(eq(machines.id, machine.id));
}
