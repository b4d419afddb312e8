import { PlateScreen } from '@/components/plates/plate-screen.tsx';
import { RouteOf } from '@/components/shell/route.tsx';
import { titles } from '@/components/text/shell.ts';

export default function Plate() {
  return (
    <RouteOf title={titles.plate} action="plate.read">
      {(id) => <PlateScreen id={id} />}
    </RouteOf>
  );
}
