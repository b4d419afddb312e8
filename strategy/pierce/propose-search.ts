import { planJudged, type Brief, type Judged } from './propose-judge.ts';
import { mostPlace, MOST_TENTHS, planFromIndex, SET_UPS, type Frame, type Plan } from './propose-plan.ts';

/** Called now and then with the share of the work done, 0…1; true from `shouldStop` ends the search. */
export type SearchWatch = {
  readonly onProgress?: (share: number) => void;
  readonly shouldStop?: () => boolean;
};

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
/** First plans that are worked on further. */
const STARTS = 2;
/** Steps of the search: places on the scale of powers and tenths of a second, from coarse to fine. */
const STEPS = [12, 4, 1] as const;

/**
 * The best plan found for any of the frames: what misses least and, of those that miss nothing, the shortest. With `give`, a place among the
 * misses, all others count before that one: what it would have to give so that they are kept. Undefined when stopped before the first.
 */
export function planSearch(
  frames: readonly Frame[],
  brief: Brief,
  budget: SearchBudget,
  perFrame: number,
  give?: number,
): { readonly frame: Frame; readonly judged: Judged } | undefined {
  const better = (a: Judged, b: Judged | undefined): boolean => {
    if (b === undefined) return true;
    const [givenA, givenB] = give === undefined ? [0, 0] : [a.misses[give] ?? 0, b.misses[give] ?? 0];
    const [restA, restB] = [a.missed - givenA, b.missed - givenB];
    if (restA !== restB) return restA < restB;
    if (givenA !== givenB) return givenA < givenB;
    return a.routineTime < b.routineTime;
  };
  const judge = (frame: Frame, plan: Plan, best: Judged | undefined): Judged | undefined => {
    if (!budget.spend()) return undefined;
    const judged = planJudged(frame, brief, plan, best?.missed === 0 ? best.routineTime : Number.POSITIVE_INFINITY);
    return judged !== undefined && better(judged, best) ? judged : undefined;
  };

  const starts: { frame: Frame; judged: Judged }[] = [];
  for (const frame of frames) {
    for (const part of FIRST_INDEXES) {
      const index = part * brief.limits.eruptionIndex;
      const plan = planFromIndex(frame, [0, 0, 0, 0], index, brief.thickness.max, brief.cold, brief.hot);
      const judged = judge(frame, plan, undefined);
      if (judged !== undefined) starts.push({ frame, judged });
    }
  }
  starts.sort((a, b) => (better(a.judged, b.judged) ? -1 : better(b.judged, a.judged) ? 1 : 0));

  let best: { frame: Frame; judged: Judged } | undefined;
  const begun = new Set<Frame>();
  for (const start of starts) {
    if (begun.size >= STARTS) break;
    if (begun.has(start.frame)) continue;
    begun.add(start.frame);
    const judged = climbed(start.frame, start.judged, judge, perFrame);
    if (best === undefined || better(judged, best.judged)) best = { frame: start.frame, judged };
  }
  return best;
}

type Judge = (frame: Frame, plan: Plan, best: Judged | undefined) => Judged | undefined;

/** From a plan to a better neighbour as long as there is one, in ever finer steps. A step that helped is tried again at once. */
function climbed(frame: Frame, start: Judged, judge: Judge, most: number): Judged {
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
  for (const step of STEPS) {
    for (let improved = true; improved && tries < most;) {
      improved = false;
      if (step !== 1) {
        for (const choice of [0, 1, 2, 3] as const) {
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

const OPTIONS = [
  SET_UPS.focus.length,
  SET_UPS.standoff.length,
  SET_UPS.pressure.length,
  SET_UPS.frequency.length,
] as const;

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
      // A ramp that is longer by what its neighbour is shorter, and a ramp that ends higher and sooner.
      if (time + 1 < frame.timeCount) {
        all.push(times((index) => (index === time ? by : index === time + 1 ? -by : 0)));
      }
      all.push(
        both(
          powers((index) => (index === time + 1 ? by : 0)),
          times((index) => (index === time ? -by : 0)),
        ),
      );
    }
  }
  return all;
}
