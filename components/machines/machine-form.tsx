import { zodResolver } from '@hookform/resolvers/zod';
import { useEffect, type ReactNode } from 'react';
import { useForm, type DefaultValues } from 'react-hook-form';
import { z } from 'zod';
import { applyFieldProblems } from '@/components/data/field-problems.ts';
import { machinesText, profileText } from '@/components/text/machines.ts';
import { Button } from '@/components/ui/button.tsx';
import { ErrorNotice } from '@/components/ui/error-notice.tsx';
import { FormText } from '@/components/ui/form-fields.tsx';
import { Form } from '@/components/ui/form.tsx';
import { Panel } from '@/components/ui/panel.tsx';
import { Row } from '@/components/ui/stack.tsx';
import { nameSchema } from '@/shared/basics.ts';
import { machineNoteSchema, machineProfileSchema } from '@/shared/machines.ts';
import { FocusFields } from './focus-fields.tsx';
import { ProfileFields } from './profile-fields.tsx';

/** What a machine's form holds; a next revision has the name already. */
const machineFormSchema = z.object({
  name: nameSchema,
  profile: machineProfileSchema,
  note: machineNoteSchema,
});
export type MachineFormIn = z.input<typeof machineFormSchema>;
export type MachineFormOut = z.output<typeof machineFormSchema>;

/** A blank form takes nothing for granted but a dial that would read the position itself. */
export const blankMachine: DefaultValues<MachineFormIn> = {
  name: '',
  note: '',
  profile: {
    focusScale: { reference: 'plate', offset: 0, slope: 1 },
    bed: { shuttleTable: false },
  },
};

/** All of a machine's profile. Knows nothing of where it goes. */
export function MachineForm({
  start,
  named,
  action,
  error,
  busy,
  onSubmit,
  onCancel,
  notice,
}: {
  readonly start: DefaultValues<MachineFormIn>;
  /** The name is asked for. */
  readonly named: boolean;
  readonly action: string;
  /** What the server said to the last try; its field errors land on their fields. */
  readonly error: unknown;
  readonly busy: boolean;
  readonly onSubmit: (given: MachineFormOut) => void;
  /** What must be read before sending again: it stands where the eyes are after sending. */
  readonly notice?: ReactNode;
  readonly onCancel?: { readonly label: string; readonly press: () => void };
}) {
  const form = useForm<MachineFormIn, unknown, MachineFormOut>({
    resolver: zodResolver(machineFormSchema),
    mode: 'onTouched',
    defaultValues: start,
  });
  const { setError } = form;
  useEffect(() => {
    if (error !== null) applyFieldProblems(error, setError);
  }, [error, setError]);

  return (
    <Form label={action} onSubmit={form.handleSubmit(onSubmit)}>
      {named ? (
        <Panel>
          <FormText control={form.control} name="name" label={machinesText.name} hint={machinesText.nameHint} />
        </Panel>
      ) : null}
      <Panel title={profileText.focusScale.title}>
        <FocusFields control={form.control} />
      </Panel>
      <ProfileFields control={form.control} />
      <Panel>
        <FormText
          control={form.control}
          name="note"
          rows={3}
          label={machinesText.note}
          hint={machinesText.noteHint}
          optional
        />
      </Panel>
      {error === null ? null : <ErrorNotice error={error} />}
      {notice}
      <Row>
        <Button kind="main" label={action} submit busy={busy} />
        {onCancel === undefined ? null : <Button label={onCancel.label} onPress={onCancel.press} />}
      </Row>
    </Form>
  );
}
