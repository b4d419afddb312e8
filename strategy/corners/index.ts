export type { CornerRules, CutConditions } from './rules.ts';
export type { CornerOption, CornerPlanRequest, CornerTreatment, PlanContour } from './case.ts';
export type { CornerPlan, CornerPlanTotals, PlannedCorner, PlannedLoop } from './plan.ts';
export { cornerPlan } from './plan.ts';
export { leastDwell } from './dwell.ts';
