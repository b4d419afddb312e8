import { useState } from 'react';
import { decisionText } from '@/components/text/pierce.ts';
import { Button } from '@/components/ui/button.tsx';
import { Dialog } from '@/components/ui/dialog.tsx';
import { ErrorNotice } from '@/components/ui/error-notice.tsx';
import { Form } from '@/components/ui/form.tsx';
import { Body } from '@/components/ui/text.tsx';
import { TextField } from '@/components/ui/text-field.tsx';

export type Decision = keyof typeof decisionText.of;

type DecisionDialogProps = {
  decision: Decision | null;
  busy: boolean;
  error: unknown;
  onDecide: (decision: Decision, words: string) => void;
  onClose: () => void;
};

/** Submit, approve, return or withdraw, with words; those that take something away must say why. */
export function DecisionDialog({ decision, busy, error, onDecide, onClose }: DecisionDialogProps) {
  const [words, setWords] = useState('');
  const [missing, setMissing] = useState(false);
  if (decision === null) return null;
  const text = decisionText.of[decision];
  const decide = () => {
    if (text.must !== null && words.trim() === '') setMissing(true);
    else onDecide(decision, words.trim());
  };
  return (
    <Dialog
      title={text.title}
      open
      onClose={onClose}
      actions={<Button kind="main" label={text.action} busy={busy} onPress={decide} />}
    >
      <Form onSubmit={decide} label={text.title}>
        <Body>{text.meaning}</Body>
        <TextField
          label={text.words}
          rows={4}
          value={words}
          optional={text.must === null}
          error={missing && words.trim() === '' ? (text.must ?? undefined) : undefined}
          onChange={setWords}
        />
        {error !== null && <ErrorNotice error={error} />}
      </Form>
    </Dialog>
  );
}
