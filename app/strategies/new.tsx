import { StrategyNewScreen } from '@/components/pierce/strategy-new-screen.tsx';
import { Route } from '@/components/shell/route.tsx';
import { titles } from '@/components/text/shell.ts';

export default function StrategyNew() {
  return (
    <Route title={titles.strategyNew} action="strategy.write">
      <StrategyNewScreen />
    </Route>
  );
}
