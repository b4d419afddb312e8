export type { CornerRules, CutConditions } from './rules.ts';
export type { CornerOption, CornerPlanRequest, CornerTreatment, EasedPath, PlanContour } from './case.ts';
export type { CornerPlan, CornerPlanTotals, PlannedCorner, PlannedLoop, PlannedRound } from './plan.ts';
export { cornerPlan } from './plan.ts';
export type { PlannedInsert } from './insert.ts';
export { cornerInsert } from './insert.ts';
export { leastDwell } from './dwell.ts';
export { slugRise } from './slug-tip.ts';
