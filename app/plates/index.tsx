import { PlatesScreen } from '@/components/plates/plates-screen.tsx';
import { Route } from '@/components/shell/route.tsx';
import { titles } from '@/components/text/shell.ts';

export default function Plates() {
  return (
    <Route title={titles.plates} action="plate.read">
      <PlatesScreen />
    </Route>
  );
}
