import type { MachineProfile } from '@/strategy/machine.ts';
import { focusForDial } from '@/strategy/beam/index.ts';
import type { Stage, StageQuantities } from '@/strategy/pierce/stage.ts';
import type { Dimension, UnitSystem } from '@/strategy/units/index.ts';
import { stageEnds, type LaneName } from './section-layout.ts';

/** What is dragged in a lane. Mean power is moved by its peak; the duty stays. */
export type KnotQuantity = Extract<
  keyof StageQuantities,
  'standoff' | 'focusPosition' | 'peakPower' | 'oxygenPressure'
>;

export const laneQuantity: Readonly<Record<LaneName, KnotQuantity>> = {
  standoff: 'standoff',
  focusPosition: 'focusPosition',
  meanPower: 'peakPower',
  oxygenPressure: 'oxygenPressure',
};

export type KnotEnd = { readonly stage: number; readonly end: 'from' | 'to' };

/** A number of a lane that can be moved: of one stage's end, or of two that meet without a step. */
export type Knot = {
  readonly lane: LaneName;
  readonly time: number; // s
  /** As drawn in the lane, SI. */
  readonly value: number;
  /** As set, SI: the peak where the lane shows the mean. */
  readonly set: number;
  readonly duty: number;
  readonly ends: readonly [KnotEnd, ...KnotEnd[]];
};

/** What is chosen in the drawing: a knot of a lane, or the end of a stage on the time axis. */
export type Target =
  | { readonly kind: 'knot'; readonly lane: LaneName; readonly stage: number; readonly end: 'from' | 'to' }
  | { readonly kind: 'duration'; readonly stage: number };

export type Range = { readonly min: number; readonly max: number };

/** The knots of a lane in the order of time; where two stages meet in a step there are two. */
export function laneKnots(stages: readonly Stage[], lane: LaneName): readonly Knot[] {
  const ends = stageEnds(stages);
  const knot = (at: StageQuantities, time: number, ...own: [KnotEnd, ...KnotEnd[]]): Knot => ({
    lane,
    time,
    value: lane === 'meanPower' ? at.peakPower * at.duty : at[lane],
    set: at[laneQuantity[lane]],
    duty: at.duty,
    ends: own,
  });
  return stages.flatMap((stage, index) => {
    const end = ends[index] ?? 0;
    const before = stages[index - 1];
    const next = stages[index + 1];
    const joinsNext = next !== undefined && meets(stage.to, next.from, lane);
    const last = knot(
      stage.to,
      end,
      { stage: index, end: 'to' },
      ...(joinsNext ? [{ stage: index + 1, end: 'from' } as const] : []),
    );
    if (before !== undefined && meets(before.to, stage.from, lane)) return [last];
    return [knot(stage.from, end - stage.duration, { stage: index, end: 'from' }), last];
  });
}

const meets = (a: StageQuantities, b: StageQuantities, lane: LaneName): boolean =>
  lane === 'meanPower' ? a.peakPower === b.peakPower && a.duty === b.duty : a[lane] === b[lane];

/** The knot that a target means; where ends have joined since, the one that holds its number. */
export const knotOf = (stages: readonly Stage[], target: Target): Knot | undefined =>
  target.kind === 'knot'
    ? laneKnots(stages, target.lane).find(({ ends }) =>
        ends.some(({ stage, end }) => stage === target.stage && end === target.end),
      )
    : undefined;

export const targetOf = ({ lane, ends: [first] }: Knot): Target => ({ kind: 'knot', lane, ...first });

export const targetSame = (a: Target | null, b: Target): boolean =>
  a !== null &&
  a.kind === b.kind &&
  a.stage === b.stage &&
  (a.kind !== 'knot' || b.kind !== 'knot' || (a.lane === b.lane && a.end === b.end));

/** What the number is now, SI; null when the target is gone. */
export function targetValue(stages: readonly Stage[], target: Target): number | null {
  if (target.kind === 'duration') return stages[target.stage]?.duration ?? null;
  return knotOf(stages, target)?.set ?? null;
}

/** The stages with the target's number changed: both sides of a knot, or one stage longer or shorter with the later ones moved along. */
export function targetMoved(stages: readonly Stage[], target: Target, value: number): readonly Stage[] {
  if (target.kind === 'duration') {
    return stages.map((stage, index) => (index === target.stage ? { ...stage, duration: value } : stage));
  }
  const ends = knotOf(stages, target)?.ends ?? [];
  const quantity = laneQuantity[target.lane];
  return stages.map((stage, index) => {
    const own = ends.filter((one) => one.stage === index);
    return own.reduce<Stage>(
      (changed, { end }) => ({ ...changed, [end]: { ...changed[end], [quantity]: value } }),
      stage,
    );
  });
}

const bar = 1e5;
const mm = 1e-3;
/** What a strategy may hold and the model can follow, whichever is narrower, SI. */
const widest: Readonly<Record<KnotQuantity, Range>> = {
  standoff: { min: 0.1 * mm, max: 50 * mm },
  focusPosition: { min: -50 * mm, max: 50 * mm },
  peakPower: { min: 1, max: 60_000 },
  oxygenPressure: { min: 0, max: 25 * bar },
};
/** A stage of less than a tenth of a second can be typed, not dragged. */
const durations: Range = { min: 0.1, max: 600 };

/** Where the target may be moved to: within the machine and what a strategy may hold. A number outside stays where it is. */
export function targetRange(stages: readonly Stage[], target: Target, profile: MachineProfile): Range {
  const now = targetValue(stages, target) ?? 0;
  if (target.kind === 'duration') return { ...durations, min: Math.min(durations.min, now) };
  const all = machineRanges(stages, target, profile);
  const min = Math.max(...all.map((range) => range.min));
  const max = Math.min(...all.map((range) => range.max));
  return min <= max ? { min, max } : { min: now, max: now };
}

function machineRanges(stages: readonly Stage[], target: Target & { kind: 'knot' }, profile: MachineProfile): Range[] {
  const quantity = laneQuantity[target.lane];
  switch (quantity) {
    case 'standoff':
      return [widest.standoff, profile.standoff];
    case 'peakPower':
      return [widest.peakPower, { min: profile.source.minPower, max: profile.source.maxPower }];
    case 'oxygenPressure':
      return [widest.oxygenPressure, { min: profile.oxygen.minPressure, max: profile.oxygen.maxPressure }];
    case 'focusPosition': {
      // a dial referred to the nozzle reaches other positions at another standoff
      const standoffs = (knotOf(stages, target)?.ends ?? []).flatMap(
        ({ stage, end }) => stages[stage]?.[end].standoff ?? [],
      );
      const { minDial, maxDial } = profile.focusScale;
      return [
        widest.focusPosition,
        ...standoffs.map((standoff) => {
          const reached = [minDial, maxDial].map((dial) => focusForDial(profile.focusScale, dial, standoff));
          return { min: Math.min(...reached), max: Math.max(...reached) };
        }),
      ];
    }
  }
}

/** Steps of a number, SI: a key or button, one with Shift, and what a drag snaps to. */
export type Steps = { readonly fine: number; readonly coarse: number; readonly snap: number };

const inch = 25.4 * mm;
const psi = 6894.757293168;
const lengthSteps = {
  metric: { fine: 0.1 * mm, coarse: 1 * mm, snap: 0.5 * mm },
  inch: { fine: 0.005 * inch, coarse: 0.05 * inch, snap: 0.02 * inch },
};
const powerSteps = { fine: 50, coarse: 500, snap: 100 };
const timeSteps = { fine: 0.1, coarse: 1, snap: 0.1 };

export function targetSteps(target: Target, system: UnitSystem): Steps {
  if (target.kind === 'duration') return timeSteps;
  switch (target.lane) {
    case 'standoff':
    case 'focusPosition':
      return lengthSteps[system];
    case 'meanPower':
      return powerSteps;
    case 'oxygenPressure':
      return system === 'metric'
        ? { fine: 0.05 * bar, coarse: 0.5 * bar, snap: 0.05 * bar }
        : { fine: 1 * psi, coarse: 5 * psi, snap: 1 * psi };
  }
}

export const targetDimension = (target: Target): Dimension => {
  if (target.kind === 'duration') return 'time';
  return target.lane === 'meanPower' ? 'power' : target.lane === 'oxygenPressure' ? 'pressure' : 'length';
};

/** The next multiple of the step above or below. */
export function stepped(value: number, direction: 1 | -1, step: number): number {
  const at = value / step;
  const next = direction > 0 ? Math.floor(at + 1e-6) + 1 : Math.ceil(at - 1e-6) - 1;
  return exact(next * step);
}

/** The nearest multiple of the step. */
export const snapped = (value: number, step: number): number => exact(Math.round(value / step) * step);

export const clamped = (value: number, { min, max }: Range): number => Math.min(max, Math.max(min, value));

/** Without the last digits that a product of decimals leaves behind. */
const exact = (value: number): number => Number(value.toPrecision(12));
