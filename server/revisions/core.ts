import type { Core } from '../../db/schema/strategy-revisions.ts';
import { bandsOfStored } from '../../shared/prediction.ts';
import type { Condition, Prediction, StrategyContent } from '../../shared/strategies.ts';

/** What a list draws of a prediction, kept beside it so that the list needn't read the whole. */
export function coreOf(prediction: Prediction, stages: StrategyContent['stages']): Core {
  return {
    reserveCold: reserveOf(prediction.cold),
    reserveHot: reserveOf(prediction.hot),
    bands: bandsOfStored(
      prediction,
      stages.map(({ duration }) => duration),
    ),
  };
}

const reserveOf = ({ reserve }: Condition): number | null => (reserve.kind === 'ok' ? reserve.value : null);
