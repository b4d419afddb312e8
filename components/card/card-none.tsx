import { useState } from 'react';
import { newId } from '@/components/data/call.ts';
import { useRequestAdd } from '@/components/data/requests.ts';
import { cardText } from '@/components/text/card.ts';
import { Button } from '@/components/ui/button.tsx';
import { ErrorNotice } from '@/components/ui/error-notice.tsx';
import { Form } from '@/components/ui/form.tsx';
import { Notice } from '@/components/ui/notice.tsx';
import { Body } from '@/components/ui/text.tsx';
import { TextField } from '@/components/ui/text-field.tsx';
import type { Card } from '@/shared/cards.ts';

/** No match: said plainly, with the one thing to do. Never the nearest guess. */
export function CardNone({ card, why, requested }: { card: Card; why: string; requested: boolean }) {
  const add = useRequestAdd();
  const [id] = useState(newId);
  const [words, setWords] = useState('');
  const asked = requested || add.isSuccess;
  return (
    <>
      <Notice kind="caution" title={cardText.none.title} large>
        <Body large>{why}</Body>
        <Body large>{cardText.none.plain}</Body>
      </Notice>
      {asked ? (
        <Notice kind="ok" title={cardText.none.asked} large live>
          {cardText.none.askedHint}
        </Notice>
      ) : (
        <Form
          label={cardText.none.ask}
          onSubmit={() =>
            add.mutate({
              id,
              machineId: card.machine.id,
              gradeGroup: card.gradeGroup,
              thickness: card.nominalThickness,
              plateId: card.plate?.id ?? null,
              words,
            })
          }
        >
          <TextField large optional rows={2} label={cardText.none.words} value={words} onChange={setWords} />
          {add.isError && <ErrorNotice error={add.error} />}
          <Button kind="main" size="gloved" fill submit label={cardText.none.ask} busy={add.isPending} />
        </Form>
      )}
    </>
  );
}
