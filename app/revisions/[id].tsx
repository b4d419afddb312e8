import { RevisionScreen } from '@/components/pierce/revision-screen.tsx';
import { RouteOf } from '@/components/shell/route.tsx';
import { titles } from '@/components/text/shell.ts';

export default function Revision() {
  return (
    <RouteOf title={titles.revision} action="strategy.read">
      {(id) => <RevisionScreen id={id} />}
    </RouteOf>
  );
}
