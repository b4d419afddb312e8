import { PartsScreen } from '@/components/parts/parts-screen.tsx';
import { Route } from '@/components/shell/route.tsx';
import { titles } from '@/components/text/shell.ts';

export default function Parts() {
  return (
    <Route title={titles.parts} action="part.read">
      <PartsScreen />
    </Route>
  );
}
