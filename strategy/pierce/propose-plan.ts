import { boreMoment, boreMomentEmpty, boreSet, ERUPTION, SET_SIZE, type Bore } from './bore.ts';
import { clamped, LONGEST_DUTY, POWER_SHARE, reachableFocus } from './defaults.ts';
import type { MachineProfile } from '../machine.ts';
import type { Stage, StageQuantities } from './stage.ts';

/**
 * A plan of a staged pierce as whole numbers, so that a search steps from one to the next and always comes to figures that an engineer
 * would have written: choices of the set-up, powers of the free knots on a scale of twentieths, durations in tenths of a second.
 */
export type Plan = {
  readonly setUp: readonly [focus: number, standoff: number, pressure: number, frequency: number];
  readonly powers: readonly number[];
  readonly durations: readonly number[];
  /** What the hold lasts beyond what the reserve asks for, in tenths of a second: a rule may want more. */
  readonly extra: number;
};

/** What the search may choose from. Common practice, no source: waist above the plate, nozzle high at first, little pressure. */
export const SET_UPS = {
  focus: [5e-3, 3.5e-3, 2e-3, 7e-3],
  standoff: [10e-3, 8e-3, 12e-3],
  pressure: [0.5e5, 0.7e5, 0.35e5, 1e5],
  frequency: [100, 200, 400, 50],
} as const;

/** Mean power of place 0 on the scale, W, and from one place to the next. */
const SCALE_START = 100;
const SCALE_STEP = 1.02;

/** From the first ramp to the last: nozzle comes down to this, pressure and frequency grow by this, duty goes from and to this. */
const LAST_STANDOFF = 4e-3;
const PRESSURE_GROWTH = 1.4;
const FREQUENCY_GROWTH = 2;
const DUTIES = [0.35, 0.65] as const;
/** A pulse must last so many of the source's rise times. A little more than what is cautioned about. */
const LEAST_RISES = 6;

/** Stages of which some are given and the rest are free; the last one, when free, holds what the ramps end with. */
export type Frame = {
  readonly profile: MachineProfile;
  readonly slots: readonly (Stage | null)[];
  /** Greatest peak power that may be used, W. */
  readonly mostPower: number;
  /** Index of the free knot at each boundary between stages, or −1 where a given stage decides. */
  readonly knots: readonly number[];
  readonly knotCount: number;
  /** Index of the free duration of each stage, or −1 for given ones and for the hold. */
  readonly times: readonly number[];
  readonly timeCount: number;
  readonly holds: boolean;
  /** Whether any stage is given. */
  readonly given: boolean;
};

/** The frame of stages of which some are given, and null for each that is free. */
export function frameOf(profile: MachineProfile, slots: readonly (Stage | null)[], mostPeakPower: number): Frame {
  const last = slots.length - 1;
  const holds = slots[last] === null;
  let knotCount = 0;
  const knots: number[] = [];
  for (let boundary = 0; boundary <= slots.length; boundary++) {
    const before = slots[boundary - 1];
    const after = slots[boundary];
    // Does the hold begin here? Then it has a knot of its own, and a ramp before it ends there.
    const startsHold = holds && boundary === last;
    if (holds && boundary === slots.length) knots.push(knots[last] ?? -1);
    else if (startsHold) knots.push(knotCount++);
    else if ((before ?? null) !== null || (after ?? null) !== null) knots.push(-1);
    else knots.push(knotCount++);
  }
  let timeCount = 0;
  const times = slots.map((slot, index) => (slot !== null || (holds && index === last) ? -1 : timeCount++));
  const given = slots.some((slot) => slot !== null);
  const { maxPower, minPower } = profile.source;
  const mostPower = Math.max(minPower, Math.min(POWER_SHARE * maxPower, mostPeakPower));
  return { profile, slots, mostPower, knots, knotCount, times, timeCount, holds, given };
}

/** The stages of a plan. The hold lasts `holdTime` s. */
export function planStages(frame: Frame, plan: Plan, holdTime: number): readonly Stage[] {
  const { slots, knots, times, holds } = frame;
  const last = slots.length - 1;
  const free = new Map<number, StageQuantities>();
  const knotAt = (boundary: number): StageQuantities => {
    const knot = knots[boundary] ?? -1;
    if (knot < 0) {
      const decides = slots[boundary - 1]?.to ?? slots[boundary]?.from;
      if (decides === undefined) throw new RangeError(`nothing decides boundary ${boundary}`);
      return decides;
    }
    const known = free.get(knot);
    if (known !== undefined) return known;
    const made = knotQuantities(frame, plan, Math.min(boundary, holds ? last : slots.length), knot);
    free.set(knot, made);
    return made;
  };
  return slots.map((slot, index) => {
    if (slot !== null) return slot;
    if (holds && index === last) return { duration: holdTime, from: knotAt(index), to: knotAt(index) };
    const duration = (plan.durations[times[index] ?? -1] ?? 1) / 10;
    // After a given stage a free one takes up where that ends, before one it ends where that begins.
    const from = slots[index - 1]?.to ?? knotAt(index);
    const to = slots[index + 1]?.from ?? knotAt(index + 1);
    return { duration, from: pulsedLike(from, to), to: pulsedLike(to, from) };
  });
}

/** Continuous power beside pulses is written as pulses without a pause between them: a stage is one or the other from end to end. */
function pulsedLike(set: StageQuantities, other: StageQuantities): StageQuantities {
  return set.pulseFrequency === null && other.pulseFrequency !== null
    ? { ...set, pulseFrequency: other.pulseFrequency }
    : set;
}

/**
 * A plan whose powers fill the bore with melt, on the hot plate, to `index` at each knot, and whose ramps last as long as the cold
 * bottom needs from knot to knot.
 */
export function planFromIndex(
  frame: Frame,
  setUp: Plan['setUp'],
  index: number,
  thickness: number,
  cold: Bore,
  hot: Bore,
): Plan {
  const ends = Math.max(1, frame.holds ? frame.slots.length - 1 : frame.slots.length);
  const set = new Float64Array(SET_SIZE);
  const moment = boreMomentEmpty();
  const powers = new Array<number>(frame.knotCount).fill(0);
  const speeds: number[] = [];
  const depths: number[] = [];
  const most = mostPlace(frame);
  for (let boundary = 0; boundary <= ends; boundary++) {
    const knot = frame.knots[boundary] ?? -1;
    const depth = thickness * depthPart(boundary / ends);
    const at = (place: number): StageQuantities => {
      powers[Math.max(0, knot)] = place;
      return knotQuantities(frame, { setUp, powers, durations: [], extra: 0 }, boundary, Math.max(0, knot));
    };
    let low = 0;
    let high = most;
    while (knot >= 0 && high - low > 1) {
      const middle = (low + high) >> 1;
      boreSet(set, at(middle));
      boreMoment(hot, set, depth, moment);
      if ((moment[ERUPTION] ?? 0) < index) low = middle;
      else high = middle;
    }
    if (knot >= 0) powers[knot] = low;
    const given = frame.slots[boundary - 1]?.to ?? frame.slots[boundary]?.from;
    boreSet(set, knot >= 0 ? at(low) : (given ?? at(low)));
    speeds.push(Math.max(boreMoment(cold, set, depth, moment), SLOWEST));
    depths.push(depth);
  }
  const durations = frame.times.flatMap((time, stage) => {
    if (time < 0) return [];
    const way = (depths[stage + 1] ?? 0) - (depths[stage] ?? 0);
    const speed = ((speeds[stage] ?? SLOWEST) + (speeds[stage + 1] ?? SLOWEST)) / 2;
    return [Math.min(MOST_TENTHS, Math.max(1, Math.round((10 * way) / speed)))];
  });
  return { setUp, powers, durations, extra: 0 };
}

/** A speed to reckon with where the bottom would stand still, m/s. */
const SLOWEST = 0.5e-3;
/** Longest ramp that a plan makes, in tenths of a second. */
export const MOST_TENTHS = 600;

/** Greatest place on the scale of powers that a frame can use. */
export function mostPlace(frame: Frame): number {
  return powerPlace(LONGEST_DUTY * frame.mostPower);
}

function powerPlace(meanPower: number): number {
  return Math.ceil(Math.log(meanPower / SCALE_START) / Math.log(SCALE_STEP));
}

/** Depth that a knot is meant for: dense near the surface, the last before the bottom. */
function depthPart(part: number): number {
  return 0.92 * part ** 1.2;
}

function knotQuantities(frame: Frame, { setUp, powers }: Plan, boundary: number, knot: number): StageQuantities {
  const { profile, slots, holds, mostPower } = frame;
  const { source, oxygen } = profile;
  const ends = Math.max(1, holds ? slots.length - 1 : slots.length);
  const part = boundary / ends;
  const [focus, high, pressure, frequency] = [
    SET_UPS.focus[setUp[0]] ?? SET_UPS.focus[0],
    SET_UPS.standoff[setUp[1]] ?? SET_UPS.standoff[0],
    SET_UPS.pressure[setUp[2]] ?? SET_UPS.pressure[0],
    SET_UPS.frequency[setUp[3]] ?? SET_UPS.frequency[0],
  ];
  const standoff = rounded(
    clamped(high + (LAST_STANDOFF - high) * part, profile.standoff.min, profile.standoff.max),
    0.5e-3,
    profile.standoff.min,
    profile.standoff.max,
  );
  const usualDuty = clamped(DUTIES[0] + (DUTIES[1] - DUTIES[0]) * part, source.minDuty, 1);
  const meanPower = SCALE_START * SCALE_STEP ** (powers[knot] ?? 0);
  // Is the source too weak for the usual duty, or its least power too much? Then the duty gives way.
  const wished = clamped(meanPower / usualDuty, source.minPower, mostPower);
  const duty = rounded(
    clamped(meanPower / wished, source.minDuty, Math.max(source.minDuty, LONGEST_DUTY)),
    0.01,
    source.minDuty,
    1,
  );
  const peakPower = rounded(clamped(meanPower / duty, source.minPower, mostPower), 10, source.minPower, mostPower);
  const fastest = source.riseTime === 0 ? source.maxFrequency : duty / (LEAST_RISES * source.riseTime);
  return {
    standoff,
    focusPosition: reachableFocus(profile, standoff, focus),
    peakPower,
    duty,
    pulseFrequency: rounded(
      clamped(
        frequency * (1 + (FREQUENCY_GROWTH - 1) * part),
        source.minFrequency,
        Math.min(source.maxFrequency, fastest),
      ),
      1,
      source.minFrequency,
      source.maxFrequency,
    ),
    oxygenPressure: rounded(
      clamped(pressure * (1 + (PRESSURE_GROWTH - 1) * part), oxygen.minPressure, oxygen.maxPressure),
      0.05e5,
      oxygen.minPressure,
      oxygen.maxPressure,
    ),
  };
}

/** The multiple of a step next to a value, or the end of the range where that lies beyond it. */
function rounded(value: number, step: number, min: number, max: number): number {
  return clamped(Number((Math.round(value / step) * step).toFixed(6)), min, max);
}
