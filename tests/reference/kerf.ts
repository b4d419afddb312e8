import { type Mesh, twiceArea, type WallNode } from './mesh.ts';
import type { Heat, Plate } from './plate.ts';
import { distanceToPiece, opensAt, pieceAt, stationBeside, type Way } from './way.ts';

/** A triangle of the kerf and the stations between which the beam comes over it, m. */
type Taken = { readonly triangle: number; readonly from: number; readonly to: number };

/** The kerf that opens along a way: which triangles it takes when, where the beam's heat goes, and where the heat of what it took goes. */
export class Kerf {
  private readonly plate: Plate;
  private readonly mesh: Mesh;
  private readonly way: Way;
  private readonly radius: number;
  /** Triangles by the station at which the beam begins to take them. */
  private readonly order: readonly Taken[];
  private begun = 0;
  private underway: Taken[] = [];

  constructor(plate: Plate, mesh: Mesh, way: Way, kerfWidth: number) {
    this.plate = plate;
    this.mesh = mesh;
    this.way = way;
    this.radius = kerfWidth / 2;
    const { x, y, triangles } = mesh;
    const order: Taken[] = [];
    for (let t = 0; t < triangles.length / 3; t++) {
      const ids = plate.nodesOf(t);
      const mean = (v: Float64Array): number => ids.reduce((sum, i) => sum + (v[i] ?? 0), 0) / 3;
      const station = opensAt(way, { x: mean(x), y: mean(y) }, kerfWidth / 2);
      if (station === Infinity) continue;
      const corners = ids.map((i) => opensAt(way, { x: x[i] ?? 0, y: y[i] ?? 0 }, this.radius * (1 + 1e-9)));
      const spread = corners.some((s) => s === Infinity) ? 0 : Math.max(...corners) - Math.min(...corners);
      // a stretch that is not of one passage says nothing about how long the beam takes over it
      const over = Math.min(spread, 2 * this.radius + Math.sqrt(2 * Math.abs(twiceArea(x, y, ...ids)))) * 0.8;
      order.push({ triangle: t, from: station - over / 2, to: station + over / 2 });
    }
    this.order = order.sort((a, b) => a.from - b.from || a.triangle - b.triangle);
  }

  /**
   * Opens what the beam covers up to a station, a triangle by and by as the beam comes over it. Heat of the metal it takes goes into the walls abreast, half to each;
   * a node on a wall keeps its own.
   */
  openUpTo(station: number, heats: readonly Heat[]): void {
    const touched = new Set<number>();
    for (; this.begun < this.order.length; this.begun++) {
      const next = this.order[this.begun];
      if (!next || next.from > station) break;
      this.underway.push(next);
    }
    this.underway = this.underway.filter((taken) => {
      const { triangle, from, to } = taken;
      const share = to > from ? Math.min(1, (station - from) / (to - from)) : 1;
      this.take(triangle, share, Math.min(station, (from + to) / 2), heats, touched);
      return share < 1;
    });
    for (const heat of heats) this.plate.settle(heat, touched);
  }

  private take(triangle: number, share: number, station: number, heats: readonly Heat[], touched: Set<number>): void {
    const { plate } = this;
    const nodes = plate.nodesOf(triangle);
    const lost = plate.volumeShare(triangle, share - plate.openedShare(triangle));
    const before = nodes.map((node) => plate.volume[node] ?? 0);
    plate.open(triangle, share);
    nodes.forEach((node, k) => {
      touched.add(node);
      const had = before[k] ?? 0;
      const dead = (plate.volume[node] ?? 0) === 0;
      if (had === 0 || (!dead && this.onWall(node, station))) return;
      const part = dead ? 1 : Math.min(1, lost / had);
      const shares = this.nearWalls(node, station);
      for (const { content } of heats) {
        const moved = part * (content[node] ?? 0);
        content[node] = (content[node] ?? 0) - moved;
        for (const to of shares) content[to.node] = (content[to.node] ?? 0) + to.share * moved;
      }
      for (const to of shares) touched.add(to.node);
    });
  }

  /** Whether a node lies on a wall of the piece that is being cut. */
  private onWall(node: number, station: number): boolean {
    const piece = this.way.pieces[pieceAt(this.way, station)];
    if (!piece) return false;
    const at = { x: this.mesh.x[node] ?? 0, y: this.mesh.y[node] ?? 0 };
    // chords of an arc's wall lie a little beside it
    return Math.abs(distanceToPiece(piece, at) - this.radius) < 0.02 * this.radius;
  }

  /**
   * Heat per node, J per metre of thickness, that the beam releases between two stations, and its sum; `perMetre` is what it leaves per metre of way, both sides
   * together, J/m².
   */
  release(from: number, to: number, perMetre: (station: number) => number): { released: Float64Array; sum: number } {
    const released = new Float64Array(this.plate.count);
    let sum = 0;
    this.way.pieces.forEach((piece, i) => {
      const [low, high] = [Math.max(from, piece.start), Math.min(to, piece.start + piece.length)];
      const walls = this.mesh.walls[i];
      if (!(high > low) || !walls) return;
      const heat = perMetre((low + high) / 2) / 2;
      for (const wall of [walls.left, walls.right]) {
        spreadOver(wall, low, high, (node, length) => {
          // a wall that an earlier kerf has taken gets nothing
          if ((this.plate.volume[node] ?? 0) === 0) return;
          released[node] = (released[node] ?? 0) + heat * length;
          sum += heat * length;
        });
      }
    });
    return { released, sum };
  }

  private alive(node: number): boolean {
    return (this.plate.volume[node] ?? 0) > 0;
  }

  /** Nodes of the two walls straight beside a node that loses its metal to the piece being cut. */
  private nearWalls(dead: number, station: number): { node: number; share: number }[] {
    const i = pieceAt(this.way, station);
    const [piece, walls] = [this.way.pieces[i], this.mesh.walls[i]];
    const beside = piece ? stationBeside(piece, { x: this.mesh.x[dead] ?? 0, y: this.mesh.y[dead] ?? 0 }) : station;
    const sides = [walls?.left ?? [], walls?.right ?? []]
      .map((wall) => abreast(wall, beside).filter(({ node }) => this.alive(node)))
      .filter((shares) => shares.length > 0);
    const shares = sides.flatMap((side) => {
      const whole = side.reduce((sum, { share }) => sum + share, 0);
      return side.map(({ node, share }) => ({ node, share: share / whole / sides.length }));
    });
    return shares.length > 0 ? shares : this.nearest(dead);
  }

  /** The first nodes with metal round about a node. */
  private nearest(dead: number): { node: number; share: number }[] {
    const seen = new Set([dead]);
    let ring = [dead];
    while (ring.length > 0) {
      const next = ring.flatMap((n) => this.plate.around(n)).filter((n) => !seen.has(n) && seen.add(n));
      const found = next.filter((n) => this.alive(n));
      if (found.length > 0) return found.map((node) => ({ node, share: 1 / found.length }));
      ring = next;
    }
    throw new RangeError('no metal is left to take the heat');
  }
}

/** The one or two nodes of a wall between which a station lies, with their shares, none of them 0. */
function abreast(wall: readonly WallNode[], station: number): { node: number; share: number }[] {
  const after = wall.findIndex((n) => n.station >= station);
  const [next, before] = [wall[after], wall[after - 1]];
  if (after === 0) return next && next.station === station ? [{ node: next.node, share: 1 }] : [];
  if (!next || !before) {
    const last = wall.at(-1);
    return last ? [{ node: last.node, share: 1 }] : [];
  }
  const t = (station - before.station) / (next.station - before.station);
  return [
    { node: before.node, share: 1 - t },
    { node: next.node, share: t },
  ].filter(({ share }) => share > 1e-12);
}

/** Spreads the stretch between two stations over a wall's nodes, each taking what falls off evenly to its neighbours; past the last node it takes all. */
function spreadOver(
  wall: readonly WallNode[],
  low: number,
  high: number,
  take: (node: number, length: number) => void,
) {
  for (let k = 1; k < wall.length; k++) {
    const [a, b] = [wall[k - 1], wall[k]];
    if (!a || !b) continue;
    const [from, to] = [Math.max(low, a.station), Math.min(high, b.station)];
    if (!(to > from)) continue;
    const middle = ((from + to) / 2 - a.station) / (b.station - a.station);
    take(a.node, (to - from) * (1 - middle));
    take(b.node, (to - from) * middle);
  }
  const last = wall.at(-1);
  if (last && high > last.station) take(last.node, high - Math.max(low, last.station));
}
