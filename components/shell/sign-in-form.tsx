import { zodResolver } from '@hookform/resolvers/zod';
import { useState } from 'react';
import { useForm } from 'react-hook-form';
import { useSignIn } from '@/components/data/sessions.ts';
import { applyFieldProblems } from '@/components/data/field-problems.ts';
import { signInText } from '@/components/text/sign-in.ts';
import { Button } from '@/components/ui/button.tsx';
import { ErrorNotice } from '@/components/ui/error-notice.tsx';
import { Form } from '@/components/ui/form.tsx';
import { FormText } from '@/components/ui/form-fields.tsx';
import { Tick } from '@/components/ui/tick.tsx';
import { signInSchema, type Session } from '@/shared/sessions.ts';

/** Mail and password. Knows nothing of where it stands: what follows is `onDone`. */
export function SignInForm({
  mail = '',
  password = '',
  onDone,
}: {
  readonly mail?: string;
  readonly password?: string;
  readonly onDone: (session: Session) => void;
}) {
  const signIn = useSignIn();
  const [shown, setShown] = useState(false);
  const form = useForm({
    resolver: zodResolver(signInSchema),
    mode: 'onTouched',
    values: { mail, password },
    resetOptions: { keepDirtyValues: false },
  });
  return (
    <Form
      label={signInText.title}
      onSubmit={form.handleSubmit((given) =>
        signIn.mutate(given, {
          onSuccess: onDone,
          onError: (error) => applyFieldProblems(error, form.setError),
        }),
      )}
    >
      <FormText control={form.control} name="mail" label={signInText.mail} kind="mail" autoComplete="username" />
      <FormText
        control={form.control}
        name="password"
        label={signInText.password}
        kind={shown ? 'text' : 'password'}
        autoComplete="current-password"
        autoCapitalize="none"
      />
      <Tick label={signInText.show} checked={shown} onChange={setShown} />
      {signIn.isError ? <ErrorNotice error={signIn.error} /> : null}
      <Button kind="main" size="large" label={signInText.action} submit busy={signIn.isPending} fill />
    </Form>
  );
}
