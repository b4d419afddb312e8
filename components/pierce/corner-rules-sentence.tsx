import { cornerRulesText } from '@/components/text/pierce.ts';
import { Sentence } from '@/components/ui/sentence.tsx';
import { Stack } from '@/components/ui/stack.tsx';
import { Tick } from '@/components/ui/tick.tsx';
import type { CornerRules } from '@/strategy/corners/rules.ts';
import { BurnBackRule } from './burn-back-rule.tsx';
import { DraftNumber, useDraft } from './draft-context.tsx';
import { EaseRoundRules } from './ease-round-rules.tsx';

type Loop = CornerRules['loop'];

/** When a corner is treated and how, told as sentences. */
export function CornerRulesSentence() {
  const { draft, dispatch, readOnly } = useDraft();
  const rules = draft.content.cornerRules;
  const change = (next: (before: CornerRules) => CornerRules, field?: string) =>
    dispatch({
      do: 'change',
      field,
      change: (content) => ({ ...content, cornerRules: mutable(next(content.cornerRules)) }),
    });
  const loopNumber = (name: Exclude<keyof Loop, 'allowed'>) => (
    <DraftNumber
      field={`cornerRules.loop.${name}`}
      label={cornerRulesText.label[name]}
      dimension="length"
      value={rules.loop[name]}
      onValue={(value) =>
        change((before) => ({ ...before, loop: { ...before.loop, [name]: value } }), `cornerRules.loop.${name}`)
      }
    />
  );
  return (
    <Stack gap="xs">
      <Sentence>
        {cornerRulesText.below}{' '}
        <DraftNumber
          field="cornerRules.treatBelowAngle"
          label={cornerRulesText.label.treatBelowAngle}
          dimension="angle"
          value={rules.treatBelowAngle}
          onValue={(treatBelowAngle) =>
            change((before) => ({ ...before, treatBelowAngle }), 'cornerRules.treatBelowAngle')
          }
        />{' '}
        {cornerRulesText.above}{' '}
        <DraftNumber
          field="cornerRules.returnExcessLimit"
          label={cornerRulesText.label.returnExcessLimit}
          dimension="temperatureDifference"
          value={rules.returnExcessLimit}
          onValue={(returnExcessLimit) =>
            change((before) => ({ ...before, returnExcessLimit }), 'cornerRules.returnExcessLimit')
          }
        />{' '}
        {cornerRulesText.hotter}
      </Sentence>
      <Tick
        label={cornerRulesText.loops}
        checked={rules.loop.allowed}
        disabled={readOnly}
        onChange={(allowed) => change((before) => ({ ...before, loop: { ...before.loop, allowed } }))}
      />
      {rules.loop.allowed && (
        <Sentence>
          {cornerRulesText.radius} {loopNumber('radius')} {cornerRulesText.extension} {loopNumber('minExtension')}{' '}
          {cornerRulesText.to} {loopNumber('maxExtension')} {cornerRulesText.clearance} {loopNumber('clearance')}
        </Sentence>
      )}
      <Tick
        label={cornerRulesText.dwells}
        checked={rules.dwell.allowed}
        disabled={readOnly}
        onChange={(allowed) => change((before) => ({ ...before, dwell: { ...before.dwell, allowed } }))}
      />
      {rules.dwell.allowed && (
        <Sentence>
          {cornerRulesText.longest}{' '}
          <DraftNumber
            field="cornerRules.dwell.maxDuration"
            label={cornerRulesText.label.maxDuration}
            dimension="time"
            value={rules.dwell.maxDuration}
            onValue={(maxDuration) =>
              change(
                (before) => ({ ...before, dwell: { ...before.dwell, maxDuration } }),
                'cornerRules.dwell.maxDuration',
              )
            }
          />{' '}
          {cornerRulesText.restart}{' '}
          <DraftNumber
            field="cornerRules.dwell.restart"
            label={cornerRulesText.label.restart}
            dimension="time"
            value={rules.dwell.restart}
            onValue={(restart) =>
              change((before) => ({ ...before, dwell: { ...before.dwell, restart } }), 'cornerRules.dwell.restart')
            }
          />
        </Sentence>
      )}
      <EaseRoundRules rules={rules} change={change} readOnly={readOnly} />
      <BurnBackRule rules={rules} change={change} readOnly={readOnly} />
    </Stack>
  );
}

/** The schema's type has writable fields; a rule made here is nobody else's. */
const mutable = ({ loop, dwell, ease, round, burnBack, ...rules }: CornerRules) => ({
  ...rules,
  loop: { ...loop },
  dwell: { ...dwell },
  ...(ease ? { ease: { ...ease } } : {}),
  ...(round ? { round: { ...round } } : {}),
  ...(burnBack ? { burnBack: { ...burnBack } } : {}),
});
