import { useQuery } from '@tanstack/react-query';
import { recordCheckQuery } from '@/components/data/record.ts';
import { recordText } from '@/components/text/record.ts';
import { Button } from '@/components/ui/button.tsx';
import { ErrorNotice } from '@/components/ui/error-notice.tsx';
import { Notice } from '@/components/ui/notice.tsx';
import { Panel } from '@/components/ui/panel.tsx';
import { Progress } from '@/components/ui/progress.tsx';
import { Body } from '@/components/ui/text.tsx';

/** Asks the server to recompute the hash chain, and says what came out. */
export function ChainCheck() {
  const check = useQuery(recordCheckQuery());
  return (
    <Panel title={recordText.chain}>
      <Body>{recordText.words}</Body>
      {check.isFetching ? (
        <Progress label={recordText.checking} />
      ) : check.isError ? (
        <ErrorNotice error={check.error} />
      ) : check.data === undefined ? null : check.data.broken === null ? (
        <Notice kind="ok" title={recordText.wholeTitle} live>
          {recordText.whole(check.data.entries)}
        </Notice>
      ) : (
        <Notice kind="wrong" title={recordText.brokenTitle} live>
          {recordText.broken(check.data.broken.sequence, check.data.broken.why)}
        </Notice>
      )}
      <Button label={recordText.check} busy={check.isFetching} onPress={() => void check.refetch()} />
    </Panel>
  );
}
