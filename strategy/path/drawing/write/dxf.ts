import Drawing from 'dxf-writer';
import type { Point } from '../../point.ts';
import type { Arc, Segment } from '../../segment.ts';
import { segmentEnd, segmentStart } from '../../segment.ts';
import type { CutFile, EasedStretch } from './cut-file.ts';
import { cutFileUnits, cutLayers, easedStretches, easeText, pieceSegments, segmentWithin } from './cut-file.ts';
import { plainLines } from './plain-text.ts';

/** The drawing index of every layer: black or white, whichever the ground is not. Layers tell the pieces apart, colours don't. */
const oneColour = 7;
/** Digits after the point: 0.02 µm at most in either unit. Of an angle: 0.01 µm on the flattest arc that a drawing's bulges make, of some 100 km. */
const digits = { mm: 6, inch: 6, degree: 12 } as const;
const toDegrees = 180 / Math.PI;

/**
 * Text of a DXF (ASCII, AC1021) with the path as lines and arcs on the layers contour, lead-in and loop, in `file.unit` ($INSUNITS). The
 * notes are its first lines, as comments (group 999), followed by the stretches that are eased, which layers can't tell. Middle of the kerf. Dwells are no geometry and are left out; pieces stand layer by
 * layer, each layer's in the order of cutting.
 */
export function dxfText(file: CutFile): string {
  const { scale } = cutFileUnits[file.unit];
  const written = (metres: number) => rounded(metres * scale, digits[file.unit]);
  const drawing = new Drawing().setUnits(file.unit === 'mm' ? 'Millimeters' : 'Inches');
  for (const layer of cutLayers) drawing.addLayer(layer, oneColour, 'CONTINUOUS');
  for (const piece of file.path.runs.flatMap(({ pieces }) => pieces)) {
    if (piece.kind === 'dwell') continue;
    drawing.setActiveLayer(piece.kind);
    for (const segment of pieceSegments(piece).flatMap((one) => segmentWithin(one, Math.PI))) draw(segment);
  }
  const eased = easedStretches(file.path).map((stretch) => easeSentence(stretch, scale));
  return `${[file.title, ...file.notes, ...eased].flatMap(commentOf).join('')}${drawing.toDxfString()}\n`;

  function draw(segment: Segment): void {
    if (segment.kind === 'line') {
      const [x1, y1, x2, y2] = [segment.start.x, segment.start.y, segment.end.x, segment.end.y].map(written);
      // shorter than what can be written?
      if (x1 === x2 && y1 === y2) return;
      drawing.drawLine(x1 ?? 0, y1 ?? 0, x2 ?? 0, y2 ?? 0);
      return;
    }
    const [from, to] = degreesOf(segment);
    const radius = written(segment.radius);
    // an arc whose ends are written alike would be read as a full circle
    if (from === to || radius === 0) return;
    drawing.drawArc(written(segment.centre.x), written(segment.centre.y), radius, from, to);
  }
}

/** Where the arc starts and ends when it is run counter-clockwise, degrees in [0, 360): a DXF knows no other sense. */
function degreesOf({ startAngle, sweep }: Arc): readonly [number, number] {
  const degree = (angle: number) => {
    const turned = rounded((((angle * toDegrees) % 360) + 360) % 360, digits.degree);
    return turned === 360 ? 0 : turned;
  };
  return sweep > 0
    ? [degree(startAngle), degree(startAngle + sweep)]
    : [degree(startAngle + sweep), degree(startAngle)];
}

/** Adding 0 takes the sign off a zero. */
const rounded = (value: number, decimals: number): number => Number(value.toFixed(decimals)) + 0;

/** Lines stay well below the 255 characters that old readers take. */
const commentOf = (note: string): string[] => plainLines(note, 100).map((line) => `999\n${line}\n`);

/** Where a stretch is eased, step by step: each from where the one before ends. */
function easeSentence({ run, pieces }: EasedStretch, scale: number): string {
  const place = ({ x, y }: Point) => `${rounded(x * scale, 4)}, ${rounded(y * scale, 4)}`;
  const first = pieces[0]?.segments[0];
  const steps = pieces.flatMap(({ segments, ease }) => {
    const last = segments.at(-1);
    return last ? [`${easeText(ease)} to ${place(segmentEnd(last))}`] : [];
  });
  const from = first ? ` from ${place(segmentStart(first))}` : '';
  return `Ease of ${run.name}${from}, shares of the cut's own: ${steps.join('; ')}.`;
}
