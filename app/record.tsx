import { RecordScreen } from '@/components/record/record-screen.tsx';
import { Route } from '@/components/shell/route.tsx';
import { titles } from '@/components/text/shell.ts';

export default function Record() {
  return (
    <Route title={titles.record} action="record.read">
      <RecordScreen />
    </Route>
  );
}
