import { cornerRulesText } from '@/components/text/pierce.ts';
import { Sentence } from '@/components/ui/sentence.tsx';
import { Tick } from '@/components/ui/tick.tsx';
import { burnBackDefaults, type CornerRules } from '@/strategy/corners/rules.ts';
import { DraftNumber } from './draft-context.tsx';

type BurnBack = NonNullable<CornerRules['burnBack']>;

type BurnBackRuleProps = {
  rules: CornerRules;
  change: (next: (before: CornerRules) => CornerRules, field?: string) => void;
  readOnly: boolean;
};

/** Whether burn-back is judged beside the return temperature, and how; strategies from before it was have none. */
export function BurnBackRule({ rules, change, readOnly }: BurnBackRuleProps) {
  const { burnBack = { ...burnBackDefaults, judged: false } } = rules;
  const number = (name: Exclude<keyof BurnBack, 'judged'>, dimension: 'length' | 'temperature') => (
    <DraftNumber
      field={`cornerRules.burnBack.${name}`}
      label={cornerRulesText.label.burnBack[name]}
      dimension={dimension}
      value={burnBack[name]}
      onValue={(value) =>
        change((before) => ({ ...before, burnBack: { ...burnBack, [name]: value } }), `cornerRules.burnBack.${name}`)
      }
    />
  );
  return (
    <>
      <Tick
        label={cornerRulesText.burnBack}
        checked={burnBack.judged}
        disabled={readOnly}
        onChange={(judged) => change((before) => ({ ...before, burnBack: { ...burnBack, judged } }))}
      />
      {burnBack.judged && (
        <Sentence>
          {cornerRulesText.burnBackNoDeeper} {number('limit', 'length')} {cornerRulesText.burnBackAbove}{' '}
          {number('ignition', 'temperature')} {cornerRulesText.burnBackEnd}
        </Sentence>
      )}
    </>
  );
}
