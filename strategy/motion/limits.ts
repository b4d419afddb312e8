/** Greatest feed on an arc, m/s: √(a r), from the centripetal acceleration a (m/s²) and the radius r (m). Kinematics. */
export function arcFeedLimit(acceleration: number, radius: number): number {
  if (!(acceleration > 0 && radius > 0))
    throw new RangeError(`acceleration ${acceleration} and radius ${radius} must be positive`);
  return Math.sqrt(acceleration * radius);
}

/** Acceleration towards the centre that an arc of `radius` m takes at `feed` m/s, m/s²: v²/r. Kinematics. */
export function arcAcceleration(feed: number, radius: number): number {
  if (!(radius > 0)) throw new RangeError(`radius ${radius} m is outside (0, ∞)`);
  return (feed * feed) / radius;
}

/**
 * Greatest feed through a break of direction, m/s, when the path may be left by `deviation` m: √(aδ·s/(1 − s)), s = sin(θ/2), θ the angle
 * included between the two pieces (π straight on). It is the feed on the arc inscribed at that deviation, r = δs/(1 − s).
 * Derived from that construction; from memory, no primary source read.
 */
export function junctionFeedLimit(acceleration: number, deviation: number, includedAngle: number): number {
  if (!(acceleration > 0)) throw new RangeError(`acceleration ${acceleration} m/s² is outside (0, ∞)`);
  if (!(deviation >= 0)) throw new RangeError(`deviation ${deviation} m is outside [0, ∞)`);
  const s = Math.sin(Math.min(Math.PI, Math.abs(includedAngle)) / 2);
  return s >= 1 ? Infinity : Math.sqrt((acceleration * deviation * s) / (1 - s));
}
