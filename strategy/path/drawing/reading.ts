import { quantityText } from '../../units/index.ts';
import type { Contour } from '../contour.ts';
import { contourArea } from '../contour.ts';
import type { Box, Point } from '../point.ts';
import { pointDistance } from '../point.ts';
import type { Segment } from '../segment.ts';
import { pathLength, segmentEnd, segmentStart } from '../segment.ts';
import type { Chain } from './chain.ts';
import { chainPieces } from './chain.ts';
import type { Repair } from './clean.ts';
import { cleanPieces, closeJoints } from './clean.ts';
import { copiesUsed } from './copies.ts';
import { dxfSource } from './dxf-source.ts';
import type { Gap } from './gaps.ts';
import { nearGaps } from './gaps.ts';
import { joinEnds } from './join.ts';
import { drawingLimits } from './limits.ts';
import type { ContourRole } from './nest.ts';
import { nestContours } from './nest.ts';
import type { Loose, Meeting } from './overlap.ts';
import { sortPieces } from './overlap.ts';
import type { Piece } from './piece.ts';
import { DrawingRefusal } from './refusal.ts';
import { shapeInto, shapeReach } from './shape.ts';
import { writeBox } from './soup.ts';
import type { Noted, Source } from './source.ts';
import { svgSource } from './svg-source.ts';
import type { DrawingUnit } from './unit.ts';
import { plausibleSize, unitLength } from './unit.ts';
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
      /** Size of the drawing under each reading, m. */
      readonly readings: readonly { readonly unit: DrawingUnit; readonly width: number; readonly height: number }[];
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
  /** What is no part of the cut, by name, with the first places. */
  readonly leftOut: readonly Noted[];
  /** Geometry that was not taken, so that it can be shown where it was. The first so many. */
  readonly aside: readonly Aside[];
  readonly repaired: readonly Repair[];
  /** What was put right in single entities, by name, with the first places. */
  readonly mended: readonly Noted[];
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
  /** More pieces touch each other than can be compared: overlaps and crossings are not all found. */
  readonly tooDense: boolean;
};

/** A connected piece of geometry that was left out, and why. m */
export type Aside = { readonly what: string; readonly segments: readonly Segment[] };

export type NoDrawing = { readonly kind: 'none'; readonly why: string };

/** Ellipses and splines are followed within this, m. */
const curveTolerance = 1e-5;

/** Ends are one when nearer than this share of the drawing's diagonal, unless told otherwise: the rounding of decimals, no more. */
const roundingShare = 1e-6;

/**
 * The part on a DXF or SVG drawing as closed contours of lines and arcs, m, turned so that the part lies on the left and nested, with everything that was
 * left out, repaired or must be asked; or `{ kind: 'none', why }` with a sentence that says what is wrong, where, and what to do. Never throws for
 * what a file holds; a gap tolerance below 0 throws RangeError. Formats: DXF reference ("DXF Group Codes", "ENTITIES Section"); Scalable Vector
 * Graphics 1.1 (W3C 2011).
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
  const what = whatItIs(bytes);
  if (what.kind === 'other') return none(what.why);
  const source = what.kind === 'svg' ? svgSource(bytes, answers.unit) : dxfSource(bytes, answers.unit);
  const { unit, notes } = source;

  const layers = layersOf(source, answers);
  const { pieces, aside, deviation } = piecesOf(source, layers);
  if (pieces.length === 0) return none(nothingDrawn(notes.leftOut, layers, answers));

  const bounds = boundsOf(pieces);
  const diagonal = Math.hypot(bounds.maxX - bounds.minX, bounds.maxY - bounds.minY);
  const rounding = Math.max(diagonal * roundingShare, Number.MIN_VALUE);
  const gapTolerance = answers.gapTolerance ?? rounding;

  const cleaned = cleanPieces(pieces, rounding);
  const join = (loose: readonly Piece[]) => joinEnds(loose, Math.min(rounding, gapTolerance), gapTolerance);
  const sorted = sortPieces(cleaned, rounding, Math.max(rounding, gapTolerance, 2 * curveTolerance), join);
  const joints = join(sorted.loose.pieces);
  const used = copiesUsed(sorted.loose, joints);
  const chains = chainPieces(sorted.loose, joints, used);
  const { whole, flat } = withoutFlat(
    [...sorted.closed.map((place) => chainOfOne(cleaned.kept, place)), ...chains.closed],
    rounding,
    sorted.meetings,
  );
  if (whole.length > drawingLimits.contours) {
    return none(
      `The drawing holds more than ${drawingLimits.contours} closed outlines. Draw the part alone and export again.`,
    );
  }
  const joined = whole.map((chain) => closeJoints(chain.segments, rounding));
  const closed = joined.map(({ segments }, i) => ({ contour: { segments }, layer: whole[i]?.layer ?? '0' }));
  const repaired = [...cleaned.repaired, ...sorted.repaired, ...copiesSaid(sorted.loose, used), ...flat];
  for (const one of joined) for (const repair of one.repaired) repaired.push(repair);
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
  const scale = unitLength[unit];
  const size = { width: (bounds.maxX - bounds.minX) / scale, height: (bounds.maxY - bounds.minY) / scale };
  const doubt = answers.unit ? null : (source.unitDoubt ?? implausible(bounds, unit));
  return {
    kind: 'drawing',
    unit,
    unitAsked: doubt !== null,
    bounds,
    contours,
    openChains: chains.open.map(({ segments, layer }) => ({ segments, layer })),
    leftOut: notes.leftOut,
    aside,
    repaired,
    mended: notes.mended,
    questions: [...unitQuestion(doubt, unit, size), ...gapQuestion(gaps), ...layerQuestion(layers, answers)],
    layers,
    gapTolerance,
    deviation,
    entityCounts: source.counts,
    branches: chains.branches,
    crossings: crossingsOf(sorted.meetings, whole),
    tooDense: sorted.tooDense,
  };
}

function layersOf({ paths, hiddenLayers }: Source, answers: DrawingAnswers): DrawingLayer[] {
  const pieces = new Map<string, number>();
  for (const { layer } of paths) pieces.set(layer, (pieces.get(layer) ?? 0) + 1);
  const chosen = answers.layers ? new Set(answers.layers) : null;
  return [...pieces].map(([name, count]) => {
    const hidden = hiddenLayers.has(name);
    return { name, pieces: count, hidden, taken: chosen ? chosen.has(name) : !hidden };
  });
}

/** Segments kept of what was left out: enough to see what it was. */
const mostAside = 3000;

/** What was drawn as lines and arcs: the pieces of layers that are taken, and what else there is for looking at. */
function piecesOf(source: Source, layers: readonly DrawingLayer[]) {
  const byName = new Map(layers.map((layer) => [layer.name, layer]));
  const pieces: Piece[] = [];
  const aside: Aside[] = [];
  let deviation = 0;
  let count = 0;
  let asideCount = 0;
  for (const { type, layer, shapes } of source.paths) {
    const { taken, hidden } = byName.get(layer) ?? { taken: true, hidden: false };
    const segments: Segment[] = [];
    if (!taken) {
      const what = `${type} on the ${hidden ? 'hidden ' : ''}layer "${layer}"`;
      source.notes.leave(what, null);
      if (asideCount > mostAside) continue;
      for (const shape of shapes) {
        if (shapeReach(shape) <= drawingLimits.reach) shapeInto(shape, lookTolerance, segments);
      }
      asideCount += segments.length;
      for (const run of connectedRuns(segments)) aside.push({ what, segments: run });
      continue;
    }
    for (const shape of shapes) {
      if (!(shapeReach(shape) <= drawingLimits.reach)) throw new DrawingRefusal(tooFar(source.unit));
      deviation = Math.max(deviation, shapeInto(shape, curveTolerance, segments));
    }
    count += segments.length;
    if (count > drawingLimits.segments) throw new DrawingRefusal(tooFine);
    if (segments.length === 1) pieces.push({ segments, layer });
    else for (const run of connectedRuns(segments)) pieces.push({ segments: run, layer });
  }
  return { pieces, aside, deviation };
}

/** For looking at only, m. */
const lookTolerance = 1e-4;

/** A jump within one entity, m, as a spline has whose inner knots part it: what follows is a piece of its own. */
const jump = 1e-6;

function connectedRuns(segments: Segment[]): Segment[][] {
  if (segments.length === 0) return [];
  const runs: Segment[][] = [];
  let from = 0;
  for (let i = 1; i < segments.length; i++) {
    const [before, here] = [segments[i - 1], segments[i]];
    if (!before || !here || pointDistance(segmentEnd(before), segmentStart(here)) <= jump) continue;
    runs.push(segments.slice(from, i));
    from = i;
  }
  runs.push(from === 0 ? segments : segments.slice(from));
  return runs;
}

function boundsOf(pieces: readonly Piece[]): Box {
  let minX = Infinity;
  let minY = Infinity;
  let maxX = -Infinity;
  let maxY = -Infinity;
  const box = new Float64Array(4);
  for (const { segments } of pieces) {
    for (const segment of segments) {
      writeBox(box, 0, segment);
      minX = Math.min(minX, box[0] ?? minX);
      minY = Math.min(minY, box[1] ?? minY);
      maxX = Math.max(maxX, box[2] ?? maxX);
      maxY = Math.max(maxY, box[3] ?? maxY);
    }
  }
  return { minX, minY, maxX, maxY };
}

function chainOfOne(pieces: readonly Piece[], place: number): Chain {
  const { segments, layer } = pieces[place] ?? { segments: [], layer: '0' };
  return { segments, layer, order: place, members: [place] };
}

/** Closed chains in the order of the drawing, without those that go and come back on themselves. */
function withoutFlat(
  closed: readonly Chain[],
  rounding: number,
  meetings: readonly Meeting[],
): { whole: Chain[]; flat: Repair[] } {
  const flat: Repair[] = [];
  const whole = closed.filter(({ segments, members }) => {
    const [first] = segments;
    const length = pathLength(segments);
    if (!first || Math.abs(contourArea({ segments })) > rounding * length) return true;
    // a figure of eight has no area either, but a place where it crosses
    if (meetings.some((meeting) => members.includes(meeting.first) && members.includes(meeting.second))) return true;
    flat.push({ what: 'outline that encloses nothing dropped', at: segmentStart(first), size: length });
    return false;
  });
  return { whole: whole.sort((a, b) => a.order - b.order), flat };
}

/** What is said of pieces drawn more than once. */
function copiesSaid({ unused, least }: Loose, used: Uint8Array): Repair[] {
  const said: Repair[] = [];
  for (const [i, copies] of unused) {
    const more = (used[i] ?? 0) - (least[i] ?? 0);
    const [first] = copies;
    for (const copy of copies.slice(more)) said.push(copy);
    if (more > 0 && first) said.push({ ...first, what: 'edge drawn twice, kept for the outline on either side' });
  }
  return said;
}

/** Crossings returned at most: what is found after that many would add nothing. */
const mostCrossings = 100;

/** Places where pieces of closed contours cross. */
function crossingsOf(meetings: readonly Meeting[], closed: readonly Chain[]): Point[] {
  if (meetings.length === 0) return [];
  const contours = new Set(closed.flatMap(({ members }) => members));
  return meetings
    .filter(({ first, second }) => contours.has(first) && contours.has(second))
    .slice(0, mostCrossings)
    .map(({ at }) => at);
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
  const units: DrawingUnit[] = ['mm', 'inch'];
  // what was taken meanwhile is an answer too
  if (!units.includes(taken)) units.push(taken);
  return [
    {
      kind: 'unit',
      why: `In which unit is this drawing? ${doubt.charAt(0).toUpperCase()}${doubt.slice(1)}.`,
      taken,
      readings: units.map((unit) => ({
        unit,
        width: size.width * unitLength[unit],
        height: size.height * unitLength[unit],
      })),
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

function layerQuestion(layers: readonly DrawingLayer[], answers: DrawingAnswers): DrawingQuestion[] {
  if (answers.layers !== undefined || layers.length < 2) return [];
  const why = `The drawing has ${layers.length} layers with geometry: which of them are the part?`;
  return [{ kind: 'layers', why, layers: layers.map(({ name }) => name) }];
}

function nothingDrawn(leftOut: readonly Noted[], layers: readonly DrawingLayer[], answers: DrawingAnswers): string {
  if (answers.layers !== undefined && layers.length > 0) {
    return `None of the chosen layers holds geometry. Layers with geometry: ${layers.map(({ name }) => name).join(', ')}.`;
  }
  const found = leftOut.map(({ what, count }) => `${count} ${what}`).join(', ');
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
