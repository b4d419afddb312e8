import { panelIntegral } from './gauss-legendre.ts';
import type { PlateProperties } from './properties.ts';
import { diffusivity } from './properties.ts';
import { wedgeKernelScaled } from './wedge-kernel.ts';

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

/** Values of the kernel between z = 0 and ∞, at even steps of z/(1 + z), are kept for this many of the last angles asked about. */
const tableSteps = 40;
const keptAngles = 400;
const tables = new Map<number, Float64Array>();

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
  const table = tableOf(angle);
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
      return Math.exp(-square(along) / (alpha4 * age)) * lookUp(table, z);
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

/**
 * What the wedge multiplies a line source on one of its edges with, on the bisector, dimensionless, with the direct distance already counted: 2π/β for
 * small z, 2 for large. Of the tables the value is within 1e-3.
 */
function lookUp(table: Float64Array, z: number): number {
  const x = (tableSteps * z) / (1 + z);
  const i = Math.min(tableSteps - 2, Math.max(1, Math.floor(x)));
  const f = x - i;
  const [a, b, c, d] = [table[i - 1] ?? 0, table[i] ?? 0, table[i + 1] ?? 0, table[i + 2] ?? 0];
  // Lagrange through four points
  return (
    (-f * (f - 1) * (f - 2) * a) / 6 +
    ((f + 1) * (f - 1) * (f - 2) * b) / 2 -
    ((f + 1) * f * (f - 2) * c) / 2 +
    ((f + 1) * f * (f - 1) * d) / 6
  );
}

function tableOf(angle: number): Float64Array {
  const kept = tables.get(angle);
  if (kept) return kept;
  const table = new Float64Array(tableSteps + 1);
  for (let i = 0; i < tableSteps; i++) {
    const z = i / (tableSteps - i);
    table[i] = wedgeKernelScaled(angle, angle / 2, angle, z) * Math.exp(2 * z * Math.sin(angle / 4) ** 2);
  }
  table[tableSteps] = 2;
  if (tables.size >= keptAngles) tables.delete(tables.keys().next().value ?? 0);
  tables.set(angle, table);
  return table;
}
