import { cardEstimate, type CardEstimate, type Judged } from '../../shared/prediction.ts';

export type Estimates = { readonly cold: CardEstimate; readonly hot: CardEstimate };

/** Some plants' worth of strategies and plate thicknesses. */
const mostKept = 500;

const kept = new Map<string, Estimates>();

/**
 * What the model says for a plate of this thickness, m, on a cold plate and on the hottest the strategy is good for. Kept by revision and
 * thickness: an approved revision never changes, nor do its machine revision and nozzle, and a hall asks for the same plates all day.
 */
export function estimatesFor(
  { plantId, revisionId }: { readonly plantId: string; readonly revisionId: string },
  judged: Judged & { readonly thickness: number },
): Estimates {
  // An id is made by whoever sends it: two plants may have the same one.
  const key = `${plantId} ${revisionId} ${judged.thickness}`;
  const known = kept.get(key);
  if (known) return known;
  const estimates = {
    cold: cardEstimate(judged),
    hot: cardEstimate({ ...judged, plateTemperature: judged.content.hottestPlate }),
  };
  const oldest = kept.keys().next();
  if (kept.size >= mostKept && !oldest.done) kept.delete(oldest.value);
  kept.set(key, estimates);
  return estimates;
}
