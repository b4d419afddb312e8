import type { Person } from '../../shared/basics.ts';
import { laidPart, wireOutline, type Layout, type LayoutSummary } from '../../shared/layouts.ts';
import { plateRectangle, plateRemnant, type PlateOutline } from '../../strategy/path/plate/index.ts';
import type { layoutLines, PartGeometry, plansOfLayout, WholeLayout } from './repository.ts';

type Names = (userId: string) => Person;

export function presentLayoutLine(
  { layout, version, tag, remnant }: Awaited<ReturnType<typeof layoutLines>>[number],
  names: Names,
): LayoutSummary {
  return {
    id: layout.id,
    name: layout.name,
    width: version.width,
    height: version.height,
    of: tag ?? remnant,
    pieces: version.pieces,
    problems: version.problems.length,
    travel: version.travel,
    changedAt: layout.changedAt.toISOString(),
    changedBy: names(layout.changedBy),
  };
}

export function presentLayout(
  whole: WholeLayout,
  plans: Awaited<ReturnType<typeof plansOfLayout>>,
  names: Names,
): Layout {
  const { layout, version } = whole;
  return {
    id: layout.id,
    version: version.version,
    name: layout.name,
    plate: plateOf(whole),
    outline: wireOutlineOf(whole),
    kerfWidth: version.kerfWidth,
    clearance: version.clearance,
    edgeMargin: version.edgeMargin,
    placements: [...whole.placements],
    parts: whole.parts.map(laidPartOf),
    order: version.cutOrder,
    orderBy: version.orderBy,
    problems: version.problems,
    moreProblems: version.moreProblems,
    travel: version.travel,
    cutLength: version.cutLength,
    changedAt: layout.changedAt.toISOString(),
    changedBy: names(layout.changedBy),
    cornerPlans: plans.map(({ id, strategyName, revisionNumber, layoutVersion, changedAt }) => ({
      id,
      strategyName,
      revisionNumber,
      layoutVersion: layoutVersion ?? 0,
      changedAt: changedAt.toISOString(),
    })),
  };
}

export const plateNameOf = ({ tag, remnant }: WholeLayout): string | null => tag ?? remnant?.name ?? null;

export const wireOutlineOf = (whole: WholeLayout): Layout['outline'] =>
  wireOutline(outlineFrom(whole), plateNameOf(whole));

export const laidPartOf = ({ id, name, reading }: PartGeometry): Layout['parts'][number] => ({
  id,
  name,
  contours: reading.contours,
});

/** What a version is cut from: the size kept with it, or the remnant's drawing. */
export function outlineFrom({ version, remnant }: Pick<WholeLayout, 'version' | 'remnant'>): PlateOutline {
  const drawn = remnant && plateRemnant(laidPart(laidPartOf(remnant)).contours);
  return drawn ?? plateRectangle(version.width, version.height);
}

function plateOf({ version: { plateId, remnantId, width, height } }: WholeLayout): Layout['plate'] {
  if (plateId !== null) return { kind: 'plate', plateId };
  if (remnantId !== null) return { kind: 'remnant', partId: remnantId };
  return { kind: 'rectangle', width, height };
}
