import type { Box, Point } from '../../path/point.ts';
import { boxUnion, emptyBox } from '../../path/point.ts';
import { segmentBox, segmentPart } from '../../path/segment.ts';
import type { HeatPuffs } from '../heat-puffs.ts';
import { heatPuffs } from '../heat-puffs.ts';
import { instantaneousLine } from '../line-source.ts';
import type { HeatedPiece } from '../path-heat.ts';
import { pathRise } from '../path-heat.ts';
import type { PlateProperties } from '../properties.ts';
import { diffusivity } from '../properties.ts';
import type { PierceHeat } from './heat-drops.ts';
import { dropsBetween } from './heat-drops.ts';

/** Heat that is too young for the grid, in its closed form: no kerf hinders it, the plate's straight edges throw it back. */
export type YoungHeat = {
  /** Rise, K, at a place at `time` s of what was let go after one moment and before another. */
  rise(point: Point, after: number, before: number, time: number): number;
  /** What was let go after a moment, as it lies at `time` s, with its mirror images. */
  puffs(after: number, time: number, grain: number): HeatPuffs;
  /** Of what was let go after a moment, how much is left at `time` s, J per metre of thickness. */
  heat(after: number, time: number): number;
};

export type YoungHeatOf = {
  readonly plate: Box;
  readonly thickness: number; // m
  readonly properties: PlateProperties;
  readonly coolingTime: number; // s
  /** In order of time. */
  readonly pieces: readonly HeatedPiece[];
  readonly pierces: readonly PierceHeat[];
};

/** Heat younger than this is left out, s: in the source itself a closed form is not finite. */
const shortest = 1e-4;
/** Heat from further than so many times √(4αt) adds less than 1e-8 of what it could. */
const spreads = 4.3;

/** Pieces and pierces of a stretch of time, kept from one call to the next: a plate is mostly asked place by place for one moment. */
type Stretch = { after: number; until: number; parts: Part[]; pierces: PierceHeat[]; box: Box };
type Part = { readonly piece: readonly [HeatedPiece]; readonly box: Box; readonly middle: number };

/** The young heat of a plate's cut. */
export function youngHeat({ plate, thickness, properties, coolingTime, pieces, pierces }: YoungHeatOf): YoungHeat {
  const alpha = diffusivity(properties);
  let known: Stretch = { after: NaN, until: NaN, parts: [], pierces: [], box: emptyBox };

  const stretch = (after: number, until: number): Stretch => {
    if (known.after === after && known.until === until) return known;
    const parts: Part[] = [];
    let box = emptyBox;
    for (let n = firstAfter(pieces, after); n < pieces.length; n++) {
      const piece = pieces[n];
      if (!piece || piece.from >= until) break;
      if (piece.powerPerLength === 0 || piece.to === piece.from) continue;
      const part = between(piece, after, until);
      const own = segmentBox(part.segment);
      box = boxUnion(box, own);
      parts.push({ piece: [part], box: own, middle: (part.from + part.to) / 2 });
    }
    const spots = pierces.filter(({ time }) => time >= after && time < until);
    for (const { at } of spots) box = boxUnion(box, { minX: at.x, maxX: at.x, minY: at.y, maxY: at.y });
    known = { after, until, parts, pierces: spots, box };
    return known;
  };

  const riseAt = ({ parts, pierces: spots }: Stretch, at: Point, time: number, far: number): number => {
    let sum = 0;
    for (const { piece, box, middle } of parts) {
      if (!within(box, at, far)) continue;
      sum += pathRise(piece, at, time, properties) * Math.exp((middle - time) / coolingTime);
    }
    for (const spot of spots) {
      const age = time - spot.time;
      const distance = Math.hypot(spot.at.x - at.x, spot.at.y - at.y);
      sum += instantaneousLine(spot.heat / thickness, distance, age, properties) * Math.exp(-age / coolingTime);
    }
    return sum;
  };

  return {
    rise(point, after, before, time) {
      const until = Math.min(before, time - shortest);
      if (!(until > after)) return 0;
      const young = stretch(after, until);
      const oldest = Math.min(young.parts[0]?.piece[0].from ?? Infinity, young.pierces[0]?.time ?? Infinity);
      const far = spreads * Math.sqrt(4 * alpha * Math.max(0, time - oldest));
      if (!(oldest < Infinity) || !within(young.box, point, far)) return 0;
      let sum = 0;
      for (const x of mirrored(point.x, plate.minX, plate.maxX, far))
        for (const y of mirrored(point.y, plate.minY, plate.maxY, far)) sum += riseAt(young, { x, y }, time, far);
      return sum;
    },
    puffs(after, time, grain) {
      const young = stretch(after, time);
      const parts = young.parts.map(({ piece }) => piece[0]);
      const plain = [...heatPuffs(parts, after, time, grain, properties)];
      for (const { at, time: when, heat } of young.pierces) plain.push(at.x, at.y, when, heat / thickness, 0);
      const all: number[] = [];
      for (let k = 0; k + 4 < plain.length; k += 5) {
        const [x = 0, y = 0, when = 0, heat = 0, spread = 0] = plain.slice(k, k + 5);
        const far = spreads * Math.sqrt(4 * alpha * (time - when) + 2 * spread);
        const left = heat * Math.exp((when - time) / coolingTime);
        for (const u of mirrored(x, plate.minX, plate.maxX, far))
          for (const v of mirrored(y, plate.minY, plate.maxY, far)) all.push(u, v, when, left, spread);
      }
      return Float64Array.from(all);
    },
    heat(after, time) {
      let sum = 0;
      dropsBetween(pieces, firstAfter(pieces, after), after, time, Infinity, coolingTime / 100, (drop) => {
        sum += drop.heat * Math.exp((drop.time - time) / coolingTime);
      });
      for (const { time: when, heat } of pierces)
        if (when >= after && when < time) sum += (heat / thickness) * Math.exp((when - time) / coolingTime);
      return sum;
    },
  };
}

const within = ({ minX, minY, maxX, maxY }: Box, { x, y }: Point, far: number): boolean =>
  x >= minX - far && x <= maxX + far && y >= minY - far && y <= maxY + far;

/** A coordinate and, where what comes as far as `far` may be thrown back at an end, its mirror images. */
function mirrored(at: number, low: number, high: number, far: number): number[] {
  if (at - low >= far && high - at >= far) return [at];
  return [at, ...(at - low < far ? [2 * low - at] : []), ...(high - at < far ? [2 * high - at] : [])];
}

/** Number of the first piece that ends after a moment, s. */
function firstAfter(pieces: readonly HeatedPiece[], time: number): number {
  let [low, high] = [0, pieces.length];
  while (low < high) {
    const middle = (low + high) >>> 1;
    if ((pieces[middle]?.to ?? Infinity) > time) high = middle;
    else low = middle + 1;
  }
  return low;
}

/** A piece as far as the source is on it between two moments, s. */
function between(piece: HeatedPiece, after: number, until: number): HeatedPiece {
  const { segment, from, to } = piece;
  if (from >= after && to <= until) return piece;
  const [start, end] = [Math.max(from, after), Math.min(to, until)];
  const part = segmentPart(segment, (start - from) / (to - from), (end - from) / (to - from));
  return { ...piece, segment: part, from: start, to: end };
}
