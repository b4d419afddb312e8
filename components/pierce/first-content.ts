import type { StrategyContent } from '@/shared/strategies.ts';
import { cornerRuleDefaults, cutConditionDefaults } from '@/strategy/corners/defaults.ts';
import type { MachineProfile, Nozzle } from '@/strategy/machine.ts';
import { pierceStageDefaults, type Stage } from '@/strategy/pierce/index.ts';

export type FirstChoices = Pick<
  StrategyContent,
  'machineRevisionId' | 'gradeGroup' | 'nozzleId' | 'thickness' | 'hottestPlate'
>;

/**
 * What a new draft begins with, for the thickest plate of its range: the stages given, or usual ones, and usual conditions for the cut
 * and its corners, each number to be tried and changed.
 */
export function firstContent(
  choices: FirstChoices,
  profile: MachineProfile,
  nozzle: Nozzle,
  stages: readonly Stage[] = pierceStageDefaults(profile, choices.thickness.max * 1e-6, nozzle),
): StrategyContent {
  const { loop, dwell, ...rules } = cornerRuleDefaults(profile);
  return {
    ...choices,
    gas: 'oxygen',
    cut: { ...cutConditionDefaults(profile, choices.thickness.max * 1e-6) },
    stages: stages.map((stage) => ({ duration: stage.duration, from: { ...stage.from }, to: { ...stage.to } })),
    cornerRules: { ...rules, loop: { ...loop }, dwell: { ...dwell } },
  };
}
