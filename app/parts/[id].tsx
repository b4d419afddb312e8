import { PartScreen } from '@/components/parts/part-screen.tsx';
import { RouteOf } from '@/components/shell/route.tsx';
import { titles } from '@/components/text/shell.ts';

export default function Part() {
  return (
    <RouteOf title={titles.part} action="part.read">
      {(id) => <PartScreen id={id} />}
    </RouteOf>
  );
}
