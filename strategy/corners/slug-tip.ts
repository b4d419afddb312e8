import type { Slug } from '../path/loop.ts';

/**
 * How high the edge of a slug can stand above the plate while it tips in its own hole, m: its width × sin θ, with θ the tilt at which its upper and lower edge
 * meet the kerf's walls, W·cos θ + d·sin θ = W + 2k (W its greatest width, d the thickness, k the kerf). All of its width where it is so wide and
 * thin that the kerf never holds it. Any slug may lie on a slat and tip over it; no width between slats is asked. Own derivation, no source. Throws RangeError for
 * a thickness or kerf that is not positive.
 */
export function slugRise({ extent }: Pick<Slug, 'extent'>, thickness: number, kerfWidth: number): number {
  if (!(thickness > 0 && kerfWidth > 0))
    throw new RangeError(`thickness ${thickness} m and kerf ${kerfWidth} m must be positive`);
  const diagonal = Math.hypot(extent, thickness);
  const pocket = extent + 2 * kerfWidth;
  if (pocket >= diagonal) return extent;
  return extent * Math.sin(Math.atan2(thickness, extent) - Math.acos(pocket / diagonal));
}
