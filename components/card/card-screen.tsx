import { useQuery } from '@tanstack/react-query';
import { useRouter } from 'expo-router';
import { useEffect, useState, type ReactNode } from 'react';
import { View } from 'react-native';
import { cardQuery } from '@/components/data/cards.ts';
import { isProblem } from '@/components/data/problem.ts';
import { Page } from '@/components/shell/page.tsx';
import { cardText } from '@/components/text/card.ts';
import { agoText, momentText } from '@/components/text/moments.ts';
import { useLayout } from '@/components/theme/layout.ts';
import { roles } from '@/components/theme/roles.ts';
import { space } from '@/components/theme/space.ts';
import { ButtonLink } from '@/components/ui/link.tsx';
import { ErrorNotice } from '@/components/ui/error-notice.tsx';
import { Notice } from '@/components/ui/notice.tsx';
import { Progress } from '@/components/ui/progress.tsx';
import { Cell, Row, Stack } from '@/components/ui/stack.tsx';
import { Body, Heading } from '@/components/ui/text.tsx';
import { useUnitSystem } from '@/components/ui/unit-system.ts';
import type { Card } from '@/shared/cards.ts';
import { Core } from '@/components/pierce/core.tsx';
import { cardAddress, cardAsked, type CardPlate } from './card-address.ts';
import { CardNumbers } from './card-numbers.tsx';
import { CardNone } from './card-none.tsx';
import { CardChecks } from './card-checks.tsx';
import { PlateByHand } from './plate-by-hand.tsx';

type Approved = Extract<Card['match'], { kind: 'approved' }>;

/** The plate card: what is approved for this plate on this machine, cautions first, the numbers as its own dial reads them. */
export function CardScreen({
  machineId,
  tag = null,
  gradeGroup = null,
  thickness = null,
}: Partial<CardPlate> & { machineId: string }) {
  const router = useRouter();
  const plate = { machineId, tag, gradeGroup, thickness };
  const answer = useQuery(cardQuery(cardAsked(plate)));

  if (!answer.data) {
    const unknown = tag !== null && isProblem(answer.error, 'not-found');
    return (
      <Page title={unknown ? cardText.unknownTag.title(tag) : cardText.title} measure="reading">
        {unknown ? (
          <>
            <Body large>{cardText.unknownTag.detail}</Body>
            <ButtonLink size="large" fill href="/at-the-machine" label={cardText.again} />
            <PlateByHand
              onPlate={(group, micrometres) =>
                router.push(cardAddress({ machineId, tag: null, gradeGroup: group, thickness: micrometres }))
              }
            />
          </>
        ) : answer.isError ? (
          <ErrorNotice error={answer.error} onRetry={() => void answer.refetch()} />
        ) : (
          <Progress label={cardText.loading} />
        )}
      </Page>
    );
  }
  const { card, kept } = answer.data;
  return (
    <Page>
      <CardOf key={card.match.kind === 'approved' ? card.match.revision.id : 'none'} card={card} kept={kept} />
    </Page>
  );
}

function CardOf({ card, kept }: { card: Card; kept: boolean }) {
  const { wide } = useLayout();
  const { match } = card;
  const head = (
    <Stack gap="m">
      <CardHead card={card} />
      <AsOf asOf={card.asOf} kept={kept} />
    </Stack>
  );
  if (match.kind === 'none') {
    return (
      <Narrow>
        {head}
        <CardNone card={card} why={match.why} requested={match.requested} />
        <ButtonLink size="large" fill href="/at-the-machine" label={cardText.other} />
      </Narrow>
    );
  }
  const first = (
    <>
      <Cautions match={match} />
      <CardChecks match={match} />
    </>
  );
  const numbers = <CardNumbers match={match} />;
  const wrong = <WentWrong card={card} match={match} />;
  return wide ? (
    <Row align="flex-start" wrap={false} gap="xl">
      <Cell grow={2}>
        <Stack gap="l">
          {head}
          {first}
          {wrong}
          <ButtonLink size="large" fill href="/at-the-machine" label={cardText.other} />
        </Stack>
      </Cell>
      <Cell grow={3}>{numbers}</Cell>
    </Row>
  ) : (
    <Stack gap="l">
      {head}
      {first}
      {numbers}
      <ButtonLink size="large" fill href="/at-the-machine" label={cardText.other} />
      <View dataSet={{ print: 'hide' }} style={styles.foot}>
        {wrong}
      </View>
    </Stack>
  );
}

function CardHead({ card }: { card: Card }) {
  const system = useUnitSystem();
  const { match, plate } = card;
  return (
    <Row gap="l" align="flex-start" wrap={false}>
      {match.kind === 'approved' && <Core bands={match.bands} reserve={match.cold.reserve} size={72} />}
      <Stack grow gap="hair">
        <Body large>{plate ? cardText.plate(plate.tag, plate.heatNumber) : cardText.byHand}</Body>
        <Heading level={1}>
          {cardText.what(
            plate ? plate.grade.name : cardText.group(card.gradeGroup),
            plate ? plate.nominalThickness : card.nominalThickness,
            system,
          )}
        </Heading>
        {plate?.measuredThickness !== null && plate !== null && (
          <Body large>{cardText.measured(plate.measuredThickness, system)}</Body>
        )}
        <Body large strong>
          {card.machine.name}
        </Body>
        {match.kind === 'approved' && (
          <>
            <Body large strong>
              {cardText.approved(match.revision.number)}
            </Body>
            <Body large>{cardText.approvedBy(match.revision.approvedBy, momentText(match.revision.approvedAt))}</Body>
          </>
        )}
      </Stack>
    </Row>
  );
}

/** How old what is shown is, in plain sight; loud when it comes from this device. */
function AsOf({ asOf, kept }: { asOf: string; kept: boolean }) {
  const [now, setNow] = useState(() => Date.now());
  useEffect(() => {
    const timer = setInterval(() => setNow(Date.now()), 20_000);
    return () => clearInterval(timer);
  }, []);
  const when = momentText(asOf);
  const ago = agoText(asOf, now);
  if (!kept) return <Body large>{cardText.asOf(when, ago)}</Body>;
  return (
    <Notice kind="caution" title={cardText.kept.title} large live>
      {cardText.kept.detail(when, ago)}
    </Notice>
  );
}

function Cautions({ match }: { match: Approved }) {
  const { machineRevision } = match;
  const older = machineRevision.newest > machineRevision.number;
  if (match.cautions.length === 0 && !older) return null;
  return (
    <View role="region" aria-label={cardText.cautions} style={{ gap: space.s }}>
      {older && (
        <Notice kind="caution" large>
          {cardText.olderMachine(machineRevision.number, machineRevision.newest)}
        </Notice>
      )}
      {match.cautions.map((caution) => (
        <Notice key={caution.id} kind={caution.state} large>
          {caution.sentence}
        </Notice>
      ))}
    </View>
  );
}

function WentWrong({ card, match }: { card: Card; match: Approved }) {
  return (
    <ButtonLink
      kind="main"
      size="gloved"
      fill
      href={{
        pathname: '/report',
        params: {
          revision: match.revision.id,
          machine: card.machine.id,
          ...(card.plate ? { plate: card.plate.id, tag: card.plate.tag } : { gradeGroup: card.gradeGroup }),
          thickness: String(card.plate?.nominalThickness ?? card.nominalThickness),
        },
      }}
      label={cardText.wrong}
    />
  );
}

function Narrow({ children }: { children: ReactNode }) {
  return <View style={{ maxWidth: 820, gap: space.l }}>{children}</View>;
}

const styles = {
  foot: {
    position: 'sticky',
    bottom: 0,
    zIndex: 5,
    backgroundColor: roles.ground,
    borderTopWidth: 1,
    borderTopColor: roles.ink,
    paddingVertical: space.m,
  },
} as const;
