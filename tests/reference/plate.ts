import { type Mesh, twiceArea } from './mesh.ts';
import type { SteelHeat } from './steel-heat.ts';

/** The heat in the plate: content of each node's share, J per metre of thickness, and its conduction potential θ, W/m. */
export type Heat = { readonly content: Float64Array; readonly theta: Float64Array };

/**
 * The plate as node-centred finite volumes: each node's volume is a third of its triangles, the flux between two nodes is the triangles' cotangents times
 * their difference in θ, which is exact for a linear field. A triangle that the kerf opens is taken out: no volume, no flux, its edges insulated.
 */
export class Plate {
  readonly volume: Float64Array; // m³ per metre of thickness
  readonly count: number;
  private readonly mesh: Mesh;
  private readonly steel: SteelHeat;
  /** Symmetric matrix of conductances by rows; `diagonal` apart. */
  private readonly rows: Int32Array;
  private readonly columns: Int32Array;
  private readonly conductance: Float64Array;
  private readonly diagonal: Float64Array;
  /** Share of each triangle that the kerf has taken, and how many triangles about each node are not wholly taken. */
  private readonly opened: Float64Array;
  private readonly closedAbout: Int32Array;
  private readonly work: Float64Array[];

  constructor(mesh: Mesh, steel: SteelHeat) {
    this.mesh = mesh;
    this.steel = steel;
    const count = mesh.x.length;
    this.count = count;
    this.volume = new Float64Array(count);
    this.diagonal = new Float64Array(count);
    this.work = Array.from({ length: 6 }, () => new Float64Array(count));
    const neighbours = Array.from({ length: count }, () => new Set<number>());
    const { triangles } = mesh;
    for (let t = 0; t < triangles.length; t += 3) {
      const ids = [triangles[t] ?? 0, triangles[t + 1] ?? 0, triangles[t + 2] ?? 0];
      for (const a of ids) for (const b of ids) if (a !== b) neighbours[a]?.add(b);
    }
    this.rows = new Int32Array(count + 1);
    for (let i = 0; i < count; i++) this.rows[i + 1] = (this.rows[i] ?? 0) + (neighbours[i]?.size ?? 0);
    this.columns = new Int32Array(this.rows[count] ?? 0);
    this.conductance = new Float64Array(this.columns.length);
    neighbours.forEach((set, i) => {
      [...set].sort((a, b) => a - b).forEach((j, k) => (this.columns[(this.rows[i] ?? 0) + k] = j));
    });
    this.opened = new Float64Array(triangles.length / 3);
    this.closedAbout = new Int32Array(count);
    for (let t = 0; t < this.opened.length; t++) {
      this.add(t, 1);
      for (const node of this.nodesOf(t)) this.closedAbout[node] = (this.closedAbout[node] ?? 0) + 1;
    }
  }

  /** Takes a share of a triangle out of the plate; at 1 it is gone, and what rounding leaves of the volume of nodes without any triangle is cleared. */
  open(triangle: number, share: number): void {
    const more = share - (this.opened[triangle] ?? 0);
    if (!(more > 0)) return;
    this.opened[triangle] = share;
    this.add(triangle, -more);
    if (share < 1) return;
    for (const node of this.nodesOf(triangle)) {
      const left = (this.closedAbout[node] ?? 0) - 1;
      this.closedAbout[node] = left;
      if (left === 0) this.volume[node] = 0;
    }
  }

  /** How much of a triangle is opened, 0..1. */
  openedShare(triangle: number): number {
    return this.opened[triangle] ?? 0;
  }

  /** Volume that a node would lose with a share of a triangle, m³ per metre of thickness. */
  volumeShare(triangle: number, share: number): number {
    const [a, b, c] = this.nodesOf(triangle);
    return (share * twiceArea(this.mesh.x, this.mesh.y, a, b, c)) / 6;
  }

  nodesOf(triangle: number): [number, number, number] {
    const { triangles } = this.mesh;
    return [triangles[3 * triangle] ?? 0, triangles[3 * triangle + 1] ?? 0, triangles[3 * triangle + 2] ?? 0];
  }

  private add(triangle: number, share: number): void {
    const { x, y } = this.mesh;
    const ids = this.nodesOf(triangle);
    const [a, b, c] = ids;
    const area2 = twiceArea(x, y, a, b, c);
    for (let n = 0; n < 3; n++) {
      const [p, q, r] = [ids[n] ?? 0, ids[(n + 1) % 3] ?? 0, ids[(n + 2) % 3] ?? 0];
      this.volume[p] = (this.volume[p] ?? 0) + (share * area2) / 6;
      // the edge q–r under the angle at p: half its cotangent
      const [ux, uy] = [(x[q] ?? 0) - (x[p] ?? 0), (y[q] ?? 0) - (y[p] ?? 0)];
      const [vx, vy] = [(x[r] ?? 0) - (x[p] ?? 0), (y[r] ?? 0) - (y[p] ?? 0)];
      const weight = (share * (ux * vx + uy * vy)) / area2 / 2;
      this.conduct(q, r, weight);
      this.conduct(r, q, weight);
    }
  }

  private conduct(i: number, j: number, weight: number): void {
    let [low, high] = [this.rows[i] ?? 0, (this.rows[i + 1] ?? 0) - 1];
    while (low < high) {
      const middle = (low + high) >> 1;
      if ((this.columns[middle] ?? 0) < j) low = middle + 1;
      else high = middle;
    }
    this.conductance[low] = (this.conductance[low] ?? 0) + weight;
    this.diagonal[i] = (this.diagonal[i] ?? 0) + weight;
  }

  /** Nodes that share a triangle with a node. */
  around(node: number): readonly number[] {
    return Array.from(this.columns.subarray(this.rows[node] ?? 0, this.rows[node + 1] ?? 0));
  }

  empty(): Heat {
    return { content: new Float64Array(this.count), theta: new Float64Array(this.count) };
  }

  /** Sets θ again from the content, after volumes or contents were changed. */
  settle({ content, theta }: Heat, nodes?: Iterable<number>): void {
    const one = (i: number): void => {
      const v = this.volume[i] ?? 0;
      theta[i] = v > 0 ? this.steel.thetaOf((content[i] ?? 0) / v) : 0;
    };
    if (nodes) for (const i of nodes) one(i);
    else for (let i = 0; i < this.count; i++) one(i);
  }

  rise({ theta }: Heat, node: number): number {
    return this.steel.riseOf(theta[node] ?? 0);
  }

  /**
   * One step of `dt` s with `released` J per metre at each node spread evenly over it: Alexander's two-stage diagonally implicit method of second order,
   * which damps whatever is short against the step. Content is taken from the fluxes, so that nothing is lost to the solver's tolerance.
   */
  step(heat: Heat, dt: number, released: Float64Array): void {
    const gamma = 1 - Math.SQRT1_2;
    const { content, theta } = heat;
    const { count } = this;
    const [base, flow] = [this.work[4], this.work[5]];
    if (!base || !flow) return;
    const h = gamma * dt;
    for (let i = 0; i < count; i++) base[i] = (content[i] ?? 0) + gamma * (released[i] ?? 0);
    this.implicit(base, theta, h);
    // the first stage's slope times dt: −Kθ·dt + released
    this.apply(theta, flow);
    for (let i = 0; i < count; i++) {
      base[i] =
        (content[i] ?? 0) + (1 - gamma) * ((released[i] ?? 0) - dt * (flow[i] ?? 0)) + gamma * (released[i] ?? 0);
    }
    this.implicit(base, theta, h);
    const second = this.work[3];
    if (!second) return;
    this.apply(theta, second);
    for (let i = 0; i < count; i++) content[i] = (base[i] ?? 0) - h * (second[i] ?? 0);
    this.settle(heat);
  }

  /** Kθ: heat flowing out of each node, W per metre. */
  private apply(theta: Float64Array, out: Float64Array): void {
    const { rows, columns, conductance, diagonal, count } = this;
    for (let i = 0; i < count; i++) {
      let sum = (diagonal[i] ?? 0) * (theta[i] ?? 0);
      const to = rows[i + 1] ?? 0;
      for (let k = rows[i] ?? 0; k < to; k++) sum -= (conductance[k] ?? 0) * (theta[columns[k] ?? 0] ?? 0);
      out[i] = sum;
    }
  }

  /** Solves V·H(θ) + h·Kθ = base for θ by Newton's method; with constant properties that is one linear system. */
  private implicit(base: Float64Array, theta: Float64Array, h: number): void {
    const { count, volume, steel } = this;
    const [residual, change, capacity] = [new Float64Array(count), new Float64Array(count), new Float64Array(count)];
    let scale = 0;
    for (let i = 0; i < count; i++) scale += (base[i] ?? 0) ** 2;
    scale = Math.sqrt(scale);
    if (scale === 0) {
      theta.fill(0);
      return;
    }
    for (let round = 0; round < 30; round++) {
      this.apply(theta, residual);
      let norm = 0;
      for (let i = 0; i < count; i++) {
        const v = volume[i] ?? 0;
        if (v === 0) {
          residual[i] = 0;
          capacity[i] = 1;
          continue;
        }
        const t = theta[i] ?? 0;
        const left = (base[i] ?? 0) - v * steel.contentOf(t) - h * (residual[i] ?? 0);
        residual[i] = left;
        capacity[i] = v * steel.capacityOf(t);
        norm += left * left;
      }
      if (Math.sqrt(norm) < 1e-8 * scale) return;
      this.conjugate(
        residual,
        change,
        capacity,
        h,
        steel.constant ? 3e-9 * scale : Math.max(3e-9 * scale, 0.02 * Math.sqrt(norm)),
      );
      for (let i = 0; i < count; i++) theta[i] = (theta[i] ?? 0) + (change[i] ?? 0);
    }
    throw new RangeError('the implicit step does not converge');
  }

  /** Solves (capacity + h·K)·out = right by conjugate gradients, preconditioned by a symmetric Gauss–Seidel sweep. */
  private conjugate(
    right: Float64Array,
    out: Float64Array,
    capacity: Float64Array,
    h: number,
    tolerance: number,
  ): void {
    const { count, rows, columns, conductance, diagonal } = this;
    const [direction, product, swept] = [this.work[0], this.work[1], this.work[2]];
    if (!direction || !product || !swept) return;
    const main = new Float64Array(count);
    for (let i = 0; i < count; i++) main[i] = (capacity[i] ?? 0) + h * (diagonal[i] ?? 0);
    const precondition = (r: Float64Array, z: Float64Array): void => {
      for (let i = 0; i < count; i++) {
        let sum = r[i] ?? 0;
        const to = rows[i + 1] ?? 0;
        for (let k = rows[i] ?? 0; k < to; k++) {
          const j = columns[k] ?? 0;
          if (j >= i) break;
          sum += h * (conductance[k] ?? 0) * (z[j] ?? 0);
        }
        z[i] = sum / (main[i] ?? 1);
      }
      for (let i = count - 1; i >= 0; i--) {
        let sum = 0;
        for (let k = (rows[i + 1] ?? 0) - 1; k >= (rows[i] ?? 0); k--) {
          const j = columns[k] ?? 0;
          if (j <= i) break;
          sum += h * (conductance[k] ?? 0) * (z[j] ?? 0);
        }
        z[i] = (z[i] ?? 0) + sum / (main[i] ?? 1);
      }
    };
    out.fill(0);
    precondition(right, swept);
    direction.set(swept);
    let rho = dot(right, swept);
    for (let round = 0; round < 2000; round++) {
      if (norm(right) <= tolerance) return;
      for (let i = 0; i < count; i++) {
        let sum = (main[i] ?? 0) * (direction[i] ?? 0);
        const to = rows[i + 1] ?? 0;
        for (let k = rows[i] ?? 0; k < to; k++) sum -= h * (conductance[k] ?? 0) * (direction[columns[k] ?? 0] ?? 0);
        product[i] = sum;
      }
      const step = rho / dot(direction, product);
      for (let i = 0; i < count; i++) {
        out[i] = (out[i] ?? 0) + step * (direction[i] ?? 0);
        right[i] = (right[i] ?? 0) - step * (product[i] ?? 0);
      }
      precondition(right, swept);
      const next = dot(right, swept);
      const share = next / rho;
      rho = next;
      for (let i = 0; i < count; i++) direction[i] = (swept[i] ?? 0) + share * (direction[i] ?? 0);
    }
    throw new RangeError('conjugate gradients do not converge');
  }
}

function dot(a: Float64Array, b: Float64Array): number {
  let sum = 0;
  for (let i = 0; i < a.length; i++) sum += (a[i] ?? 0) * (b[i] ?? 0);
  return sum;
}

const norm = (a: Float64Array): number => Math.sqrt(dot(a, a));
