import { zodResolver } from '@hookform/resolvers/zod';
import { useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { useForm } from 'react-hook-form';
import { applyFieldProblems } from '@/components/data/field-problems.ts';
import { isProblem } from '@/components/data/problem.ts';
import { reportQuery, useReportClose } from '@/components/data/reports.ts';
import { reportsText } from '@/components/text/reports.ts';
import { Button } from '@/components/ui/button.tsx';
import { ConflictNotice } from '@/components/ui/conflict-notice.tsx';
import { ErrorNotice } from '@/components/ui/error-notice.tsx';
import { FormText } from '@/components/ui/form-fields.tsx';
import { Form } from '@/components/ui/form.tsx';
import { Panel } from '@/components/ui/panel.tsx';
import { reportEndpoints, type Report } from '@/shared/reports.ts';

/** Closes a report with what was found. */
export function ReportCloseForm({ report }: { readonly report: Report }) {
  const client = useQueryClient();
  const close = useReportClose();
  const [seen, setSeen] = useState(report.version);
  const form = useForm({
    resolver: zodResolver(reportEndpoints.close.body),
    mode: 'onTouched',
    defaultValues: { words: '' },
  });
  const stale = isProblem(close.error, 'stale');
  const loadNewest = async () => {
    const newest = await client.fetchQuery({ ...reportQuery(report.id), staleTime: 0 });
    setSeen(newest.version);
    close.reset();
  };
  return (
    <Panel title={reportsText.closing}>
      <Form
        label={reportsText.closing}
        onSubmit={form.handleSubmit(({ words }) =>
          close.mutate(
            { report: { id: report.id, version: seen }, words },
            { onError: (error) => applyFieldProblems(error, form.setError) },
          ),
        )}
      >
        <FormText control={form.control} name="words" rows={5} label={reportsText.found} hint={reportsText.foundHint} />
        {stale ? (
          <ConflictNotice onLoad={() => void loadNewest()} />
        ) : close.isError ? (
          <ErrorNotice error={close.error} />
        ) : null}
        <Button kind="main" label={reportsText.closing} submit busy={close.isPending} />
      </Form>
    </Panel>
  );
}
