import { useQuery } from '@tanstack/react-query';
import { machinesQuery } from '@/components/data/machines.ts';
import { machinesText } from '@/components/text/machines.ts';
import { platesText } from '@/components/text/plates.ts';
import { ErrorNotice } from '@/components/ui/error-notice.tsx';
import { LinkRow, Rows } from '@/components/ui/link-row.tsx';
import { Panel } from '@/components/ui/panel.tsx';
import { Progress } from '@/components/ui/progress.tsx';
import { Body, Small } from '@/components/ui/text.tsx';

/** The way from a plate to its card, a machine each. */
export function PlateCards({ tag }: { readonly tag: string }) {
  const machines = useQuery(machinesQuery());
  return (
    <Panel title={platesText.cards}>
      <Small>{platesText.cardsWords}</Small>
      {machines.isPending ? (
        <Progress label={machinesText.fetching} />
      ) : machines.data === undefined ? (
        <ErrorNotice error={machines.error} onRetry={() => void machines.refetch()} />
      ) : machines.data.length === 0 ? (
        <Small>{platesText.noMachines}</Small>
      ) : (
        <Rows label={platesText.cards}>
          {machines.data.map((machine) => (
            <LinkRow key={machine.id} href={{ pathname: '/card', params: { machine: machine.id, tag } }}>
              <Body strong>{machine.name}</Body>
            </LinkRow>
          ))}
        </Rows>
      )}
    </Panel>
  );
}
