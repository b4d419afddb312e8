import {
  PIERCE_DEFAULTS,
  pierceOutline,
  type PierceInput,
  type Stage,
  type StageQuantities,
} from '../../strategy/pierce/index.ts';
import {
  boreMoment,
  boreMomentEmpty,
  boreOf,
  boreRamp,
  boreSetAt,
  FLOWS,
  MOMENT_SIZE,
  SET_SIZE,
  type Bore,
} from '../../strategy/pierce/bore.ts';
import { NOZZLE_1_5, TEN_KILOWATT } from '../support/machines.ts';
import { sayLine, seededNumbers, timeOf } from './line.ts';

const next = seededNumbers(20_260_101);
const between = (min: number, max: number) => min + (max - min) * next();

type Kind = 'ramps that join' | 'stages that step' | 'long pauses' | 'continuous';

/** Five stages that grow in power, of one of four kinds. */
function fiveStages(kind: Kind): readonly Stage[] {
  const powers = [between(450, 650), between(700, 900), between(1000, 1500), between(1600, 2400), between(2400, 3400)];
  powers.push(between(3000, 4500));
  const knot = (i: number): StageQuantities => {
    const pulsed = kind !== 'continuous';
    const duty = pulsed ? 0.35 + 0.06 * i : 1;
    return {
      standoff: 0.01 - 0.001 * i,
      focusPosition: 0.005 - 0.0006 * i,
      peakPower: (powers[i] ?? 0) / duty,
      duty,
      pulseFrequency: pulsed ? (kind === 'long pauses' ? 60 + 30 * i : 120 + 20 * i) : null,
      oxygenPressure: (0.4 + 0.12 * i) * 1e5,
    };
  };
  return [0, 1, 2, 3, 4].map((i) => ({
    duration: between(0.6, 1.8),
    from: knot(i),
    to: kind === 'stages that step' ? knot(i) : knot(i + 1),
  }));
}

const KINDS: readonly Kind[] = ['ramps that join', 'stages that step', 'long pauses', 'continuous'];
const cases = KINDS.flatMap((kind) =>
  [0, 1, 2].map(() => ({ stages: fiveStages(kind), thickness: between(0.012, 0.02), plateTemperature: 293.15 })),
);
const inputs = cases.map((one): PierceInput => ({ ...one, profile: TEN_KILOWATT, nozzle: NOZZLE_1_5 }));
const bore = boreOf(TEN_KILOWATT, NOZZLE_1_5, 293.15, PIERCE_DEFAULTS);

/** Moment of breakthrough, s, or at the end of the routine the depth, m: what is compared. */
function ours(input: PierceInput): number {
  const { breakthroughTime, depth } = pierceOutline(input);
  return breakthroughTime ?? depth;
}

/**
 * The peer: the same balance by classical Runge–Kutta in equal steps within each stage, its flows added up with the same weights, the
 * breakthrough put in straight between the ends of the last step. `refine` finds it by halving that step instead, for the reference.
 */
function plain(hole: Bore, stages: readonly Stage[], thickness: number, steps: number, refine = false): number {
  const set = new Float64Array(SET_SIZE);
  const ramp = new Float64Array(2 * SET_SIZE);
  const moments = [0, 1, 2, 3].map(() => boreMomentEmpty());
  const [m1, m2, m3, m4] = moments;
  if (m1 === undefined || m2 === undefined || m3 === undefined || m4 === undefined) throw new Error('no room');
  const sums = new Float64Array(MOMENT_SIZE);
  let depth = 0;
  let start = 0;
  for (const stage of stages) {
    boreRamp(ramp, stage);
    const speed = (time: number, at: number, moment: Float64Array): number => {
      boreSetAt(set, ramp, time / stage.duration);
      return boreMoment(hole, set, at, moment);
    };
    const stepped = (time: number, h: number): number => {
      const k1 = speed(time, depth, m1);
      const k2 = speed(time + h / 2, depth + (h / 2) * k1, m2);
      const k3 = speed(time + h / 2, depth + (h / 2) * k2, m3);
      const k4 = speed(time + h, depth + h * k3, m4);
      return depth + (h / 6) * (k1 + 2 * k2 + 2 * k3 + k4);
    };
    const h = stage.duration / steps;
    for (let i = 0; i < steps; i++) {
      const after = stepped(i * h, h);
      if (after >= thickness) {
        if (!refine) return start + i * h + (h * (thickness - depth)) / (after - depth);
        let [low, high] = [0, h];
        for (let tries = 0; tries < 60; tries++) {
          const middle = (low + high) / 2;
          if (stepped(i * h, middle) >= thickness) high = middle;
          else low = middle;
        }
        return start + i * h + high;
      }
      for (let flow = 0; flow < FLOWS; flow++) {
        const sum = (m1[flow] ?? 0) + 2 * (m2[flow] ?? 0) + 2 * (m3[flow] ?? 0) + (m4[flow] ?? 0);
        sums[flow] = (sums[flow] ?? 0) + (h / 6) * sum;
      }
      depth = after;
    }
    start += stage.duration;
  }
  return depth;
}

const REFERENCE_STEPS = 40_000;
const truth = cases.map(({ stages, thickness }) => plain(bore, stages, thickness, REFERENCE_STEPS, true));
const errorsOf = (answers: readonly number[]) =>
  answers.map((answer, i) => Math.abs(answer / (truth[i] ?? Number.NaN) - 1));
const mean = (of: readonly number[]) => of.reduce((sum, one) => sum + one, 0) / of.length;

const oursErrors = errorsOf(inputs.map(ours));
// The fewest steps with which the peer's mean error is as small, found by doubling: never fewer than it needs by more than half.
let steps = 8;
while (
  steps < REFERENCE_STEPS / 4 &&
  mean(errorsOf(cases.map(({ stages, thickness }) => plain(bore, stages, thickness, steps)))) > mean(oursErrors)
) {
  steps *= 2;
}

// All cases in one call, so that both sides do the same work.
const oursTime = timeOf(() => mean(inputs.map(ours)), { warmUp: 300, rounds: 15, calls: 20 }) / cases.length;
const peerTime =
  timeOf(() => mean(cases.map(({ stages, thickness }) => plain(bore, stages, thickness, steps))), {
    warmUp: 1,
    rounds: 3,
    calls: 1,
  }) / cases.length;
sayLine({
  case: 'pierce-predict',
  ours: oursTime,
  peer: peerTime,
  unit: 'ms',
  ratio: peerTime / oursTime,
  errorMean: mean(oursErrors),
  errorMax: Math.max(...oursErrors),
  exponent: null,
});
