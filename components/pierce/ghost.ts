import type { Condition, Prediction } from '@/shared/strategies.ts';
import type { Stage } from '@/strategy/pierce/stage.ts';

/** Another pierce drawn behind this one, thin and dotted, to compare with: a former revision, a proposal. */
export type Ghost = {
  /** Said beside its trace. */
  readonly label: string;
  readonly stages: readonly Stage[];
  readonly routineTime: number; // s
  readonly cold: Pick<Condition, 'trace' | 'breakthrough' | 'thickness'>;
};

export const ghostOf = (label: string, stages: readonly Stage[], { routineTime, cold }: Prediction): Ghost => ({
  label,
  stages,
  routineTime,
  cold,
});
