import { readFileSync } from 'node:fs';
import path from 'node:path';
import PDFDocument from 'pdfkit';
import type { CutLayer } from '../../strategy/path/drawing/write/index.ts';
import { cutLayers } from '../../strategy/path/drawing/write/index.ts';
import type { CutPath, CutPiece } from '../../strategy/path/cut-path.ts';
import type { Box, Contour, Point } from '../../strategy/path/index.ts';
import { boxUnion, contourBox, emptyBox, segmentBox, svgContourData, svgPathData } from '../../strategy/path/index.ts';
import { numberText } from '../../strategy/units/index.ts';

export type SheetCorner = {
  readonly at: Point; // m
  /** Direction from the corner into the part, unit length: there its number stands. */
  readonly inward: Point;
  /** Inside the part, rad. */
  readonly angle: number;
  /** A row of the table, a text for each of `columns` but the first, which is the corner's number. */
  readonly row: readonly string[];
  /** What the programmer must look at. */
  readonly trouble: string | null;
  readonly caution: string | null;
};

/** What the sheet says, in words already: how it is set is this file's alone. */
export type Sheet = {
  readonly paper: 'A4' | 'LETTER';
  readonly kind: string;
  readonly title: string;
  readonly approved: boolean;
  readonly state: string;
  readonly block: readonly { readonly label: string; readonly value: string }[];
  readonly contours: readonly Contour[];
  readonly path: CutPath;
  readonly legend: Readonly<Record<CutLayer | 'edge' | 'pierce' | 'wait', string>>;
  readonly columns: readonly string[];
  readonly corners: readonly SheetCorner[];
  readonly noCorners: string;
  readonly notes: readonly string[];
  /** At the foot of every page. */
  readonly foot: string;
  readonly at: Date;
};

const fonts = path.join(import.meta.dirname, '../../assets/fonts');
const font = (name: string) => readFileSync(path.join(fonts, name));
const faces = {
  plain: font('Barlow_400Regular.ttf'),
  strong: font('Barlow_600SemiBold.ttf'),
  narrow: font('BarlowCondensed_500Medium.ttf'),
} as const;

/** Points a metre; all else here is in points. */
const points = 72 / 0.0254;
const margin = 36;
const ink = '#1D2326';
const softInk = '#565D5A';
/** Finished edges, under the path. */
const edgeInk = '#8A938F';
const pictureHeight = 330;
const footHeight = 34;
const rowHeight = 14;
/** Above this many corners their numbers would cover the drawing. */
const mostNumbers = 120;

const dashes: Readonly<Record<CutLayer, readonly number[]>> = { contour: [], 'lead-in': [3, 2], loop: [7, 2, 1, 2] };

/** The PDF of a sheet: picture with its title block, cautions, and the table of corners on as many pages as it takes. */
export async function sheetPdf(sheet: Sheet): Promise<Uint8Array> {
  const document = new PDFDocument({
    size: sheet.paper,
    margins: { top: margin, left: margin, right: margin, bottom: 0 },
    bufferPages: true,
    lang: 'en',
    displayTitle: true,
    info: { Title: `${sheet.kind}: ${sheet.title}`, CreationDate: sheet.at, ModDate: sheet.at },
  });
  const chunks: Uint8Array[] = [];
  const ended = new Promise<void>((resolve, reject) => {
    document.on('data', (chunk: Uint8Array) => chunks.push(chunk));
    document.on('end', resolve);
    document.on('error', reject);
  });
  for (const [name, face] of Object.entries(faces)) document.registerFont(name, face);

  let y = drawHead(document, sheet, margin);
  y = drawPicture(document, sheet, y + 8);
  y = drawBlock(document, sheet, y);
  y = drawNotes(document, sheet, y + 10);
  drawTable(document, sheet, y + 12);
  drawFeet(document, sheet);

  document.end();
  await ended;
  return Buffer.concat(chunks);
}

type Document = InstanceType<typeof PDFDocument>;
type Face = keyof typeof faces;

const widthOf = (document: Document) => document.page.width - 2 * margin;
const bottomOf = (document: Document) => document.page.height - margin - footHeight;

type Set = { x: number; y: number; width: number; face?: Face; size: number; colour?: string; right?: boolean };

/** One line of text, cut off where it has no room; `right` is set against the right end. */
function line(
  document: Document,
  text: string,
  { x, y, width, face = 'plain', size, colour = ink, right = false }: Set,
): void {
  document.font(face).fontSize(size).fillColor(colour);
  // no letter is wider than its size: most texts need no measuring
  const measured = right || text.length * size > width;
  const shown = measured ? shortened(document, text, width) : text;
  document.text(shown, right ? x + width - document.widthOfString(shown) : x, y, { lineBreak: false });
}

function shortened(document: Document, text: string, width: number): string {
  if (document.widthOfString(text) <= width) return text;
  let end = text.length;
  while (end > 0 && document.widthOfString(`${text.slice(0, end).trimEnd()}…`) > width) end--;
  return `${text.slice(0, end).trimEnd()}…`;
}

/** Text over as many lines as it takes; gives where it ends. */
function lines(document: Document, text: string, { x, y, width, face = 'plain', size, colour = ink }: Set): number {
  document.font(face).fontSize(size).fillColor(colour).text(text, x, y, { width });
  return document.y;
}

function drawHead(document: Document, sheet: Sheet, top: number): number {
  const width = widthOf(document);
  line(document, sheet.kind, { x: margin, y: top, width: width / 2, face: 'narrow', size: 10, colour: softInk });
  // told by frame and words, not by colour
  document.font('strong').fontSize(11);
  const stateWidth = Math.min(width * 0.38, document.widthOfString(sheet.state) + 20);
  const left = margin + width - stateWidth;
  document
    .lineWidth(sheet.approved ? 0.7 : 2)
    .strokeColor(ink)
    .rect(left, top + 8, stateWidth, 26)
    .stroke();
  const room = left - margin - 12;
  const size =
    [20, 16, 13].find((one) => document.font('strong').fontSize(one).widthOfString(sheet.title) <= room) ?? 11;
  line(document, sheet.title, { x: margin, y: top + 12 + (20 - size) / 2, width: room, face: 'strong', size });
  line(document, sheet.state, { x: left + 8, y: top + 14, width: stateWidth - 10, face: 'strong', size: 11 });
  return top + 40;
}

function drawPicture(document: Document, sheet: Sheet, top: number): number {
  const width = widthOf(document);
  const frame = { x: margin, y: top, width, height: pictureHeight };
  document.lineWidth(0.7).strokeColor(ink).rect(frame.x, frame.y, frame.width, frame.height).stroke();

  const box = drawnBox(sheet);
  const room = { width: frame.width - 40, height: frame.height - 62 };
  const [wide, high] = [box.maxX - box.minX, box.maxY - box.minY];
  const perMetre = Math.min(room.width / wide, room.height / high);
  // in the middle of its room, above the legend
  const left = frame.x + 20 + (room.width - wide * perMetre) / 2;
  const above = frame.y + 16 + (room.height - high * perMetre) / 2;
  const origin = { x: box.minX, y: box.maxY };
  const options = { scale: perMetre, origin, digits: 4 };
  const paperPlace = ({ x, y }: Point) => ({
    x: left + (x - origin.x) * perMetre,
    y: above - (y - origin.y) * perMetre,
  });

  document.save().translate(left, above).lineJoin('round').lineCap('butt');
  document.lineWidth(0.35).strokeColor(edgeInk);
  for (const contour of sheet.contours) document.path(svgContourData(contour, options)).stroke();
  document.strokeColor(ink);
  for (const layer of cutLayers) {
    lineType(document, layer);
    for (const { segments } of piecesOf(sheet.path, layer)) document.path(svgPathData(segments, options)).stroke();
  }
  document.undash().restore();

  document.lineWidth(0.7).strokeColor(ink);
  for (const { pierce } of sheet.path.runs) {
    const at = paperPlace(pierce);
    cross(document, at);
  }
  for (const { at } of waitsOf(sheet.path)) {
    const place = paperPlace(at);
    bars(document, place);
  }
  if (sheet.corners.length <= mostNumbers) drawNumbers(document, sheet, paperPlace);
  drawLegend(document, sheet, frame.y + frame.height - 22, scaleText(perMetre / points));
  return frame.y + frame.height;
}

const scaleText = (factor: number): string =>
  factor >= 1 ? `scale ${numberText(factor, 2)} : 1` : `scale 1 : ${numberText(1 / factor, 2)}`;

function drawnBox({ contours, path }: Sheet): Box {
  const edges = contours.map(contourBox);
  const cut = path.runs.flatMap(({ pieces }) =>
    pieces.flatMap((piece) => (piece.kind === 'dwell' ? [] : piece.segments)),
  );
  return [...edges, ...cut.map(segmentBox)].reduce(boxUnion, emptyBox);
}

const piecesOf = (path: CutPath, layer: CutLayer) =>
  path.runs.flatMap(({ pieces }) => pieces.flatMap((piece) => (piece.kind === layer ? [piece] : [])));
const waitsOf = (path: CutPath) =>
  path.runs.flatMap(({ pieces }) =>
    pieces.flatMap((piece): Extract<CutPiece, { kind: 'dwell' }>[] => (piece.kind === 'dwell' ? [piece] : [])),
  );

function lineType(document: Document, layer: CutLayer): void {
  document.lineWidth(layer === 'contour' ? 0.9 : 0.7);
  // the package takes a list of lengths; its types know a single one too
  if (dashes[layer].length > 0) document.dash([...dashes[layer]] as unknown as number, {});
  else document.undash();
}

function cross(document: Document, { x, y }: Point): void {
  document
    .moveTo(x - 3, y - 3)
    .lineTo(x + 3, y + 3)
    .moveTo(x - 3, y + 3)
    .lineTo(x + 3, y - 3)
    .stroke();
}

function bars(document: Document, { x, y }: Point): void {
  document
    .moveTo(x - 1.5, y - 3.5)
    .lineTo(x - 1.5, y + 3.5)
    .moveTo(x + 1.5, y - 3.5)
    .lineTo(x + 1.5, y + 3.5)
    .stroke();
}

/** Each corner's number on the part, the further in the narrower the tip is. */
function drawNumbers(document: Document, { corners }: Sheet, place: (p: Point) => Point): void {
  document.font('narrow').fontSize(8).fillColor(ink);
  corners.forEach(({ at, inward, angle, trouble }, i) => {
    const { x, y } = place(at);
    const text = `${i + 1}${trouble === null ? '' : '!'}`;
    const off = Math.min(26, 8 / Math.sin(Math.min(angle, Math.PI) / 2));
    // y runs down on paper
    document.text(text, x + inward.x * off - document.widthOfString(text) / 2, y - inward.y * off - 5, {
      lineBreak: false,
    });
  });
}

function drawLegend(document: Document, { legend }: Sheet, y: number, scale: string): void {
  let x = margin + 10;
  const item = (text: string, draw: (x: number) => void) => {
    document.strokeColor(ink);
    draw(x);
    document.undash();
    document
      .font('narrow')
      .fontSize(8.5)
      .fillColor(ink)
      .text(text, x + 26, y + 1, { lineBreak: false });
    x += 26 + document.widthOfString(text) + 14;
  };
  const stroke = (at: number) =>
    document
      .moveTo(at, y + 6)
      .lineTo(at + 22, y + 6)
      .stroke();
  item(legend.edge, (at) => {
    document.lineWidth(0.35).strokeColor(edgeInk);
    stroke(at);
  });
  for (const layer of cutLayers) {
    item(legend[layer], (at) => {
      lineType(document, layer);
      stroke(at);
    });
  }
  document.lineWidth(0.7);
  item(legend.pierce, (at) => cross(document, { x: at + 12, y: y + 6 }));
  item(legend.wait, (at) => bars(document, { x: at + 12, y: y + 6 }));
  const right = margin + widthOf(document) - 10;
  line(document, scale, { x: right - 90, y: y + 1, width: 90, face: 'narrow', size: 8.5, right: true });
}

/** The title block: cells of a label above its value, three in a row, joined to the picture's frame. */
function drawBlock(document: Document, { block }: Sheet, top: number): number {
  const across = 3;
  const width = widthOf(document) / across;
  const height = 27;
  const rows = Math.ceil(block.length / across);
  for (let i = 0; i < rows * across; i++) {
    const x = margin + (i % across) * width;
    const y = top + Math.floor(i / across) * height;
    document.lineWidth(0.7).strokeColor(ink).rect(x, y, width, height).stroke();
    const cell = block[i];
    if (!cell) continue;
    line(document, cell.label, { x: x + 6, y: y + 3, width: width - 10, face: 'narrow', size: 8, colour: softInk });
    line(document, cell.value, { x: x + 6, y: y + 12, width: width - 10, size: 10 });
  }
  return top + rows * height;
}

function drawNotes(document: Document, { notes }: Sheet, top: number): number {
  let y = top;
  for (const note of notes) {
    const x = margin + 10;
    const width = widthOf(document) - 10;
    document.font('plain').fontSize(9.5);
    if (y + document.heightOfString(note, { width }) > bottomOf(document)) y = nextPage(document);
    document
      .lineWidth(0.7)
      .strokeColor(ink)
      .moveTo(margin, y + 6)
      .lineTo(margin + 5, y + 6)
      .stroke();
    y = lines(document, note, { x, y, width, size: 9.5 }) + 2;
  }
  return y;
}

/** Shares of the width: number, place, angle, treatment, radius, two temperatures, time. */
const shares = [0.06, 0.2, 0.09, 0.17, 0.12, 0.13, 0.12, 0.11];

function drawTable(document: Document, sheet: Sheet, top: number): void {
  if (sheet.corners.length === 0) {
    lines(document, sheet.noCorners, { x: margin, y: top, width: widthOf(document), size: 9.5 });
    return;
  }
  const width = widthOf(document);
  const cells = (texts: readonly string[], y: number, face: Face, colour: string) => {
    let x = margin;
    texts.forEach((text, i) => {
      const own = (shares[i] ?? 0) * width;
      line(document, text, { x, y, width: own - 6, face, size: 9, colour });
      x += own;
    });
  };
  const heading = (y: number): number => {
    cells(sheet.columns, y, 'narrow', softInk);
    document
      .lineWidth(0.7)
      .strokeColor(ink)
      .moveTo(margin, y + rowHeight)
      .lineTo(margin + width, y + rowHeight)
      .stroke();
    return y + rowHeight + 3;
  };
  // a heading alone at a page's end helps nobody
  let y = heading(top + 4 * rowHeight > bottomOf(document) ? nextPage(document) : top);
  sheet.corners.forEach((corner, i) => {
    const words = [corner.trouble, corner.caution].flatMap((one) => (one === null ? [] : [one])).join(' ');
    document.font('plain').fontSize(9);
    const indent = (shares[0] ?? 0) * width;
    const more = words === '' ? 0 : document.heightOfString(words, { width: width - indent }) + 2;
    if (y + rowHeight + more > bottomOf(document)) y = heading(nextPage(document));
    cells([`${i + 1}${corner.trouble === null ? '' : ' !'}`, ...corner.row], y, 'plain', ink);
    y += rowHeight;
    if (words !== '')
      y = lines(document, words, { x: margin + indent, y, width: width - indent, size: 9, colour: softInk }) + 2;
  });
}

function nextPage(document: Document): number {
  document.addPage();
  return margin;
}

function drawFeet(document: Document, { foot, title }: Sheet): void {
  const { count } = document.bufferedPageRange();
  for (let i = 0; i < count; i++) {
    document.switchToPage(i);
    const y = document.page.height - margin - footHeight + 10;
    const width = widthOf(document);
    document
      .lineWidth(0.5)
      .strokeColor(ink)
      .moveTo(margin, y)
      .lineTo(margin + width, y)
      .stroke();
    line(document, title, { x: margin, y: y + 4, width: width - 90, face: 'strong', size: 8 });
    line(document, `page ${i + 1} of ${count}`, { x: margin + width - 80, y: y + 4, width: 80, size: 8, right: true });
    document
      .font('plain')
      .fontSize(8)
      .fillColor(softInk)
      .text(foot, margin, y + 14, { width, height: 20, ellipsis: true });
  }
}
