import { StrategyScreen } from '@/components/pierce/strategy-screen.tsx';
import { RouteOf } from '@/components/shell/route.tsx';
import { titles } from '@/components/text/shell.ts';

export default function Strategy() {
  return (
    <RouteOf title={titles.strategy} action="strategy.read">
      {(id) => <StrategyScreen id={id} />}
    </RouteOf>
  );
}
