import type { Candidate } from '../../../strategy/corners/case.ts';
import type { ChoiceModel, Judged, Outcome } from '../../../strategy/corners/plate/choose.ts';
import { bestAlone, betterOutcome } from '../../../strategy/corners/plate/choose.ts';
import type { PlateWay } from '../../../strategy/corners/plate/own-ways.ts';
import type { PreparedPlate } from '../../../strategy/corners/plate/prepared.ts';
import { isWay } from '../../../strategy/corners/plate/prepared.ts';
import type { HeatedPiece } from '../../../strategy/heat/index.ts';
import { instantaneousLine, pathRise } from '../../../strategy/heat/index.ts';
import type { Point } from '../../../strategy/path/index.ts';
import { pointDistance, segmentStart } from '../../../strategy/path/index.ts';

/** A way as it turns out on a plate whose heat is summed up piece by piece. */
export type ExactWay = Judged & {
  readonly way: PlateWay;
  readonly wait: number;
  readonly returnsAt: number;
};

/** Every corner decided so far with when the front was there. */
export type ExactState = {
  readonly late: number;
  readonly done: readonly { readonly chosen: ExactWay; readonly arrives: number }[];
};

/** Waits longer than needed that stand for all longer ones, s. */
const longer = [0, 0.5, 1, 2, 4] as const;

/**
 * The cut of a plate, far from its edges and without losses, in which everything cut before is summed up directly in time: no field, no puffs, nothing forgotten. With
 * `sacrifices` corners that need nothing may be treated too.
 */
export function exactModel(
  { legs: { legs }, corners, context, request, properties }: PreparedPlate,
  { sacrifices = false, ahead = 8 } = {},
): ChoiceModel<ExactWay, ExactState> & {
  readonly everything: (k: number, state: ExactState) => ExactWay[];
  readonly exactly: (k: number, state: ExactState, way: PlateWay, wait: number) => ExactWay;
} {
  const at = (pieces: readonly HeatedPiece[], place: Point, time: number) =>
    pieces.length > 0 ? pathRise(pieces, place, time, properties) : 0;
  const background = (k: number, state: ExactState, place: Point, time: number): number => {
    const leg = legs[k];
    if (!leg) throw new Error(`no leg ${k}`);
    const pierces = (which: typeof leg, since: number) =>
      which.pierces.reduce(
        (sum, { at: spot, time: when, heat }) =>
          sum +
          instantaneousLine(heat / request.thickness, pointDistance(spot, place), time - when - since, properties),
        0,
      );
    const first = leg.own[0];
    const own = first
      ? leg.heat.findIndex((piece) => pointDistance(segmentStart(piece.segment), segmentStart(first)) < 1e-12)
      : 0;
    let sum = at(leg.heat.slice(0, own), place, time - state.late) + pierces(leg, state.late);
    state.done.forEach(({ chosen, arrives }, j) => {
      const before = legs[j];
      if (!before) return;
      const late = arrives - before.arrives;
      sum += at(before.heat, place, time - late) + pierces(before, late) + at(chosen.way.heat, place, time - arrives);
    });
    return request.plateTemperature + sum;
  };
  const judged = (k: number, state: ExactState, way: PlateWay, wait: number): ExactWay => {
    const leg = legs[k];
    const corner = leg && corners[leg.corner];
    if (!corner) throw new Error(`no corner ${k}`);
    const time = leg.arrives + state.late + way.delay + wait;
    const returnsAt = background(k, state, way.place, time) + way.rise(wait);
    const over = corner.counts ? Math.max(0, returnsAt - context.limit) : 0;
    return { way, wait, addedTime: way.addedTime + wait, returnsAt, over: over < 1e-9 ? 0 : over };
  };
  const least = (k: number, state: ExactState, way: PlateWay): ExactWay => {
    const longest = way.longestWait;
    if (longest === undefined) return judged(k, state, way, 0);
    if (judged(k, state, way, longest).over > 0) return judged(k, state, way, longest);
    // from the longest down to the last crossing, then halved
    let [low, high] = [-1, longest];
    for (let i = 15; i >= 0 && low < 0; i--) {
      const wait = longest * (i / 16) ** 2;
      if (judged(k, state, way, wait).over > 0) low = wait;
      else high = wait;
    }
    while (low >= 0 && high - low > 1e-3) {
      const middle = (low + high) / 2;
      if (judged(k, state, way, middle).over > 0) low = middle;
      else high = middle;
    }
    return judged(k, state, way, high);
  };
  const waysOf = (k: number) => {
    const corner = corners[legs[k]?.corner ?? -1];
    if (!corner) throw new Error(`no corner ${k}`);
    const fits = (one: PlateWay | Candidate): one is PlateWay => isWay(one);
    return { corner, others: corner.treatable ? corner.tried([]).filter(fits) : [] };
  };
  return {
    corners: legs.length,
    start: { late: 0, done: [] },
    exactly: judged,
    judge(k, state) {
      const { corner, others } = waysOf(k);
      const leave = judged(k, state, corner.leave, 0);
      if (leave.over === 0 || others.length === 0) return [leave];
      return [leave, ...others.map((way) => least(k, state, way))];
    },
    everything(k, state) {
      const { corner, others } = waysOf(k);
      const leave = judged(k, state, corner.leave, 0);
      if (leave.over === 0 && !sacrifices) return [leave];
      const open = [leave, ...others.map((way) => least(k, state, way))];
      const more = open.flatMap(({ way, wait }) =>
        way.longestWait === undefined
          ? []
          : longer.flatMap((by) =>
              by > 0 && wait + by <= (way.longestWait ?? 0) ? [judged(k, state, way, wait + by)] : [],
            ),
      );
      // a corner that needs nothing is not changed to spare its stop
      const all = [...open, ...more].filter((one) => leave.over > 0 || one.addedTime >= 0);
      const under = all.filter((one) => one.over === 0);
      return under.length > 0 ? under : [bestAlone(all)];
    },
    then: (k, { late, done }, chosen) => ({
      late: late + chosen.addedTime,
      done: [...done, { chosen, arrives: (legs[k]?.arrives ?? 0) + late }],
    }),
    dearer(k, { before: state, way: chosen, open }) {
      const more = open.flatMap(({ way, wait, over }) =>
        over > 0 || way.longestWait === undefined
          ? []
          : longer.flatMap((by) =>
              by > 0 && wait + by <= (way.longestWait ?? 0) ? [judged(k, state, way, wait + by)] : [],
            ),
      );
      const under = open.filter((one) => one.over === 0 && one !== chosen && one.addedTime > chosen.addedTime);
      return [...under, ...more].sort((a, b) => a.addedTime - b.addedTime);
    },
    reach: (k) => k + ahead,
  };
}

/** The best of all combinations, one corner after another: all are gone through, but for those that can't become better than the best so far. */
export function bruteForce(
  model: ReturnType<typeof exactModel>,
  mostSpared: number,
): Outcome & { readonly tried: number; readonly ways: readonly ExactWay[] } {
  let best: Outcome & { ways: readonly ExactWay[] } = { over: Infinity, addedTime: Infinity, ways: [] };
  let tried = 0;
  const go = (k: number, state: ExactState, so: Outcome): void => {
    const least = { over: so.over, addedTime: so.addedTime - mostSpared * (model.corners - k) };
    if (!betterOutcome(least, best)) return;
    if (k === model.corners) {
      best = { ...so, ways: state.done.map(({ chosen }) => chosen) };
      return;
    }
    const ways = [...model.everything(k, state)].sort((a, b) => a.addedTime - b.addedTime);
    for (const way of ways) {
      tried++;
      go(k + 1, model.then(k, state, way), {
        over: so.over + (way.over > 0 ? 1 : 0),
        addedTime: so.addedTime + way.addedTime,
      });
    }
  };
  go(0, model.start, { over: 0, addedTime: 0 });
  return { ...best, tried };
}
