import { useMemo, useState } from 'react';
import { predictionOf } from '@/shared/prediction.ts';
import type { Prediction, StrategyContent } from '@/shared/strategies.ts';
import type { MachineProfile, Nozzle } from '@/strategy/machine.ts';
import type { ReserveRules } from '@/strategy/pierce/index.ts';

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
  rules: ReserveRules,
  first: LivePrediction,
): LivePrediction {
  const now = useMemo(() => {
    if (!sound || !profile || !nozzle) return null;
    const prediction = predicted(content, profile, nozzle, rules);
    return prediction && { prediction, content, behind: false };
  }, [content, sound, profile, nozzle, rules]);
  const [last, setLast] = useState(first);
  if (now && now !== last) setLast(now);
  return now ?? { ...last, behind: sound ? last.content !== content : true };
}

/** The prediction of any content; null where the model can't follow. */
export function predicted(
  content: StrategyContent,
  profile: MachineProfile,
  nozzle: Nozzle,
  rules: ReserveRules,
): Prediction | null {
  try {
    return predictionOf({ content, profile, nozzle }, rules);
  } catch (error) {
    // the computation refuses what its model cannot take; the fields' own ranges are wider
    if (error instanceof RangeError) return null;
    throw error;
  }
}
