import { panelIntegral } from '../heat/gauss-legendre.ts';
import { erfc, logGamma } from '../heat/special-functions.ts';

/** Most trials that are reckoned with; beyond them the factor hardly changes. */
const MOST_TRIALS = 10_000;

/**
 * How many standard deviations of a few trials above their mean lies what a share of all further ones will not exceed, with a confidence;
 * without unit. One-sided tolerance factor of the normal distribution as in ISO 16269-6: the k for which the chance that mean + k·s is
 * above the share's quantile is the confidence, the chance taken over the sample's own standard deviation. RangeError for fewer than two
 * trials or a share or confidence outside [0.5, 1).
 */
export function toleranceFactor(trials: number, share = 0.95, confidence = 0.95): number {
  if (!(Number.isInteger(trials) && trials >= 2 && trials <= MOST_TRIALS)) {
    throw new RangeError(`${trials} trials are outside [2, ${MOST_TRIALS}]`);
  }
  for (const [name, value] of Object.entries({ share, confidence })) {
    if (!(value >= 0.5 && value < 1)) throw new RangeError(`${name} ${value} is outside [0.5, 1)`);
  }
  const quantile = rootOf((z) => normalBelow(z) - share, 0, 40);
  return rootOf((k) => chanceAbove(k, trials, quantile) - confidence, 0, 1e4);
}

/** Chance that mean + k·s of so many normal values lies above a quantile, in standard deviations. */
function chanceAbove(k: number, trials: number, quantile: number): number {
  const freedom = trials - 1;
  // Density of s/σ: a chi distribution over the root of its degrees of freedom.
  const scale = Math.LN2 + (freedom / 2) * Math.log(freedom / 2) - logGamma(freedom / 2);
  const density = (s: number) => Math.exp(scale + (freedom - 1) * Math.log(s) - (freedom * s * s) / 2);
  const reach = 10 / Math.sqrt(2 * freedom);
  const [from, to] = [Math.max(0, 1 - reach), 1 + reach];
  // The fewer the trials, the steeper the chance rises with s.
  const pieces = trials < 4 ? 96 : 8;
  const piece = (to - from) / pieces;
  let sum = 0;
  for (let i = 0; i < pieces; i++) {
    const start = from + i * piece;
    sum += panelIntegral((s) => density(s) * normalBelow(Math.sqrt(trials) * (k * s - quantile)), start, start + piece);
  }
  return sum;
}

function normalBelow(z: number): number {
  return erfc(-z / Math.SQRT2) / 2;
}

/** Where a growing function passes zero. */
function rootOf(f: (x: number) => number, low: number, high: number): number {
  let [from, to] = [low, high];
  for (let tries = 0; tries < 200 && to - from > 1e-11 * to; tries++) {
    const middle = (from + to) / 2;
    if (f(middle) < 0) from = middle;
    else to = middle;
  }
  return (from + to) / 2;
}
