import { diffusivity, midZoneProperties, type PlateProperties } from '../../strategy/heat/index.ts';
import { leftOutStretch, measuringDepth, measuringPlace } from '../../strategy/heat/index.ts';
import { cornerInward } from '../../strategy/path/corner.ts';
import type { Point } from '../../strategy/path/point.ts';
import { pointAdd, pointScale } from '../../strategy/path/point.ts';
import { roundTangent } from '../../strategy/path/round.ts';
import type { CornerCase } from './corners.ts';
import { loopOf } from './corners.ts';
import { Kerf } from './kerf.ts';
import { type Mesh, meshOf, type Sizes, sizeOnWay, twiceArea } from './mesh.ts';
import { type Heat, Plate } from './plate.ts';
import { constantHeat, standardHeat, type SteelHeat } from './steel-heat.ts';
import { cornerOf, type Way, wayOf } from './way.ts';

/** Changes with anything that moves a result; the committed results carry it. */
export const solverVersion = 1;

/** Depths inside the finished tip along the bisector at which the second edge's heat is followed, m. */
export const peakDepths = [0.5e-3, 1e-3, 1.5e-3, 2e-3, 3e-3, 5e-3] as const;

export type SolveOptions = {
  /** Wished edge of a triangle near the corner, m; all other sizes and the steps of time go with it. */
  readonly finest?: number;
  /** Constant properties, or the standard's that change with temperature. */
  readonly properties?: PlateProperties | 'standard';
  /** Follow the second edge too, for the peaks. */
  readonly history?: boolean;
  /** Length of second edge that is cut, m. */
  readonly secondEdge?: number;
  /** The kerf stays metal: for the comparison with exact line sources in a whole plate. */
  readonly uncut?: boolean;
  /** Ends this length of way before the second edge begins, m, with all heat until then in both rises. */
  readonly stopBefore?: number;
  /** Another place than the measuring place, m. */
  readonly place?: Point;
  /** Factor on the run-in and on the distance of the plate's rim, to show that neither shows. */
  readonly far?: number;
};

/** Rises over the plate temperature, K; times in s. */
export type CornerResult = {
  /** At the measuring place when cutting along the second edge begins, the last 2 mm left out. */
  readonly returnRise: number;
  /** The same with the last 2 mm counted. */
  readonly wholeRise: number;
  /** With the beam off at the corner: the rise (last 2 mm left out) by the time waited. */
  readonly cooling: readonly { readonly wait: number; readonly rise: number }[];
  /** While the second edge is cut, everything counted: greatest rise by depth inside the finished tip, m, and when. */
  readonly peaks: readonly {
    readonly depth: number;
    readonly before: number;
    readonly rise: number;
    readonly time: number;
  }[];
  /** Heat found in the plate at the end ÷ heat released. */
  readonly balance: number;
  readonly nodes: number;
  readonly steps: number;
};

const usualFinest = 0.2e-3;

/** The sizes of a mesh for a corner: finest from the path's corner to well inside the measuring place. */
function sizesFor(place: Point, finest: number): Sizes {
  const ratio = finest / usualFinest;
  return {
    finest,
    growth: 0.14 * ratio,
    coarsest: 8e-3 * ratio,
    centre: pointScale(place, 0.6),
    zone: 0.6 * Math.hypot(place.x, place.y) + 1e-3,
  };
}

/** Everything that one case's walk through the plate needs. */
type Set = {
  readonly one: CornerCase;
  readonly way: Way;
  readonly mesh: Mesh;
  readonly sizes: Sizes;
  readonly steel: SteelHeat;
  readonly place: Point;
  readonly inward: Point;
  readonly tip: number;
};

function setUp(one: CornerCase, options: SolveOptions): Set {
  const { finest = usualFinest, properties = midZoneProperties, far = 1 } = options;
  const corner = cornerOf(one.angle);
  const place = measuringPlace(corner, one.kerfWidth, one.round);
  const inward = cornerInward(corner);
  const tip = Math.hypot(place.x, place.y) - measuringDepth;
  const loop = one.treatment.kind === 'loop' ? loopOf(one.treatment, corner) : null;
  const wait = one.treatment.kind === 'dwell' ? one.treatment.duration : 0;
  const tangent = one.round === undefined ? 0 : roundTangent(one.round, one.angle);
  const after = tangent + (options.secondEdge ?? (options.history ? 30e-3 : 6e-3));
  // heat older than the run-in has spread so thin that its share at the corner is below 1e-4 (an exponent of 10)
  const spread = 40 * (properties === 'standard' ? 1.2e-5 : diffusivity(properties));
  const timeAfter = wait + (loop?.length ?? 0) / one.feed;
  const b = spread / one.feed;
  const run = tangent + far * Math.max(25e-3, b / 2 + Math.sqrt((b * b) / 4 + spread * timeAfter));
  const way = wayOf(one, run, after);
  const sizes = sizesFor(place, finest);
  const reach = Math.max(run, after, loop?.reach ?? 0);
  const radius = reach + far * Math.max(12e-3, 0.8 * Math.sqrt(spread * (timeAfter + 1)));
  const exact = peakDepths.map((depth) => pointScale(inward, tip + depth));
  const mesh = meshOf(way, one.kerfWidth, sizes, radius, exact);
  const steel = properties === 'standard' ? standardHeat(one.plateTemperature) : constantHeat(properties);
  return { one, way, mesh, sizes, steel, place, inward, tip };
}

/** Reads the rise at a place, from the node there or straight between the three about it. */
function probe({ mesh }: Set, plate: Plate, at: Point): (heat: Heat) => number {
  const { x, y, triangles } = mesh;
  const far = (i: number) => Math.hypot((x[i] ?? 0) - at.x, (y[i] ?? 0) - at.y);
  for (let i = 0; i < x.length; i++) if (far(i) < 1e-12) return (heat) => plate.rise(heat, i);
  for (let t = 0; t < triangles.length; t += 3) {
    const [a, b, c] = [triangles[t] ?? 0, triangles[t + 1] ?? 0, triangles[t + 2] ?? 0];
    const [ax, ay, bx, by, cx, cy] = [x[a] ?? 0, y[a] ?? 0, x[b] ?? 0, y[b] ?? 0, x[c] ?? 0, y[c] ?? 0];
    const whole = twiceArea(x, y, a, b, c);
    const wa = ((bx - at.x) * (cy - at.y) - (cx - at.x) * (by - at.y)) / whole;
    const wb = ((cx - at.x) * (ay - at.y) - (ax - at.x) * (cy - at.y)) / whole;
    const wc = 1 - wa - wb;
    if (wa < -1e-9 || wb < -1e-9 || wc < -1e-9) continue;
    return (heat) => wa * plate.rise(heat, a) + wb * plate.rise(heat, b) + wc * plate.rise(heat, c);
  }
  throw new RangeError(`no triangle about (${at.x}, ${at.y}) m`);
}

/** Feed, m/s, and power, W per metre of thickness, at a station. */
function conditionsAt({ one, way }: Set, station: number): { feed: number; power: number } {
  const power = one.heatIntoPlate * one.feed;
  if (one.treatment.kind !== 'ease') return { feed: one.feed, power };
  const { length, feedShare, powerShare } = one.treatment;
  const first = way.pieces[0];
  const before = (first?.length ?? 0) - station;
  const behind = station - way.arrival;
  const away = before > 0 ? before : behind > 0 ? behind : 0;
  const eased = Math.max(0, 1 - away / length);
  return { feed: one.feed * (1 - eased * (1 - feedShare)), power: power * (1 - eased * (1 - powerShare)) };
}

/**
 * Runs one corner through the reference solver: two-dimensional transient conduction in a large plate whose kerf opens as the beam goes on its way.
 *
 * The model: at each moment the kerf is all that lies within half its width of the way travelled; it is void and its walls are insulated. Heat into
 * the plate × feed is released in the walls abreast of the beam's axis, half in each; a wall that an earlier kerf has taken gets nothing. What the metal of the
 * kerf held is put back into the walls abreast. No surface losses.
 */
export function solveCorner(one: CornerCase, options: SolveOptions = {}): CornerResult {
  const set = setUp(one, options);
  const { way, mesh, sizes, steel } = set;
  const plate = new Plate(mesh, steel);
  const kerf = new Kerf(plate, mesh, way, one.kerfWidth);
  const atPlace = probe(set, plate, options.place ?? set.place);
  const depths = peakDepths.map((depth) => ({
    depth,
    read: probe(set, plate, pointScale(set.inward, set.tip + depth)),
  }));
  const counted: Heat = plate.empty();
  const out = way.arrival - (options.stopBefore ?? leftOutStretch);
  const pace = 0.8;
  let steps = 0;
  let releasedCounted = 0;
  /** Cuts from one station to another: the beam's heat into `lit`, the others only see the kerf open. */
  const cut = (
    from: number,
    to: number,
    heats: readonly Heat[],
    lit: readonly Heat[],
    each?: (time: number) => void,
  ) => {
    let station = from;
    let time = 0;
    while (station < to - 1e-12) {
      const rest = to - station;
      const wished = pace * sizeOnWay(sizes, way, station);
      const count = Math.max(1, Math.ceil(rest / wished - 0.01));
      const next = count === 1 ? to : station + rest / count;
      const dt = travelTime(set, station, next);
      if (!options.uncut) kerf.openUpTo((station + next) / 2, heats);
      const { released, sum } = kerf.release(station, next, (s) => {
        const { feed, power } = conditionsAt(set, s);
        return power / feed;
      });
      const none = new Float64Array(plate.count);
      for (const heat of heats) plate.step(heat, dt, lit.includes(heat) ? released : none);
      if (lit.includes(counted)) releasedCounted += sum;
      if (whole && lit.includes(whole)) releasedWhole += sum;
      station = next;
      time += dt;
      steps++;
      each?.(time);
    }
    if (!options.uncut) kerf.openUpTo(to, heats);
  };
  let whole: Heat | null = null;
  let releasedWhole = 0;
  cut(0, out, [counted], [counted]);
  if (options.stopBefore !== undefined) {
    const rise = atPlace(counted);
    const balance = counted.content.reduce((sum, e) => sum + e, 0) / releasedCounted;
    return { returnRise: rise, wholeRise: rise, cooling: [], peaks: [], balance, nodes: plate.count, steps };
  }
  whole = { content: counted.content.slice(), theta: counted.theta.slice() };
  releasedWhole = releasedCounted;
  cut(out, way.arrival, [counted, whole], [whole]);
  const cooling = [{ wait: 0, rise: atPlace(counted) }];
  if (one.treatment.kind === 'dwell') {
    const { duration } = one.treatment;
    let waited = 0;
    let dt = (0.5 * sizes.finest) / one.feed;
    const longest = (duration * sizes.finest) / usualFinest / 25;
    const none = new Float64Array(plate.count);
    while (waited < duration - 1e-12) {
      const rest = duration - waited;
      const count = Math.max(1, Math.ceil(rest / Math.min(dt, longest) - 0.01));
      const step = rest / count;
      for (const heat of [counted, whole]) plate.step(heat, step, none);
      waited = count === 1 ? duration : waited + step;
      dt *= 1.25;
      steps++;
      cooling.push({ wait: waited, rise: atPlace(counted) });
    }
  }
  const returnRise = atPlace(counted);
  const wholeRise = atPlace(whole);
  const total = whole;
  const peaks = depths.map(({ depth, read }) => ({ depth, before: read(counted), rise: read(total), time: 0 }));
  if (options.history) {
    cut(way.arrival, way.end, [total], [total], (time) => {
      depths.forEach(({ read }, i) => {
        const now = read(total);
        const peak = peaks[i];
        if (peak && now > peak.rise) {
          peak.rise = now;
          peak.time = time;
        }
      });
    });
  }
  const stored = total.content.reduce((sum, e) => sum + e, 0);
  return { returnRise, wholeRise, cooling, peaks, balance: stored / releasedWhole, nodes: plate.count, steps };
}

/** Time between two stations, s, by Simpson's rule on 1/feed. */
function travelTime(set: Set, from: number, to: number): number {
  const slow = (s: number) => 1 / conditionsAt(set, s).feed;
  return ((to - from) * (slow(from) + 4 * slow((from + to) / 2) + slow(to))) / 6;
}

/** Place inside the finished tip, m: also for tests. */
export const insideTip = (one: CornerCase, depth: number): Point => {
  const corner = cornerOf(one.angle);
  const place = measuringPlace(corner, one.kerfWidth, one.round);
  return pointAdd(place, pointScale(cornerInward(corner), depth - measuringDepth));
};
