import type { MachineProfile } from '../../strategy/machine.ts';
import {
  DEFAULT_RESERVE_RULES,
  PIERCE_DEFAULTS,
  piercePropose,
  routineTime,
  type ProposeInput,
  type Stage,
  type StageQuantities,
} from '../../strategy/pierce/index.ts';
import { boreOf, type Bore } from '../../strategy/pierce/bore.ts';
import { pierceRun } from '../../strategy/pierce/run.ts';
import { FOUR_KILOWATT, NOZZLE_1_5, TEN_KILOWATT } from '../support/machines.ts';
import { sayLine, timeOf } from './line.ts';

const HOT = 423.15;
const COLD = 293.15;
/** The peer need not be as short to the last tenth. */
const AS_SHORT = 1.02;
/** Finest grid that is tried: so many values of each of the five numbers. */
const FINEST = 11;

const tasks: readonly ProposeInput[] = (
  [
    [TEN_KILOWATT, 20],
    [FOUR_KILOWATT, 12],
    [TEN_KILOWATT, 28],
  ] as const
).map(([profile, mm]) => ({
  profile,
  nozzle: NOZZLE_1_5,
  thickness: { min: mm * 0.9e-3, max: mm * 1e-3 },
  hottestPlateTemperature: HOT,
}));

type Grid = { readonly best: number; readonly looked: number };

/**
 * The peer: every combination of the mean power at three knots and the time of two ramps on an even grid, a hold as the reserve asks for. It is
 * given what the proposal found out beside that (focus, standoff, frequency, pressure, duty) and uses the same quick prediction.
 */
function gridSearch({ profile, thickness }: ProposeInput, like: readonly Stage[], values: number): Grid {
  const [cold, hot] = [COLD, HOT].map((plate) => boreOf(profile, NOZZLE_1_5, plate, PIERCE_DEFAULTS));
  if (cold === undefined || hot === undefined) throw new Error('no bore');
  const first = like[0]?.from;
  const last = like.at(-1)?.to;
  if (first === undefined || last === undefined) throw new Error('nothing to be like');
  const most = 0.95 * profile.source.maxPower * 0.9;
  const power = (i: number) => 400 * (most / 400) ** (i / (values - 1));
  const time = (i: number) => Math.round(10 * 0.2 * (3 / 0.2) ** (i / (values - 1))) / 10;
  const knot = (part: number, mean: number): StageQuantities => knotLike(profile, first, last, part, mean);
  let best = Number.POSITIVE_INFINITY;
  let looked = 0;
  for (let a = 0; a < values; a++) {
    for (let b = a; b < values; b++) {
      for (let c = b; c < values; c++) {
        for (let s = 0; s < values; s++) {
          for (let t = 0; t < values; t++) {
            looked += 1;
            const [from, middle, to] = [knot(0, power(a)), knot(0.5, power(b)), knot(1, power(c))];
            const stages: readonly Stage[] = [
              { duration: time(s), from, to: middle },
              { duration: time(t), from: middle, to },
              { duration: 60, from: to, to },
            ];
            best = Math.min(best, routineOf(cold, hot, stages, thickness.max, best));
          }
        }
      }
    }
  }
  return { best, looked };
}

/** Time of the routine with the hold that the reserve asks for, s; infinite when it is not sound or no shorter than `beat`. */
function routineOf(cold: Bore, hot: Bore, stages: readonly Stage[], thickness: number, beat: number): number {
  const ramps = routineTime(stages.slice(0, -1));
  if (ramps >= beat) return Number.POSITIVE_INFINITY;
  const inCold = pierceRun(cold, stages, thickness);
  if (inCold.through === null || inCold.through.time < ramps || inCold.stood > 0.05) return Number.POSITIVE_INFINITY;
  if (DEFAULT_RESERVE_RULES.cold * inCold.through.time >= beat) return Number.POSITIVE_INFINITY;
  const inHot = pierceRun(hot, stages, thickness);
  if (inHot.through === null) return Number.POSITIVE_INFINITY;
  const index = Math.max(...inCold.eruptions, ...inHot.eruptions);
  if (index >= 0.8 * PIERCE_DEFAULTS.eruptionLimit) return Number.POSITIVE_INFINITY;
  const wished = Math.max(
    DEFAULT_RESERVE_RULES.cold * inCold.through.time,
    DEFAULT_RESERVE_RULES.hot * inHot.through.time,
    ramps + 0.1,
  );
  return Math.ceil(wished * 10 - 1e-7) / 10;
}

function knotLike(
  { source }: MachineProfile,
  first: StageQuantities,
  last: StageQuantities,
  part: number,
  meanPower: number,
): StageQuantities {
  const mixed = (from: number, to: number) => from + (to - from) * part;
  const usual = 0.35 + 0.3 * part;
  const peakPower = Math.min(0.95 * source.maxPower, Math.max(source.minPower, meanPower / usual));
  return {
    standoff: mixed(first.standoff, last.standoff),
    focusPosition: mixed(first.focusPosition, last.focusPosition),
    peakPower,
    duty: Math.min(0.9, Math.max(source.minDuty, meanPower / peakPower)),
    pulseFrequency: mixed(first.pulseFrequency ?? 100, last.pulseFrequency ?? 200),
    oxygenPressure: mixed(first.oxygenPressure, last.oxygenPressure),
  };
}

let oursTotal = 0;
let peerTotal = 0;
const shorter: number[] = [];
for (const task of tasks) {
  const proposal = piercePropose(task);
  if (proposal.kind !== 'ok') throw new Error('no proposal to compare with');
  const found = proposal.prediction.routineTime;
  oursTotal += timeOf(
    () => {
      const again = piercePropose(task);
      return again.kind === 'ok' ? again.prediction.routineTime : Number.NaN;
    },
    { warmUp: 3, rounds: 7, calls: 1 },
  );
  // Grids ever finer; only the one that is fine enough counts, or the finest where none is.
  for (let values = 5; values <= FINEST; values += 1) {
    const start = performance.now();
    const { best } = gridSearch(task, proposal.stages, values);
    const took = performance.now() - start;
    if (best <= found * AS_SHORT || values === FINEST) {
      peerTotal += took;
      shorter.push(best / found - 1);
      break;
    }
  }
}
sayLine({
  case: 'pierce-propose',
  ours: oursTotal / tasks.length,
  peer: peerTotal / tasks.length,
  unit: 'ms',
  ratio: peerTotal / oursTotal,
  // By how much the peer's routine is longer than ours, in the mean and at most.
  errorMean: shorter.reduce((sum, one) => sum + one, 0) / shorter.length,
  errorMax: Math.max(...shorter),
  exponent: null,
});
