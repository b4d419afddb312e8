import { useQuery } from '@tanstack/react-query';
import { strategyQuery } from '@/components/data/strategies.ts';
import { Page } from '@/components/shell/page.tsx';
import { common } from '@/components/text/common.ts';
import { strategiesText } from '@/components/text/pierce.ts';
import { useLayout } from '@/components/theme/layout.ts';
import { ErrorNotice } from '@/components/ui/error-notice.tsx';
import { EstimateNote } from '@/components/ui/estimate-note.tsx';
import { Progress } from '@/components/ui/progress.tsx';
import { RevisionRows, StandingSection } from './strategy-parts.tsx';

/** One strategy: the section of the revision that stands for it, and all its revisions. */
export function StrategyScreen({ id }: { id: string }) {
  const strategy = useQuery(strategyQuery(id));
  const { wide } = useLayout();
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
  const revisions = <RevisionRows strategy={strategy.data} />;
  return (
    <Page title={strategy.data.name} eyebrow={strategiesText.one} aside={wide ? revisions : undefined}>
      {!wide && revisions}
      <StandingSection strategy={strategy.data} />
      <EstimateNote />
    </Page>
  );
}
