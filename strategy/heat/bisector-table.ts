import { bisectorKernel } from './wedge-kernel.ts';

/** Values of the kernel between z = 0 and ∞, at even steps of z/(1 + z), are kept for this many of the last angles asked about. */
const tableSteps = 40;
const keptAngles = 4000;
const tables = new Map<number, Float64Array>();

/**
 * What the wedge multiplies a line source on one of its edges with, on the bisector, dimensionless, with the direct distance already counted: 2π/β for
 * small z, 2 for large. Of the tables the value is within 1e-3.
 */
export function bisectorShare(table: Float64Array, z: number): number {
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

/** The kernel of a wedge of `angle` rad, for `bisectorShare`. */
export function bisectorTable(angle: number): Float64Array {
  const kept = tables.get(angle);
  if (kept) return kept;
  const table = new Float64Array(tableSteps + 1);
  for (let i = 0; i < tableSteps; i++) {
    const z = i / (tableSteps - i);
    table[i] = bisectorKernel(angle, z);
  }
  table[tableSteps] = 2;
  if (tables.size >= keptAngles) tables.delete(tables.keys().next().value ?? 0);
  tables.set(angle, table);
  return table;
}
