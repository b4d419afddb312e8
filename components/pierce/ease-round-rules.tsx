import { cornerRulesText } from '@/components/text/pierce.ts';
import { Sentence } from '@/components/ui/sentence.tsx';
import { Tick } from '@/components/ui/tick.tsx';
import { easeDefaults, roundDefaults, type CornerRules } from '@/strategy/corners/rules.ts';
import { DraftNumber } from './draft-context.tsx';

type Ease = NonNullable<CornerRules['ease']>;
type Round = NonNullable<CornerRules['round']>;

type EaseRoundRulesProps = {
  rules: CornerRules;
  change: (next: (before: CornerRules) => CornerRules, field?: string) => void;
  readOnly: boolean;
};

/** Whether corners may be eased or rounded, and by how much; strategies from before there was either have none. */
export function EaseRoundRules({ rules, change, readOnly }: EaseRoundRulesProps) {
  const { ease = { ...easeDefaults, allowed: false }, round = { ...roundDefaults, allowed: false } } = rules;
  const easeNumber = (name: Exclude<keyof Ease, 'allowed'>, dimension: 'length' | 'ratio') => (
    <DraftNumber
      field={`cornerRules.ease.${name}`}
      label={cornerRulesText.label.ease[name]}
      dimension={dimension}
      value={ease[name]}
      onValue={(value) =>
        change((before) => ({ ...before, ease: { ...ease, [name]: value } }), `cornerRules.ease.${name}`)
      }
    />
  );
  const roundNumber = (name: Exclude<keyof Round, 'allowed'>) => (
    <DraftNumber
      field={`cornerRules.round.${name}`}
      label={cornerRulesText.label.round[name]}
      dimension="length"
      value={round[name]}
      onValue={(value) =>
        change((before) => ({ ...before, round: { ...round, [name]: value } }), `cornerRules.round.${name}`)
      }
    />
  );
  return (
    <>
      <Tick
        label={cornerRulesText.eases}
        checked={ease.allowed}
        disabled={readOnly}
        onChange={(allowed) => change((before) => ({ ...before, ease: { ...ease, allowed } }))}
      />
      {ease.allowed && (
        <Sentence>
          {cornerRulesText.easeOver} {easeNumber('length', 'length')} {cornerRulesText.easeFeed}{' '}
          {easeNumber('feedShare', 'ratio')} {cornerRulesText.easePower} {easeNumber('powerShare', 'ratio')}{' '}
          {cornerRulesText.easeEnd}
        </Sentence>
      )}
      <Tick
        label={cornerRulesText.rounds}
        checked={round.allowed}
        disabled={readOnly}
        onChange={(allowed) => change((before) => ({ ...before, round: { ...round, allowed } }))}
      />
      {round.allowed && (
        <Sentence>
          {cornerRulesText.roundRadius} {roundNumber('radius')} {cornerRulesText.roundTolerance}{' '}
          {roundNumber('tolerance')} {cornerRulesText.roundEnd}
        </Sentence>
      )}
    </>
  );
}
