import { MachinesScreen } from '@/components/machines/machines-screen.tsx';
import { Route } from '@/components/shell/route.tsx';
import { titles } from '@/components/text/shell.ts';

export default function Machines() {
  return (
    <Route title={titles.machines} action="machine.read">
      <MachinesScreen />
    </Route>
  );
}
