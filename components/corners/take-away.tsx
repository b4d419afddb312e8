import { useState } from 'react';
import { useCutPathTake } from '@/components/data/take-away.ts';
import { takeAwayText } from '@/components/text/take-away.ts';
import { Button } from '@/components/ui/button.tsx';
import { Choice } from '@/components/ui/choice.tsx';
import { ErrorNotice } from '@/components/ui/error-notice.tsx';
import { Notice } from '@/components/ui/notice.tsx';
import { Panel } from '@/components/ui/panel.tsx';
import { Row } from '@/components/ui/stack.tsx';
import { Body, Small } from '@/components/ui/text.tsx';
import { useUnitSystem } from '@/components/ui/unit-system.ts';
import { takeAwayCautions, takeAwayFormats, takeAwayUnits } from '@/shared/take-away.ts';

/** The plan's cut path as files, with what must be known before one is used. */
export function TakeAway({ planId, approved }: { readonly planId: string; readonly approved: boolean }) {
  const system = useUnitSystem();
  const [chosen, setChosen] = useState<(typeof takeAwayUnits)[number] | null>(null);
  const unit = chosen ?? (system === 'metric' ? 'mm' : 'inch');
  const take = useCutPathTake();
  return (
    <Panel title={takeAwayText.title}>
      <Body>{takeAwayText.words}</Body>
      <Notice kind="caution" title={takeAwayText.cautions}>
        {!approved && <Body strong>{takeAwayText.notApproved}</Body>}
        {takeAwayCautions.map((caution) => (
          <Body key={caution}>{caution}</Body>
        ))}
      </Notice>
      <Choice
        label={takeAwayText.unit}
        options={takeAwayUnits.map((value) => ({ value, label: takeAwayText.units[value] }))}
        value={unit}
        onChange={setChosen}
      />
      <Row>
        {takeAwayFormats.map((as) => (
          <Button
            key={as}
            label={takeAwayText.as[as]}
            busy={take.isPending && take.variables.as === as}
            disabled={take.isPending && take.variables.as !== as}
            onPress={() => take.mutate({ planId, as, unit })}
          />
        ))}
      </Row>
      {take.isError && <ErrorNotice error={take.error} />}
      {take.isSuccess && (
        <Notice kind="ok" live>
          {takeAwayText.saved(take.data)}
        </Notice>
      )}
      <Small>{takeAwayText.hints}</Small>
    </Panel>
  );
}
