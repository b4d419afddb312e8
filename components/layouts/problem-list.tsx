import { asSentence } from '@/components/text/corners.ts';
import { layoutsText } from '@/components/text/layouts.ts';
import { Rows } from '@/components/ui/link-row.tsx';
import { Mark } from '@/components/ui/mark.tsx';
import { Notice } from '@/components/ui/notice.tsx';
import { Panel } from '@/components/ui/panel.tsx';
import { PressRow } from '@/components/ui/press-row.tsx';
import { Body, Small } from '@/components/ui/text.tsx';
import type { LayoutProblem } from '@/strategy/path/plate/index.ts';

type ProblemListProps = {
  problems: readonly LayoutProblem[];
  more: boolean;
  onShow: (problem: LayoutProblem) => void;
};

/** What is in the way, as sentences; each leads to its place on the drawing. */
export function ProblemList({ problems, more, onShow }: ProblemListProps) {
  if (problems.length === 0) return <Notice kind="ok">{layoutsText.fine}</Notice>;
  return (
    <Panel title={layoutsText.wrong}>
      <Rows label={layoutsText.wrong}>
        {problems.map((problem, i) => (
          <PressRow
            key={`${problem.kind} ${problem.placements.join(' ')}`}
            chosen={false}
            spoken={`${layoutsText.go(i + 1)}: ${asSentence(problem.why)}`}
            onPress={() => onShow(problem)}
            left={<Mark name="caution" tone="hot" />}
          >
            <Body>{asSentence(problem.why)}</Body>
          </PressRow>
        ))}
      </Rows>
      {more && <Small>{layoutsText.more}</Small>}
    </Panel>
  );
}
