import { useRouter } from 'expo-router';
import { useState } from 'react';
import { newId } from '@/components/data/call.ts';
import { useMachineAdd } from '@/components/data/machines.ts';
import { Page } from '@/components/shell/page.tsx';
import { machinesText } from '@/components/text/machines.ts';
import { FocusCheck } from './focus-check.tsx';
import { blankMachine, MachineForm } from './machine-form.tsx';

/** A machine and its first revision. */
export function MachineNewScreen() {
  const add = useMachineAdd();
  const router = useRouter();
  const [ids] = useState(() => ({ id: newId(), revisionId: newId() }));
  return (
    <Page title={machinesText.newTitle} aside={<FocusCheck />} estimates>
      <MachineForm
        start={blankMachine}
        named
        action={machinesText.addAction}
        error={add.error}
        busy={add.isPending}
        onSubmit={(given) =>
          add.mutate({ ...ids, ...given }, { onSuccess: (machine) => router.replace(`/machines/${machine.id}`) })
        }
      />
    </Page>
  );
}
