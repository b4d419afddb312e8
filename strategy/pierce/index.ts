export {
  DEFAULT_RESERVE_RULES,
  pierceChecks,
  type CheckState,
  type PierceCheck,
  type PierceCheckId,
  type PierceCheckInput,
  type ReserveRules,
} from './checks.ts';
export { peakRiseAroundLine, peakRiseAroundPoint } from './crater.ts';
export { pierceStageDefaults } from './defaults.ts';
export {
  DEFAULT_START_TEMPERATURE,
  leadInNeeded,
  pierceWarmth,
  type LeadInInput,
  type LeadInNeeded,
  type PierceHeat,
} from './lead-in.ts';
export { pierceInterval, type PierceFit, type PierceInterval, type PierceRange } from './fit.ts';
export { pierceMechanismTable, type PierceMechanism } from './mechanisms.ts';
export {
  CHOKING_GAUGE_PRESSURE,
  criticalFlowFactor,
  criticalPressureRatio,
  OXYGEN_NORMAL_DENSITY,
  oxygenMassFlow,
} from './oxygen-flow.ts';
export {
  PIERCE_DEFAULTS,
  PIERCE_MODEL_VERSION,
  pierceParameters,
  pierceParameterTable,
  type PierceParameterName,
  type PierceParameterRow,
  type PierceParameters,
} from './parameters.ts';
export {
  pierceOutline,
  piercePredict,
  THICKEST_PLATE,
  type Breakthrough,
  type PierceInput,
  type PierceOutline,
  type PiercePrediction,
  type PierceStageResult,
  type PierceStall,
  type StallCause,
} from './predict.ts';
export type { ProposalLimits, ProposalRule } from './propose-judge.ts';
export { piercePropose, type PierceProposal, type ProposalObstacle, type ProposeInput } from './propose.ts';
export { pierceResults, type PierceResults } from './results.ts';
export type { PierceLedger } from './run.ts';
export { effectiveDuty, pulseTrain, type PulseTrain } from './pulse.ts';
export { pierceSensitivity, type SensitivityCase, type SensitivityRow } from './sensitivity.ts';
export { routineTime, stageMeanPower, stagePulses, stageQuantitiesAt } from './stage-math.ts';
export { LONGEST_STAGE, MOST_STAGES, stageProblems, type StageProblem } from './stage-problems.ts';
export type { Stage, StageQuantities } from './stage.ts';
export {
  pierceReserve,
  strategyPrediction,
  type Reserve,
  type StrategyEruption,
  type StrategyInput,
  type StrategyOutcome,
  type StrategyPrediction,
} from './strategy-prediction.ts';
