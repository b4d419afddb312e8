import { ReportsScreen } from '@/components/reports/reports-screen.tsx';
import { Route } from '@/components/shell/route.tsx';
import { titles } from '@/components/text/shell.ts';

export default function Reports() {
  return (
    <Route title={titles.reports} action="report.read">
      <ReportsScreen />
    </Route>
  );
}
