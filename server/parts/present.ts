import type { Person } from '../../shared/basics.ts';
import { drawingReadingSchema, type Part, type PartSummary } from '../../shared/parts.ts';
import type { findPart, partLines, plansOfPart } from './repository.ts';

export function presentPartLine(
  line: Awaited<ReturnType<typeof partLines>>[number],
  names: (userId: string) => Person,
): PartSummary {
  const { id, name, fileName, width, height, outlines, holes, addedAt, addedBy, cornerPlans } = line;
  return {
    id,
    name,
    fileName,
    width,
    height,
    outlines,
    holes,
    addedAt: addedAt.toISOString(),
    addedBy: names(addedBy),
    cornerPlans,
  };
}

export function presentPart(
  { part, file }: NonNullable<Awaited<ReturnType<typeof findPart>>>,
  plans: Awaited<ReturnType<typeof plansOfPart>>,
  names: (userId: string) => Person,
): Part {
  return {
    id: part.id,
    version: part.version,
    name: part.name,
    fileName: part.fileName,
    fileBytes: file.bytes,
    sha256: file.sha256,
    // By the schema, so that a reading stored before a field was added still tells all that is promised.
    reading: drawingReadingSchema.parse(part.reading),
    addedAt: part.addedAt.toISOString(),
    addedBy: names(part.addedBy),
    cornerPlans: plans.map(({ id, strategyName, revisionNumber, changedAt }) => ({
      id,
      strategyName,
      revisionNumber,
      changedAt: changedAt.toISOString(),
    })),
  };
}
