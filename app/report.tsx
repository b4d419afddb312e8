import { ReportNewScreen } from '@/components/card/report-new-screen.tsx';
import { NothingHere } from '@/components/shell/nothing-here.tsx';
import { Route, useTextParam } from '@/components/shell/route.tsx';
import { titles } from '@/components/text/shell.ts';
import { idSchema, thicknessSchema } from '@/shared/basics.ts';

/** `?revision=&machine=`, with `&plate=` (its id) and `&thickness=` (µm) when they are known. */
export default function Report() {
  const revision = idSchema.safeParse(useTextParam('revision'));
  const machine = idSchema.safeParse(useTextParam('machine'));
  const plate = idSchema.safeParse(useTextParam('plate'));
  const thickness = thicknessSchema.safeParse(Number(useTextParam('thickness')));
  return (
    <Route title={titles.reportNew} action="report.write">
      {revision.success && machine.success ? (
        <ReportNewScreen
          revisionId={revision.data}
          machineId={machine.data}
          plateId={plate.success ? plate.data : null}
          thickness={thickness.success ? thickness.data : null}
        />
      ) : (
        <NothingHere />
      )}
    </Route>
  );
}
