import { useQuery } from '@tanstack/react-query';
import { reportPhotoAddress, reportQuery } from '@/components/data/reports.ts';
import { isProblem } from '@/components/data/problem.ts';
import { NothingHere } from '@/components/shell/nothing-here.tsx';
import { Page } from '@/components/shell/page.tsx';
import { momentText } from '@/components/text/moments.ts';
import { reportsText, troubleNames } from '@/components/text/reports.ts';
import { ErrorNotice } from '@/components/ui/error-notice.tsx';
import { ButtonLink } from '@/components/ui/link.tsx';
import { Panel } from '@/components/ui/panel.tsx';
import { Picture } from '@/components/ui/picture.tsx';
import { Progress } from '@/components/ui/progress.tsx';
import { Sheet } from '@/components/ui/sheet.tsx';
import { Body, Small } from '@/components/ui/text.tsx';
import type { Report } from '@/shared/reports.ts';
import { ReportCloseForm } from './report-close-form.tsx';

/** One report: what was seen, its picture, and the form that closes it with what was found. */
export function ReportScreen({ id }: { readonly id: string }) {
  const report = useQuery(reportQuery(id));
  if (report.isPending) {
    return (
      <Page>
        <Progress label={reportsText.fetchingOne} />
      </Page>
    );
  }
  if (report.data === undefined) {
    if (isProblem(report.error, 'not-found')) return <NothingHere />;
    return (
      <Page>
        <ErrorNotice error={report.error} onRetry={() => void report.refetch()} />
      </Page>
    );
  }
  return <ReportSheet report={report.data} />;
}

function ReportSheet({ report }: { readonly report: Report }) {
  const { cells } = reportsText;
  return (
    <Page
      title={troubleNames[report.kind]}
      eyebrow={reportsText.eyebrow(report.machine.name)}
      actions={<ButtonLink href={`/revisions/${report.revision.id}`} label={reportsText.toRevision} />}
      aside={
        report.closed === null ? (
          <ReportCloseForm report={report} />
        ) : (
          <Panel title={reportsText.closedTitle}>
            <Body>{report.closed.words}</Body>
            <Small>{reportsText.by(report.closed.by.name, momentText(report.closed.at))}</Small>
          </Panel>
        )
      }
    >
      <Sheet
        label={reportsText.block}
        cells={[
          { label: cells.strategy, value: report.strategy.name, share: 2 },
          { label: cells.revision, value: String(report.revision.number) },
          { label: cells.machine, value: report.machine.name },
          { label: cells.plate, value: report.plateTag ?? '–' },
          { label: cells.by, value: report.by.name },
          { label: cells.at, value: momentText(report.at), share: 1.6 },
        ]}
      />
      <Panel title={reportsText.words}>
        {report.words === '' ? <Small>{reportsText.noWords}</Small> : <Body>{report.words}</Body>}
      </Panel>
      <Panel title={reportsText.photo}>
        {report.photo === null ? (
          <Small>{reportsText.noPhoto}</Small>
        ) : (
          <Picture
            address={reportPhotoAddress(report.id)}
            width={report.photo.width}
            height={report.photo.height}
            words={reportsText.photoAlt(troubleNames[report.kind])}
            lost={reportsText.photoLost}
          />
        )}
      </Panel>
    </Page>
  );
}
