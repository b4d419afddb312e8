import { PartNewScreen } from '@/components/parts/part-new-screen.tsx';
import { Route } from '@/components/shell/route.tsx';
import { titles } from '@/components/text/shell.ts';

export default function PartNew() {
  return (
    <Route title={titles.partNew} action="part.write">
      <PartNewScreen />
    </Route>
  );
}
