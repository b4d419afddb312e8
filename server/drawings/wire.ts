import type { DrawingReadingWire } from '../../shared/parts.ts';
import { pathLength } from '../../strategy/path/index.ts';
import type { DrawingQuestion, DrawingReading, Noted, Repair } from '../../strategy/path/drawing/index.ts';

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
    leftOut: reading.leftOut.map(wireNoted),
    repaired: [...countedRepairs(reading.repaired), ...reading.mended.map(wireNoted)],
    aside: reading.aside.map(({ what, segments }) => ({ what, segments: [...segments] })),
    deviation: reading.deviation,
    crossings: reading.crossings.map(wirePoint),
    branches: reading.branches.slice(0, mostPlaces).map(wirePoint),
    tooDense: reading.tooDense,
    questions: reading.questions.flatMap(wireQuestion),
  };
}

function wireQuestion(question: DrawingQuestion): DrawingReadingWire['questions'] {
  switch (question.kind) {
    case 'unit':
      return [
        {
          kind: 'unit',
          why: question.why,
          readings: question.readings.map(({ unit, width, height }) => ({ unit, width, height })),
        },
      ];
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

/** Places of one kind that go over the wire: more would only cover each other on the screen. */
const mostPlaces = 100;

const wirePoint = ({ x, y }: { readonly x: number; readonly y: number }) => ({ x, y });

const wireNoted = ({ what, count, at }: Noted) => ({ what, count, at: at.map(wirePoint), largest: null });

/** Repairs by what they are, with the first places of each and the largest size. */
function countedRepairs(repairs: readonly Repair[]): DrawingReadingWire['repaired'] {
  const byWhat = new Map<string, DrawingReadingWire['repaired'][number]>();
  for (const { what, at, size } of repairs) {
    let noted = byWhat.get(what);
    if (!noted) byWhat.set(what, (noted = { what, count: 0, at: [], largest: null }));
    noted.count++;
    if (noted.at.length < mostPlaces) noted.at.push(wirePoint(at));
    if (size !== undefined) noted.largest = Math.max(noted.largest ?? 0, size);
  }
  return [...byWhat.values()];
}
