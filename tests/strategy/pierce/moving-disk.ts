/**
 * Steady temperature below and around a disk held at 1 that sinks into solid at 0, drawing an insulated bore behind it: finite
 * volumes in (r, z), frame of the disk, lengths in disk radii. The independent solver that the model's conduction is held against.
 */
export type MovingDisk = {
  /** Heat that stays in the solid, in k·a·ΔT: 4 for a still disk on a half-space (Carslaw & Jaeger, 2nd ed., chapter 8). */
  readonly netHeat: number;
  /** What flowed out at the far ends less what came through the disk, as a share of it: 0 but for rounding. */
  readonly imbalance: number;
};

/**
 * Solves for speed·radius/diffusivity = `peclet`. `depth` is the length of the bore in radii (0: the disk lies on the surface of a
 * half-space). `finest` is the cell at the disk's rim in radii; cells grow away from it.
 */
export function movingDisk(peclet: number, depth: number, finest: number): MovingDisk {
  const reach = 60;
  const r = [...edges(1, finest).map((x) => 1 - x)].reverse().concat(
    edges(reach, finest)
      .slice(1)
      .map((x) => 1 + x),
  );
  const down = edges(reach, finest);
  const up = depth === 0 ? [0] : edges(depth, finest);
  const z = [
    ...up
      .slice(1)
      .reverse()
      .map((x) => -x),
    ...down,
  ];
  const nr = r.length - 1;
  const nz = z.length - 1;
  const firstBelow = up.length - 1;
  const size = nr * nz;
  const band = nr;
  // Band matrix, row by row: place `band` is the diagonal.
  const width = 2 * band + 1;
  const matrix = new Float64Array(size * width);
  const right = new Float64Array(size);
  const at = (i: number, j: number) => j * nr + i;
  const isSolid = (i: number, j: number) => j >= firstBelow || (r[i] ?? 0) >= 1 - 1e-12;
  const add = (row: number, column: number, value: number) => {
    const place = row * width + band + column - row;
    matrix[place] = (matrix[place] ?? 0) + value;
  };
  const edge = (of: readonly number[], index: number) => of[index] ?? 0;
  const middle = (of: readonly number[], index: number) => (edge(of, index) + edge(of, index + 1)) / 2;
  const ring = (i: number) => Math.PI * (edge(r, i + 1) ** 2 - edge(r, i) ** 2);

  // Through a face between z1 < z2 a distance h apart, material moving to −z: flux up = B(−Ph)·T2 − B(Ph)·T1 over h, B(x) = x/(eˣ − 1).
  const bernoulli = (x: number) => (Math.abs(x) < 1e-8 ? 1 - x / 2 : x / Math.expm1(x));
  for (let j = 0; j < nz; j++) {
    for (let i = 0; i < nr; i++) {
      const row = at(i, j);
      if (!isSolid(i, j)) {
        add(row, row, 1);
        continue;
      }
      const height = edge(z, j + 1) - edge(z, j);
      if (i + 1 < nr) {
        const g = (2 * Math.PI * edge(r, i + 1) * height) / (middle(r, i + 1) - middle(r, i));
        if (isSolid(i + 1, j)) {
          add(row, row, g);
          add(row, at(i + 1, j), -g);
        }
      } else {
        add(row, row, (2 * Math.PI * edge(r, nr) * height) / (edge(r, nr) - middle(r, i))); // 0 beyond
      }
      if (i > 0 && isSolid(i - 1, j)) {
        const g = (2 * Math.PI * edge(r, i) * height) / (middle(r, i) - middle(r, i - 1));
        add(row, row, g);
        add(row, at(i - 1, j), -g);
      }
      // Below: the next cell, or 0 at the far end.
      const hBelow = (j + 1 < nz ? middle(z, j + 1) : edge(z, nz)) - middle(z, j);
      add(row, row, (ring(i) * bernoulli(peclet * hBelow)) / hBelow);
      if (j + 1 < nz) add(row, at(i, j + 1), (-ring(i) * bernoulli(-peclet * hBelow)) / hBelow);
      // Above: the next cell, the disk at 1, the insulated surface, or the way out at the bore's top, with the material.
      if (j > 0 && isSolid(i, j - 1)) {
        const h = middle(z, j) - middle(z, j - 1);
        add(row, row, (ring(i) * bernoulli(-peclet * h)) / h);
        add(row, at(i, j - 1), (-ring(i) * bernoulli(peclet * h)) / h);
      } else if (j === firstBelow && edge(r, i) < 1 - 1e-12) {
        const h = middle(z, j) - edge(z, j);
        add(row, row, (ring(i) * bernoulli(-peclet * h)) / h);
        right[row] = (right[row] ?? 0) + (ring(i) * bernoulli(peclet * h)) / h;
      } else {
        add(row, row, ring(i) * peclet);
      }
    }
  }
  const temperature = bandSolve(matrix, right, size, band);

  let through = 0;
  let left = 0;
  for (let i = 0; i < nr; i++) {
    if (edge(r, i) < 1 - 1e-12) {
      const h = middle(z, firstBelow) - edge(z, firstBelow);
      const up = (bernoulli(-peclet * h) * (temperature[at(i, firstBelow)] ?? 0) - bernoulli(peclet * h)) / h;
      through -= ring(i) * up;
    }
    const last = temperature[at(i, nz - 1)] ?? 0;
    const h = edge(z, nz) - middle(z, nz - 1);
    left += (ring(i) * bernoulli(peclet * h) * last) / h;
    if (isSolid(i, 0) && !(firstBelow === 0 && edge(r, i) < 1 - 1e-12))
      left += ring(i) * peclet * (temperature[at(i, 0)] ?? 0);
  }
  for (let j = 0; j < nz; j++) {
    const height = edge(z, j + 1) - edge(z, j);
    left +=
      ((2 * Math.PI * edge(r, nr) * height) / (edge(r, nr) - middle(r, nr - 1))) * (temperature[at(nr - 1, j)] ?? 0);
  }
  return { netHeat: through, imbalance: Math.abs(left / through - 1) };
}

/** Cell edges from 0 to `reach`, the first `finest` wide, growing by an eighth each. */
function edges(reach: number, finest: number): readonly number[] {
  const all = [0];
  for (let width = finest, x = 0; x < reach; width *= 1.14) {
    x += width;
    if (x > reach - width * 0.6) x = reach;
    all.push(x);
  }
  return all;
}

/** Elimination without exchange of rows: the matrix is diagonally dominant. */
function bandSolve(matrix: Float64Array, right: Float64Array, size: number, band: number): Float64Array {
  const width = 2 * band + 1;
  for (let k = 0; k < size; k++) {
    const pivot = matrix[k * width + band] ?? 0;
    for (let row = k + 1; row <= Math.min(size - 1, k + band); row++) {
      const lead = row * width + band + k - row;
      const factor = (matrix[lead] ?? 0) / pivot;
      if (factor === 0) continue;
      for (let c = 1; c <= band; c++)
        matrix[lead + c] = (matrix[lead + c] ?? 0) - factor * (matrix[k * width + band + c] ?? 0);
      right[row] = (right[row] ?? 0) - factor * (right[k] ?? 0);
    }
  }
  for (let k = size - 1; k >= 0; k--) {
    let sum = right[k] ?? 0;
    for (let c = 1; c <= band && k + c < size; c++) sum -= (matrix[k * width + band + c] ?? 0) * (right[k + c] ?? 0);
    right[k] = sum / (matrix[k * width + band] ?? 1);
  }
  return right;
}
