/** Steps in which the wait is looked through before the last crossing is narrowed down. */
const coarse = 24;

/**
 * Least wait, s, up to `longest` after which the temperature stays at or under `limit` K; `longest` when even that is not enough. `after` gives
 * the temperature for a wait. The tip may warm for a moment before it cools, so the last crossing counts, not the first.
 */
export function leastDwell(after: (duration: number) => number, limit: number, longest: number): number {
  if (!(longest > 0)) throw new RangeError(`longest dwell ${longest} s is outside (0, ∞)`);
  if (after(longest) > limit) return longest;
  let low = -1;
  let high = longest;
  for (let i = coarse - 1; i >= 0; i--) {
    // finer near the start, where the temperature moves fastest
    const wait = longest * (i / coarse) ** 2;
    if (after(wait) > limit) {
      low = wait;
      break;
    }
    high = wait;
  }
  if (low < 0) return 0;
  while (high - low > 1e-3) {
    const middle = (low + high) / 2;
    if (after(middle) > limit) low = middle;
    else high = middle;
  }
  return high;
}
