import { useInfiniteQuery } from '@tanstack/react-query';
import { recordQuery } from '@/components/data/record.ts';
import { Page } from '@/components/shell/page.tsx';
import { recordText } from '@/components/text/record.ts';
import { Button } from '@/components/ui/button.tsx';
import { Empty } from '@/components/ui/empty.tsx';
import { ErrorNotice } from '@/components/ui/error-notice.tsx';
import { Rows } from '@/components/ui/link-row.tsx';
import { Progress } from '@/components/ui/progress.tsx';
import { ChainCheck } from './chain-check.tsx';
import { EntryRow } from './entry-row.tsx';

/** Who decided what, and whether the record is whole. */
export function RecordScreen() {
  const record = useInfiniteQuery(recordQuery());
  const entries = record.data?.pages.flat() ?? [];
  return (
    <Page title={recordText.title} asideFirst aside={<ChainCheck />}>
      {record.isPending ? (
        <Progress label={recordText.fetching} />
      ) : record.data === undefined ? (
        <ErrorNotice error={record.error} onRetry={() => void record.refetch()} />
      ) : entries.length === 0 ? (
        <Empty title={recordText.empty.title}>{recordText.empty.words}</Empty>
      ) : (
        <Rows label={recordText.list}>
          {entries.map((entry) => (
            <EntryRow key={entry.sequence} entry={entry} />
          ))}
        </Rows>
      )}
      {record.isFetchNextPageError ? <ErrorNotice error={record.error} /> : null}
      {record.hasNextPage ? (
        <Button label={recordText.older} busy={record.isFetchingNextPage} onPress={() => void record.fetchNextPage()} />
      ) : null}
    </Page>
  );
}
