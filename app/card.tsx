import { CardScreen } from '@/components/card/card-screen.tsx';
import { NothingHere } from '@/components/shell/nothing-here.tsx';
import { Route, useTextParam } from '@/components/shell/route.tsx';
import { titles } from '@/components/text/shell.ts';
import { idSchema, thicknessSchema } from '@/shared/basics.ts';

/** `?machine=` with `&tag=`, or with `&gradeGroup=` and `&thickness=` (µm) for a plate that isn't booked in. */
export default function Card() {
  const machine = idSchema.safeParse(useTextParam('machine'));
  const tag = useTextParam('tag');
  const gradeGroup = useTextParam('gradeGroup');
  const thickness = thicknessSchema.safeParse(Number(useTextParam('thickness')));
  const asked = tag !== null || (gradeGroup !== null && thickness.success);
  return (
    <Route title={titles.card} action="card.read">
      {machine.success && asked ? (
        <CardScreen
          machineId={machine.data}
          tag={tag}
          gradeGroup={gradeGroup}
          thickness={thickness.success ? thickness.data : null}
        />
      ) : (
        <NothingHere />
      )}
    </Route>
  );
}
