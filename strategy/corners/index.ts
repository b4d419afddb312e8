export type { CornerRules, CutConditions } from './rules.ts';
export type {
  CornerOption,
  CornerPlan,
  CornerPlanRequest,
  CornerPlanTotals,
  CornerTreatment,
  PlanContour,
  PlannedCorner,
  PlannedLoop,
} from './plan.ts';
export { cornerPlan } from './plan.ts';
export { leastDwell } from './dwell.ts';
