import { historyOf, peakOf } from './corner-peak.ts';
import type { PlateProperties } from './properties.ts';
import type { ReturnQuestion } from './return-question.ts';

/**
 * Temperatures at which steel takes fire in oxygen, K: thin foil from 1233 K; bulk iron and carbon steel when FeO melts, at 1644 K, whatever the pressure.
 * Abstract of doi 10.1023/A:1017523922778.
 */
export const ignitionRange = { min: 1233, max: 1644 } as const;

/**
 * Ignition threshold to start from, K: that of bulk steel, since a tip measured in millimetres is bulk. To be fitted to test cuts; for a tip thin as foil
 * the lower end of the range.
 */
export const ignitionThreshold: number = ignitionRange.max;

/** Least and greatest depth looked at, m. */
const shallowest = 1e-5;
const deepest = 0.05;

/**
 * Burn-back estimate, m: the distance inside the finished tip, along the bisector, to which the peak after the second edge has begun passes the ignition
 * threshold, K. 0 where it does not 0.01 mm inside; 50 mm is the most it looks for. Relative error of the search 1 %. Throws RangeError as `peakAfter` and for a
 * threshold outside the two anchors of `ignitionRange`.
 */
export function burnBack(question: ReturnQuestion, threshold: number = ignitionThreshold): number {
  checkThreshold(threshold);
  const history = historyOf(question);
  const over = (depth: number) => peakOf(history, depth).temperature >= threshold;
  if (!over(shallowest)) return 0;
  let low = shallowest;
  let high = 2e-4;
  while (high < deepest && over(high)) [low, high] = [high, high * 2];
  if (high >= deepest && over(deepest)) return deepest;
  while (high - low > 0.01 * low) {
    const middle = Math.sqrt(high * low);
    if (over(middle)) low = middle;
    else high = middle;
  }
  return (low + high) / 2;
}

/** The same beside a straight cut, m: the thin band inside a straight finished edge that gets hotter than the threshold. */
export function straightEdgeBurnBack(
  cut: ReturnQuestion['cut'],
  plateTemperature: number,
  threshold: number = ignitionThreshold,
  properties?: PlateProperties,
): number {
  const ahead = { x: 1, y: 0 };
  const corner = { point: { x: 0, y: 0 }, incoming: ahead, outgoing: ahead, angle: Math.PI };
  return burnBack({ corner, treatment: { kind: 'leave' }, cut, plateTemperature, properties }, threshold);
}

function checkThreshold(threshold: number): void {
  const { min, max } = ignitionRange;
  if (!(threshold >= min && threshold <= max))
    throw new RangeError(`ignition threshold ${threshold} K is outside [${min}, ${max}] K`);
}
