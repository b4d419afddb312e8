import { diffusivity, erfc, midZoneProperties, pathRise, type HeatedPiece } from '../../strategy/heat/index.ts';
import { addPuffs, heatPuffs } from '../../strategy/heat/heat-puffs.ts';
import { plateField, type PlateField } from '../../strategy/heat/plate/index.ts';
import type { Point } from '../../strategy/path/index.ts';
import {
  lineBetween,
  segmentBox,
  segmentEnd,
  segmentLength,
  segmentPointAt,
  segmentStart,
} from '../../strategy/path/index.ts';
import { sayLine, seededNumbers, timeOf } from './line.ts';
import { warmPlate } from './warm-plate.ts';

// what the closed form knows: no kerfs and, to have one thing less to be equal in, no losses
const asked = warmPlate(200, 1200);
const question = { ...asked, kerfs: [], lossCoefficient: 0, pierces: [] };
const { heat, plate, plateTemperature } = question;
const alpha = diffusivity(midZoneProperties);
const capacity = midZoneProperties.density * midZoneProperties.specificHeat;

function ours(): { field: PlateField; frames: Float32Array[] } {
  const field = plateField(question);
  return { field, frames: Array.from(field.times, (_, i) => field.frame(i)) };
}

const { field, frames } = ours();
const { grid, times } = field;
const { nx, ny, cellX, cellY } = grid;

/** A place and its nearest mirror images in the plate's edges: m. */
const mirrors = ({ x, y }: Point): Point[] =>
  [x, 2 * plate.minX - x, 2 * plate.maxX - x].flatMap((u) =>
    [y, 2 * plate.minY - y, 2 * plate.maxY - y].map((v) => ({ x: u, y: v })),
  );

/** The exact rise, K: every piece integrated along its path, with all of the nearest mirror images. */
const exact = (at: Point, time: number): number =>
  mirrors(at).reduce((sum, image) => sum + pathRise(heat, image, time, midZoneProperties), 0);

/** The pieces with arcs in three chords, which are half a millimetre off at most: for the peer. */
const straight: HeatedPiece[] = heat.flatMap((piece) => {
  const { segment, from, to, powerPerLength } = piece;
  if (segment.kind === 'line') return [piece];
  const lasts = (to - from) / 3;
  return [0, 1, 2].map((k) => ({
    segment: lineBetween(segmentPointAt(segment, k / 3), segmentPointAt(segment, (k + 1) / 3)),
    from: from + k * lasts,
    to: from + (k + 1) * lasts,
    powerPerLength,
  }));
});

/** How far the peer looks, in √(4αt), and up to which age, s, it integrates along the path what older it takes as let go at once. */
type Peer = { readonly reach: number; readonly young: number };

/** One source of the superposition: a piece or its mirror image, and the cells it is worth a look at. */
type Source = { readonly piece: HeatedPiece; readonly flipX: number | null; readonly flipY: number | null };

/**
 * The peer: each cell at each moment is the sum over the pieces of what each leaves there in closed form, a piece that is old as a stretch let go at once,
 * Q′/(ρc·√(4παt))·exp(−y²/4αt)·(erf − erf)/2, a young one integrated along its path. Pieces and mirror images further than `reach` times √(4αt) are left out, so
 * that cells are looked at only near what warms them.
 */
function superposition(moments: readonly number[], { reach, young }: Peer): Float32Array[] {
  return moments.map((time) => {
    const temperatures = new Float32Array(nx * ny).fill(plateTemperature);
    for (const piece of straight) {
      if (piece.from >= time) break;
      const far = reach * Math.sqrt(4 * alpha * (time - piece.from));
      for (const source of sourcesOf(piece, far)) addSource(temperatures, source, time, far, young);
    }
    return temperatures;
  });
}

function sourcesOf(piece: HeatedPiece, far: number): Source[] {
  const box = segmentBox(piece.segment);
  const flips = (low: number, high: number, from: number, to: number): (number | null)[] => [
    null,
    ...(low - from < far ? [2 * from] : []),
    ...(to - high < far ? [2 * to] : []),
  ];
  return flips(box.minX, box.maxX, plate.minX, plate.maxX).flatMap((flipX) =>
    flips(box.minY, box.maxY, plate.minY, plate.maxY).map((flipY) => ({ piece, flipX, flipY })),
  );
}

function addSource(
  target: Float32Array,
  { piece, flipX, flipY }: Source,
  time: number,
  far: number,
  young: number,
): void {
  const { segment, from, to, powerPerLength } = piece;
  const box = segmentBox(segment);
  const [lowX, highX] = flipX === null ? [box.minX, box.maxX] : [flipX - box.maxX, flipX - box.minX];
  const [lowY, highY] = flipY === null ? [box.minY, box.maxY] : [flipY - box.maxY, flipY - box.minY];
  const i0 = Math.max(0, Math.ceil((lowX - far - grid.minX) / cellX - 0.5));
  const i1 = Math.min(nx - 1, Math.floor((highX + far - grid.minX) / cellX - 0.5));
  const j0 = Math.max(0, Math.ceil((lowY - far - grid.minY) / cellY - 0.5));
  const j1 = Math.min(ny - 1, Math.floor((highY + far - grid.minY) / cellY - 0.5));
  const placeAt = (i: number, j: number): Point => {
    const [x, y] = [grid.minX + (i + 0.5) * cellX, grid.minY + (j + 0.5) * cellY];
    return { x: flipX === null ? x : flipX - x, y: flipY === null ? y : flipY - y };
  };
  if (time - to < young) {
    const one = [piece];
    for (let j = j0; j <= j1; j++) {
      for (let i = i0; i <= i1; i++)
        target[j * nx + i] = (target[j * nx + i] ?? 0) + pathRise(one, placeAt(i, j), time, midZoneProperties);
    }
    return;
  }
  const [start, end] = [segmentStart(segment), segmentEnd(segment)];
  const length = segmentLength(segment);
  const [ux, uy] = [(end.x - start.x) / length, (end.y - start.y) / length];
  const spread = 4 * alpha * (time - (from + to) / 2);
  const width = Math.sqrt(spread);
  const most = (powerPerLength * (to - from)) / length / (capacity * Math.sqrt(Math.PI * spread)) / 2;
  for (let j = j0; j <= j1; j++) {
    for (let i = i0; i <= i1; i++) {
      const { x, y } = placeAt(i, j);
      const along = (x - start.x) * ux + (y - start.y) * uy;
      const aside = (y - start.y) * ux - (x - start.x) * uy;
      const share = aside * aside;
      if (share > far * far) continue;
      target[j * nx + i] =
        (target[j * nx + i] ?? 0) +
        most * Math.exp(-share / spread) * (erfcQuick((along - length) / width) - erfcQuick(along / width));
    }
  }
}

/** Error function's complement to 1.5e-7 (Abramowitz and Stegun 7.1.26): near enough for the peer, and faster than to rounding. */
function erfcQuick(x: number): number {
  const t = 1 / (1 + 0.3275911 * Math.abs(x));
  const sum = 0.254829592 + t * (-0.284496736 + t * (1.421413741 + t * (-1.453152027 + t * 1.061405429)));
  const value = t * sum * Math.exp(-x * x);
  return x >= 0 ? value : 2 - value;
}
for (let x = -3; x < 4; x += 0.01)
  if (Math.abs(erfcQuick(x) - erfc(x)) > 2e-7) throw new Error(`the peer's error function is off at ${x}`);

/** Cells and moments at which both are held to the exact rise: warm ones, the same in each run. */
const next = seededNumbers(7);
const samples = Array.from({ length: 60 }, (_, i) => i).flatMap((i) => {
  const found: { i: number; k: number; rise: number }[] = [];
  for (let tries = 0; i > 0 && found.length < 6 && tries < 4000; tries++) {
    const k = Math.floor(next() * nx * ny);
    if ((frames[i]?.[k] ?? 0) - plateTemperature < 1) continue;
    const at = { x: grid.minX + ((k % nx) + 0.5) * cellX, y: grid.minY + (Math.floor(k / nx) + 0.5) * cellY };
    found.push({ i, k, rise: exact(at, times[i] ?? 0) });
  }
  return found;
});

/** Errors as shares: their mean of the mean rise, the greatest of the greatest rise. */
function errorsOf(frame: (i: number) => Float32Array | undefined): { mean: number; most: number } {
  let [sum, most, rises, greatest] = [0, 0, 0, 0];
  for (const { i, k, rise } of samples) {
    const temperatures = frame(i);
    if (!temperatures) continue;
    const error = Math.abs((temperatures[k] ?? 0) - plateTemperature - rise);
    sum += error;
    most = Math.max(most, error);
    rises += rise;
    greatest = Math.max(greatest, rise);
  }
  return { mean: sum / rises, most: most / greatest };
}

const mine = errorsOf((i) => frames[i]);
// the cheapest peer whose mean error on a few moments is no larger than ours
const few = [12, 44];
const peers = [1.6, 2, 2.5, 3].flatMap((reach) => [3, 15].map((young) => ({ reach, young })));
const tried = peers.map((peer) => {
  const begun = performance.now();
  const shown = superposition(
    few.map((i) => times[i] ?? 0),
    peer,
  );
  return { peer, took: performance.now() - begun, error: errorsOf((i) => shown[few.indexOf(i)]).mean };
});
const equal = tried.filter(({ error }) => error <= mine.mean).sort((a, b) => a.took - b.took)[0];
if (!equal) throw new Error(`no superposition comes as near as ${mine.mean}`);

const sum = (shown: readonly Float32Array[]): number =>
  shown.reduce((all, one) => all + one.reduce((s, x) => s + x, 0), 0);
const oursTime = timeOf(() => sum(ours().frames), { warmUp: 3, rounds: 9, calls: 1 });
const peerTime = timeOf(() => sum(superposition([...times], equal.peer)), { warmUp: 0, rounds: 1, calls: 1 });
const kerfsTime = timeOf(
  () => {
    const shielded = plateField(asked);
    return sum(Array.from(shielded.times, (_, i) => shielded.frame(i)));
  },
  { warmUp: 1, rounds: 5, calls: 1 },
);
/** The superposition that a raster allows: bells instead of pieces, each added as a row times a column. */
const bells = (): Float32Array[] =>
  [...times].map((time) => {
    const temperatures = new Float32Array(nx * ny).fill(plateTemperature);
    const raster = { x: grid.minX + cellX / 2, y: grid.minY + cellY / 2, dx: cellX, dy: cellY, columns: nx, rows: ny };
    addPuffs(temperatures, raster, heatPuffs(heat, -1, time, cellX / 4, midZoneProperties), time, midZoneProperties);
    return temperatures;
  });
const bellsTime = timeOf(() => sum(bells()), { warmUp: 1, rounds: 3, calls: 1 });
console.error(
  `plate-background: with kerfs ${kerfsTime.toFixed(0)} ms; peer with reach ${equal.peer.reach} and ${equal.peer.young} s, error ${equal.error.toExponential(1)}; bells row by column without mirrors ${bellsTime.toFixed(0)} ms`,
);
sayLine({
  case: 'plate-background',
  ours: oursTime,
  peer: peerTime,
  unit: 'ms',
  ratio: peerTime / oursTime,
  errorMean: mine.mean,
  errorMax: mine.most,
  exponent: null,
});
