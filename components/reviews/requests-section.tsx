import { useQuery } from '@tanstack/react-query';
import { View } from 'react-native';
import { requestsQuery } from '@/components/data/requests.ts';
import { useActor } from '@/components/shell/actor.tsx';
import { momentText } from '@/components/text/moments.ts';
import { reviewsText } from '@/components/text/reviews.ts';
import { thicknessText } from '@/components/text/thickness.ts';
import { ErrorNotice } from '@/components/ui/error-notice.tsx';
import { Rows } from '@/components/ui/link-row.tsx';
import { ButtonLink } from '@/components/ui/link.tsx';
import { Panel } from '@/components/ui/panel.tsx';
import { Progress } from '@/components/ui/progress.tsx';
import { Stack } from '@/components/ui/stack.tsx';
import { Body, Small } from '@/components/ui/text.tsx';
import { useUnitSystem } from '@/components/ui/unit-system.ts';
import type { StrategyRequest } from '@/shared/cards.ts';
import { may } from '@/shared/policy.ts';
import type { UnitSystem } from '@/strategy/units/index.ts';

const { asked } = reviewsText;

/** Plates that came to a machine and had no approved strategy; those still without one first. */
export function RequestsSection() {
  const requests = useQuery(requestsQuery());
  const actor = useActor();
  const system = useUnitSystem();
  const sorted = requests.data?.toSorted((a, b) => Number(a.answered) - Number(b.answered)) ?? [];
  return (
    <Panel title={asked.title}>
      <Small>{asked.words}</Small>
      {requests.isPending ? (
        <Progress label={asked.fetching} />
      ) : requests.data === undefined ? (
        <ErrorNotice error={requests.error} onRetry={() => void requests.refetch()} />
      ) : sorted.length === 0 ? (
        <Small>{asked.empty}</Small>
      ) : (
        <Rows label={asked.list}>
          {sorted.map((request) => (
            <RequestRow
              key={request.id}
              request={request}
              system={system}
              mayBegin={actor !== null && may(actor, 'strategy.write')}
            />
          ))}
        </Rows>
      )}
    </Panel>
  );
}

function RequestRow({
  request,
  system,
  mayBegin,
}: {
  readonly request: StrategyRequest;
  readonly system: UnitSystem;
  readonly mayBegin: boolean;
}) {
  return (
    <View style={{ paddingVertical: 12 }}>
      <Stack gap="xs">
        <Body strong>
          {`${request.gradeGroup}, ${thicknessText(request.thickness, system)}, ${request.machine.name}`}
        </Body>
        {request.plateTag === null ? null : <Small>{asked.tag(request.plateTag)}</Small>}
        {request.words === '' ? null : <Body>{request.words}</Body>}
        <Small>{asked.by(request.by.name, momentText(request.at))}</Small>
        <Small strong tone={request.answered ? 'good' : 'hot'}>
          {request.answered ? asked.answered : asked.open}
        </Small>
        {request.answered || !mayBegin ? null : (
          <View style={{ alignItems: 'flex-start' }}>
            <ButtonLink
              href={{
                pathname: '/strategies/new',
                params: {
                  machine: request.machine.id,
                  gradeGroup: request.gradeGroup,
                  thickness: String(request.thickness),
                },
              }}
              label={asked.begin}
            />
          </View>
        )}
      </Stack>
    </View>
  );
}
