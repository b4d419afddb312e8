/** Time of a move, s, and the highest speed in it, m/s. */
export type Move = { readonly time: number; readonly peakSpeed: number };

function positive(name: string, value: number): void {
  if (!(value > 0 && value < Infinity)) throw new RangeError(`${name} ${value} is outside (0, ∞)`);
}

/**
 * Time, s, and peak speed, m/s, of a straight move of `length` m from rest to rest at constant acceleration:
 * L/v + v/a when L ≥ v²/a, else 2√(L/a). Kinematics. Throws RangeError for a feed or acceleration that is not positive.
 */
export function trapezoidMove(length: number, feed: number, acceleration: number): Move {
  if (!(length >= 0)) throw new RangeError(`length ${length} m is outside [0, ∞)`);
  positive('feed', feed);
  positive('acceleration', acceleration);
  if (length >= (feed * feed) / acceleration) return { time: length / feed + feed / acceleration, peakSpeed: feed };
  return { time: 2 * Math.sqrt(length / acceleration), peakSpeed: Math.sqrt(length * acceleration) };
}

/**
 * Time, s, and peak speed, m/s, of a move of `length` m from rest to rest with bounded jerk (seven phases at most). Biagiotti and
 * Melchiorri, Trajectory Planning for Automatic Machines and Robots (2008), ch. 3. Throws RangeError for limits that are not positive.
 */
export function sCurveMove(length: number, feed: number, acceleration: number, jerk: number): Move {
  if (!(length >= 0)) throw new RangeError(`length ${length} m is outside [0, ∞)`);
  positive('feed', feed);
  positive('acceleration', acceleration);
  positive('jerk', jerk);
  const a = acceleration;
  const j = jerk;
  const rise = feed >= (a * a) / j ? feed / a + a / j : 2 * Math.sqrt(feed / j);
  // is the feed reached at all?
  if (length >= feed * rise) return { time: length / feed + rise, peakSpeed: feed };
  // is the full acceleration reached? Then v(v/a + a/j) = L
  if (length >= (2 * a ** 3) / (j * j)) {
    const ramp = a / j;
    const peakSpeed = (a / 2) * (Math.sqrt(ramp * ramp + (4 * length) / a) - ramp);
    return { time: 2 * (peakSpeed / a + ramp), peakSpeed };
  }
  // jerk alone: 2 v √(v/j) = L
  const peakSpeed = Math.cbrt((length * length * j) / 4);
  return { time: 4 * Math.sqrt(peakSpeed / j), peakSpeed };
}
