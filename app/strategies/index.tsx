import { StrategiesScreen } from '@/components/pierce/strategies-screen.tsx';
import { Route } from '@/components/shell/route.tsx';
import { titles } from '@/components/text/shell.ts';

export default function Strategies() {
  return (
    <Route title={titles.strategies} action="strategy.read">
      <StrategiesScreen />
    </Route>
  );
}
