import { MachineNewScreen } from '@/components/machines/machine-new-screen.tsx';
import { Route } from '@/components/shell/route.tsx';
import { titles } from '@/components/text/shell.ts';

export default function MachineNew() {
  return (
    <Route title={titles.machineNew} action="machine.write">
      <MachineNewScreen />
    </Route>
  );
}
