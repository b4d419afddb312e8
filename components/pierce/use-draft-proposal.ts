import { useMemo } from 'react';
import { proposeText } from '@/components/text/pierce-designer.ts';
import type { HouseRule } from '@/shared/house-rules.ts';
import type { Prediction, Revision, StrategyContent } from '@/shared/strategies.ts';
import type { MachineProfile, Nozzle } from '@/strategy/machine.ts';
import type { ReserveRules, Stage } from '@/strategy/pierce/index.ts';
import { ghostOf, type Ghost } from './ghost.ts';
import type { ProposeAsked } from './propose.worker.ts';
import { predicted } from './use-prediction.ts';
import { useProposal, type ProposalState } from './use-proposal.ts';

/** What every proposal starts from: machine, nozzle, plates, and the house rules that block. */
export type ProposalGround = Pick<
  ProposeAsked,
  'profile' | 'nozzle' | 'thickness' | 'hottestPlateTemperature' | 'houseRules'
>;

export type DraftProposal = {
  /** Null while machine or nozzle are not known, or a number is wrong. */
  readonly ground: ProposalGround | null;
  readonly state: ProposalState;
  /** What the proposed, or the nearest, stages come to. */
  readonly proposed: Prediction | null;
  readonly ghost: Ghost | null;
  readonly begin: (asked: ProposeAsked) => void;
  readonly clear: () => void;
};

type Asked = {
  content: StrategyContent;
  /** Every number can be read and is in its range. */
  sound: boolean;
  profile: MachineProfile | null;
  nozzle: Nozzle | null;
  rules: ReserveRules;
  houseRules: Revision['houseRules'];
};

/** The designer's proposal for a draft. One made for another plate, machine or nozzle than stands there now is none any more. */
export function useDraftProposal({ content, sound, profile, nozzle, rules, houseRules }: Asked): DraftProposal {
  const { state: last, begin, clear } = useProposal();
  const ground = useMemo(
    () => (sound && profile && nozzle ? groundOf(content, profile, nozzle, houseRules) : null),
    [sound, content, profile, nozzle, houseRules],
  );
  const outdated = last.kind === 'answered' && ground !== null && !groundSame(ground, last.asked);
  const state: ProposalState = outdated ? { kind: 'idle' } : last;
  const answer = state.kind === 'answered' ? state.proposal : null;
  const stages = answer && (answer.kind === 'ok' ? answer.stages : answer.nearest);
  const proposed = useMemo(
    () => (stages && profile && nozzle ? predicted(withStages(content, stages), profile, nozzle, rules) : null),
    [stages, content, profile, nozzle, rules],
  );
  const label = answer?.kind === 'ok' ? proposeText.label : proposeText.nearestLabel;
  const ghost = useMemo(
    () => (stages && proposed ? ghostOf(label, stages, proposed) : null),
    [stages, proposed, label],
  );
  return { ground, state, proposed, ghost, begin, clear };
}

export const groundOf = (
  content: Pick<StrategyContent, 'thickness' | 'hottestPlate'>,
  profile: MachineProfile,
  nozzle: Nozzle,
  houseRules: readonly Pick<HouseRule, 'expression' | 'sentence' | 'blocks'>[],
): ProposalGround => ({
  profile,
  nozzle: { type: nozzle.type, diameter: nozzle.diameter },
  thickness: { min: content.thickness.min * 1e-6, max: content.thickness.max * 1e-6 },
  hottestPlateTemperature: content.hottestPlate,
  houseRules: houseRules.filter(({ blocks }) => blocks).map(({ expression, sentence }) => ({ expression, sentence })),
});

export const groundSame = (a: ProposalGround, b: ProposalGround): boolean => groundText(a) === groundText(b);

const groundText = ({ profile, nozzle, thickness, hottestPlateTemperature, houseRules }: ProposalGround): string =>
  JSON.stringify([profile, nozzle, thickness, hottestPlateTemperature, houseRules]);

/** Content with other stages, as a draft holds them. */
const withStages = (content: StrategyContent, stages: readonly Stage[]): StrategyContent => ({
  ...content,
  stages: stages.map(({ duration, from, to }) => ({ duration, from: { ...from }, to: { ...to } })),
});
