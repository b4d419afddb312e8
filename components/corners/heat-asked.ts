import type { CornerPlan } from '@/shared/corner-plans.ts';
import type { CutPath } from '@/strategy/path/cut-path.ts';
import type { HeatAsked } from './heat.worker.ts';
import { plateOf } from './plan-plate.ts';

/** What the heat of a plan's cut follows from. */
export const heatAsked = (
  plan: Pick<CornerPlan, 'part' | 'skeleton' | 'layout' | 'cutting' | 'thickness' | 'plateTemperature'>,
  path: CutPath,
): HeatAsked => ({
  path,
  cutting: plan.cutting,
  ...plateOf(plan),
  thickness: plan.thickness,
  plateTemperature: plan.plateTemperature,
});
