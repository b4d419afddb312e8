import { ReportScreen } from '@/components/reports/report-screen.tsx';
import { RouteOf } from '@/components/shell/route.tsx';
import { titles } from '@/components/text/shell.ts';

export default function Report() {
  return (
    <RouteOf title={titles.report} action="report.read">
      {(id) => <ReportScreen id={id} />}
    </RouteOf>
  );
}
