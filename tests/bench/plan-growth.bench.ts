import process from 'node:process';
import { keptPlan, planAgain, platePlan } from '../../strategy/corners/index.ts';
import { cutOfPlate } from './cut-plate.ts';
import { sayLine } from './line.ts';

/** Corners of the plates, about: from a few parts to ten large plates' worth. */
const [few, usual, many] = [200, 2_000, 20_000];

/** Corners of a plate, and the processor's time for the whole plan, ms: the least of some rounds, so that what else runs does not count. */
function planned(corners: number, rounds: number): { readonly corners: number; readonly time: number } {
  const request = cutOfPlate(corners / 10);
  let least = Infinity;
  let found = 0;
  for (let round = 0; round < rounds; round++) {
    const start = process.cpuUsage();
    const plan = platePlan(request);
    const used = process.cpuUsage(start);
    least = Math.min(least, (used.user + used.system) / 1000);
    found = plan.corners.length;
    if (plan.totals.treated < corners / 8) throw new Error(`only ${plan.totals.treated} corners are treated`);
    if (plan.totals.problems > corners / 20) throw new Error(`${plan.totals.problems} corners stay over the limit`);
  }
  return { corners: found, time: least };
}

/** The processor's time, ms, for planning the plate again when one corner is asked for: the least and the most of some corners all over it, each the least of three. */
function plannedAgain(corners: number, rounds: number): { readonly least: number; readonly most: number } {
  const kept = keptPlan(cutOfPlate(corners / 10));
  const waits = kept.plan.corners.filter(({ treatment }) => treatment === 'dwell');
  const times = Array.from({ length: rounds }, (_, round) => {
    const id = waits[Math.floor((round * waits.length) / rounds)]?.id ?? '';
    return Math.min(
      ...Array.from({ length: 3 }, () => {
        const start = process.cpuUsage();
        const again = planAgain(kept, { [id]: 'leave' });
        const used = process.cpuUsage(start);
        if (again.plan.totals.treated >= kept.plan.totals.treated) throw new Error(`${id} is not left`);
        return (used.user + used.system) / 1000;
      }),
    );
  });
  return { least: Math.min(...times), most: Math.max(...times) };
}

// The whole plan: what fits, the plate's heat, the choice, and what is said of it. The path is given.
const small = planned(few, 8);
const middle = planned(usual, 5);
const again = plannedAgain(usual, 12);
const large = planned(many, 1);
const evenly = (small.time * large.corners) / small.corners;
sayLine({
  case: 'plan-growth',
  // the plate of 3 × 1.5 m
  ours: middle.time,
  // what it would be if every corner cost what it costs on the smallest plate
  peer: (small.time * middle.corners) / small.corners,
  unit: 'ms',
  ratio: evenly / large.time,
  errorMean: null,
  errorMax: null,
  exponent: Math.log(large.time / small.time) / Math.log(large.corners / small.corners),
});
process.stderr.write(
  `plan-growth: the plate of ${middle.corners} corners again with one of them asked for: ${again.least.toFixed(0)} to ${again.most.toFixed(0)} ms\n`,
);
