import type { Loop, LoopCorner } from '../path/loop.ts';
import type { Point } from '../path/point.ts';
import { pointCross, pointDot, pointSubtract } from '../path/point.ts';
import { gaussNodes, gaussWeights } from './gauss-legendre.ts';
import type { PlateProperties } from './properties.ts';
import { diffusivity } from './properties.ts';

/** A loop in the frame of its first edge: x along the cut's travel, y towards the part, the path's corner in the origin. */
type Turn = {
  readonly radius: number; // m, of the path
  readonly extension: number; // m
  /** Turn of the first arc, rad, and of the whole loop. */
  readonly first: number;
  readonly whole: number;
  /** Length of the straight between two arcs, m; 0 for the loop of one arc. */
  readonly straight: number;
};

/** Past this exponent a contribution is below 1e-11 of what it could be. */
const negligible = 25;

/**
 * Temperature rise, K, in the part at `at` from the arcs of a loop, `time` s after the front left the end of the extension (with the straight between the arcs
 * of a flat loop), for `powerPerLength` W per metre of thickness, both walls together.
 *
 * The heat of the inner wall stays with the slug. That of the outer wall, half, comes back along it: the way is the shortest about the kerf, and of what a
 * straight wall would give (twice an infinite plate) there is left
 * - V(x), what creeps on round a convex wall: x = ψ·(R·l/4αt)^⅓ with the turn ψ of the wall out of sight, its radius R and the way l. V = 1 − (√π/4)x^1.5 + (7/60)x³ − (7√π/512)x^4.5 …
 *   = √(πx)·Σ e^(−aₙx)/aₙ, aₙ the zeros of Ai′ with their signs turned: Fock's function of a wall on which source and place lie (V. A. Fock, Electromagnetic Diffraction and Propagation
 *   Problems, 1965, from memory) at an imaginary wave number, carried over to an instantaneous source by the saddle point of its Laplace transform.
 * - 1 − (√π/8)·√(4αt)/R for the steel being more than half a plane about the source: the next term of the same expansion, Debye's for K′/K (Abramowitz and Stegun 9.7.10, 9.7.12),
 *   bounded by what is left at the end of a slit, 2π/2π: ½.
 */
export function loopTurnRise(
  corner: LoopCorner,
  loop: Loop,
  kerfWidth: number,
  feed: number,
  powerPerLength: number,
  at: Point,
  time: number,
  plate: PlateProperties,
): number {
  if (!(time > 0) || powerPerLength === 0) return 0;
  const turn = turnOf(corner, loop);
  const { radius, extension, first, whole, straight } = turn;
  const from = pointSubtract(at, corner.point);
  const across = pointCross(corner.incoming, from);
  const along = pointDot(corner.incoming, from);
  const outer = radius + kerfWidth / 2;
  const alpha4 = 4 * diffusivity(plate);
  // from the arc's centre: where the place is, and the turn up to which the wall is in sight of it
  const [cx, cy] = [along - extension, across + radius];
  const reach = Math.max(outer, Math.hypot(cx, cy));
  const sight = Math.atan2(cx, cy) + Math.acos(outer / reach);
  const tangent = Math.sqrt(reach * reach - outer * outer);
  const spread = Math.sqrt(negligible * alpha4 * time);

  /** Heat from a stretch of the loop of which each place has a turn, rad, a way, m, and a length of path from the extension's end, m. */
  const stretch = (
    from_: number,
    to: number,
    wayOf: (turned: number) => number,
    pathOf: (turned: number) => number,
    turnedOf: (x: number) => number,
  ): number => {
    const last = Math.min(to, from_ + (time * feed - pathOf(from_)) * ((to - from_) / (pathOf(to) - pathOf(from_))));
    if (!(last > from_) || wayOf(from_) > spread) return 0;
    // the way grows along the loop: what is further off than heat can have come is not looked at
    let end = last;
    if (wayOf(end) > spread) {
      let low = from_;
      for (let i = 0; i < 12; i++) {
        const middle = (low + end) / 2;
        if (wayOf(middle) > spread) end = middle;
        else low = middle;
      }
    }
    const half = (end - from_) / 2;
    const perStep = (pathOf(end) - pathOf(from_)) / (end - from_) / feed;
    let sum = 0;
    for (let i = 0; i < gaussNodes.length; i++) {
      const x = from_ + half * (1 + (gaussNodes[i] ?? 0));
      const age = time - pathOf(x) / feed;
      const way = wayOf(x);
      const turned = Math.max(0, turnedOf(x) - sight);
      const creeping = creepingShare(turned * Math.cbrt((outer * way) / (alpha4 * age)));
      const room = roomShare(Math.sqrt(alpha4 * age) / outer);
      sum += ((gaussWeights[i] ?? 0) * creeping * room * Math.exp((-way * way) / (alpha4 * age))) / age;
    }
    // half of the power, twice an infinite plate
    return (sum * half * perStep * powerPerLength) / (4 * Math.PI * plate.conductivity);
  };
  const onArc = (turned: number): number => {
    if (turned >= sight) return tangent + outer * (turned - sight);
    return Math.hypot(cx - outer * Math.sin(turned), cy - outer * Math.cos(turned));
  };
  const same = (x: number) => x;
  const inSight = Math.min(first, Math.max(0, sight));
  // in two pieces: the way's curvature jumps where the wall goes out of sight
  let rise =
    stretch(0, inSight, onArc, (x) => x * radius, same) + stretch(inSight, first, onArc, (x) => x * radius, same);
  if (straight > 0) {
    const passed = first * radius;
    rise += stretch(
      0,
      straight,
      (x) => onArc(first) + x,
      (x) => passed + x,
      () => first,
    );
    rise += stretch(
      first,
      whole,
      (x) => onArc(x) + straight,
      (x) => x * radius + straight,
      same,
    );
  }
  return rise;
}

function turnOf({ angle }: LoopCorner, { shape, radius, extension, segments }: Loop): Turn {
  const whole = Math.PI + angle;
  if (shape === 'tangent') return { radius, extension, first: whole, whole, straight: 0 };
  const [, , line] = segments;
  const straight = line?.kind === 'line' ? Math.hypot(line.end.x - line.start.x, line.end.y - line.start.y) : 0;
  return { radius, extension, first: whole / 2, whole, straight };
}

/** Zeros of the derivative of Airy's function, their signs turned. Abramowitz and Stegun, table 10.13. */
const airyZeros = [1.01879297, 3.24819758, 4.82009921, 6.16330736];

/** What creeps round a convex wall, dimensionless, 1 down to 0; see `loopTurnRise`. Within 1e-3, also where the two forms meet. */
export function creepingShare(x: number): number {
  if (x < 0.8) {
    const root = x * Math.sqrt(x);
    return 1 + root * (-Math.sqrt(Math.PI) / 4 + root * (7 / 60 - ((7 * Math.sqrt(Math.PI)) / 512) * root));
  }
  let sum = 0;
  for (const zero of airyZeros) sum += Math.exp(-zero * x) / zero;
  return Math.sqrt(Math.PI * x) * sum;
}

/** What the room about a convex wall leaves, dimensionless, 1 down to ½, where heat has spread `y` radii of it. */
const roomShare = (y: number): number => 0.5 + 0.5 / (1 + (Math.sqrt(Math.PI) / 4) * y);
