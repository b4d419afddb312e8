import type { CutPiece, CutRun } from '../../cut-path.ts';
import type { Point } from '../../point.ts';
import { pointDistance } from '../../point.ts';
import type { Segment } from '../../segment.ts';
import { segmentEnd, segmentStart } from '../../segment.ts';
import type { CutFile } from './cut-file.ts';
import { cutFileUnits, easeText, pieceEase, segmentWithin } from './cut-file.ts';
import { plainLines, plainText } from './plain-text.ts';

/** A plant's own lines before and after the blocks, as they are: nothing in them is read or changed. */
export type BlockFrame = { readonly header: string; readonly footer: string };

/** Digits after the point: 0.05 µm at most in millimetres, 0.02 µm in inches. */
const digits = { mm: 4, inch: 6 } as const;
/** Pieces of a run join closer than this, m; further apart, the machine would go where the path does not. */
const joinTolerance = 5e-7;
/**
 * An arc that stands off its chord by less than this, m, is written as a line: of one so short or so flat, rounded ends may come to lie in
 * the wrong order on the circle, and then it would be run nearly all the way round.
 */
const flatArc = 3e-7;
/** Widest comment, characters with its brackets: a line that a narrow screen shows whole. */
const commentWidth = 78;

/**
 * The path as blocks after ISO 6983-1: G00 to the pierce, G01, G02 and G03 along the cut with I and J from an arc's start to its centre,
 * G04 for a dwell, and comments, which say feed and power where they are eased; no other word. Absolute positions in `file.unit`, middle of the kerf, y up. The unit and absolute
 * positions are said in a comment and set by the plant's own header: the words for it differ between controls (G70 and G71 in the
 * standard; elsewhere G20 and G21, which yet others take for something else). RangeError where the pieces of a run don't join.
 */
export function blocksText(file: CutFile, frame: BlockFrame): string {
  const { name } = cutFileUnits[file.unit];
  const lines = [
    ...linesOf(frame.header),
    ...[
      file.title,
      ...file.notes,
      `Unit ${name}, absolute positions, X to the right, Y up. I and J lead from an arc's start to its centre. Dwells in seconds (F).`,
      "The plant's own header sets unit, plane and absolute positions. No block below does.",
      'The positions are the middle of the kerf. Add no offset for the kerf.',
    ].flatMap(commentOf),
    ...file.path.runs.flatMap((run, i) => runBlocks(run, `${i + 1} of ${file.path.runs.length}`, file)),
    ...linesOf(frame.footer),
  ];
  return `${lines.join('\n')}\n`;
}

function runBlocks(run: CutRun, number: string, file: CutFile): string[] {
  const write = writer(file.unit);
  let at = run.pierce;
  let eased = false;
  const said = (one: Exclude<CutPiece, { kind: 'dwell' }>): string[] => {
    const [ease, before] = [pieceEase(one), eased];
    eased = ease !== null;
    if (ease) return [one.kind, `ease: ${easeText(ease)} of the cut's until the next comment`];
    return before ? [one.kind, 'ease ends: feed and power of the cut again'] : [one.kind];
  };
  const piece = (one: CutPiece): string[] => {
    if (one.kind === 'dwell') {
      mustJoin(at, one.at, run);
      const seconds = withPoint(one.duration, 3);
      return [...commentOf(`dwell ${seconds} s, beam off: by the plant's own postprocessing`), `G04 F${seconds}`];
    }
    const blocks = one.segments.flatMap((segment) => {
      mustJoin(at, segmentStart(segment), run);
      at = segmentEnd(segment);
      return segmentWithin(segment, Math.PI).flatMap(write.segment);
    });
    return [...said(one).flatMap(commentOf), ...blocks];
  };
  return [
    ...commentOf(`${number}: ${plainText(run.name)}`),
    `G00 ${write.start(run.pierce)}`,
    ...commentOf("pierce: by the plant's own postprocessing"),
    ...run.pieces.flatMap(piece),
    ...commentOf("end of this cut, beam off: by the plant's own postprocessing"),
  ];
}

function mustJoin(a: Point, b: Point, { name }: CutRun): void {
  const gap = pointDistance(a, b);
  if (!(gap <= joinTolerance))
    throw new RangeError(`pieces of ${name} are ${gap} m apart, not within ${joinTolerance} m`);
}

function writer(unit: CutFile['unit']) {
  const { scale } = cutFileUnits[unit];
  const written = (metres: number) => withPoint(metres * scale, digits[unit]);
  const place = (p: Point) => `X${written(p.x)} Y${written(p.y)}`;
  // Where the blocks so far have led, as written: an arc's I and J start from there, so that its centre stays where it is.
  let last = { x: 0, y: 0 };
  const reach = (p: Point): string => {
    last = { x: Number(written(p.x)) / scale, y: Number(written(p.y)) / scale };
    return place(p);
  };
  const segment = (s: Segment): string[] => {
    const end = segmentEnd(s);
    // shorter than what can be written? an arc whose ends are written alike would be a full circle
    if (place(last) === place(end)) return [];
    if (s.kind === 'line' || s.radius * (1 - Math.cos(s.sweep / 2)) < flatArc) return [`G01 ${reach(end)}`];
    const centre = `I${written(s.centre.x - last.x)} J${written(s.centre.y - last.y)}`;
    return [`${s.sweep > 0 ? 'G03' : 'G02'} ${reach(end)} ${centre}`];
  };
  return { start: reach, segment };
}

/** Always with a point: a number without one is read in smallest steps by some controls. */
function withPoint(value: number, decimals: number): string {
  const number = value.toFixed(decimals).replace(/0+$/, '');
  const whole = number.endsWith('.') ? `${number}0` : number;
  return whole === '-0.0' ? '0.0' : whole;
}

/** The text in comments of one line each. Brackets inside would end them early. */
const commentOf = (text: string): string[] =>
  plainLines(text.replaceAll('(', '[').replaceAll(')', ']'), commentWidth - 2).map((line) => `(${line})`);

const linesOf = (text: string): string[] => (text === '' ? [] : text.replace(/\n+$/, '').split('\n'));
