import type { CutConditions } from '../corners/rules.ts';
import type { Loop, LoopCorner } from '../path/loop.ts';
import type { Segment } from '../path/segment.ts';
import type { PlateProperties } from './properties.ts';

/** Depth of the measuring place inside the finished tip, along the bisector, m. */
export const measuringDepth = 1.5e-3;

/** Last stretch of path whose heat is left out, m: so near the source no closed form and no grid agrees with another. */
export const leftOutStretch = 2e-3;

/** Straight cut taken before a corner when nothing else is said, m; older heat no longer shows at the front. */
export const straightRun = 0.3;

/** What happens between the end of the first edge and the beginning of the second. */
export type ReturnTreatment =
  | { readonly kind: 'leave' }
  | { readonly kind: 'loop'; readonly loop: Loop }
  | { readonly kind: 'dwell'; readonly duration: number } // s
  /** Feed and mean power fall evenly over the last `length` m to these shares of the straight cut's. */
  | { readonly kind: 'ease'; readonly length: number; readonly feedShare: number; readonly powerShare: number };

export type ReturnQuestion = {
  /** Corner of the path (half the kerf outside the finished edges). */
  readonly corner: LoopCorner;
  /** Radius of the arc on which the path goes round the corner, m; sharp when left out. A loop runs on to the corner itself. */
  readonly round?: number;
  /** Path cut before the corner, in order of travel, ending in it; a straight cut when left out. */
  readonly before?: readonly Segment[];
  /**
   * Path cut right before `before` and ending where that begins, whose heat is in the plate's temperature already, as `pathRise` counts it: from the kerf's middle, in an open
   * plate. Here it makes the tip between both, and what its walls and that tip keep of its heat besides is added.
   */
  readonly earlier?: readonly Segment[];
  readonly treatment: ReturnTreatment;
  readonly cut: Pick<CutConditions, 'feed' | 'kerfWidth' | 'heatIntoPlate'>;
  readonly plateTemperature: number; // K
  readonly properties?: PlateProperties;
};

/** The radius on which the path goes round the corner, m; undefined where it turns sharply: a loop runs on to the corner itself. */
export const roundOf = ({ treatment, round }: ReturnQuestion): number | undefined =>
  treatment.kind === 'loop' ? undefined : round;

/** Throws RangeError, with the value and the range, for a question that has no answer. */
export function checkReturnQuestion({ corner, round, treatment, cut, plateTemperature }: ReturnQuestion): void {
  positive('plate temperature', plateTemperature, 'K');
  positive('feed', cut.feed, 'm/s');
  positive('kerf width', cut.kerfWidth, 'm');
  if (!(cut.heatIntoPlate >= 0 && cut.heatIntoPlate < Infinity))
    throw new RangeError(`heat into the plate ${cut.heatIntoPlate} J/m² is outside [0, ∞)`);
  if (!(corner.angle > 0 && corner.angle < 2 * Math.PI))
    throw new RangeError(`corner angle ${corner.angle} rad is outside (0, 2π)`);
  if (round !== undefined) positive('radius of the round', round, 'm');
  if (treatment.kind === 'dwell' && !(treatment.duration >= 0 && treatment.duration < Infinity))
    throw new RangeError(`dwell ${treatment.duration} s is outside [0, ∞)`);
  if (treatment.kind === 'ease') {
    const { length, feedShare, powerShare } = treatment;
    if (!(length >= 0 && length < Infinity)) throw new RangeError(`length of the ease ${length} m is outside [0, ∞)`);
    if (!(feedShare > 0 && feedShare <= 1 && powerShare >= 0 && powerShare <= 1))
      throw new RangeError(`shares of feed ${feedShare} and power ${powerShare} are outside (0, 1]`);
  }
}

function positive(what: string, value: number, unit: string): void {
  if (!(value > 0 && value < Infinity)) throw new RangeError(`${what} ${value} ${unit} is outside (0, ∞)`);
}
