import { quantityText } from '../../units/index.ts';
import type { Contour } from '../contour.ts';
import type { Box, Point } from '../point.ts';
import { boxUnion, emptyBox } from '../point.ts';
import type { Segment } from '../segment.ts';
import { segmentBox, segmentStart } from '../segment.ts';
import type { Chain, Piece } from './chain.ts';
import { chainPieces } from './chain.ts';
import type { Repair } from './clean.ts';
import { cleanPieces, closeJoints } from './clean.ts';
import { documentOf } from './document.ts';
import { drawnEntities, entityCounts } from './entities.ts';
import { contourCrossings } from './crossings.ts';
import type { Gap } from './gaps.ts';
import { nearGaps } from './gaps.ts';
import { drawingLimits } from './limits.ts';
import type { ContourRole } from './nest.ts';
import { nestContours } from './nest.ts';
import { DrawingRefusal } from './refusal.ts';
import { shapeMap, shapeReach, shapeSegments } from './shape.ts';
import { tagsOf } from './tags.ts';
import type { DrawingUnit } from './unit.ts';
import { headerUnit, plausibleSize, unitLength } from './unit.ts';
import { whatItIs } from './what-it-is.ts';

/** What the reader of a drawing has been told about it. */
export type DrawingAnswers = {
  readonly unit?: DrawingUnit;
  /** Ends nearer than this are joined, m. */
  readonly gapTolerance?: number;
  /** Layers to take, hidden ones too; all that are neither off nor frozen when left out. */
  readonly layers?: readonly string[];
};

export type DrawingContour = {
  readonly id: string;
  readonly contour: Contour;
  readonly depth: number;
  readonly role: ContourRole;
  readonly layer: string;
  /** Id of the contour around it. */
  readonly parent: string | null;
};

export type OpenChain = { readonly segments: readonly Segment[]; readonly layer: string };

export type DrawingLayer = {
  readonly name: string;
  readonly pieces: number;
  readonly hidden: boolean;
  readonly taken: boolean;
};

/** Width and height. */
export type Size = { readonly width: number; readonly height: number };

export type DrawingQuestion =
  | {
      readonly kind: 'unit';
      readonly why: string;
      /** Unit taken until it is answered. */
      readonly taken: DrawingUnit;
      /** The same numbers read as millimetres and as inches: size in mm if drawn in mm, in inches if drawn in inches, each also in the other. */
      readonly sizes: {
        readonly asMillimetres: { readonly mm: Size; readonly inch: Size };
        readonly asInches: { readonly mm: Size; readonly inch: Size };
      };
    }
  | {
      readonly kind: 'gaps';
      readonly why: string;
      readonly gaps: readonly Gap[];
      /** Least tolerance that would join them all, m. */
      readonly tolerance: number;
    }
  | { readonly kind: 'layers'; readonly why: string; readonly layers: readonly string[] };

/** None of the contours may be closed yet: then the gaps that keep them open are asked about. */
export type DrawingReading = {
  readonly kind: 'drawing';
  readonly unit: DrawingUnit;
  /** True while the unit is only assumed. */
  readonly unitAsked: boolean;
  readonly bounds: Box; // m, of contours and open chains
  readonly contours: readonly DrawingContour[];
  readonly openChains: readonly OpenChain[];
  readonly leftOut: readonly { readonly what: string; readonly count: number }[];
  readonly repaired: readonly Repair[];
  readonly questions: readonly DrawingQuestion[];
  readonly layers: readonly DrawingLayer[];
  readonly gapTolerance: number; // m
  /** Greatest distance of the lines and arcs from the ellipses and splines they stand for, m. */
  readonly deviation: number;
  /** Entities of the file by type. */
  readonly entityCounts: Readonly<Record<string, number>>;
  /** Places where more than two ends meet, m: there the way was chosen. */
  readonly branches: readonly Point[];
  /** Places where contours cross each other or themselves, m: such a drawing is no part yet. The first hundred. */
  readonly crossings: readonly Point[];
};

export type NoDrawing = { readonly kind: 'none'; readonly why: string };

/** Ellipses and splines are followed within this, m. */
const curveTolerance = 1e-5;

/** Ends are one when nearer than this share of the drawing's diagonal, unless told otherwise: the rounding of decimals, no more. */
const roundingShare = 1e-6;

/**
 * The part on a DXF drawing as closed contours of lines and arcs, m, turned so that the part lies on the left and nested, with everything that was
 * left out, repaired or must be asked; or `{ kind: 'none', why }` with a sentence that says what is wrong, where, and what to do. Never throws for
 * what a file holds; a gap tolerance below 0 throws RangeError. Format: DXF reference ("DXF Group Codes", "ENTITIES Section").
 */
export function drawingRead(bytes: Uint8Array, answers: DrawingAnswers = {}): DrawingReading | NoDrawing {
  if (answers.gapTolerance !== undefined && !(answers.gapTolerance >= 0 && answers.gapTolerance < Infinity)) {
    throw new RangeError(`gap tolerance ${answers.gapTolerance} m is outside [0, ∞)`);
  }
  try {
    return read(bytes, answers);
  } catch (error) {
    if (error instanceof DrawingRefusal) return { kind: 'none', why: error.message };
    throw error;
  }
}

function read(bytes: Uint8Array, answers: DrawingAnswers): DrawingReading | NoDrawing {
  if (bytes.length === 0) return none('The file is empty. Export the drawing again.');
  if (bytes.length > drawingLimits.bytes) {
    return none(
      `The file is ${(bytes.length / 1048576).toFixed(1)} MiB; at most ${drawingLimits.bytes / 1048576} MiB are read. Draw the part alone and export again.`,
    );
  }
  const other = whatItIs(bytes);
  if (other) return none(other);

  const tags = tagsOf(bytes);
  const document = documentOf(tags);
  const drawn = drawnEntities(document);
  const stated = headerUnit(document.insertUnits, document.measurement);
  const unit = answers.unit ?? stated.unit;
  const scale = unitLength[unit];

  const leftOut = new Map(drawn.leftOut);
  if (document.endMissing || tags.cutShort) leftOut.set('end of the file (it stops before its EOF mark)', 1);
  const layerPieces = new Map<string, number>();
  for (const { layer } of drawn.paths) layerPieces.set(layer, (layerPieces.get(layer) ?? 0) + 1);
  const hidden = new Set(document.layers.filter((layer) => layer.hidden).map((layer) => layer.name));
  const taken = (layer: string) => (answers.layers ? answers.layers.includes(layer) : !hidden.has(layer));
  for (const { type, layer } of drawn.paths) {
    if (taken(layer)) continue;
    const what = `${type} on the ${hidden.has(layer) ? 'hidden ' : ''}layer "${layer}"`;
    leftOut.set(what, (leftOut.get(what) ?? 0) + 1);
  }

  let deviation = 0;
  let count = 0;
  const all = drawn.paths
    .filter(({ layer }) => taken(layer))
    .map(({ shapes, layer }): Piece => {
      const segments = shapes.flatMap((shape) => {
        const scaled = shapeMap({ a: scale, b: 0, c: 0, d: scale, e: 0, f: 0 }, shape);
        if (!(shapeReach(scaled) <= drawingLimits.reach)) throw new DrawingRefusal(tooFar(unit));
        const fit = shapeSegments(scaled, curveTolerance);
        deviation = Math.max(deviation, fit.deviation);
        count += fit.segments.length;
        if (count > drawingLimits.segments) throw new DrawingRefusal(tooFine);
        return fit.segments;
      });
      return { segments, layer };
    })
    .filter((piece) => piece.segments.length > 0);
  if (all.length === 0) return none(nothingDrawn(leftOut, layerPieces, answers));

  const bounds = all.reduce((box, piece) => piece.segments.reduce((b, s) => boxUnion(b, segmentBox(s)), box), emptyBox);
  const diagonal = Math.hypot(bounds.maxX - bounds.minX, bounds.maxY - bounds.minY);
  const rounding = Math.max(diagonal * roundingShare, Number.MIN_VALUE);
  const gapTolerance = answers.gapTolerance ?? rounding;

  const { kept, repaired: cleaned } = cleanPieces(all, rounding);
  const chains = chainPieces(kept, gapTolerance);
  const joined = chains.closed.map((chain) => closeJoints(chain.segments, rounding));
  const closed = joined.map(({ segments }, i) => ({ contour: { segments }, layer: chains.closed[i]?.layer ?? '0' }));
  const repaired = [...cleaned, ...joined.flatMap((one) => one.repaired)];
  // Ends that lie within the tolerance and were still not joined meet where the way was chosen: a wider one would not join them.
  const gaps = nearGaps(chains.open, diagonal).filter(({ size }) => size > gapTolerance);
  if (closed.length === 0 && gaps.length === 0) return noContour(chains.open, unit);

  const contours = nestContours(closed.map(({ contour }) => contour)).map(
    ({ contour, depth, role, parent }, i): DrawingContour => ({
      id: String(i + 1),
      contour,
      depth,
      role,
      layer: closed[i]?.layer ?? '0',
      parent: parent === null ? null : String(parent + 1),
    }),
  );
  const size = { width: (bounds.maxX - bounds.minX) / scale, height: (bounds.maxY - bounds.minY) / scale };
  const doubt = answers.unit ? null : (stated.doubt ?? implausible(bounds, unit));
  const layers = [...layerPieces].map(([name, pieces]) => ({
    name,
    pieces,
    hidden: hidden.has(name),
    taken: taken(name),
  }));
  return {
    kind: 'drawing',
    unit,
    unitAsked: doubt !== null,
    bounds,
    contours,
    openChains: chains.open.map(({ segments, layer }) => ({ segments, layer })),
    leftOut: [...leftOut].map(([what, count]) => ({ what, count })),
    repaired,
    questions: [
      ...unitQuestion(doubt, unit, size),
      ...gapQuestion(gaps),
      ...(answers.layers === undefined && layers.length > 1
        ? [
            {
              kind: 'layers' as const,
              why: `The drawing has ${layers.length} layers with geometry: which of them are the part?`,
              layers: layers.map((l) => l.name),
            },
          ]
        : []),
    ],
    layers,
    gapTolerance,
    deviation,
    entityCounts: entityCounts(document),
    branches: chains.branches,
    crossings: contourCrossings(
      contours.map(({ contour }) => contour),
      rounding,
    ),
  };
}

const tooFar = (unit: DrawingUnit): string =>
  `Read in ${unit}, a place of the drawing lies more than 10 km away. Correct the unit or move the part to the origin.`;
const tooFine = `The drawing becomes more than ${drawingLimits.segments} lines and arcs. Draw the part alone and export again.`;

const none = (why: string): NoDrawing => ({ kind: 'none', why });

function implausible(bounds: Box, unit: DrawingUnit): string | null {
  const largest = Math.max(bounds.maxX - bounds.minX, bounds.maxY - bounds.minY);
  if (largest < plausibleSize.least) return `read in ${unit} the whole drawing is only ${millimetres(largest, 2)}`;
  if (largest > plausibleSize.most) return `read in ${unit} the drawing is ${largest.toFixed(0)} m`;
  return null;
}

function unitQuestion(doubt: string | null, taken: DrawingUnit, size: Size): DrawingQuestion[] {
  if (doubt === null) return [];
  const times = (factor: number): Size => ({ width: size.width * factor, height: size.height * factor });
  const inch = unitLength.inch / unitLength.mm;
  return [
    {
      kind: 'unit',
      why: `In which unit is this drawing? ${doubt.charAt(0).toUpperCase()}${doubt.slice(1)}.`,
      taken,
      sizes: { asMillimetres: { mm: size, inch: times(1 / inch) }, asInches: { mm: times(inch), inch: size } },
    },
  ];
}

function gapQuestion(gaps: readonly Gap[]): DrawingQuestion[] {
  if (gaps.length === 0) return [];
  const widest = gaps.reduce((most, gap) => Math.max(most, gap.size), 0);
  const many =
    gaps.length === 1 ? 'One contour stays open by a gap' : `${gaps.length} gaps keep contours open, the widest`;
  return [
    {
      kind: 'gaps',
      why: `${many} of ${millimetres(widest, 3)}. Should gaps up to that be closed?`,
      gaps,
      tolerance: widest * (1 + 1e-6),
    },
  ];
}

function nothingDrawn(
  leftOut: ReadonlyMap<string, number>,
  layers: ReadonlyMap<string, number>,
  answers: DrawingAnswers,
): string {
  if (answers.layers !== undefined && layers.size > 0) {
    return `None of the chosen layers holds geometry. Layers with geometry: ${[...layers.keys()].join(', ')}.`;
  }
  const found = [...leftOut].map(([what, count]) => `${count} ${what}`).join(', ');
  return `The drawing holds no lines, arcs or curves to cut${found ? `, only ${found}` : ''}. Export the part's outline.`;
}

function noContour(open: readonly Chain[], unit: DrawingUnit): NoDrawing {
  const start = open[0]?.segments[0];
  const where = start ? placeIn(segmentStart(start), unit) : 'the drawing';
  const chains = open.length === 1 ? 'its one line of pieces is open' : `all ${open.length} lines of pieces are open`;
  return none(
    `The drawing has no closed contour: ${chains}, the first from ${where}. Close the outline in the drawing and export again.`,
  );
}

const placeIn = (p: Point, unit: DrawingUnit): string =>
  `(${trim(p.x / unitLength[unit])}, ${trim(p.y / unitLength[unit])}) ${unit}`;
const trim = (value: number): string => String(Number(value.toFixed(3)));
const millimetres = (length: number, figures: number): string =>
  quantityText(length, 'length', 'metric', { figures }).text;
