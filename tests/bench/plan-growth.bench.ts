import process from 'node:process';
import { platePlan } from '../../strategy/corners/index.ts';
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

// The whole plan: what fits, the plate's heat, the choice, and what is said of it. The path is given.
const small = planned(few, 8);
const middle = planned(usual, 5);
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
