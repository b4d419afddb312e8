import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { gradesQuery } from '@/components/data/grades.ts';
import { atTheMachineText } from '@/components/text/card.ts';
import { common } from '@/components/text/common.ts';
import { Button } from '@/components/ui/button.tsx';
import { Choice } from '@/components/ui/choice.tsx';
import { ErrorNotice } from '@/components/ui/error-notice.tsx';
import { Form } from '@/components/ui/form.tsx';
import { ThicknessField } from '@/components/ui/form-fields.tsx';
import { Progress } from '@/components/ui/progress.tsx';
import { thicknessSchema } from '@/shared/basics.ts';

/** A plate that isn't booked in: its grade group and nominal thickness. */
export function PlateByHand({ onPlate }: { onPlate: (gradeGroup: string, thickness: number) => void }) {
  const grades = useQuery(gradesQuery());
  const [group, setGroup] = useState<string | null>(null);
  const [thickness, setThickness] = useState<number | null>(null);
  const [sent, setSent] = useState(false);
  const read = thicknessSchema.safeParse(thickness);
  if (grades.isError) return <ErrorNotice error={grades.error} onRetry={() => void grades.refetch()} />;
  if (!grades.data) return <Progress label={common.loading} />;
  const groups = [...new Set(grades.data.map((grade) => grade.group))];
  const show = () => {
    setSent(true);
    if (group !== null && read.success) onPlate(group, read.data);
  };
  return (
    <Form onSubmit={show} label={atTheMachineText.byHand}>
      <Choice
        large
        kind="radios"
        label={atTheMachineText.gradeGroup}
        options={groups.map((value) => ({ value, label: value }))}
        value={group}
        onChange={setGroup}
        error={sent && group === null ? atTheMachineText.missing.gradeGroup : undefined}
      />
      <ThicknessField
        large
        label={atTheMachineText.thickness}
        value={thickness}
        onChange={setThickness}
        error={sent && !read.success ? atTheMachineText.missing.thickness : undefined}
      />
      <Button kind="main" size="gloved" fill submit label={atTheMachineText.show} />
    </Form>
  );
}
