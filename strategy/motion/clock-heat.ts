import type { HeatedPiece } from '../heat/path-heat.ts';
import type { Point } from '../path/point.ts';
import { segmentPart } from '../path/segment.ts';
import type { PathClock } from './path-clock.ts';
import { clockDistance } from './path-clock.ts';
import type { ClockStep, PlateClock, TimedRun } from './plate-clock.ts';

export type HeatOfCut = {
  /** Heat the straight cut leaves in the plate, J per m² of cut face (length × thickness), both sides together. */
  readonly heatIntoPlate: number;
  /** Heat one pierce leaves in the plate, J: of the pierce's own prediction. */
  readonly pierceHeat: number;
};

/** Heat of a pierce, J, taken as given off at a place, m, at one moment, s: the end of its routine, as none is there before it was given off. */
export type PierceDeposit = { readonly at: Point; readonly time: number; readonly heat: number };

/** All heat that a cut leaves in the plate, in the order of time. */
export type ClockHeat = { readonly heat: readonly HeatedPiece[]; readonly pierces: readonly PierceDeposit[] };

/** A piece's source goes at one speed: where the cut changes speed, pieces are parted until the source is never further off than this, m. */
const placeOff = 0.2e-3;

/**
 * The heat a cut leaves, as pieces of path with their times, s, and power, W per m of thickness, and its pierces. A metre of cut leaves the same however fast
 * the axes let it be cut: slower where they turn, the heat into the plate stays what it is per length. Where the cut is eased it goes as the mean power over the
 * feed, as in the return temperature. Nothing is left while it waits or starts again. Throws RangeError for heat below 0.
 */
export function heatOfClock({ steps, runs }: PlateClock, { heatIntoPlate, pierceHeat }: HeatOfCut): ClockHeat {
  if (!(heatIntoPlate >= 0 && pierceHeat >= 0)) {
    throw new RangeError(
      `heat into the plate ${heatIntoPlate} J/m² and of a pierce ${pierceHeat} J must not be below 0`,
    );
  }
  const heat: HeatedPiece[] = [];
  const pierces: PierceDeposit[] = [];
  for (const step of steps) {
    const run = runs[step.run];
    if (step.phase === 'pierce') pierces.push({ at: step.at, time: step.end, heat: pierceHeat });
    else if (step.phase === 'cut' && run) addStretch(step, run, heatIntoPlate, heat);
  }
  return { heat, pierces };
}

type CutStep = Extract<ClockStep, { readonly phase: 'cut' }>;

function addStretch(step: CutStep, run: TimedRun, heatIntoPlate: number, heat: HeatedPiece[]): void {
  const { first, reached, ends, clock, start } = step;
  for (let i = 0; i < ends.length; i++) {
    const segment = run.segments[first + i];
    if (!segment) continue;
    const [from, to] = [i > 0 ? (ends[i - 1] ?? 0) : 0, ends[i] ?? 0];
    const [begins, reaches] = [i > 0 ? (reached[i - 1] ?? 0) : 0, reached[i] ?? 0];
    const length = reaches - begins;
    if (!(to > from && length > 0)) continue;
    const perLength = (heatIntoPlate * (run.powerShares[first + i] ?? 1)) / (run.feedShares[first + i] ?? 1);
    let [place, time] = [begins, from];
    for (const cut of [...partings(clock, { place: begins, time: from }, { place: reaches, time: to }), to]) {
      const next = cut === to ? reaches : clockDistance(clock, cut);
      if (!(next > place && cut > time)) continue;
      const whole = place === begins && next === reaches;
      heat.push({
        segment: whole ? segment : segmentPart(segment, (place - begins) / length, (next - begins) / length),
        from: start + time,
        to: start + cut,
        powerPerLength: (perLength * (next - place)) / (cut - time),
      });
      [place, time] = [next, cut];
    }
  }
}

type Passing = { readonly place: number; readonly time: number };

/** Times, s, at which a segment is parted, so that a source of even speed in each part stays with the cut. Rising. */
function partings({ distance, time }: PathClock, a: Passing, b: Passing): number[] {
  const speed = (b.place - a.place) / (b.time - a.time);
  let worst = placeOff;
  let at: Passing | null = null;
  for (let i = firstAfter(time, a.time); i < time.length; i++) {
    const passing = { place: distance[i] ?? 0, time: time[i] ?? 0 };
    if (passing.time >= b.time) break;
    const off = Math.abs(a.place + speed * (passing.time - a.time) - passing.place);
    if (off <= worst) continue;
    worst = off;
    at = passing;
  }
  if (!at) return [];
  return [...partings({ distance, time }, a, at), at.time, ...partings({ distance, time }, at, b)];
}

function firstAfter(rising: Float64Array, value: number): number {
  let low = 0;
  let high = rising.length;
  while (low < high) {
    const middle = (low + high) >> 1;
    if ((rising[middle] ?? 0) > value) high = middle;
    else low = middle + 1;
  }
  return low;
}
