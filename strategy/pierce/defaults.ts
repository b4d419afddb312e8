import { focusForDial } from '../beam/index.ts';
import type { MachineProfile, Nozzle } from '../machine.ts';
import { COLD_PLATE_TEMPERATURE } from '../steel/index.ts';
import { boreMoment, boreMomentEmpty, boreOf, boreSet, SET_SIZE } from './bore.ts';
import { PIERCE_DEFAULTS } from './parameters.ts';
import { piercePredict, THICKEST_PLATE } from './predict.ts';
import { routineTime } from './stage-math.ts';
import type { Stage, StageQuantities } from './stage.ts';

/** A point of the routine: at this part of the depth the bottom should move at this speed, with these conditions. */
type Knot = {
  readonly part: number;
  readonly speed: number; // m/s
  readonly standoff: number; // m
  readonly duty: number;
  readonly frequency: number; // Hz
  readonly pressure: number; // Pa
};

/**
 * Gently in, quicker once the bore guides the melt, slower again where little light arrives; high standoff and short
 * pulses first, lower, longer and with more oxygen later. Common practice, no source; the speeds are an own choice.
 */
const KNOTS: readonly Knot[] = [
  { part: 0, speed: 2.2e-3, standoff: 0.01, duty: 0.35, frequency: 100, pressure: 0.5e5 },
  { part: 0.15, speed: 2.8e-3, standoff: 0.008, duty: 0.4, frequency: 150, pressure: 0.5e5 },
  { part: 0.5, speed: 3.2e-3, standoff: 0.006, duty: 0.5, frequency: 200, pressure: 0.6e5 },
  { part: 0.92, speed: 2.6e-3, standoff: 0.004, duty: 0.65, frequency: 200, pressure: 0.7e5 },
];

/** Thinner plates need no stage between the first and the last ramp, m. */
const THREE_STAGES_BELOW = 0.01;

/** Waist above the plate while piercing, m: it widens the bore and keeps the crater shallow. Common practice, no source. */
const FOCUS_POSITION = 0.005;

/** Share of the source's greatest power that a default uses, and the longest duty that is still pulsed. */
export const POWER_SHARE = 0.95;
export const LONGEST_DUTY = 0.9;

/** Routine over predicted breakthrough, with room for the rules of 2.0 cold and 2.2 hot. */
const ROUTINE_OVER_BREAKTHROUGH = 2.3;

/** How slow a default may become on a weak source, as a share of the speeds above. */
const SLOWEST = 0.15;
const BEYOND_REACH = 0.5;

const DEFAULT_NOZZLE: Nozzle = { type: 'single', diameter: 0.0015 };

/**
 * Three or four stages to start a new strategy from, for a thickness in m: ramps whose power is what the model needs to keep the
 * bottom moving at a chosen speed, then a hold that brings the routine to 2.3 times the predicted breakthrough. Within the machine's limits; where its
 * power does not suffice the last stage holds all it has, and the prediction says that the hole is not through.
 * RangeError for a thickness outside (0, 60] mm.
 */
export function pierceStageDefaults(
  profile: MachineProfile,
  thickness: number,
  nozzle: Nozzle = DEFAULT_NOZZLE,
): readonly Stage[] {
  if (!(thickness > 0 && thickness <= THICKEST_PLATE)) {
    throw new RangeError(`thickness ${thickness} m is outside (0, ${THICKEST_PLATE}] m`);
  }
  const knots = thickness < THREE_STAGES_BELOW ? KNOTS.filter((_, index) => index !== 1) : KNOTS;
  const ends = knotQuantities(knots, profile, nozzle, thickness);

  const through = (stages: readonly Stage[]) =>
    piercePredict({ stages, thickness, plateTemperature: COLD_PLATE_TEMPERATURE, profile, nozzle }).breakthrough;
  const last = ends.quantities[ends.quantities.length - 1];
  if (last === undefined) throw new RangeError('a default needs a last knot');
  const hold = (duration: number): Stage => ({ duration, from: last, to: last });

  // The ramps are shortened until the hold still has something to do: a straight ramp of power runs ahead of the plan.
  let ramps = rampsOf(ends, 1);
  let found = through([...ramps, hold(LONG_HOLD)]);
  for (let share = 0.9; found.kind === 'through' && found.stage < ramps.length && share > 0.3; share -= 0.1) {
    ramps = rampsOf(ends, share);
    found = through([...ramps, hold(LONG_HOLD)]);
  }
  const rampTime = routineTime(ramps);
  const routine = found.kind === 'through' ? ROUTINE_OVER_BREAKTHROUGH * found.time : 2 * rampTime;
  return [...ramps, hold(roundedUp(Math.max(routine - rampTime, 0.5), 0.1))];
}

/** Long enough to see whether the hold gets through at all, s. */
const LONG_HOLD = 60;

type Plan = {
  readonly quantities: readonly StageQuantities[];
  /** From each knot to the next, s. */
  readonly durations: readonly number[];
};

/** The knots as quantities; slower throughout when the source cannot give the power that the last one needs. */
function knotQuantities(knots: readonly Knot[], profile: MachineProfile, nozzle: Nozzle, thickness: number): Plan {
  const planned = (slowness: number) => {
    const at = knots.map((knot) => knotQuantitiesAt(knot, slowness, profile, nozzle, thickness));
    const durations = knots.slice(1).map((knot, index) => {
      const before = knots[index] ?? knot;
      return ((knot.part - before.part) * thickness) / ((slowness * (before.speed + knot.speed)) / 2);
    });
    return { enough: at.every(({ enough }) => enough), quantities: at.map(({ quantities }) => quantities), durations };
  };
  for (let slowness = 1; slowness >= SLOWEST; slowness *= 0.8) {
    const plan = planned(slowness);
    if (plan.enough) return plan;
  }
  // Is the plate beyond the source at any speed? Then there is no use in crawling towards it.
  return planned(BEYOND_REACH);
}

function rampsOf({ quantities, durations }: Plan, share: number): readonly Stage[] {
  return durations.flatMap((duration, index) => {
    const from = quantities[index];
    const to = quantities[index + 1];
    return from === undefined || to === undefined ? [] : [{ duration: roundedUp(duration * share, 0.1), from, to }];
  });
}

/** The quantities at a knot: power for its speed on the thickest cold plate, split into peak and duty as the source allows. */
function knotQuantitiesAt(
  knot: Knot,
  slowness: number,
  profile: MachineProfile,
  nozzle: Nozzle,
  thickness: number,
): { readonly quantities: StageQuantities; readonly enough: boolean } {
  const { source, oxygen } = profile;
  const bore = boreOf(profile, nozzle, COLD_PLATE_TEMPERATURE, PIERCE_DEFAULTS);
  const moment = boreMomentEmpty();
  const standoff = clamped(knot.standoff, profile.standoff.min, profile.standoff.max);
  const set = {
    standoff,
    focusPosition: reachableFocus(profile, standoff),
    duty: clamped(knot.duty, source.minDuty, 1),
    pulseFrequency: clamped(knot.frequency, source.minFrequency, source.maxFrequency),
    oxygenPressure: clamped(knot.pressure, oxygen.minPressure, oxygen.maxPressure),
  };
  const most = POWER_SHARE * source.maxPower;
  const places = new Float64Array(SET_SIZE);
  const speedAt = (peakPower: number, duty: number) => {
    boreSet(places, { ...set, peakPower, duty });
    return boreMoment(bore, places, knot.part * thickness, moment);
  };
  const target = knot.speed * slowness;

  // Does the usual duty do with the source's power? Then the peak follows; else the duty grows with the peak at its most.
  if (speedAt(most, set.duty) >= target) {
    // Is even the source's least power too much for it? Then the duty gives way.
    if (speedAt(source.minPower, set.duty) > target) {
      const least = bisected(source.minDuty, set.duty, (duty) => speedAt(source.minPower, duty) >= target);
      return {
        quantities: { ...set, peakPower: source.minPower, duty: Math.min(set.duty, roundedUp(least, 0.01)) },
        enough: true,
      };
    }
    const needed = bisected(source.minPower, most, (peak) => speedAt(peak, set.duty) >= target);
    return { quantities: { ...set, peakPower: Math.min(most, roundedUp(needed, 10)) }, enough: true };
  }
  const enough = speedAt(most, LONGEST_DUTY) >= target;
  const duty = enough
    ? Math.min(
        LONGEST_DUTY,
        roundedUp(
          bisected(set.duty, LONGEST_DUTY, (more) => speedAt(most, more) >= target),
          0.01,
        ),
      )
    : LONGEST_DUTY;
  return { quantities: { ...set, peakPower: Math.max(most, source.minPower), duty }, enough };
}

/** A wished focus position, or the nearest that the dial reaches at this standoff, m. */
export function reachableFocus(
  { focusScale }: MachineProfile,
  standoff: number,
  wished: number = FOCUS_POSITION,
): number {
  const ends = [focusScale.minDial, focusScale.maxDial].map((typed) => focusForDial(focusScale, typed, standoff));
  return clamped(wished, Math.min(...ends), Math.max(...ends));
}

/** Least value in [low, high] for which a monotone condition holds, given that it holds at `high`. */
function bisected(low: number, high: number, holds: (value: number) => boolean): number {
  let from = low;
  let to = high;
  for (let tries = 0; tries < 40; tries++) {
    const middle = (from + to) / 2;
    if (holds(middle)) to = middle;
    else from = middle;
  }
  return to;
}

/** The value, or the end of the range that it lies beyond. */
export function clamped(value: number, min: number, max: number): number {
  return Math.min(Math.max(value, min), max);
}

/** The next multiple of a step; a figure that an engineer would have written. */
function roundedUp(value: number, step: number): number {
  return Number((Math.ceil(value / step - 1e-9) * step).toFixed(6));
}
