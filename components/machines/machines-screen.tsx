import { useQuery } from '@tanstack/react-query';
import { machinesQuery } from '@/components/data/machines.ts';
import { useActor } from '@/components/shell/actor.tsx';
import { Page } from '@/components/shell/page.tsx';
import { machinesText } from '@/components/text/machines.ts';
import { Empty } from '@/components/ui/empty.tsx';
import { ErrorNotice } from '@/components/ui/error-notice.tsx';
import { LinkRow, Rows } from '@/components/ui/link-row.tsx';
import { ButtonLink } from '@/components/ui/link.tsx';
import { Progress } from '@/components/ui/progress.tsx';
import { Body, Figure, Heading, Small } from '@/components/ui/text.tsx';
import { useUnitSystem } from '@/components/ui/unit-system.ts';
import type { Machine } from '@/shared/machines.ts';
import { may } from '@/shared/policy.ts';
import { quantityText, type UnitSystem } from '@/strategy/units/index.ts';
import { GradesSection } from './grades-section.tsx';
import { NozzlesSection } from './nozzles-section.tsx';

/** The machines of the plant, with the nozzles and grades that strategies are made for. */
export function MachinesScreen() {
  const machines = useQuery(machinesQuery());
  const actor = useActor();
  const system = useUnitSystem();
  const add =
    actor !== null && may(actor, 'machine.write') ? (
      <ButtonLink kind="main" href="/machines/new" label={machinesText.add} />
    ) : undefined;

  return (
    <Page
      title={machinesText.title}
      actions={add}
      aside={
        <>
          <NozzlesSection />
          <GradesSection />
        </>
      }
    >
      {machines.isPending ? (
        <Progress label={machinesText.fetching} />
      ) : machines.data === undefined ? (
        <ErrorNotice error={machines.error} onRetry={() => void machines.refetch()} />
      ) : machines.data.length === 0 ? (
        <Empty title={machinesText.empty.title} action={add}>
          {machinesText.empty.words}
        </Empty>
      ) : (
        <Rows label={machinesText.list}>
          {machines.data.map((machine) => (
            <MachineRow key={machine.id} machine={machine} system={system} />
          ))}
        </Rows>
      )}
    </Page>
  );
}

function MachineRow({ machine, system }: { readonly machine: Machine; readonly system: UnitSystem }) {
  const newest = machine.revisions[0];
  const power = newest === undefined ? null : quantityText(newest.profile.source.maxPower, 'power', system);
  const bed = newest?.profile.bed;
  const metres = (value: number) => quantityText(value, 'length', 'metric', { unit: 'm', decimals: 1 }).number;
  return (
    <LinkRow
      href={`/machines/${machine.id}`}
      right={power === null ? null : <Figure value={power.number} unit={power.unit} />}
    >
      <Heading level={2} look={3}>
        {machine.name}
      </Heading>
      {newest === undefined || bed === undefined ? null : (
        <>
          <Body>
            {`${metres(bed.length)} × ${metres(bed.width)} m, ${bed.shuttleTable ? machinesText.shuttle : machinesText.noShuttle}`}
          </Body>
          <Small>{machinesText.revision(newest.number)}</Small>
        </>
      )}
    </LinkRow>
  );
}
