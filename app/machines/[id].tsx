import { MachineScreen } from '@/components/machines/machine-screen.tsx';
import { RouteOf } from '@/components/shell/route.tsx';
import { titles } from '@/components/text/shell.ts';

export default function Machine() {
  return (
    <RouteOf title={titles.machine} action="machine.read">
      {(id) => <MachineScreen id={id} />}
    </RouteOf>
  );
}
