import { useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { newId } from '@/components/data/call.ts';
import { machineQuery, useMachineRevise } from '@/components/data/machines.ts';
import { isProblem } from '@/components/data/problem.ts';
import { common } from '@/components/text/common.ts';
import { machinesText } from '@/components/text/machines.ts';
import { ConflictNotice } from '@/components/ui/conflict-notice.tsx';
import { Notice } from '@/components/ui/notice.tsx';
import type { Machine, MachineRevision } from '@/shared/machines.ts';
import { MachineForm } from './machine-form.tsx';

/** The next revision, begun from one of the earlier ones. Says so when somebody wrote one meanwhile; what was typed stays. */
export function MachineReviseForm({
  machine,
  from,
  onDone,
}: {
  readonly machine: Machine;
  readonly from: MachineRevision;
  readonly onDone: () => void;
}) {
  const client = useQueryClient();
  const revise = useMachineRevise();
  const [id] = useState(newId);
  // The version that this person has seen: a newer one that arrives by itself must not pass for seen.
  const [seen, setSeen] = useState({ version: machine.version, number: machine.revisions[0]?.number ?? 0 });
  const [newer, setNewer] = useState<MachineRevision | null>(null);
  const stale = isProblem(revise.error, 'stale');

  const loadNewest = async () => {
    const fetched = await client.fetchQuery({ ...machineQuery(machine.id), staleTime: 0 });
    const newest = fetched.revisions[0];
    if (newest === undefined) return;
    setSeen({ version: fetched.version, number: newest.number });
    setNewer(newest);
    revise.reset();
  };

  return (
    <MachineForm
      start={{ name: machine.name, profile: from.profile, note: '' }}
      named={false}
      action={machinesText.saveRevision(seen.number + 1)}
      error={stale ? null : revise.error}
      busy={revise.isPending}
      onSubmit={({ profile, note }) =>
        revise.mutate(
          { machineId: machine.id, version: seen.version, body: { id, profile, note } },
          { onSuccess: onDone },
        )
      }
      notice={
        <>
          {stale ? <ConflictNotice onLoad={() => void loadNewest()} /> : null}
          {newer === null ? null : (
            <Notice kind="caution" live>
              {machinesText.newer(newer.number, newer.madeBy.name)}
            </Notice>
          )}
        </>
      }
      onCancel={{ label: common.cancel, press: onDone }}
    />
  );
}
