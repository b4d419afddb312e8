import { LayoutsScreen } from '@/components/layouts/layouts-screen.tsx';
import { Route } from '@/components/shell/route.tsx';
import { titles } from '@/components/text/shell.ts';

export default function Layouts() {
  return (
    <Route title={titles.layouts} action="layout.read">
      <LayoutsScreen />
    </Route>
  );
}
