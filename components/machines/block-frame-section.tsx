import { zodResolver } from '@hookform/resolvers/zod';
import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { useForm } from 'react-hook-form';
import { applyFieldProblems } from '@/components/data/field-problems.ts';
import { isProblem } from '@/components/data/problem.ts';
import { blockFrameQuery, useBlockFrameChange } from '@/components/data/take-away.ts';
import { useActor } from '@/components/shell/actor.tsx';
import { common } from '@/components/text/common.ts';
import { blockFrameText, takeAwayText } from '@/components/text/take-away.ts';
import { Button } from '@/components/ui/button.tsx';
import { ConflictNotice } from '@/components/ui/conflict-notice.tsx';
import { ErrorNotice } from '@/components/ui/error-notice.tsx';
import { Facts } from '@/components/ui/facts.tsx';
import { FormChoice, FormText } from '@/components/ui/form-fields.tsx';
import { Form } from '@/components/ui/form.tsx';
import { Notice } from '@/components/ui/notice.tsx';
import { Panel } from '@/components/ui/panel.tsx';
import { Progress } from '@/components/ui/progress.tsx';
import { Row } from '@/components/ui/stack.tsx';
import { Body, Small } from '@/components/ui/text.tsx';
import { may } from '@/shared/policy.ts';
import { blockFrameFormSchema, takeAwayUnits, type MachineBlockFrame } from '@/shared/take-away.ts';

/** What this machine's blocks begin and end with: read by those who take paths away, written by those who write machines. */
export function BlockFrameSection({ machineId }: { readonly machineId: string }) {
  const frame = useQuery(blockFrameQuery(machineId));
  const actor = useActor();
  return (
    <Panel title={blockFrameText.title}>
      <Body>{blockFrameText.words}</Body>
      {frame.data !== undefined ? (
        actor !== null && may(actor, 'machine.write') ? (
          <FrameForm
            machineId={machineId}
            frame={frame.data}
            onNewest={async () => (await frame.refetch()).data ?? null}
          />
        ) : (
          <>
            <FrameFacts frame={frame.data} />
            <Small>{blockFrameText.readOnly}</Small>
          </>
        )
      ) : frame.isError ? (
        <ErrorNotice error={frame.error} onRetry={() => void frame.refetch()} />
      ) : (
        <Progress label={blockFrameText.fetching} />
      )}
    </Panel>
  );
}

function FrameFacts({ frame: { unit, header, footer } }: { readonly frame: MachineBlockFrame }) {
  return (
    <Facts
      items={[
        { label: blockFrameText.unit, value: takeAwayText.units[unit] },
        { label: blockFrameText.header, value: header === '' ? blockFrameText.none : header },
        { label: blockFrameText.footer, value: footer === '' ? blockFrameText.none : footer },
      ]}
    />
  );
}

type FrameFormProps = {
  readonly machineId: string;
  readonly frame: MachineBlockFrame;
  readonly onNewest: () => Promise<MachineBlockFrame | null>;
};

/** Somebody else changed the machine meanwhile? What was typed stays, beside what they saved. */
function FrameForm({ machineId, frame, onNewest }: FrameFormProps) {
  const change = useBlockFrameChange(machineId);
  // The version that what is typed was begun from: a newer one fetched behind it is no leave to overwrite.
  const [seen, setSeen] = useState(frame.version);
  const [newer, setNewer] = useState<MachineBlockFrame | null>(null);
  const form = useForm({
    resolver: zodResolver(blockFrameFormSchema),
    mode: 'onTouched',
    defaultValues: { unit: frame.unit, header: frame.header, footer: frame.footer },
  });
  const stale = isProblem(change.error, 'stale');
  const loadNewest = async () => {
    const newest = await onNewest();
    if (!newest) return;
    setSeen(newest.version);
    setNewer(newest);
    change.reset();
  };
  return (
    <Form
      label={blockFrameText.title}
      onSubmit={form.handleSubmit((body) =>
        change.mutate(
          { version: seen, body },
          {
            onSuccess: (saved) => {
              setSeen(saved.version);
              setNewer(null);
            },
            onError: (error) => applyFieldProblems(error, form.setError),
          },
        ),
      )}
    >
      <FormChoice
        control={form.control}
        name="unit"
        label={blockFrameText.unit}
        hint={blockFrameText.unitHint}
        options={takeAwayUnits.map((value) => ({ value, label: takeAwayText.units[value] }))}
      />
      <FormText
        control={form.control}
        name="header"
        label={blockFrameText.header}
        hint={blockFrameText.plain}
        rows={5}
        optional
      />
      <FormText
        control={form.control}
        name="footer"
        label={blockFrameText.footer}
        hint={blockFrameText.plain}
        rows={3}
        optional
      />
      <Notice kind="caution">{blockFrameText.caution}</Notice>
      {newer === null ? null : (
        <Notice kind="caution" title={common.newest.title} live>
          <FrameFacts frame={newer} />
          <Row>
            <Button
              label={common.newest.take}
              onPress={() => {
                form.reset({ unit: newer.unit, header: newer.header, footer: newer.footer });
                setNewer(null);
              }}
            />
          </Row>
        </Notice>
      )}
      {stale ? (
        <ConflictNotice onLoad={() => void loadNewest()} />
      ) : change.isError ? (
        <ErrorNotice error={change.error} />
      ) : null}
      {change.isSuccess ? (
        <Notice kind="ok" live>
          {blockFrameText.saved}
        </Notice>
      ) : null}
      <Row>
        <Button label={blockFrameText.save} submit busy={change.isPending} />
      </Row>
    </Form>
  );
}
