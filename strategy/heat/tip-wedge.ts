import { panelIntegral } from './gauss-legendre.ts';
import type { PlateProperties } from './properties.ts';
import { diffusivity } from './properties.ts';
import { bisectorShare, bisectorTable } from './bisector-table.ts';

/** A stretch of the second edge: how far its ends are from the finished tip along the edge, m, and when the front is there, s. */
export type EdgeStretch = {
  readonly from: number; // m
  readonly to: number; // m
  readonly start: number; // s
  readonly end: number; // s
  /** W per metre of thickness, both sides of the kerf together. */
  readonly powerPerLength: number;
};

/** Past this exponent a contribution is below 1e-11 of what it could be. */
const negligible = 25;

/**
 * Temperature rise, K, on the bisector of an insulated wedge, `depth` m from its tip, at `time` s, from a source that runs along one of its edges: half of
 * what it gives goes to the wedge. Instantaneous line sources in a wedge (Carslaw and Jaeger, ch. 14), superposed; near the tip π/β times what a straight
 * edge would get.
 */
export function edgeRise(
  stretches: readonly EdgeStretch[],
  angle: number,
  depth: number,
  time: number,
  plate: PlateProperties,
): number {
  const alpha4 = 4 * diffusivity(plate);
  const table = bisectorTable(angle);
  const cosine = Math.cos(angle / 2);
  let rise = 0;
  for (const { from, to, start, end, powerPerLength } of stretches) {
    if (!(time > start) || powerPerLength === 0) continue;
    const speed = (to - from) / (end - start);
    const square = (along: number) => depth * depth + along * along - 2 * depth * along * cosine;
    const nearest = square(Math.min(to, Math.max(from, depth * cosine)));
    const oldest = time - start;
    const youngest = Math.max(time - end, nearest / (alpha4 * negligible));
    if (youngest >= oldest) continue;
    const integrand = (logAge: number): number => {
      const age = Math.exp(logAge);
      const along = from + speed * (oldest - age);
      const z = (2 * depth * along) / (alpha4 * age);
      return Math.exp(-square(along) / (alpha4 * age)) * bisectorShare(table, z);
    };
    let low = Math.log(youngest);
    const high = Math.log(oldest);
    let sum = 0;
    while (low < high) {
      const width = Math.min(1.4, (3 * Math.sqrt(alpha4 / Math.exp(low))) / speed);
      const next = high - low < 1.1 * width ? high : low + width;
      sum += panelIntegral(integrand, low, next);
      low = next;
    }
    rise += (powerPerLength / (8 * Math.PI * plate.conductivity)) * sum;
  }
  return rise;
}
