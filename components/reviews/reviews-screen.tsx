import { useQuery } from '@tanstack/react-query';
import { reviewsQuery } from '@/components/data/reviews.ts';
import { Core } from '@/components/pierce/core.tsx';
import { useActor } from '@/components/shell/actor.tsx';
import { Page } from '@/components/shell/page.tsx';
import { momentText } from '@/components/text/moments.ts';
import { reserveText } from '@/components/text/pierce.ts';
import { reviewsText } from '@/components/text/reviews.ts';
import { thicknessRangeText } from '@/components/text/thickness.ts';
import { Empty } from '@/components/ui/empty.tsx';
import { ErrorNotice } from '@/components/ui/error-notice.tsx';
import { LinkRow, Rows } from '@/components/ui/link-row.tsx';
import { Progress } from '@/components/ui/progress.tsx';
import { Body, Heading, Small } from '@/components/ui/text.tsx';
import { useUnitSystem } from '@/components/ui/unit-system.ts';
import { reviewEndpoints } from '@/shared/strategies.ts';
import type { AnswerOf } from '@/shared/endpoint.ts';
import { can, type Actor } from '@/shared/policy.ts';
import type { UnitSystem } from '@/strategy/units/index.ts';
import { RequestsSection } from './requests-section.tsx';

type Waiting = AnswerOf<typeof reviewEndpoints.list>['items'][number];

/** What waits for a decision, and what was asked for at the machines. */
export function ReviewsScreen() {
  const reviews = useQuery(reviewsQuery());
  const actor = useActor();
  const system = useUnitSystem();
  return (
    <Page title={reviewsText.title} aside={<RequestsSection />} estimates>
      {reviews.isPending ? (
        <Progress label={reviewsText.fetching} />
      ) : reviews.data === undefined ? (
        <ErrorNotice error={reviews.error} onRetry={() => void reviews.refetch()} />
      ) : reviews.data.length === 0 ? (
        <Empty title={reviewsText.empty.title}>{reviewsText.empty.words}</Empty>
      ) : (
        <Rows label={reviewsText.list}>
          {reviews.data.map((waiting) => (
            <WaitingRow key={waiting.latest.id} waiting={waiting} actor={actor} system={system} />
          ))}
        </Rows>
      )}
    </Page>
  );
}

function WaitingRow({
  waiting,
  actor,
  system,
}: {
  readonly waiting: Waiting;
  readonly actor: Actor | null;
  readonly system: UnitSystem;
}) {
  const { latest } = waiting;
  const verdict =
    actor === null ? null : can(actor, 'review.decide', { touchedBy: waiting.touchedBy.map((person) => person.id) });
  return (
    <LinkRow
      href={`/revisions/${latest.id}`}
      left={<Core bands={latest.bands} reserve={latest.reserveCold} size={48} silent />}
    >
      <Heading level={2}>{`${waiting.gradeGroup}, ${thicknessRangeText(waiting.thickness, system)}`}</Heading>
      <Body>{`${waiting.name}, ${reviewsText.revision(latest.number)}, ${waiting.machine.name}`}</Body>
      <Small>{reviewsText.reserve(reserveText(latest.reserveCold), reserveText(latest.reserveHot))}</Small>
      <Small>{reviewsText.submitted(waiting.submittedBy.name, momentText(waiting.submittedAt))}</Small>
      {waiting.openReports === 0 ? null : <Small tone="hot">{reviewsText.trouble(waiting.openReports)}</Small>}
      {verdict === null ? null : verdict.ok ? (
        <Small strong>{reviewsText.yours}</Small>
      ) : (
        <Small>{verdict.code === 'own-work' ? reviewsText.own : reviewsText.noGrant}</Small>
      )}
    </LinkRow>
  );
}
