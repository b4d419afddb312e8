import { useMemo, useState } from 'react';
import { predictionOf } from '@/shared/prediction.ts';
import type { Prediction, StrategyContent } from '@/shared/strategies.ts';
import type { MachineProfile, Nozzle } from '@/strategy/machine.ts';

export type LivePrediction = {
  /** The last one that could be computed. */
  readonly prediction: Prediction;
  /** The content it belongs to: stages are drawn as they were predicted. */
  readonly content: StrategyContent;
  /** It is not of the numbers on the screen. */
  readonly behind: boolean;
};

/** The prediction as one types; while a number is wrong, or machine and nozzle are not here yet, the last good one stays. */
export function usePrediction(
  content: StrategyContent,
  sound: boolean,
  profile: MachineProfile | null,
  nozzle: Nozzle | null,
  first: LivePrediction,
): LivePrediction {
  const now = useMemo(() => {
    if (!sound || !profile || !nozzle) return null;
    try {
      return { prediction: predictionOf({ content, profile, nozzle }), content, behind: false };
    } catch (error) {
      // the computation refuses what its model cannot take; the fields' own ranges are wider
      if (error instanceof RangeError) return null;
      throw error;
    }
  }, [content, sound, profile, nozzle]);
  const [last, setLast] = useState(first);
  if (now && now !== last) setLast(now);
  return now ?? { ...last, behind: sound ? last.content !== content : true };
}
