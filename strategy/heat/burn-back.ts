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

/** Share of the threshold by which the peak at the depth found may be off. */
const closeEnough = 1e-3;

/**
 * Burn-back estimate, m: the distance inside the finished tip, along the bisector, to which the peak after the second edge has begun passes the ignition
 * threshold, K. 0 where it does not 0.01 mm inside; 50 mm is the most it looks for. The search is within 1 % of the depth or 0.1 % of the threshold. Throws RangeError as `peakAfter` and for a
 * threshold outside the two anchors of `ignitionRange`.
 */
export function burnBack(question: ReturnQuestion, threshold: number = ignitionThreshold): number {
  checkThreshold(threshold);
  const history = historyOf(question);
  const over = (depth: number) => Math.log(peakOf(history, depth).temperature / threshold);
  let low = { depth: shallowest, over: over(shallowest) };
  if (low.over < 0) return 0;
  let high = { depth: 4e-4, over: over(4e-4) };
  while (high.over >= 0 && high.depth < deepest) {
    const depth = Math.min(deepest, 3 * high.depth);
    [low, high] = [high, { depth, over: over(depth) }];
  }
  if (high.over >= 0) return deepest;
  // the peak falls nearly as a power of the depth: the straight line in logarithms between the ends, held off them
  while (high.depth > 1.01 * low.depth) {
    const width = Math.log(high.depth / low.depth);
    const share = Math.min(0.9, Math.max(0.1, low.over / (low.over - high.over)));
    const depth = low.depth * Math.exp(share * width);
    const found = { depth, over: over(depth) };
    if (Math.abs(found.over) < closeEnough) return depth;
    if (found.over >= 0) low = found;
    else high = found;
  }
  return Math.sqrt(low.depth * high.depth);
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
