import { StrategyNewScreen } from '@/components/pierce/strategy-new-screen.tsx';
import { Route, useTextParam } from '@/components/shell/route.tsx';
import { titles } from '@/components/text/shell.ts';
import { idSchema, thicknessSchema } from '@/shared/basics.ts';

/** `?machine=&gradeGroup=&thickness=` (µm) when it is begun for a plate that had none. */
export default function StrategyNew() {
  const machine = idSchema.safeParse(useTextParam('machine'));
  const gradeGroup = useTextParam('gradeGroup');
  const thickness = thicknessSchema.safeParse(Number(useTextParam('thickness')));
  return (
    <Route title={titles.strategyNew} action="strategy.write">
      <StrategyNewScreen
        machineId={machine.success ? machine.data : null}
        gradeGroup={gradeGroup}
        thickness={thickness.success ? thickness.data : null}
      />
    </Route>
  );
}
