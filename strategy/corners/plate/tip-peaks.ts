import { peakAfter } from '../../heat/corner-peak.ts';
import type { PlateProperties } from '../../heat/properties.ts';
import type { ReturnQuestion, ReturnTreatment } from '../../heat/return-temperature.ts';
import { returnOf } from '../../heat/return-temperature.ts';
import { measuringDepth } from '../../heat/return-question.ts';
import { loopAt } from '../../path/loop.ts';
import { loopRadii } from '../../path/loop-radius.ts';
import { roundRadius } from '../../path/round.ts';
import type { CornerPlanRequest } from '../case.ts';

/** What a tip's peak follows from besides the temperature that it returns at. */
export type TipKind = {
  readonly angle: number; // rad
  /** Of waits, s. */
  readonly wait: number;
  readonly treatment: 'plain' | 'loop' | 'ease' | 'round';
};

export type TipPeaks = {
  /** K that the peak lies over the return temperature at a depth, m, inside the finished tip; at the measuring place when left out. */
  readonly over: (kind: TipKind, depth?: number) => number;
  /** Depth inside the finished tip, m, to which a tip that returns at a temperature, K, passes the ignition threshold, K; 0 where it does not. */
  readonly burnBack: (kind: TipKind, returnsAt: number, ignition: number) => number;
};

export type TipConditions = Pick<CornerPlanRequest, 'cut' | 'rules'> & { readonly properties: PlateProperties };

/** Steps of the angle, of the wait and of the depth between which values are interpolated: even in the logarithm. */
const angleStep = 0.15;
const [leastAngle, mostAngle] = [0.04, 3.05];
const angleSteps = Math.ceil(Math.log(mostAngle / leastAngle) / angleStep);
const kinds = ['plain', 'loop', 'ease', 'round'] as const;
const waits = [0, 0.4, 1.5, 5] as const;
const depths: readonly number[] = [
  1e-5, 5e-5, 1.2e-4, 2.2e-4, 3.5e-4, 5.5e-4, 8e-4, 1.1e-3, 1.5e-3, 2.2e-3, 3.2e-3, 5e-3, 8e-3, 1.4e-2,
];

const anyPlate = 300;

/**
 * Peaks of tips with long straight edges under a strategy's cut. The peak over the return temperature hardly depends on what was cut before the first edge: it is the second edge's heat
 * and what goes on leaving of the first's. So values for angles, waits and depths at steps stand for all tips, of a loop those of the designed one; a test holds
 * them against `peakAfter` and `burnBack` themselves.
 */
export function tipPeaks({ cut, rules, properties }: TipConditions): TipPeaks {
  const { feed, kerfWidth, heatIntoPlate } = cut;
  const key = JSON.stringify([
    feed,
    kerfWidth,
    heatIntoPlate,
    rules.loop,
    rules.ease,
    rules.round,
    rules.burnBack?.limit,
    properties,
  ]);
  let peaks = lately.get(key);
  if (!peaks) {
    peaks = peaksOf({ cut, rules, properties });
    if (lately.size >= mostKept) lately.delete(lately.keys().next().value ?? '');
    lately.set(key, peaks);
  }
  return peaks;
}

/** Of the strategies planned with last: the next plan is most often the same with another choice. */
const lately = new Map<string, TipPeaks>();
const mostKept = 6;

function peaksOf({ cut, rules, properties }: TipConditions): TipPeaks {
  const asked = rules.burnBack?.limit;
  const kept = asked === undefined || depths.includes(asked) ? depths : [...depths, asked];
  // NaN for what was not asked about yet
  const known = new Float64Array(kinds.length * (angleSteps + 1) * waits.length * kept.length).fill(Number.NaN);
  const valueAt = (treatment: TipKind['treatment'], step: number, wait: number, depth: number): number => {
    const place = ((kinds.indexOf(treatment) * (angleSteps + 1) + step) * waits.length + wait) * kept.length + depth;
    const value = known[place] ?? Number.NaN;
    if (!Number.isNaN(value)) return value;
    const angle = Math.min(mostAngle, leastAngle * Math.exp(step * angleStep));
    const question = standardQuestion(treatment, angle, waits[wait] ?? 0);
    const found = peakAfter(question, kept[depth]).temperature - returnOf(question);
    known[place] = found;
    return found;
  };
  const standardQuestion = (kind: TipKind['treatment'], angle: number, wait: number): ReturnQuestion => {
    const turn = Math.PI - angle;
    const corner = {
      point: { x: 0, y: 0 },
      incoming: { x: 1, y: 0 },
      outgoing: { x: Math.cos(turn), y: Math.sin(turn) },
      angle,
    };
    const { ease, round } = rules;
    const treatment: ReturnTreatment =
      kind === 'loop'
        ? { kind: 'loop', loop: loopAt(corner, designRadius(angle)) }
        : kind === 'ease' && ease
          ? { kind: 'ease', length: ease.length, feedShare: ease.feedShare, powerShare: ease.powerShare }
          : wait > 0
            ? { kind: 'dwell', duration: wait }
            : { kind: 'leave' };
    const radius = kind === 'round' && round ? Math.min(round.radius, roundRadius(round.tolerance, angle)) : null;
    return {
      corner,
      treatment,
      ...(radius === null ? {} : { round: radius + cut.kerfWidth / 2 }),
      cut,
      plateTemperature: anyPlate,
      properties,
    };
  };
  const designRadius = (angle: number): number => {
    const sizes = loopRadii(angle, { ...rules.loop, smallestArc: 0 });
    return sizes.kind === 'none' ? rules.loop.radius : Math.max(...sizes.radii);
  };
  const overAt = ({ angle, wait, treatment }: TipKind, depth: number): number => {
    const held = Math.min(mostAngle, Math.max(leastAngle, angle));
    return cubic(Math.log(held / leastAngle) / angleStep, angleSteps, (i) => {
      // loops, eases and rounds are one each; of waits the longest kept stands for longer ones
      if (treatment !== 'plain') return valueAt(treatment, i, 0, depth);
      return cubic(placeAmong(waits, wait, shortWait), waits.length - 1, (n) => valueAt('plain', i, n, depth));
    });
  };
  const over = (kind: TipKind, depth: number): number => {
    const known_ = kept.indexOf(depth);
    if (known_ < 0) throw new RangeError(`depth ${depth} m is none of those kept`);
    return overAt(kind, known_);
  };
  return {
    over: (kind, depth = measuringDepth) => over(kind, depth),
    burnBack(kind, returnsAt, ignition) {
      const needed = ignition - returnsAt;
      if (!(needed > 0)) return depths.at(-1) ?? 0;
      const at = (i: number) => overAt(kind, i);
      // the peak falls with the depth, but for the first hundredths of a millimetre
      let [low, high] = [0, depths.length];
      while (high - low > 1) {
        const middle = (low + high) >> 1;
        if (at(middle) < needed) high = middle;
        else low = middle;
      }
      const [shallower, deeper] = [depths[low] ?? 0, depths[high]];
      if (deeper === undefined) return at(low) < needed ? 0 : shallower;
      const [more, less] = [at(low), at(high)];
      if (more < needed) return 0;
      return shallower * (deeper / shallower) ** ((more - needed) / (more - less));
    },
  };
}

/** Waits are told apart as log(1 + w/0.2 s). */
const shortWait = 0.2;

/** Where a value lies among rising ones, in places; between them even in the logarithm of 1 + x/scale. */
function placeAmong(values: readonly number[], x: number, scale: number): number {
  const log = (value: number) => Math.log(1 + value / scale);
  const last = values.length - 1;
  for (let i = 0; i < last; i++) {
    const [low, high] = [values[i] ?? 0, values[i + 1] ?? 0];
    if (x < high) return i + (log(x) - log(low)) / (log(high) - log(low));
  }
  return last;
}

/** Through four values about a place among 0..last, by Lagrange. */
function cubic(place: number, last: number, at: (i: number) => number): number {
  const i = Math.min(last - 2, Math.max(1, Math.floor(place)));
  const t = place - i;
  if (t === 0) return at(i);
  return (
    (-t * (t - 1) * (t - 2) * at(i - 1)) / 6 +
    ((t + 1) * (t - 1) * (t - 2) * at(i)) / 2 -
    ((t + 1) * t * (t - 2) * at(i + 1)) / 2 +
    ((t + 1) * t * (t - 1) * at(i + 2)) / 6
  );
}
