import { zodResolver } from '@hookform/resolvers/zod';
import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { useForm } from 'react-hook-form';
import { z } from 'zod';
import { newId } from '@/components/data/call.ts';
import { applyFieldProblems } from '@/components/data/field-problems.ts';
import { gradesQuery, useGradeAdd } from '@/components/data/grades.ts';
import { useActor } from '@/components/shell/actor.tsx';
import { common } from '@/components/text/common.ts';
import { gradeText } from '@/components/text/machines.ts';
import { Button } from '@/components/ui/button.tsx';
import { ErrorNotice } from '@/components/ui/error-notice.tsx';
import { Facts } from '@/components/ui/facts.tsx';
import { FormText } from '@/components/ui/form-fields.tsx';
import { Form } from '@/components/ui/form.tsx';
import { Panel } from '@/components/ui/panel.tsx';
import { Progress } from '@/components/ui/progress.tsx';
import { Row } from '@/components/ui/stack.tsx';
import { Small } from '@/components/ui/text.tsx';
import { nameSchema } from '@/shared/basics.ts';
import { may } from '@/shared/policy.ts';

/** Steel as ordered, and the group that a strategy is made for. */
export function GradesSection() {
  const grades = useQuery(gradesQuery());
  const actor = useActor();
  const [adding, setAdding] = useState(false);
  return (
    <Panel title={gradeText.title}>
      {grades.isPending ? (
        <Progress label={gradeText.fetching} />
      ) : grades.data === undefined ? (
        <ErrorNotice error={grades.error} onRetry={() => void grades.refetch()} />
      ) : grades.data.length === 0 ? (
        <Small>{gradeText.empty}</Small>
      ) : (
        <Facts items={grades.data.map((grade) => ({ label: grade.name, value: gradeText.of(grade.group) }))} />
      )}
      {actor === null || !may(actor, 'grade.write') ? null : adding ? (
        <GradeForm onDone={() => setAdding(false)} />
      ) : (
        <Button label={gradeText.add} onPress={() => setAdding(true)} />
      )}
    </Panel>
  );
}

const formSchema = z.object({ name: nameSchema, group: nameSchema });

function GradeForm({ onDone }: { readonly onDone: () => void }) {
  const add = useGradeAdd();
  const [id] = useState(newId);
  const form = useForm({
    resolver: zodResolver(formSchema),
    mode: 'onTouched',
    defaultValues: { name: '', group: '' },
  });
  return (
    <Form
      label={gradeText.add}
      onSubmit={form.handleSubmit((given) =>
        add.mutate(
          { id, ...given },
          { onSuccess: onDone, onError: (error) => applyFieldProblems(error, form.setError) },
        ),
      )}
    >
      <FormText control={form.control} name="name" label={gradeText.name} hint={gradeText.nameHint} />
      <FormText control={form.control} name="group" label={gradeText.group} hint={gradeText.groupHint} />
      {add.isError ? <ErrorNotice error={add.error} /> : null}
      <Row>
        <Button kind="main" label={gradeText.add} submit busy={add.isPending} />
        <Button label={common.cancel} onPress={onDone} />
      </Row>
    </Form>
  );
}
