import { PlateNewScreen } from '@/components/plates/plate-new-screen.tsx';
import { Route } from '@/components/shell/route.tsx';
import { titles } from '@/components/text/shell.ts';

export default function PlateNew() {
  return (
    <Route title={titles.plateNew} action="plate.write">
      <PlateNewScreen />
    </Route>
  );
}
