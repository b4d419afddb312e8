import { LayoutNewScreen } from '@/components/layouts/layout-new-screen.tsx';
import { Route } from '@/components/shell/route.tsx';
import { titles } from '@/components/text/shell.ts';

export default function LayoutNew() {
  return (
    <Route title={titles.layoutNew} action="layout.write">
      <LayoutNewScreen />
    </Route>
  );
}
