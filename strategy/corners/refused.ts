import type { Point } from '../path/point.ts';
import type { Candidate, CornerTreatment } from './case.ts';

/** A treatment that does not fit, with the reason and the place of what is in the way. */
export const refused = (treatment: CornerTreatment, why: string, at?: Point): Candidate => ({
  treatment,
  fits: false,
  returnWith: null,
  addedTime: null,
  why,
  ...(at ? { at } : {}),
});

/** A treatment that the corner rules do not allow anywhere. */
export const ruledOut = (treatment: CornerTreatment, why: string): Candidate => ({
  ...refused(treatment, `the corner rules of this strategy allow no ${why}`),
  ruledOut: true,
});
