import { zodResolver } from '@hookform/resolvers/zod';
import { useState } from 'react';
import { useForm, useWatch } from 'react-hook-form';
import { newId } from '@/components/data/call.ts';
import { applyFieldProblems } from '@/components/data/field-problems.ts';
import { usePersonAdd } from '@/components/data/people.ts';
import { peopleText } from '@/components/text/people.ts';
import { roleDeeds, roleNames } from '@/components/text/shell.ts';
import { Button } from '@/components/ui/button.tsx';
import { Dialog } from '@/components/ui/dialog.tsx';
import { ErrorNotice } from '@/components/ui/error-notice.tsx';
import { FormChoice, FormText, FormTick } from '@/components/ui/form-fields.tsx';
import { Form } from '@/components/ui/form.tsx';
import { memberNewSchema } from '@/shared/people.ts';
import { roles } from '@/shared/policy.ts';

export const roleOptions = roles.map((value) => ({ value, label: roleNames[value], hint: roleDeeds[value] }));

/** Adds a person to this plant. */
export function PersonNewDialog({ onClose }: { readonly onClose: () => void }) {
  const add = usePersonAdd();
  const [id] = useState(newId);
  const form = useForm({
    resolver: zodResolver(memberNewSchema),
    mode: 'onTouched',
    defaultValues: { id, name: '', mail: '', role: 'operator', mayApprove: false, password: '' },
  });
  const role = useWatch({ control: form.control, name: 'role' });
  return (
    <Dialog title={peopleText.add} open onClose={onClose}>
      <Form
        label={peopleText.add}
        onSubmit={form.handleSubmit((given) =>
          add.mutate(
            { ...given, mayApprove: given.role === 'engineer' && given.mayApprove },
            { onSuccess: onClose, onError: (error) => applyFieldProblems(error, form.setError) },
          ),
        )}
      >
        <FormText control={form.control} name="name" label={peopleText.fields.name} />
        <FormText control={form.control} name="mail" kind="mail" label={peopleText.fields.mail} />
        <FormChoice
          control={form.control}
          name="role"
          kind="radios"
          label={peopleText.fields.role}
          options={roleOptions}
        />
        {role === 'engineer' ? (
          <FormTick
            control={form.control}
            name="mayApprove"
            label={peopleText.fields.mayApprove}
            hint={peopleText.fields.mayApproveHint}
          />
        ) : null}
        <FormText
          control={form.control}
          name="password"
          label={peopleText.fields.password}
          hint={peopleText.fields.passwordHint}
          autoComplete="new-password"
          autoCapitalize="none"
        />
        {add.isError ? <ErrorNotice error={add.error} /> : null}
        <Button kind="main" label={peopleText.add} submit busy={add.isPending} />
      </Form>
    </Dialog>
  );
}
