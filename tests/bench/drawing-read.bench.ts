import SecondReader from 'dxf-parser';
import { drawingRead } from '../../strategy/path/drawing/index.ts';
import { arc, circle, line, makeDxf, type Tag } from '../support/drawings/make-dxf.ts';
import { sayLine, seededNumbers, timeOf } from './line.ts';

const PIECES = 20_000;
/** Of each part: four edges, two bolt holes, a slot of two lines and two arcs. */
const PIECES_A_PART = 10;

const random = seededNumbers(4);
const between = (low: number, high: number) => low + (high - low) * random();

/** Parts beside each other on a sheet, their pieces in the order a program writes them: each part on its own, its edges in any order and sense. */
function sheet(): Tag[][] {
  const entities: Tag[][] = [];
  const parts = PIECES / PIECES_A_PART;
  const columns = Math.ceil(Math.sqrt(parts));
  for (let part = 0; part < parts; part++) {
    const x = (part % columns) * 130;
    const y = Math.floor(part / columns) * 90;
    const width = between(80, 120);
    const height = between(50, 80);
    const corners = [
      [x, y],
      [x + width, y],
      [x + width + between(-5, 5), y + height],
      [x, y + height],
    ] as const;
    const edges = corners.map((from, i) => {
      const to = corners[(i + 1) % 4] ?? from;
      return random() < 0.5 ? line(from, to) : line(to, from);
    });
    const radius = between(3, 6);
    const [left, right, low] = [x + 30, x + 55, y + 10];
    entities.push(
      ...edges.sort(() => random() - 0.5),
      circle([x + 12, y + height / 2], radius),
      circle([x + width - 12, y + height / 2], radius),
      line([left, low], [right, low]),
      arc([right, low + 8], 8, 270, 90),
      line([right, low + 16], [left, low + 16]),
      arc([left, low + 8], 8, 90, 270),
    );
  }
  return entities;
}

const bytes = makeDxf({ version: 'AC1021', units: 4, layers: [{ name: 'CUT' }], entities: sheet() });
const text = new TextDecoder().decode(bytes);

/** All that a reading is for: closed, nested contours in metres; it is no reading when one is missing. */
function ours(): number {
  const reading = drawingRead(bytes);
  if (reading.kind === 'none') throw new Error(reading.why);
  if (reading.contours.length !== (4 * PIECES) / PIECES_A_PART || reading.openChains.length > 0)
    throw new Error('contours are missing');
  return reading.contours.length;
}

/** The peer only parses: its own objects, an entity each, from text that is decoded already. */
function peer(): number {
  const entities = new SecondReader().parseSync(text)?.entities.length;
  if (entities !== PIECES) throw new Error('entities are missing');
  return entities;
}

const rounds = { warmUp: 12, rounds: 15, calls: 1 };
const peerTime = timeOf(peer, rounds);
const oursTime = timeOf(ours, rounds);
sayLine({
  case: 'drawing-read',
  ours: oursTime,
  peer: peerTime,
  unit: 'ms',
  ratio: peerTime / oursTime,
  errorMean: null,
  errorMax: null,
  exponent: null,
});
