import { useQuery } from '@tanstack/react-query';
import { reportsQuery } from '@/components/data/reports.ts';
import { Page } from '@/components/shell/page.tsx';
import { momentText } from '@/components/text/moments.ts';
import { reportsText, troubleNames } from '@/components/text/reports.ts';
import { Empty } from '@/components/ui/empty.tsx';
import { ErrorNotice } from '@/components/ui/error-notice.tsx';
import { LinkRow, Rows } from '@/components/ui/link-row.tsx';
import { Progress } from '@/components/ui/progress.tsx';
import { Stack } from '@/components/ui/stack.tsx';
import { Body, Heading, Small } from '@/components/ui/text.tsx';
import { KindsPanel } from './kinds-panel.tsx';
import type { Report } from '@/shared/reports.ts';

/** What went wrong at the machines: the open ones, then those that somebody has looked into. */
export function ReportsScreen() {
  const reports = useQuery(reportsQuery());
  const open = reports.data?.filter((report) => report.closed === null) ?? [];
  const closed = reports.data?.filter((report) => report.closed !== null) ?? [];
  return (
    <Page
      title={reportsText.title}
      aside={
        reports.data === undefined || reports.data.length === 0 ? undefined : <KindsPanel reports={reports.data} />
      }
    >
      {reports.isPending ? (
        <Progress label={reportsText.fetching} />
      ) : reports.data === undefined ? (
        <ErrorNotice error={reports.error} onRetry={() => void reports.refetch()} />
      ) : reports.data.length === 0 ? (
        <Empty title={reportsText.empty.title}>{reportsText.empty.words}</Empty>
      ) : (
        <>
          <Section title={reportsText.open} reports={open} none={reportsText.noneOpen} />
          {closed.length === 0 ? null : <Section title={reportsText.closed} reports={closed} />}
        </>
      )}
    </Page>
  );
}

function Section({
  title,
  reports,
  none,
}: {
  readonly title: string;
  readonly reports: readonly Report[];
  readonly none?: string;
}) {
  return (
    <Stack>
      <Heading level={2}>{title}</Heading>
      {reports.length === 0 ? (
        <Body tone="softInk">{none}</Body>
      ) : (
        <Rows label={title}>
          {reports.map((report) => (
            <ReportRow key={report.id} report={report} />
          ))}
        </Rows>
      )}
    </Stack>
  );
}

function ReportRow({ report }: { readonly report: Report }) {
  const photo = report.photo === null ? [] : [reportsText.withPhoto];
  return (
    <LinkRow href={`/reports/${report.id}`}>
      <Heading level={3}>{troubleNames[report.kind]}</Heading>
      <Body>{reportsText.on(report.machine.name, report.plateTag)}</Body>
      {report.words === '' ? null : <Body lines={2}>{report.words}</Body>}
      <Small>{[`${report.strategy.name}, revision ${report.revision.number}`, ...photo].join(', ')}</Small>
      <Small>{reportsText.by(report.by.name, momentText(report.at))}</Small>
    </LinkRow>
  );
}
