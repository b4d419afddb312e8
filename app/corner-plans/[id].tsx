import { CornerPlanScreen } from '@/components/corners/corner-plan-screen.tsx';
import { RouteOf } from '@/components/shell/route.tsx';
import { titles } from '@/components/text/shell.ts';

export default function CornerPlan() {
  return (
    <RouteOf title={titles.cornerPlan} action="card.read">
      {(id) => <CornerPlanScreen id={id} />}
    </RouteOf>
  );
}
