import { Route } from '@/components/shell/route.tsx';
import { Start } from '@/components/shell/start.tsx';
import { titles } from '@/components/text/shell.ts';

export default function Index() {
  return (
    <Route title={titles.start} action="session.use">
      <Start />
    </Route>
  );
}
