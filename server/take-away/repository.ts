import { eq } from 'drizzle-orm';
import type { Transaction } from '../../db/database.ts';
import { machineRevisions } from '../../db/schema/machine-revisions.ts';
import { machines } from '../../db/schema/machines.ts';
import type { BlockFrameForm } from '../../shared/take-away.ts';
import { findCornerPlan } from '../corner-plans/repository.ts';
import { namesOf } from '../people/names.ts';

/** All that a plan's files are made of. */
export async function findTakenPlan(tx: Transaction, planId: string) {
  const found = await findCornerPlan(tx, planId);
  if (!found) return null;
  const [on] = await tx
    .select({
      machine: { name: machines.name, revision: machineRevisions.number },
      frame: { unit: machines.blockUnit, header: machines.blockHeader, footer: machines.blockFooter },
    })
    .from(machineRevisions)
    .innerJoin(machines, eq(machines.id, machineRevisions.machineId))
    .where(eq(machineRevisions.id, found.revision.machineRevisionId));
  if (!on) throw new Error(`corner plan ${planId} is for no machine`);
  const names = await namesOf(tx);
  return { ...found, ...on, plannedBy: names(found.plan.changedBy).name };
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
