import type { HeatPuffs } from '../../heat/heat-puffs.ts';
import { puffsRise } from '../../heat/heat-puffs.ts';
import type { HeatedPiece } from '../../heat/path-heat.ts';
import type { PlateField } from '../../heat/plate/index.ts';
import type { PlateProperties } from '../../heat/properties.ts';
import { diffusionLength } from '../../heat/properties.ts';
import type { Box, Point } from '../../path/point.ts';
import type { ChoiceModel, Judged, Step } from './choose.ts';
import { leastDwell } from '../dwell.ts';
import type { Leg } from './legs.ts';

/** One way to treat a corner with its own heat, which is the same whatever was cut before: heat adds up. */
export type OwnWay = {
  /** s; of a wait what it costs beside the wait. */
  readonly addedTime: number;
  /** Rise, K, at the measuring place when the second edge begins, of the corner's own path and treatment; for a wait after so many s. */
  readonly rise: (wait: number) => number;
  /** The same within some tenths of a kelvin, to look for a wait with. */
  readonly roughRise?: (wait: number) => number;
  /** Where it is measured, m. */
  readonly place: Point;
  /** From when the front is in the corner to when the second edge begins, s, without a wait. */
  readonly delay: number;
  /** Longest wait, s; only waits have one. */
  readonly longestWait?: number;
  /** What the peak afterwards at the depth that burn-back is judged at is over the return temperature, K; null where it isn't judged. */
  readonly toPeak: ((wait: number) => number) | null;
  /** Whether later loops must keep clear of it. */
  readonly isLoop: boolean;
  /** What the treatment leaves in the plate besides the path, with times from when the front is in the corner; and as puffs. */
  readonly heat: readonly HeatedPiece[];
  readonly puffs: HeatPuffs;
};

/** What a model asks about a corner. */
export type OwnCorner<Way extends OwnWay> = {
  /** Left as it is. */
  readonly leave: Way;
  /** Whether more than leaving is open when leaving it is over a limit. */
  readonly treatable: boolean;
  /** Whether it counts when it is over: not so a notch, of whose steel more carries the heat away than of an edge's. */
  readonly counts: boolean;
  /** Whatever else fits, next to the loops placed so far. */
  readonly others: (near: readonly PlacedWay<Way>[]) => readonly Way[];
  /** The one asked for by the programmer, when it fits. */
  readonly asked: ((near: readonly PlacedWay<Way>[]) => Way | null) | null;
  /** Corners whose loops may come near to a loop of this one. */
  readonly near: ReadonlySet<number>;
};

export type PlacedWay<Way> = { readonly corner: number; readonly way: Way };

/** A way as it turns out on the plate. */
export type WayJudged<Way> = Judged & {
  readonly way: Way;
  readonly wait: number; // s
  /** From when the front is in the corner to when the second edge begins, s. */
  readonly delay: number;
  readonly background: number; // K
  readonly returnsAt: number; // K
};

/** Corners decided so far, the last one first. Times in s. */
type Done<Way> = {
  /** Number of the leg that ends in the corner. */
  readonly leg: number;
  readonly judged: WayJudged<Way>;
  readonly arrives: number;
  readonly before: Done<Way> | null;
};

type Loops<Way> = { readonly placed: PlacedWay<Way>; readonly before: Loops<Way> | null };

export type PlateState<Way> = {
  /** What all treatments so far add to the time, s. */
  readonly late: number;
  readonly done: Done<Way> | null;
  readonly loops: Loops<Way> | null;
};

/** The cut that a field was computed for: when the front was in each corner, leg by leg, and what each treatment added, s. */
export type OldHeat = {
  readonly field: Pick<PlateField, 'background' | 'splitBefore'>;
  /** Heat younger than this, s, is taken straight from the path: the field would not be read from its grid alone. */
  readonly settled: number;
  readonly arrives: Float64Array;
  readonly addedTime: Float64Array;
};

export type PlateModelInput<Way extends OwnWay> = {
  readonly legs: readonly Leg[];
  /** By the number that a leg says it ends in. */
  readonly corners: readonly OwnCorner<Way>[];
  /** How hot the tip may be when the cut comes back, and the peak after that at the depth at which burn-back is judged, K. */
  readonly limit: number;
  readonly ignition: number;
  readonly plateTemperature: number; // K
  readonly properties: PlateProperties;
  /** The plate's insulated edges, m. */
  readonly plate: Box;
  /** Null where none is known yet: then only what was cut lately counts. */
  readonly old: OldHeat | null;
  /** Corners ahead that a dearer way is tried with. */
  readonly ahead: number;
  /** What was chosen leg by leg before: kept as long as it keeps every limit. */
  readonly held?: readonly WayJudged<Way>[];
};

/** The choice at the corners of a plate, and how each way would turn out that need not be looked at for it. */
export type PlateModel<Way extends OwnWay> = ChoiceModel<WayJudged<Way>, PlateState<Way>> & {
  /**
   * What else fits a corner that needs nothing, or got what was asked for, on the plate as warm as the one chosen found it; no waits. Seconds later or sooner the plate
   * there differs by little.
   */
  beside(corner: number, state: PlateState<Way>, chosen: WayJudged<Way>): readonly WayJudged<Way>[];
};

/** Without a field heat counts for so long, s. */
const remembered = 40;
/** Heat that is taken from the path is older than `settled` by no more, s: a step of the field. And it comes no further than so many times its spread √(4αt). */
const oneStep = 14;
const puffReach = 2.5;
/** The plate's edge throws heat back over so many times its spread √(4αt). */
const mirrored = 2;
/** Waits longer than needed that are tried because they may cool what follows, s. */
const longerWaits = [0.25, 0.5, 1, 1.5, 2, 3, 4] as const;

/** The choice at the corners of a plate's cut, leg by leg: each finds what those before it left in the plate, and when. */
export function plateModel<Way extends OwnWay>(input: PlateModelInput<Way>): PlateModel<Way> {
  const { legs, corners, limit, ignition, plateTemperature, properties, plate, old } = input;
  const settled = old?.settled ?? remembered;
  const far = mirrored * diffusionLength(properties, settled);
  const reach = (puffReach * diffusionLength(properties, settled + oneStep)) ** 2;

  const ownOf = (k: number): { leg: Leg; own: OwnCorner<Way> } => {
    const leg = legs[k];
    const own = leg && corners[leg.corner];
    if (!own) throw new RangeError(`there is no corner ${k} of ${legs.length}`);
    return { leg, own };
  };

  // the field's clock, as it was when its cut came here
  const then = (j: number) => old?.arrives[j] ?? 0;

  /** Rise, K, that puffs in a box leave at a place and its images behind the edges; those let go before `since` don't count. */
  const rise = (puffs: HeatPuffs, box: Box | null, since: number, images: readonly Point[], time: number): number => {
    if (puffs.length === 0) return 0;
    let sum = 0;
    // puffs beyond four times their width add nothing: √(2·alpha·age), the oldest of them as old as what is remembered
    for (const { x, y } of images) {
      if (box && distanceSquared(box, x, y) > reach) continue;
      sum += puffsRise(since === -Infinity ? puffs : partAfter(puffs, since), x, y, time, properties);
    }
    return sum;
  };

  /** Temperature, K, at a place at a time of all that was cut before a corner's own path. */
  const background = (k: number, state: PlateState<Way>, place: Point, time: number): number => {
    const { leg } = ownOf(k);
    if (!contains(plate, place)) return plateTemperature;
    const images = imagesOf(place, plate, far);
    const since = old
      ? Math.min(
          old.field.splitBefore(then(k) + time - leg.arrives - state.late - settled),
          then(k) - (leg.arrives - leg.ownFrom),
        )
      : -Infinity;
    /** What of a leg's heat is after `since`: all of it, or from when on by the leg's own clock. */
    const from = (j: number, begins: number, arrives: number) =>
      since <= then(j) - (arrives - begins) ? -Infinity : since - (then(j) - arrives);

    let recent = rise(leg.apart, null, from(k, leg.begins, leg.arrives), images, time - state.late);
    /** What is `since` on the clock of this cut. */
    let split = leg.arrives + state.late - (then(k) - since);
    for (let done = state.done; done; done = done.before) {
      const { leg: j, judged, arrives } = done;
      const addedThen = old?.addedTime[j] ?? 0;
      if (old ? then(j) + addedThen <= since : time - arrives - judged.addedTime > remembered) break;
      const treated = since <= then(j) ? -Infinity : since - then(j);
      recent += rise(judged.way.puffs, null, treated, images, time - arrives);
      if (then(j) <= since) {
        split = arrives + Math.min(since - then(j), judged.addedTime);
        break;
      }
      const own = legs[j];
      if (!own) break;
      recent += rise(own.puffs, own.box, from(j, own.begins, own.arrives), images, time - (arrives - own.arrives));
      split = arrives - (then(j) - since);
    }
    if (!old) return plateTemperature + recent;
    return recent + old.field.background(place, since, since === -Infinity ? time : since + time - split);
  };

  const overBy = (way: Way, wait: number, returnsAt: number): number => {
    const over = Math.max(returnsAt - limit, way.toPeak ? returnsAt + way.toPeak(wait) - ignition : 0);
    return over < rounding ? 0 : over;
  };

  const judged = (k: number, state: PlateState<Way>, way: Way, wait: number): WayJudged<Way> => {
    const { leg, own } = ownOf(k);
    const delay = way.delay + wait;
    const around = background(k, state, way.place, leg.arrives + state.late + delay);
    const returnsAt = around + way.rise(wait);
    const over = own.counts ? overBy(way, wait, returnsAt) : 0;
    return { way, wait, delay, addedTime: way.addedTime + wait, background: around, returnsAt, over };
  };

  /** The least wait after which every limit is kept, or the longest. */
  const waited = (k: number, state: PlateState<Way>, way: Way, longest: number): WayJudged<Way> => {
    const arrives = ownOf(k).leg.arrives + state.late;
    const [start, middle, end] = [0, longest / 2, longest].map((wait) =>
      background(k, state, way.place, arrives + way.delay + wait),
    ) as [number, number, number];
    // what is around changes slowly while the beam is off: a parabola through three moments follows it
    const warmth = (wait: number): number => {
      const x = wait / longest;
      return start * (1 - x) * (1 - 2 * x) + 4 * middle * x * (1 - x) + end * x * (2 * x - 1);
    };
    const rise = way.roughRise ?? way.rise;
    const overRough = (wait: number) =>
      Math.max(
        warmth(wait) + rise(wait) - limit,
        way.toPeak ? warmth(wait) + rise(wait) + way.toPeak(wait) - ignition : -Infinity,
      );
    let wait = leastDwell(overRough, 0, longest);
    let found = judged(k, state, way, wait);
    // what is kept of the cooling is off by some tenths of a kelvin: wait on by what they take
    for (let tries = 0; tries < 8 && found.over > 0 && wait < longest; tries++) {
      const slope = (overRough(wait) - overRough(wait + slopeStep)) / slopeStep;
      const more = slope > 0 ? (1.1 * found.over) / slope : 0;
      wait = Math.min(longest, wait + Math.max(leastMore * 2 ** tries, Math.min(more, longest / 8)));
      found = judged(k, state, way, wait);
    }
    return found;
  };

  const asked = (k: number, state: PlateState<Way>, way: Way): WayJudged<Way> =>
    way.longestWait === undefined ? judged(k, state, way, 0) : waited(k, state, way, way.longestWait);

  return {
    corners: legs.length,
    start: { late: 0, done: null, loops: null },
    judge(k, state) {
      const { own } = ownOf(k);
      const near = own.near.size > 0 ? loopsNear(state, own.near) : [];
      const wanted = own.asked?.(near);
      // a wait that isn't needed is none
      if (wanted && (wanted.longestWait === undefined || judged(k, state, own.leave, 0).over > 0))
        return [asked(k, state, wanted)];
      const leave = judged(k, state, own.leave, 0);
      if (leave.over === 0 || !own.treatable) return [leave];
      const held = input.held?.[k];
      if (held) {
        const again = own.others(near).find((way) => way === held.way);
        const kept = again && judged(k, state, again, held.wait);
        if (kept?.over === 0) return [kept];
      }
      return [leave, ...own.others(near).map((way) => asked(k, state, way))];
    },
    beside(k, state, chosen) {
      const { own } = ownOf(k);
      const near = own.near.size > 0 ? loopsNear(state, own.near) : [];
      return own
        .others(near)
        .filter(({ longestWait }) => longestWait === undefined)
        .map((way) => {
          const returnsAt = chosen.background + way.rise(0);
          const over = own.counts ? overBy(way, 0, returnsAt) : 0;
          return { ...chosen, way, wait: 0, delay: way.delay, addedTime: way.addedTime, returnsAt, over };
        });
    },
    then(k, { late, done, loops }, way) {
      const { leg } = ownOf(k);
      const placed = { corner: leg.corner, way: way.way };
      return {
        late: late + way.addedTime,
        done: { leg: k, judged: way, arrives: leg.arrives + late, before: done },
        loops: way.way.isLoop ? { placed, before: loops } : loops,
      };
    },
    dearer(k, { before: state, way: chosen, open }, after) {
      const { leg } = ownOf(k);
      const passed = leg.arrives + state.late;
      const near = after.flatMap((step, i): Near<Way>[] => {
        const later = ownOf(k + 1 + i);
        const { x, y } = step.way.way.place;
        if (Math.hypot(x - chosen.way.place.x, y - chosen.way.place.y) > influence) return [];
        return [{ step, time: later.leg.arrives + step.before.late - passed }];
      });
      if (near.length === 0) return [];
      const inTrouble = near.some(({ step }) => step.way.over > 0);
      /** What a way could save at most at the corners near by, s. */
      const saves = (heat: HeatPuffs, wait: number): number =>
        near.reduce((sum, { step, time }) => {
          const { x, y } = step.way.way.place;
          const less =
            puffsRise(chosen.way.puffs, x, y, time, properties) -
            puffsRise(heat, x, y, time, properties) +
            ((step.way.background - plateTemperature) * wait) / (time + wait);
          return less > 0 ? sum + savedBy(step, less) : sum;
        }, 0);
      const pays = (way: Way, addedTime: number): boolean => {
        const more = addedTime - chosen.addedTime;
        return more > 0 && (inTrouble || saves(way.puffs, more) > more);
      };
      const under = open.filter((way) => way.over === 0 && way !== chosen && pays(way.way, way.addedTime));
      const longer = open.flatMap(({ way, wait, over }) => {
        const longest = way.longestWait;
        if (over > 0 || longest === undefined) return [];
        return longerWaits
          .filter((more) => wait + more <= longest && pays(way, way.addedTime + wait + more))
          .map((more) => judged(k, state, way, wait + more));
      });
      return [...under, ...longer].sort((a, b) => a.addedTime - b.addedTime);
    },
    reach: (k) => k + input.ahead,
  };
}

/** Step over which the cooling's slope is taken, and the least that a wait is made longer by, s. */
const slopeStep = 0.01;
const leastMore = 1e-3;

/** Heat of a treatment is felt no farther away within the corners looked ahead, m. */
const influence = 0.08;

type Near<Way> = {
  readonly step: Step<WayJudged<Way>, PlateState<Way>>;
  /** From one corner to the other, s. */
  readonly time: number;
};

/** Time that a corner could save at most if it were cooler by so much, K: by something quicker that is only just too hot, or by a shorter wait. */
function savedBy<Way extends OwnWay>({ way, open }: Near<Way>['step'], cooler: number): number {
  const quicker = open.filter((one) => one.addedTime < way.addedTime && one.over <= cooler);
  const least = Math.min(way.addedTime, ...quicker.map(({ addedTime }) => addedTime));
  const rise = way.way.roughRise;
  if (!rise || way.wait === 0) return way.addedTime - least;
  const shorter = Math.max(0, way.wait - steadyStep);
  const slope = (rise(shorter) - rise(way.wait)) / (way.wait - shorter);
  const shortened = slope > 0 ? Math.min(way.wait, cooler / slope) : way.wait;
  return Math.max(way.addedTime - least, shortened);
}

/** Step over which the cooling at the end of a wait is taken, s. */
const steadyStep = 0.1;

/** What rounding leaves over a limit, K. */
const rounding = 1e-9;

/** Loops placed so far that may come near to a corner's, in the order of cutting. */
export function loopsNear<Way>(state: PlateState<Way>, near: ReadonlySet<number>): PlacedWay<Way>[] {
  const found: PlacedWay<Way>[] = [];
  for (let loop = state.loops; loop; loop = loop.before) if (near.has(loop.placed.corner)) found.push(loop.placed);
  return found.reverse();
}

/** Puffs let go from a moment on, s. */
function partAfter(puffs: HeatPuffs, since: number): HeatPuffs {
  if (since === -Infinity || puffs.length === 0) return puffs;
  const kept: number[] = [];
  let all = true;
  for (let i = 0; i < puffs.length; i += puffFields) {
    if ((puffs[i + 2] ?? 0) < since) all = false;
    else for (let field = 0; field < puffFields; field++) kept.push(puffs[i + field] ?? 0);
  }
  return all ? puffs : Float64Array.from(kept);
}

/** Numbers of a puff; the third is its time. */
const puffFields = 5;

const contains = ({ minX, minY, maxX, maxY }: Box, { x, y }: Point): boolean =>
  x >= minX && x <= maxX && y >= minY && y <= maxY;

/** Square of the distance from a box to a place, m². */
function distanceSquared({ minX, minY, maxX, maxY }: Box, x: number, y: number): number {
  const dx = Math.max(minX - x, 0, x - maxX);
  const dy = Math.max(minY - y, 0, y - maxY);
  return dx * dx + dy * dy;
}

/** A place and its mirror images behind the plate's edges that are nearer than `far`, m. */
function imagesOf({ x, y }: Point, { minX, minY, maxX, maxY }: Box, far: number): Point[] {
  if (x - minX >= far && maxX - x >= far && y - minY >= far && maxY - y >= far) return [{ x, y }];
  const across = [x, ...(x - minX < far ? [2 * minX - x] : []), ...(maxX - x < far ? [2 * maxX - x] : [])];
  const upwards = [y, ...(y - minY < far ? [2 * minY - y] : []), ...(maxY - y < far ? [2 * maxY - y] : [])];
  return across.flatMap((u) => upwards.map((v) => ({ x: u, y: v })));
}
