import { returnDelay } from '../../heat/corner-peak.ts';
import type { HeatPuffs } from '../../heat/heat-puffs.ts';
import { heatPuffs } from '../../heat/heat-puffs.ts';
import type { HeatedPiece } from '../../heat/path-heat.ts';
import { heatedPath } from '../../heat/path-heat.ts';
import type { PlateProperties } from '../../heat/properties.ts';
import type { ReturnQuestion } from '../../heat/return-temperature.ts';
import { measuringPlace, returnOf } from '../../heat/return-temperature.ts';
import type { Segment } from '../../path/segment.ts';
import { pathLength } from '../../path/segment.ts';
import type { CornerPlanRequest, CornerTreatment, Prospect, Way } from '../case.ts';
import { leftAlone } from '../options.ts';
import type { OwnWay } from './plate-model.ts';
import type { TipKind } from './tip-peaks.ts';

/** A treatment of a corner with its own heat, and what it puts on the plate. */
export type PlateWay = OwnWay & {
  readonly treatment: CornerTreatment;
  /** Id of its corner. */
  readonly of: string;
  /** What its peak follows from, after a wait, s; null for a notch, which nothing threatens. */
  readonly tip: ((wait: number) => TipKind) | null;
  /** What fits; null for leaving and for waiting, of which nothing need fit. */
  readonly fits: Way | null;
};

/** A corner, the path cut before it since the corner before, ending in it, and what was cut right before that. */
export type Approach = {
  readonly found: Prospect;
  readonly before: readonly Segment[];
  /** Its heat is the plate's. */
  readonly earlier: readonly Segment[];
};

export type OwnHeat = Pick<CornerPlanRequest, 'cut' | 'rules'> & {
  readonly properties: PlateProperties;
  /** What the peak at the depth at which burn-back is judged is over the return temperature, K; null where it isn't judged. */
  readonly toPeak: ((tip: TipKind) => number) | null;
};

/** Heat that a question is asked on top of, K: rises add up, so any does. */
const anyPlate = 300;
/** Steps in which the cooling is kept to look for a wait. */
const coolingSteps = 10;
/** Youngest age, s, and shortest length, m, at which a loop's puffs are told from its path. */
const puffAge = 0.3;
const puffLength = 1e-3;
const nothing: HeatPuffs = new Float64Array(0);

/** Leaving a corner as it is. */
export const leaveWay = (at: Approach, heat: OwnHeat): PlateWay =>
  ownWay(at, heat, 'leave', leftAlone(at.found), 0, null);

/** Waiting in a corner with the beam off, up to the longest allowed. */
export function waitWay(at: Approach, heat: OwnHeat): PlateWay {
  const { dwell } = heat.rules;
  const asks = { ...leftAlone(at.found), treatment: { kind: 'dwell', duration: 0 } } as const;
  const way = ownWay(at, heat, 'dwell', asks, dwell.restart, null);
  return { ...way, longestWait: dwell.maxDuration, roughRise: tabled(way.rise, dwell.maxDuration) };
}

/** A treatment that fits. */
export function fittedWay(at: Approach, heat: OwnHeat, fits: Way): PlateWay {
  const way = ownWay(at, heat, fits.treatment, fits.asks, fits.addedTime, fits);
  const { loop } = fits;
  if (!loop) return way;
  const { feed, heatIntoPlate } = heat.cut;
  const pieces = heatedPath(loop.segments, feed, pathLength(loop.segments) / feed, heatIntoPlate * feed);
  const puffs = heatPuffs(pieces, -Infinity, loop.length / feed + puffAge, puffLength, heat.properties);
  return { ...way, isLoop: true, heat: pieces, puffs };
}

/**
 * The heat of the path since the corner before is the way's own; older heat is the plate's. With the path right before that (`earlier`) the closed form adds what the tip there keeps of both,
 * so that together they are the closed form of the whole path: exact where the corner before was left as it is. Where that got a loop or a wait its edge's heat is older than taken here, and
 * what is kept of it told somewhat too high. Edges still older count as in an open plate.
 */
function ownWay(
  { found, before, earlier }: Approach,
  { cut, properties, toPeak }: OwnHeat,
  treatment: CornerTreatment,
  asks: Way['asks'],
  addedTime: number,
  fits: Way | null,
): PlateWay {
  const question: ReturnQuestion = {
    corner: found.onPath,
    before,
    earlier,
    ...asks,
    cut,
    plateTemperature: anyPlate,
    properties,
  };
  const after = (wait: number): ReturnQuestion =>
    asks.treatment.kind === 'dwell' ? { ...question, treatment: { kind: 'dwell', duration: wait } } : question;
  const heat: readonly HeatedPiece[] = [];
  const { angle, convex } = found.corner;
  const kind = treatment === 'leave' || treatment === 'dwell' ? 'plain' : treatment;
  const tip = convex ? (wait: number): TipKind => ({ angle, wait, treatment: kind }) : null;
  return {
    treatment,
    of: found.id,
    tip,
    fits,
    addedTime,
    place: measuringPlace(found.onPath, cut.kerfWidth, asks.treatment.kind === 'loop' ? undefined : asks.round),
    delay: asks.treatment.kind === 'loop' ? returnDelay(question) : 0,
    rise: lastKept((wait) => returnOf(after(wait)) - anyPlate),
    toPeak: toPeak && tip && lastKept((wait) => toPeak(tip(wait))),
    isLoop: false,
    heat,
    puffs: nothing,
  };
}

/** The function with its value for the last argument kept. */
function lastKept(f: (x: number) => number): (x: number) => number {
  let last = Number.NaN;
  let value = Number.NaN;
  return (x) => {
    if (x !== last) [last, value] = [x, f(x)];
    return value;
  };
}

/** The function on 0..longest through kept values at steps that are finer near 0, where it changes fastest. */
function tabled(f: (x: number) => number, longest: number): (x: number) => number {
  let values: number[] | null = null;
  return (x) => {
    values ??= Array.from({ length: coolingSteps + 1 }, (_, i) => f(longest * (i / coolingSteps) ** 2));
    const u = Math.sqrt(x / longest) * coolingSteps;
    const i = Math.min(coolingSteps - 2, Math.max(1, Math.floor(u)));
    const [a, b, c, d] = [values[i - 1] ?? 0, values[i] ?? 0, values[i + 1] ?? 0, values[i + 2] ?? 0];
    const t = u - i;
    // Lagrange through four points
    return (
      (-t * (t - 1) * (t - 2) * a) / 6 +
      ((t + 1) * (t - 1) * (t - 2) * b) / 2 -
      ((t + 1) * t * (t - 2) * c) / 2 +
      ((t + 1) * t * (t - 1) * d) / 6
    );
  };
}
