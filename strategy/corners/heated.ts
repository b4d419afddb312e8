import { returnOf } from '../heat/return-temperature.ts';
import { celsius } from '../units/said.ts';
import type { Candidate, Case, Context, Way } from './case.ts';

/** A treatment that fits with the tip's return temperature, K, on a plate of one temperature. */
export function heated(found: Case, way: Way, { request }: Pick<Context, 'request'>): Candidate {
  const { cut, plateTemperature, properties } = request;
  const { onPath, before } = found;
  return candidateOf(way, returnOf({ corner: onPath, before, ...way.asks, cut, plateTemperature, properties }));
}

/** A treatment that fits, told with the temperature that the tip returns at, K. */
export function candidateOf(way: Way, returnWith: number): Candidate {
  const { treatment, addedTime, say, loop, ease, round } = way;
  return {
    treatment,
    fits: true,
    returnWith,
    addedTime,
    why: say(celsius(returnWith)),
    ...(loop ? { loop } : {}),
    ...(ease ? { ease } : {}),
    ...(round ? { round } : {}),
  };
}
