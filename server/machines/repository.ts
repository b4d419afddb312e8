import { and, asc, desc, eq, inArray } from 'drizzle-orm';
import type { Transaction } from '../../db/database.ts';
import { machineRevisions } from '../../db/schema/machine-revisions.ts';
import { machines } from '../../db/schema/machines.ts';
import { limits } from '../../shared/limits.ts';

export type MachineRow = typeof machines.$inferSelect;
export type MachineRevisionRow = typeof machineRevisions.$inferSelect;
export type MachineWithRevisions = { readonly machine: MachineRow; readonly revisions: readonly MachineRevisionRow[] };

export async function allMachines(tx: Transaction): Promise<MachineWithRevisions[]> {
  const rows = await tx.select().from(machines).orderBy(asc(machines.name)).limit(limits.listRows);
  return withRevisions(tx, rows);
}

export async function findMachine(tx: Transaction, id: string): Promise<MachineWithRevisions | null> {
  const rows = await tx.select().from(machines).where(eq(machines.id, id));
  return (await withRevisions(tx, rows))[0] ?? null;
}

export async function lockMachine(tx: Transaction, id: string): Promise<MachineRow | null> {
  const [row] = await tx.select().from(machines).where(eq(machines.id, id)).for('update');
  return row ?? null;
}

export async function findMachineRevision(tx: Transaction, id: string): Promise<MachineRevisionRow | null> {
  const [row] = await tx.select().from(machineRevisions).where(eq(machineRevisions.id, id));
  return row ?? null;
}

export async function newestRevision(tx: Transaction, machineId: string): Promise<MachineRevisionRow | null> {
  const [row] = await tx
    .select()
    .from(machineRevisions)
    .where(and(eq(machineRevisions.machineId, machineId)))
    .orderBy(desc(machineRevisions.number))
    .limit(1);
  return row ?? null;
}

export async function addMachine(
  tx: Transaction,
  { plantId, id, name }: { plantId: string; id: string; name: string },
) {
  await tx.insert(machines).values({ plantId, id, name });
}

export async function addMachineRevision(
  tx: Transaction,
  row: Pick<MachineRevisionRow, 'plantId' | 'id' | 'machineId' | 'number' | 'profile' | 'note' | 'madeBy'>,
) {
  const { plantId, id, machineId, number, profile, note, madeBy } = row;
  await tx.insert(machineRevisions).values({ plantId, id, machineId, number, profile, note, madeBy });
}

export async function raiseMachineVersion(tx: Transaction, row: MachineRow) {
  await tx
    .update(machines)
    .set({ version: row.version + 1 })
    .where(eq(machines.id, row.id));
}

async function withRevisions(tx: Transaction, rows: readonly MachineRow[]): Promise<MachineWithRevisions[]> {
  if (rows.length === 0) return [];
  const revisions = await tx
    .select()
    .from(machineRevisions)
    .where(
      inArray(
        machineRevisions.machineId,
        rows.map((row) => row.id),
      ),
    )
    .orderBy(desc(machineRevisions.number));
  return rows.map((machine) => ({
    machine,
    revisions: revisions.filter((revision) => revision.machineId === machine.id),
  }));
}
