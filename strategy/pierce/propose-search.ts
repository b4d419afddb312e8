import { MISSES, planJudged, type Brief, type Judged } from './propose-judge.ts';
import { mostPlace, MOST_TENTHS, planFromIndex, SET_UPS, type Frame, type Plan } from './propose-plan.ts';

/** Called now and then with the share of the work done, 0…1; true from `shouldStop` ends the search. */
export type SearchWatch = {
  readonly onProgress?: (share: number) => void;
  readonly shouldStop?: () => boolean;
};

const THROUGH = MISSES.indexOf('through');

/** Counts judged plans: the search ends by their number and never by a clock, so that it finds the same everywhere. */
export class SearchBudget {
  tried = 0;
  stopped = false;
  private readonly most: number;
  private readonly watch: SearchWatch;

  constructor(most: number, watch: SearchWatch) {
    this.most = most;
    this.watch = watch;
  }

  /** Whether any is left. */
  left(): boolean {
    return !this.stopped && this.tried < this.most;
  }

  /** Whether another plan may be judged. */
  spend(): boolean {
    if (this.stopped || this.tried >= this.most) return false;
    this.tried += 1;
    if (this.tried % 64 === 0) {
      this.watch.onProgress?.(Math.min(1, this.tried / this.most));
      if (this.watch.shouldStop?.() === true) this.stopped = true;
    }
    return !this.stopped;
  }
}

/** Parts of the eruption's limit that first plans are made for. */
const FIRST_INDEXES = [0.95, 0.6, 0.35, 0.2, 0.1] as const;
const SET_UP_INDEXES = [0.95, 0.6, 0.35] as const;
/** Choices of a set-up, and how many options each has. */
const CHOICES = [0, 1, 2, 3] as const;
const OPTIONS = [
  SET_UPS.focus.length,
  SET_UPS.standoff.length,
  SET_UPS.pressure.length,
  SET_UPS.frequency.length,
] as const;

/** First plans that are worked on further. */
const STARTS = 2;
/** Steps of the search: places on the scale of powers and tenths of a second, from coarse to fine. */
const STEPS = [8, 3, 1] as const;
const SHAKEN_STEPS = [3, 1] as const;
/** How far a shake goes: places on the scale of powers, times by up to this factor, and how often a choice changes. */
const SHAKE_PLACES = 10;
const SHAKE_TIMES = 1.5;
const SHAKE_SET_UP = 0.3;

/**
 * The best plan found for any of the frames: what misses least and, of those that miss nothing, the shortest. With `give`, a place among the
 * misses, all others count before that one: what it would have to give so that they are kept. Undefined when stopped before the first.
 */
export function planSearch(
  frames: readonly Frame[],
  brief: Brief,
  budget: SearchBudget,
  perStart: number,
  give?: number,
): { readonly frame: Frame; readonly judged: Judged } | undefined {
  const better = (a: Judged, b: Judged | undefined): boolean => {
    if (b === undefined) return true;
    const [givenA, givenB] = give === undefined ? [0, 0] : [a.misses[give] ?? 0, b.misses[give] ?? 0];
    const [restA, restB] = [a.missed - givenA, b.missed - givenB];
    if (restA !== restB) return restA < restB;
    if (givenA !== givenB) return givenA < givenB;
    return a.wished < b.wished;
  };
  const judge = (frame: Frame, plan: Plan, best: Judged | undefined): Judged | undefined => {
    if (!budget.spend()) return undefined;
    const judged = planJudged(frame, brief, plan, best?.missed === 0 ? best.wished : Number.POSITIVE_INFINITY);
    return judged !== undefined && better(judged, best) ? judged : undefined;
  };

  type Found = { readonly frame: Frame; readonly judged: Judged };
  const byWorth = (a: Found, b: Found) => (better(a.judged, b.judged) ? -1 : better(b.judged, a.judged) ? 1 : 0);
  const begun = (frame: Frame, setUp: Plan['setUp'], part: number): readonly Found[] => {
    const index = part * brief.limits.eruptionIndex;
    const plan = planFromIndex(frame, setUp, index, brief.thickness.max, brief.cold, brief.hot);
    const judged = judge(frame, plan, undefined);
    return judged === undefined ? [] : [{ frame, judged }];
  };

  // First plans: every number of stages, then every choice of the set-up with the best of them.
  const starts = frames.flatMap((frame) => FIRST_INDEXES.flatMap((part) => begun(frame, [0, 0, 0, 0], part)));
  starts.sort(byWorth);
  const [first] = starts;
  if (first === undefined) return undefined;
  for (const choice of CHOICES) {
    for (let option = 1; option < OPTIONS[choice]; option++) {
      const { setUp } = withSetUp(first.judged.plan, choice, option);
      for (const part of SET_UP_INDEXES) starts.push(...begun(first.frame, setUp, part));
    }
  }
  starts.sort(byWorth);

  let best = first;
  const known = new Set<string>();
  for (const { frame, judged } of starts) {
    const kind = `${frames.indexOf(frame)} ${judged.plan.setUp.join()}`;
    if (known.has(kind) || known.size >= STARTS) continue;
    known.add(kind);
    const after = climbed(frame, judged, judge, perStart, STEPS);
    if (better(after, best.judged)) best = { frame, judged: after };
  }
  // What is left of the budget: shaken, climbed again, kept when better. The same shakes each time. Is it not even through? Then
  // all its power is used, and shaking gives no more.
  const shake = shakes();
  while (budget.left() && best.judged.misses[THROUGH] === 0) {
    const { frame, judged } = best;
    const shaken = planJudged(frame, brief, shake(frame, judged.plan), Number.POSITIVE_INFINITY);
    if (shaken === undefined || !budget.spend()) break;
    const after = climbed(frame, shaken, judge, perStart, SHAKEN_STEPS);
    if (better(after, judged)) best = { frame, judged: after };
  }
  return best;
}

/** A plan shaken: powers, times and now and then a choice of the set-up. From numbers of its own, the same in each search. */
function shakes(): (frame: Frame, plan: Plan) => Plan {
  let state = 1;
  // Park and Miller's minimal standard generator.
  const next = (): number => (state = (state * 48_271) % 2_147_483_647) / 2_147_483_647;
  const spread = (): number => 2 * next() - 1;
  return (frame, plan) => {
    const top = mostPlace(frame);
    const powers = plan.powers.map((value) => Math.min(top, Math.max(0, value + Math.round(SHAKE_PLACES * spread()))));
    const durations = plan.durations.map((value) => Math.max(1, Math.round(value * SHAKE_TIMES ** spread())));
    let shaken: Plan = { ...plan, powers, durations };
    for (const choice of CHOICES) {
      if (next() < SHAKE_SET_UP) shaken = withSetUp(shaken, choice, Math.floor(next() * OPTIONS[choice]));
    }
    return shaken;
  };
}

type Judge = (frame: Frame, plan: Plan, best: Judged | undefined) => Judged | undefined;

/** From a plan to a better neighbour as long as there is one, in ever finer steps. A step that helped is tried again at once. */
function climbed(frame: Frame, start: Judged, judge: Judge, most: number, steps: readonly number[]): Judged {
  let best = start;
  let tries = 0;
  const seen = new Set<string>();
  const attempt = (plan: Plan | undefined): boolean => {
    if (plan === undefined || tries >= most) return false;
    const key = `${plan.setUp.join()};${plan.powers.join()};${plan.durations.join()};${plan.extra}`;
    if (seen.has(key)) return false;
    seen.add(key);
    tries += 1;
    const judged = judge(frame, plan, best);
    if (judged === undefined) return false;
    best = judged;
    return true;
  };
  for (const step of steps) {
    for (let improved = true; improved && tries < most;) {
      improved = false;
      if (step !== 1) {
        for (const choice of CHOICES) {
          for (let option = 0; option < OPTIONS[choice]; option++) {
            if (attempt(withSetUp(best.plan, choice, option))) improved = true;
          }
        }
      }
      for (const move of moves(frame, step)) {
        while (attempt(move(best.plan))) improved = true;
      }
    }
  }
  return best;
}

function withSetUp(plan: Plan, choice: 0 | 1 | 2 | 3, option: number): Plan {
  const [focus, standoff, pressure, frequency] = plan.setUp;
  const setUp = [focus, standoff, pressure, frequency] satisfies [number, number, number, number];
  setUp[choice] = option;
  return { ...plan, setUp };
}

type Move = (plan: Plan) => Plan | undefined;

/** Every single power and time by a step, powers and times together, and a power with the times beside it, which go up and down together. */
function moves(frame: Frame, step: number): readonly Move[] {
  const top = mostPlace(frame);
  const shift = (of: readonly number[], which: (index: number) => number, least: number, most: number) => {
    let changed = false;
    const shifted = of.map((value, index) => {
      const next = Math.min(most, Math.max(least, value + which(index)));
      changed ||= next !== value;
      return next;
    });
    return changed ? shifted : undefined;
  };
  const powers = (which: (index: number) => number): Move => {
    return (plan) => {
      const shifted = shift(plan.powers, which, 0, top);
      return shifted === undefined ? undefined : { ...plan, powers: shifted };
    };
  };
  const times = (which: (index: number) => number): Move => {
    return (plan) => {
      const shifted = shift(plan.durations, which, 1, MOST_TENTHS);
      return shifted === undefined ? undefined : { ...plan, durations: shifted };
    };
  };
  const both = (a: Move, b: Move): Move => {
    return (plan) => {
      const first = a(plan);
      return first === undefined ? undefined : b(first);
    };
  };
  const all: Move[] = [];
  for (const by of [step, -step]) {
    all.push(powers(() => by));
    all.push(times(() => by));
    all.push((plan) => (frame.holds && plan.extra + by >= 0 ? { ...plan, extra: plan.extra + by } : undefined));
    for (let knot = 0; knot < frame.knotCount; knot++) all.push(powers((index) => (index === knot ? by : 0)));
    for (let time = 0; time < frame.timeCount; time++) {
      all.push(times((index) => (index === time ? by : 0)));
      // A ramp that is longer by what its neighbour is shorter.
      if (time + 1 < frame.timeCount) {
        all.push(times((index) => (index === time ? by : index === time + 1 ? -by : 0)));
      }
      // A knot that is higher and later or sooner reached.
      for (const way of [by, -by]) {
        all.push(
          both(
            powers((index) => (index === time + 1 ? by : 0)),
            times((index) => (index === time ? way : 0)),
          ),
        );
      }
    }
    // A knot that is higher by what the next one is lower.
    for (let knot = 0; knot + 1 < frame.knotCount; knot++) {
      all.push(powers((index) => (index === knot ? by : index === knot + 1 ? -by : 0)));
    }
  }
  return all;
}
