/** How fast a drive may change speed. m/s² and m/s³; an infinite jerk gives the trapezoid. */
export type DriveLimits = { readonly acceleration: number; readonly jerk?: number };

/**
 * Time to change speed by `change` m/s, s, starting and ending without acceleration: Δv/a + a/j when the full acceleration is reached
 * (Δv ≥ a²/j), otherwise 2√(Δv/j). Biagiotti and Melchiorri, Trajectory Planning for Automatic Machines and Robots (2008), ch. 3.
 */
export function speedChangeTime(change: number, { acceleration: a, jerk: j = Infinity }: DriveLimits): number {
  if (!(a > 0 && j > 0)) throw new RangeError(`acceleration ${a} m/s² and jerk ${j} m/s³ must be positive`);
  const dv = Math.abs(change);
  return dv >= (a * a) / j ? dv / a + a / j : 2 * Math.sqrt(dv / j);
}

/** Distance needed to change between two speeds, m: the mean speed times the time, as the change is symmetric. */
export const speedChangeDistance = (from: number, to: number, limits: DriveLimits): number =>
  ((from + to) / 2) * speedChangeTime(to - from, limits);

/**
 * Greatest speed, m/s, not above `limit`, that can be reached from `from` within `distance` m; never below `from`. `speedChangeDistance` solved for the
 * speed: a quadratic where the full acceleration is reached, a cubic where it is not.
 */
export function speedReached(from: number, distance: number, limit: number, limits: DriveLimits): number {
  if (limit <= from || speedChangeDistance(from, limit, limits) <= distance) return Math.max(from, limit);
  const { acceleration: a, jerk: j = Infinity } = limits;
  if (j === Infinity) return Math.sqrt(from * from + 2 * a * distance);
  const ramp = a / j;
  // is the full acceleration reached? (v₀ + Δv/2)(Δv/a + a/j) = L
  if (distance >= (2 * from + a * ramp) * ramp) {
    const b = 2 * from + a * ramp;
    const c = 2 * a * (from * ramp - distance);
    return within(from - (2 * c) / (b + Math.sqrt(b * b - 4 * c)));
  }
  // (2v₀ + s²)·s = L√j with s = √Δv
  const root = cubicRoot(2 * from, distance * Math.sqrt(j));
  return within(from + root * root);

  /** Rounded down until it asks for no more distance than there is. */
  function within(speed: number): number {
    let reached = Math.min(limit, speed);
    while (reached > from && speedChangeDistance(from, reached, limits) > distance) reached *= 1 - Number.EPSILON;
    return Math.max(from, reached);
  }
}

/** The one root s ≥ 0 of s³ + p·s = q for p, q ≥ 0: Newton's steps from above, which only fall. */
function cubicRoot(p: number, q: number): number {
  let s = p > 0 ? Math.min(Math.cbrt(q), q / p) : Math.cbrt(q);
  for (let i = 0; i < 60; i++) {
    const slope = 3 * s * s + p;
    if (!(slope > 0)) return s;
    const next = s - ((s * s + p) * s - q) / slope;
    if (!(next < s)) return s;
    s = next;
  }
  return s;
}
