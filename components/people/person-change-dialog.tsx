import { useState } from 'react';
import { usePersonChange } from '@/components/data/people.ts';
import { isProblem } from '@/components/data/problem.ts';
import { peopleText } from '@/components/text/people.ts';
import { Button } from '@/components/ui/button.tsx';
import { Choice } from '@/components/ui/choice.tsx';
import { ConflictNotice } from '@/components/ui/conflict-notice.tsx';
import { Dialog } from '@/components/ui/dialog.tsx';
import { Divider } from '@/components/ui/divider.tsx';
import { ErrorNotice } from '@/components/ui/error-notice.tsx';
import { Form } from '@/components/ui/form.tsx';
import { Notice } from '@/components/ui/notice.tsx';
import { Row, Stack } from '@/components/ui/stack.tsx';
import { Body } from '@/components/ui/text.tsx';
import { Tick } from '@/components/ui/tick.tsx';
import type { Member } from '@/shared/people.ts';
import { roleOptions } from './person-new-dialog.tsx';

/** Changes a person's role or grant, or ends the membership; ending asks once more. */
export function PersonChangeDialog({
  member,
  onLoadNewest,
  onClose,
}: {
  readonly member: Member;
  readonly onLoadNewest: () => Promise<unknown>;
  readonly onClose: () => void;
}) {
  const change = usePersonChange();
  const [role, setRole] = useState(member.role);
  const [mayApprove, setMayApprove] = useState(member.mayApprove);
  const [ending, setEnding] = useState(false);
  const send = (given: Parameters<typeof change.mutate>[0]['change']) =>
    change.mutate({ member, change: given }, { onSuccess: onClose });

  return (
    <Dialog title={ending ? peopleText.endTitle(member.name) : member.name} open onClose={onClose}>
      {change.isError ? (
        isProblem(change.error, 'stale') ? (
          <ConflictNotice onLoad={() => void onLoadNewest().then(() => change.reset())} />
        ) : (
          <ErrorNotice error={change.error} />
        )
      ) : null}
      {ending ? (
        <Stack gap="l">
          <Notice kind="caution">{peopleText.endWords}</Notice>
          <Row>
            <Button kind="main" label={peopleText.end} busy={change.isPending} onPress={() => send({ ended: true })} />
          </Row>
        </Stack>
      ) : member.endedAt !== null ? (
        <Stack gap="l">
          <Body>{peopleText.ended}</Body>
          <Row>
            <Button
              kind="main"
              label={peopleText.resume}
              busy={change.isPending}
              onPress={() => send({ ended: false })}
            />
          </Row>
        </Stack>
      ) : (
        <Form
          label={peopleText.changeOf(member.name)}
          onSubmit={() => send({ role, mayApprove: role === 'engineer' && mayApprove })}
        >
          <Choice label={peopleText.fields.role} kind="radios" options={roleOptions} value={role} onChange={setRole} />
          {role === 'engineer' ? (
            <Tick
              label={peopleText.fields.mayApprove}
              hint={peopleText.fields.mayApproveHint}
              checked={mayApprove}
              onChange={setMayApprove}
            />
          ) : null}
          <Button kind="main" label={peopleText.save} submit busy={change.isPending} />
          <Divider />
          <Button label={peopleText.end} onPress={() => setEnding(true)} />
        </Form>
      )}
    </Dialog>
  );
}
