import { momentText } from '@/components/text/moments.ts';
import { reserveText, revisionText, reviewText, strategiesText } from '@/components/text/pierce.ts';
import { LinkRow, Rows } from '@/components/ui/link-row.tsx';
import { Stack } from '@/components/ui/stack.tsx';
import { Heading, Small } from '@/components/ui/text.tsx';
import { bandsOfStored, reserveRulesOf } from '@/shared/prediction.ts';
import type { Revision, Strategy } from '@/shared/strategies.ts';
import { Core } from './core.tsx';
import { SectionPanel } from './section-panel.tsx';
import { StateMark } from './state-mark.tsx';

/** The revision that stands for a strategy: the approved one, or else the newest. */
export const standingRevision = (strategy: Strategy): Revision | undefined =>
  strategy.revisions.find(({ state }) => state === 'approved') ?? strategy.revisions[0];

/** The standing revision's section, as it was stored. */
export function StandingSection({ strategy }: { strategy: Strategy }) {
  const revision = standingRevision(strategy);
  if (!revision) return null;
  const { prediction, content } = revision;
  return (
    <Stack gap="m">
      <StateMark state={revision.state} detail={revisionText.number(revision.number)} />
      <SectionPanel
        live={{ prediction, content, behind: false }}
        content={content}
        machine={revision.machine}
        nozzle={revision.nozzle}
        chosen={null}
        rules={reserveRulesOf(revision.houseRules.map(({ expression }) => expression))}
      />
    </Stack>
  );
}

/** All revisions, the newest first, each with its core and what last happened to it. */
export function RevisionRows({ strategy }: { strategy: Strategy }) {
  return (
    <Stack gap="m">
      <Heading level={2}>{strategiesText.tail}</Heading>
      <Rows label={strategiesText.tail}>
        {strategy.revisions.map((revision) => (
          <RevisionRow key={revision.id} revision={revision} />
        ))}
      </Rows>
    </Stack>
  );
}

function RevisionRow({ revision }: { revision: Revision }) {
  const { cold, hot } = revision.prediction;
  const last = revision.reviews.at(-1);
  const value = (reserve: typeof cold.reserve) => (reserve.kind === 'ok' ? reserve.value : null);
  return (
    <LinkRow
      href={`/revisions/${revision.id}`}
      left={
        <Core
          bands={bandsOfStored(
            revision.prediction,
            revision.content.stages.map((stage) => stage.duration),
          )}
          reserve={value(cold.reserve)}
          size={48}
          silent
        />
      }
    >
      <Stack gap="hair">
        <StateMark state={revision.state} detail={strategiesText.revision(revision.number)} />
        <Small>{`reserve ${reserveText(value(cold.reserve))} cold, ${reserveText(value(hot.reserve))} hot`}</Small>
        <Small>
          {last
            ? `${reviewText.verdict[last.verdict](last.by.name)}, ${momentText(last.at)}`
            : strategiesText.changed(momentText(revision.changedAt))}
        </Small>
      </Stack>
    </LinkRow>
  );
}
