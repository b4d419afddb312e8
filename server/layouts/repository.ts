import { and, desc, eq, inArray, sql } from 'drizzle-orm';
import type { Transaction } from '../../db/database.ts';
import { cornerPlans } from '../../db/schema/corner-plans.ts';
import { layoutVersions } from '../../db/schema/layout-versions.ts';
import { layouts } from '../../db/schema/layouts.ts';
import { parts } from '../../db/schema/parts.ts';
import { placements } from '../../db/schema/placements.ts';
import { plates } from '../../db/schema/plates.ts';
import { strategies } from '../../db/schema/strategies.ts';
import { strategyRevisions } from '../../db/schema/strategy-revisions.ts';
import type { PlacementWire } from '../../shared/layouts.ts';
import { limits } from '../../shared/limits.ts';
import type { DrawingReadingWire } from '../../shared/parts.ts';

export type LayoutRow = typeof layouts.$inferSelect;
export type LayoutVersionRow = typeof layoutVersions.$inferSelect;
export type PartGeometry = { readonly id: string; readonly name: string; readonly reading: DrawingReadingWire };

/** A version of a layout with what it names. */
export type WholeLayout = {
  readonly layout: LayoutRow;
  readonly version: LayoutVersionRow;
  readonly tag: string | null;
  readonly remnant: PartGeometry | null;
  readonly placements: readonly PlacementWire[];
  /** Each part that lies on it, once, in the order of the placements. */
  readonly parts: readonly PartGeometry[];
};

/** Layouts with their newest version, the last changed first. */
export async function layoutLines(tx: Transaction) {
  return tx
    .select({ layout: layouts, version: layoutVersions, tag: plates.tag, remnant: parts.name })
    .from(layouts)
    .innerJoin(layoutVersions, newest)
    .leftJoin(plates, eq(plates.id, layoutVersions.plateId))
    .leftJoin(parts, eq(parts.id, layoutVersions.remnantId))
    .orderBy(desc(layouts.changedAt), desc(layouts.id))
    .limit(limits.listRows);
}

const newest = and(eq(layoutVersions.layoutId, layouts.id), eq(layoutVersions.version, layouts.version));

/** The newest version, or the one asked for. */
export async function findLayout(tx: Transaction, id: string, version?: number): Promise<WholeLayout | null> {
  const [row] = await tx
    .select({ layout: layouts, version: layoutVersions, tag: plates.tag })
    .from(layouts)
    .innerJoin(
      layoutVersions,
      version === undefined
        ? newest
        : and(eq(layoutVersions.layoutId, layouts.id), eq(layoutVersions.version, version)),
    )
    .leftJoin(plates, eq(plates.id, layoutVersions.plateId))
    .where(eq(layouts.id, id));
  if (!row) return null;
  const lying = await tx
    .select()
    .from(placements)
    .where(and(eq(placements.layoutId, id), eq(placements.version, row.version.version)))
    .orderBy(placements.number);
  const { remnantId } = row.version;
  const known = await partGeometries(tx, [...lying.map(({ partId }) => partId), ...(remnantId ? [remnantId] : [])]);
  return {
    ...row,
    remnant: known.find(({ id: one }) => one === remnantId) ?? null,
    placements: lying.map(({ number, partId, x, y, turn, mirrored }) => ({
      number,
      partId,
      at: { x, y },
      turn,
      mirrored,
    })),
    parts: known.filter(({ id: one }) => lying.some(({ partId }) => partId === one)),
  };
}

/** Corner plans made for any of its versions, the newest first. */
export async function plansOfLayout(tx: Transaction, layoutId: string) {
  return tx
    .select({
      id: cornerPlans.id,
      strategyName: strategies.name,
      revisionNumber: strategyRevisions.number,
      layoutVersion: cornerPlans.layoutVersion,
      changedAt: cornerPlans.changedAt,
    })
    .from(cornerPlans)
    .innerJoin(strategyRevisions, eq(strategyRevisions.id, cornerPlans.revisionId))
    .innerJoin(strategies, eq(strategies.id, strategyRevisions.strategyId))
    .where(eq(cornerPlans.layoutId, layoutId))
    .orderBy(desc(cornerPlans.changedAt));
}

export async function lockLayout(tx: Transaction, id: string): Promise<LayoutRow | null> {
  const [row] = await tx.select().from(layouts).where(eq(layouts.id, id)).for('update');
  return row ?? null;
}

/** Those of the parts that are there. */
export async function partGeometries(tx: Transaction, ids: readonly string[]): Promise<PartGeometry[]> {
  const asked = [...new Set(ids)];
  if (asked.length === 0) return [];
  const rows = await tx
    .select({ id: parts.id, name: parts.name, reading: parts.reading })
    .from(parts)
    .where(inArray(parts.id, asked));
  return rows.sort((a, b) => asked.indexOf(a.id) - asked.indexOf(b.id));
}

export async function addLayout(
  tx: Transaction,
  row: Pick<LayoutRow, 'plantId' | 'id' | 'name' | 'changedBy'>,
  content: LayoutContent,
): Promise<void> {
  await tx.insert(layouts).values({ ...row, version: 1 });
  await addVersion(tx, row, 1, content);
}

export async function changeLayout(
  tx: Transaction,
  row: LayoutRow,
  name: string,
  by: string,
  content: LayoutContent,
): Promise<void> {
  const version = row.version + 1;
  await tx
    .update(layouts)
    .set({ name, version, changedAt: sql`now()`, changedBy: by })
    .where(eq(layouts.id, row.id));
  await addVersion(tx, row, version, content);
}

/** What a version holds beside its keys. */
export type LayoutContent = {
  readonly version: Omit<LayoutVersionRow, 'plantId' | 'layoutId' | 'version'>;
  readonly placements: readonly PlacementWire[];
};

async function addVersion(
  tx: Transaction,
  { plantId, id: layoutId }: Pick<LayoutRow, 'plantId' | 'id'>,
  version: number,
  content: LayoutContent,
): Promise<void> {
  await tx.insert(layoutVersions).values({ plantId, layoutId, version, ...content.version });
  if (content.placements.length === 0) return;
  await tx.insert(placements).values(
    content.placements.map(({ number, partId, at: { x, y }, turn, mirrored }) => ({
      plantId,
      layoutId,
      version,
      number,
      partId,
      x,
      y,
      turn,
      mirrored,
    })),
  );
}
