import type { DrawingReadingWire } from '../../shared/parts.ts';
import { pathLength } from '../../strategy/path/index.ts';
import { unitLength, type DrawingQuestion, type DrawingReading } from '../../strategy/path/drawing/index.ts';

/** A reading as it goes over the wire and into the database: every field named, lengths in m. */
export function wireReading(reading: DrawingReading): DrawingReadingWire {
  const { bounds } = reading;
  return {
    unit: reading.unitAsked ? null : reading.unit,
    gapTolerance: reading.gapTolerance,
    bounds: { min: { x: bounds.minX, y: bounds.minY }, max: { x: bounds.maxX, y: bounds.maxY } },
    contours: reading.contours.map(({ id, depth, role, parent, layer, contour }) => ({
      id,
      depth,
      role,
      parent,
      layer,
      segments: [...contour.segments],
    })),
    openChains: reading.openChains.map(({ layer, segments }) => ({
      layer,
      segments: [...segments],
      length: pathLength(segments),
    })),
    layers: reading.layers.map(({ name, pieces, taken }) => ({ name, pieces, taken })),
    leftOut: reading.leftOut.map(({ what, count }) => ({ what, count })),
    repaired: countedBy(reading.repaired.map(({ what }) => what)),
    deviation: reading.deviation,
    crossings: reading.crossings.map(({ x, y }) => ({ x, y })),
    questions: reading.questions.flatMap(wireQuestion),
  };
}

function wireQuestion(question: DrawingQuestion): DrawingReadingWire['questions'] {
  switch (question.kind) {
    case 'unit': {
      const { asMillimetres, asInches } = question.sizes;
      return [
        {
          kind: 'unit',
          why: question.why,
          readings: [
            {
              unit: 'mm',
              width: asMillimetres.mm.width * unitLength.mm,
              height: asMillimetres.mm.height * unitLength.mm,
            },
            {
              unit: 'inch',
              width: asInches.inch.width * unitLength.inch,
              height: asInches.inch.height * unitLength.inch,
            },
          ],
        },
      ];
    }
    case 'gaps':
      return [
        {
          kind: 'gaps',
          why: question.why,
          gaps: question.gaps.map(({ at, size }) => ({ at, size })),
          closesAt: question.tolerance,
        },
      ];
    case 'layers':
      // The list of layers says which are taken; not asking for a choice is the ordinary case.
      return [];
  }
}

function countedBy(words: readonly string[]): { what: string; count: number }[] {
  const counts = new Map<string, number>();
  for (const what of words) counts.set(what, (counts.get(what) ?? 0) + 1);
  return [...counts].map(([what, count]) => ({ what, count }));
}
