import { useQuery } from '@tanstack/react-query';
import { strategyQuery } from '@/components/data/strategies.ts';
import { Page } from '@/components/shell/page.tsx';
import { common } from '@/components/text/common.ts';
import { momentText } from '@/components/text/moments.ts';
import { reserveText, reviewText, strategiesText, thicknessRangeText } from '@/components/text/pierce.ts';
import { ErrorNotice } from '@/components/ui/error-notice.tsx';
import { EstimateNote } from '@/components/ui/estimate-note.tsx';
import { LinkRow, Rows } from '@/components/ui/link-row.tsx';
import { Progress } from '@/components/ui/progress.tsx';
import { Sheet } from '@/components/ui/sheet.tsx';
import { Stack } from '@/components/ui/stack.tsx';
import { Heading, Small } from '@/components/ui/text.tsx';
import { useUnitSystem } from '@/components/ui/unit-system.ts';
import { bandsOfStored } from '@/shared/prediction.ts';
import type { Revision } from '@/shared/strategies.ts';
import { Core } from './core.tsx';
import { StateMark } from './state-mark.tsx';

/** One strategy: its revisions, the newest first, each with its core and where it stands. */
export function StrategyScreen({ id }: { id: string }) {
  const strategy = useQuery(strategyQuery(id));
  const system = useUnitSystem();
  if (!strategy.data) {
    return (
      <Page title={strategiesText.one}>
        {strategy.isError ? (
          <ErrorNotice error={strategy.error} onRetry={() => void strategy.refetch()} />
        ) : (
          <Progress label={common.loading} />
        )}
      </Page>
    );
  }
  const newest = strategy.data.revisions[0];
  const standing = strategy.data.revisions.find(({ state }) => state === 'approved');
  return (
    <Page title={strategy.data.name} eyebrow={strategiesText.one}>
      {newest && (
        <Sheet
          label={strategy.data.name}
          cells={[
            {
              label: strategiesText.block.plate,
              value: `${newest.content.gradeGroup}, ${thicknessRangeText(newest.content.thickness, system)}`,
            },
            { label: strategiesText.block.machine, value: newest.machine.name },
            {
              label: strategiesText.block.approved,
              value: standing ? strategiesText.revision(standing.number) : strategiesText.block.none,
            },
          ]}
        />
      )}
      <Heading level={2}>{strategiesText.tail}</Heading>
      <Rows label={strategiesText.tail}>
        {strategy.data.revisions.map((revision) => (
          <RevisionRow key={revision.id} revision={revision} />
        ))}
      </Rows>
      <EstimateNote />
    </Page>
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
