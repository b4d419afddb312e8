import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { View } from 'react-native';
import { machineQuery } from '@/components/data/machines.ts';
import { useActor } from '@/components/shell/actor.tsx';
import { NothingHere } from '@/components/shell/nothing-here.tsx';
import { Page } from '@/components/shell/page.tsx';
import { isProblem } from '@/components/data/problem.ts';
import { machinesText } from '@/components/text/machines.ts';
import { momentText } from '@/components/text/moments.ts';
import { Button } from '@/components/ui/button.tsx';
import { ErrorNotice } from '@/components/ui/error-notice.tsx';
import { Notice } from '@/components/ui/notice.tsx';
import { Progress } from '@/components/ui/progress.tsx';
import { Sheet } from '@/components/ui/sheet.tsx';
import { Body } from '@/components/ui/text.tsx';
import { useUnitSystem } from '@/components/ui/unit-system.ts';
import type { Machine, MachineRevision } from '@/shared/machines.ts';
import { may } from '@/shared/policy.ts';
import { numberText, quantityText } from '@/strategy/units/index.ts';
import { BlockFrameSection } from './block-frame-section.tsx';
import { FocusCheck } from './focus-check.tsx';
import { MachineReviseForm } from './machine-revise-form.tsx';
import { ProfileView } from './profile-view.tsx';
import { RevisionList } from './revision-list.tsx';

/** One machine: how it is now, how it was, and the form for its next revision. */
export function MachineScreen({ id }: { readonly id: string }) {
  const machine = useQuery(machineQuery(id));
  if (machine.isPending) {
    return (
      <Page>
        <Progress label={machinesText.fetchingOne} />
      </Page>
    );
  }
  if (machine.data === undefined) {
    if (isProblem(machine.error, 'not-found')) return <NothingHere />;
    return (
      <Page>
        <ErrorNotice error={machine.error} onRetry={() => void machine.refetch()} />
      </Page>
    );
  }
  return <MachineSheet machine={machine.data} />;
}

function MachineSheet({ machine }: { readonly machine: Machine }) {
  const actor = useActor();
  const [chosen, setChosen] = useState<number | null>(null);
  const [revising, setRevising] = useState(false);
  const newest = machine.revisions[0];
  const shown = machine.revisions.find((revision) => revision.number === chosen) ?? newest;
  if (newest === undefined || shown === undefined) return <NothingHere />;

  if (revising) {
    return (
      <Page title={machinesText.reviseTitle(machine.name, newest.number + 1)} aside={<FocusCheck />} estimates>
        <Body>{machinesText.reviseWords}</Body>
        <MachineReviseForm machine={machine} from={shown} onDone={() => setRevising(false)} />
      </Page>
    );
  }
  return (
    <Page
      title={machine.name}
      eyebrow={machinesText.revision(shown.number)}
      actions={
        actor !== null && may(actor, 'machine.write') ? (
          <Button kind="main" label={machinesText.revise} onPress={() => setRevising(true)} />
        ) : undefined
      }
      aside={
        <>
          <RevisionList revisions={machine.revisions} shown={shown.number} onShow={setChosen} />
          <FocusCheck />
        </>
      }
      estimates
    >
      {shown === newest ? null : (
        <Notice kind="caution" title={machinesText.older(shown.number)}>
          <View style={{ alignItems: 'flex-start' }}>
            <Button label={machinesText.showNewest} onPress={() => setChosen(null)} />
          </View>
        </Notice>
      )}
      <Block revision={shown} />
      <ProfileView profile={shown.profile} />
      {actor !== null && may(actor, 'cutPath.take') ? <BlockFrameSection machineId={machine.id} /> : null}
    </Page>
  );
}

function Block({ revision }: { readonly revision: MachineRevision }) {
  const system = useUnitSystem();
  const { profile } = revision;
  const metres = (value: number) => quantityText(value, 'length', 'metric', { unit: 'm', decimals: 1 }).number;
  return (
    <Sheet
      label={machinesText.block}
      cells={[
        { label: 'peak power', value: quantityText(profile.source.maxPower, 'power', system).text },
        { label: 'bed', value: `${metres(profile.bed.length)} × ${metres(profile.bed.width)} m` },
        { label: 'focus travel per 1 typed', value: numberText(profile.focusScale.slope, 3) },
        { label: 'revision', value: String(revision.number) },
        { label: 'written', value: machinesText.madeBy(revision.madeBy.name, momentText(revision.madeAt)), share: 2 },
      ]}
    />
  );
}
