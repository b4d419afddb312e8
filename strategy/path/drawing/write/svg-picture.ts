import type { CutPiece } from '../../cut-path.ts';
import { boxGrow, boxUnion, emptyBox } from '../../point.ts';
import { segmentBox } from '../../segment.ts';
import { svgPathData } from '../../svg.ts';
import type { CutFile, CutLayer } from './cut-file.ts';
import { cutFileUnits, cutLayers, pieceEase, pieceSegments, segmentWithin } from './cut-file.ts';

/** Free paper around the path, m, so that no line is cut in half. */
const margin = 1e-3;
/** Digits after the point of a millimetre: 0.05 µm at most. */
const digits = 4;
/** An SVG arc's centre follows from its ends; near half a turn a rounded end would move it by much more than was rounded. */
const largestSweep = (2 * Math.PI) / 3;

/** Line types, mm: the same ink for all. */
const dashes: Readonly<Record<CutLayer, string>> = { contour: '', 'lead-in': '2 1', loop: '4 1 0.5 1' };

/**
 * Text of an SVG in real size, in millimetres whatever unit the file was asked for in: x as in the drawing, y downwards. Groups with the
 * ids contour, lead-in and loop hold the path (middle of the kerf), a run's pieces in the order of cutting; one that is eased has the shares of the cut's feed and
 * power as data-feed-share and data-power-share. The notes stand in `desc`, not
 * in the picture: what is drawn in it may get cut.
 */
export function svgText({ path, title, notes }: Omit<CutFile, 'unit'>): string {
  const { scale } = cutFileUnits.mm;
  const pieces = path.runs.flatMap((run) => run.pieces);
  const drawn = pieces.flatMap(pieceSegments).map(segmentBox).reduce(boxUnion, emptyBox);
  const box = boxGrow(pieces.length === 0 ? { minX: 0, minY: 0, maxX: 0, maxY: 0 } : drawn, margin);
  const length = (metres: number) => String(Number((metres * scale).toFixed(digits)) + 0);
  const [width, height] = [length(box.maxX - box.minX), length(box.maxY - box.minY)];

  const groupOf = (layer: CutLayer): string => {
    const dash = dashes[layer] === '' ? '' : ` stroke-dasharray="${dashes[layer]}"`;
    const paths = pieces
      .filter(({ kind }) => kind === layer)
      .map((piece) => {
        const segments = pieceSegments(piece).flatMap((one) => segmentWithin(one, largestSweep));
        const data = svgPathData(segments, { scale, digits });
        return data === '' ? '' : `    <path d="${data}"${easeData(piece)}/>\n`;
      });
    return `  <g id="${layer}" fill="none" stroke="#000000" stroke-width="0.1"${dash}>\n${paths.join('')}  </g>\n`;
  };

  return [
    '<?xml version="1.0" encoding="UTF-8"?>\n',
    `<svg xmlns="http://www.w3.org/2000/svg" width="${width}mm" height="${height}mm" `,
    `viewBox="${length(box.minX)} ${length(-box.maxY)} ${width} ${height}">\n`,
    `  <title>${escaped(title)}</title>\n`,
    `  <desc>\n${notes.map((note) => `    ${escaped(note)}\n`).join('')}  </desc>\n`,
    ...cutLayers.map(groupOf),
    '</svg>\n',
  ].join('');
}

const entities: Readonly<Record<string, string>> = { '&': '&amp;', '<': '&lt;', '>': '&gt;', '"': '&quot;' };

/** Text for XML 1.0, which has no control characters at all. */
const escaped = (text: string): string =>
  text
    .replace(
      /[\x00-\x08\x0b\x0c\x0e-\x1f\ufffe\uffff]|[\ud800-\udbff](?![\udc00-\udfff])|(?<![\ud800-\udbff])[\udc00-\udfff]/g,
      ' ',
    )
    .replace(/[&<>"]/g, (letter) => entities[letter] ?? letter);

function easeData(piece: CutPiece): string {
  const ease = pieceEase(piece);
  const share = (value: number) => String(Number(value.toFixed(4)));
  return ease ? ` data-feed-share="${share(ease.feedShare)}" data-power-share="${share(ease.powerShare)}"` : '';
}
