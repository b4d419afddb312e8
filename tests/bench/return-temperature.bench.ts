import { returnOf } from '../../strategy/heat/index.ts';
import { cornerSet, questionOf, type SetCase } from '../reference/corners.ts';
import { solveCorner } from '../reference/solve.ts';
import { sayLine, timeOf } from './line.ts';

/** The size of cell with which the reference's results are kept, m: halving it moves none of them by 1 %. */
const finest = 0.1e-3;

/** Of each treatment the slow and the fast corner in the middle of its angles. */
const corners = (['leave', 'tangent loop', 'flat loop', 'dwell', 'ease', 'round'] as const).flatMap((group) => {
  const all = cornerSet().filter((one) => one.group === group);
  const middle = Math.floor(all.length / 2);
  return all.slice(middle - 1, middle + 1);
});

const ours = (one: SetCase): number => returnOf(questionOf(one)) - one.plateTemperature;
const peer = (one: SetCase): number => solveCorner(one, { finest }).returnRise;

const reference: number[] = [];
const peerTime =
  timeOf(
    () => {
      const rises = corners.map(peer);
      reference.push(...rises);
      return rises.reduce((sum, rise) => sum + rise, 0);
    },
    { warmUp: 0, rounds: 1, calls: 1 },
  ) / corners.length;
const oursTime =
  timeOf(() => corners.reduce((sum, one) => sum + ours(one), 0), { warmUp: 50, rounds: 9, calls: 20 }) / corners.length;
const errors = corners.map((one, i) => Math.abs(ours(one) / (reference[i] ?? Number.NaN) - 1));
sayLine({
  case: 'return-temperature',
  ours: oursTime,
  peer: peerTime,
  unit: 'ms a corner',
  ratio: peerTime / oursTime,
  errorMean: errors.reduce((sum, error) => sum + error, 0) / errors.length,
  errorMax: Math.max(...errors),
  exponent: null,
});
