import { zodResolver } from '@hookform/resolvers/zod';
import { useQuery } from '@tanstack/react-query';
import { useEffect, type ReactNode } from 'react';
import { useForm, type DefaultValues } from 'react-hook-form';
import type { z } from 'zod';
import { applyFieldProblems } from '@/components/data/field-problems.ts';
import { gradesQuery } from '@/components/data/grades.ts';
import { platesText, surfaceNames } from '@/components/text/plates.ts';
import { gradeText } from '@/components/text/machines.ts';
import { Button } from '@/components/ui/button.tsx';
import { Columns } from '@/components/ui/columns.tsx';
import { ErrorNotice } from '@/components/ui/error-notice.tsx';
import { FormChoice, FormNumber, FormText, FormThickness } from '@/components/ui/form-fields.tsx';
import { Form } from '@/components/ui/form.tsx';
import { Panel } from '@/components/ui/panel.tsx';
import { Progress } from '@/components/ui/progress.tsx';
import { Row } from '@/components/ui/stack.tsx';
import { plateFormSchema, surfaces } from '@/shared/plates.ts';

export type PlateFormIn = z.input<typeof plateFormSchema>;
export type PlateFormOut = z.output<typeof plateFormSchema>;

export const blankPlate: DefaultValues<PlateFormIn> = {
  tag: '',
  heatNumber: '',
  measuredThickness: null,
  surface: 'mill scale',
  certificate: '',
  length: null,
  width: null,
};

/** All that is known of a plate. Knows nothing of where it goes. */
export function PlateForm({
  start,
  action,
  error,
  busy,
  onSubmit,
  notice,
}: {
  readonly start: DefaultValues<PlateFormIn>;
  readonly action: string;
  /** What the server said to the last try; its field errors land on their fields. */
  readonly error: unknown;
  readonly busy: boolean;
  readonly onSubmit: (given: PlateFormOut) => void;
  /** What must be read before sending again: it stands where the eyes are after sending. */
  readonly notice?: ReactNode;
}) {
  const grades = useQuery(gradesQuery());
  const form = useForm<PlateFormIn, unknown, PlateFormOut>({
    resolver: zodResolver(plateFormSchema),
    mode: 'onTouched',
    defaultValues: start,
  });
  const { setError, control } = form;
  useEffect(() => {
    if (error !== null) applyFieldProblems(error, setError);
  }, [error, setError]);
  const { fields } = platesText;

  return (
    <Form label={action} onSubmit={form.handleSubmit(onSubmit)}>
      <Panel title={platesText.identity}>
        <Columns>
          <FormText control={control} name="tag" label={fields.tag} hint={fields.tagHint} autoCapitalize="characters" />
          {grades.isPending ? (
            <Progress label={gradeText.fetching} />
          ) : grades.data === undefined ? (
            <ErrorNotice error={grades.error} onRetry={() => void grades.refetch()} />
          ) : (
            <FormChoice
              control={control}
              name="gradeId"
              kind="list"
              label={fields.grade}
              hint={fields.gradeHint}
              options={grades.data.map((grade) => ({ value: grade.id, label: grade.name }))}
            />
          )}
          <FormText control={control} name="heatNumber" label={fields.heatNumber} optional />
          <FormText control={control} name="certificate" label={fields.certificate} optional />
        </Columns>
      </Panel>
      <Panel title={platesText.state}>
        <Columns>
          <FormThickness control={control} name="nominalThickness" label={fields.nominal} hint={fields.nominalHint} />
          <FormThickness
            control={control}
            name="measuredThickness"
            label={fields.measured}
            hint={fields.measuredHint}
            optional
          />
          <FormNumber control={control} name="length" dimension="length" label={fields.length} optional />
          <FormNumber control={control} name="width" dimension="length" label={fields.width} optional />
        </Columns>
        <FormChoice
          control={control}
          name="surface"
          label={fields.surface}
          options={surfaces.map((value) => ({ value, label: surfaceNames[value] }))}
        />
      </Panel>
      {error === null ? null : <ErrorNotice error={error} />}
      {notice}
      <Row>
        <Button kind="main" label={action} submit busy={busy} />
      </Row>
    </Form>
  );
}
