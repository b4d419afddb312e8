import process from 'node:process';
import { cornerPlan } from '../../strategy/corners/index.ts';
import { plateOfParts } from './corner-plate.ts';
import { sayLine } from './line.ts';

/** Corners on the smaller and on the larger plate. */
const [few, many] = [2_000, 20_000];

/** Corners of a plate, and the processor's time for the whole plan, ms: the least of some rounds, so that what else runs does not count. */
function planned(corners: number, rounds: number): { readonly corners: number; readonly time: number } {
  const request = plateOfParts(corners / 10);
  // without dwells, which cost no clearance, every tip looks for a loop and gets one where one fits
  const { rules } = request;
  const looping = { ...request, rules: { ...rules, dwell: { ...rules.dwell, allowed: false } } };
  let least = Infinity;
  let found = 0;
  for (let round = 0; round < rounds; round++) {
    const start = process.cpuUsage();
    const plan = cornerPlan(looping);
    const used = process.cpuUsage(start);
    least = Math.min(least, (used.user + used.system) / 1000);
    found = plan.corners.length;
    if (plan.totals.loops < corners / 4) throw new Error(`only ${plan.totals.loops} loops on ${corners} corners`);
  }
  return { corners: found, time: least };
}

// The whole plan with heat, times and clearance.
const small = planned(few, 6);
const large = planned(many, 2);
const evenly = (small.time * large.corners) / small.corners;
sayLine({
  case: 'corner-growth',
  ours: large.time,
  // what it would be if every corner cost what it costs on the smaller plate
  peer: evenly,
  unit: 'ms',
  ratio: evenly / large.time,
  errorMean: null,
  errorMax: null,
  exponent: Math.log(large.time / small.time) / Math.log(large.corners / small.corners),
});
