import type { Treatment } from '@/shared/corner-plans.ts';
import { answered, burnBack, coolingCurve, peakAfter, returnDelay } from '@/strategy/heat/index.ts';
import type { CornerQuestion } from './corner-questions.ts';

/** A corner's tip against time with one treatment. Times in s from when the front is at the end of the first edge. */
export type CoolingCurve = {
  readonly treatment: Treatment;
  readonly chosen: boolean;
  readonly times: readonly number[];
  readonly kelvin: readonly number[];
  /** When cutting along the second edge begins, and what waits there then. */
  readonly back: { readonly time: number; readonly kelvin: number };
  /** The hottest the tip gets after that. */
  readonly peak: { readonly time: number; readonly kelvin: number };
  readonly burnBack: number; // m
};

/** What is shown before the first edge ends, s, and after the last return. */
const before = 2;
const after = 4;
/** Steps of a curve: finer where the cut comes, turns and comes back. */
const steps = 72;

/** The curves of a corner's treatments on one span of time. Questions the closed form cannot take are left out. */
export function coolingCurves(questions: readonly CornerQuestion[]): CoolingCurve[] {
  const asked = questions.flatMap((one) => {
    const delay = answered(() => returnDelay(one.question));
    return delay === null ? [] : [{ ...one, delay }];
  });
  const last = Math.max(after, ...asked.map(({ delay }) => delay)) + after;
  return asked.flatMap(({ treatment, chosen, question, returnsAt, delay }) => {
    const times = timesOf(delay, last);
    const curve = answered(() => ({
      kelvin: coolingCurve(question, times),
      peak: peakAfter(question),
      burnBack: burnBack(question),
    }));
    if (!curve) return [];
    const { kelvin, peak } = curve;
    return [
      {
        treatment,
        chosen,
        times,
        kelvin,
        back: { time: delay, kelvin: returnsAt },
        peak: { time: delay + peak.time, kelvin: peak.temperature },
        burnBack: curve.burnBack,
      },
    ];
  });
}

/** Even steps, and closer ones about the corner and the return. */
function timesOf(delay: number, last: number): number[] {
  const even = Array.from({ length: steps + 1 }, (_, i) => -before + ((before + last) * i) / steps);
  const near = [0, delay].flatMap((time) => [-0.2, -0.1, -0.05, 0, 0.05, 0.1, 0.2, 0.35, 0.5].map((by) => time + by));
  return [...new Set([...even, ...near].filter((time) => time >= -before && time <= last))].sort((a, b) => a - b);
}
