import { isProblem } from '@/components/data/problem.ts';
import { cornerText } from '@/components/text/corners.ts';
import { Button } from '@/components/ui/button.tsx';
import { ErrorNotice } from '@/components/ui/error-notice.tsx';
import { Notice } from '@/components/ui/notice.tsx';
import { Row } from '@/components/ui/stack.tsx';
import { Body } from '@/components/ui/text.tsx';

type RedoTroubleProps = { error: unknown; onTheirs: () => Promise<void>; onMine: () => Promise<void> };

/** Planning again failed: said, and when somebody else was first, both ways on. */
export function RedoTrouble({ error, onTheirs, onMine }: RedoTroubleProps) {
  if (!isProblem(error, 'stale')) return <ErrorNotice error={error} />;
  return (
    <Notice kind="caution" live>
      <Body>{cornerText.stale}</Body>
      <Row>
        <Button label={cornerText.replanMine} onPress={() => void onMine()} />
        <Button label={cornerText.takeTheirs} onPress={() => void onTheirs()} />
      </Row>
    </Notice>
  );
}
