import { LayoutScreen } from '@/components/layouts/layout-screen.tsx';
import { RouteOf } from '@/components/shell/route.tsx';
import { titles } from '@/components/text/shell.ts';

export default function Layout() {
  return (
    <RouteOf title={titles.layout} action="layout.read">
      {(id) => <LayoutScreen id={id} />}
    </RouteOf>
  );
}
