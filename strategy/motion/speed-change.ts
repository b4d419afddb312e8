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

/** Greatest speed, m/s, not above `limit`, that can be reached from `from` within `distance` m; never below `from`. */
export function speedReached(from: number, distance: number, limit: number, limits: DriveLimits): number {
  if (limit <= from || speedChangeDistance(from, limit, limits) <= distance) return Math.max(from, limit);
  if (limits.jerk === undefined || limits.jerk === Infinity)
    return Math.sqrt(from * from + 2 * limits.acceleration * distance);
  // the distance grows with the speed, so halving finds it; 60 halvings are below the last digit of any feed
  let low = from;
  let high = limit;
  for (let i = 0; i < 60; i++) {
    const middle = (low + high) / 2;
    if (speedChangeDistance(from, middle, limits) <= distance) low = middle;
    else high = middle;
  }
  return low;
}
