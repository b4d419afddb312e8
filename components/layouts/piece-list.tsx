import { layoutsText } from '@/components/text/layouts.ts';
import { Rows } from '@/components/ui/link-row.tsx';
import { Mark } from '@/components/ui/mark.tsx';
import { Panel } from '@/components/ui/panel.tsx';
import { PressRow } from '@/components/ui/press-row.tsx';
import { Body, Small } from '@/components/ui/text.tsx';
import { useUnitSystem } from '@/components/ui/unit-system.ts';
import type { PlacementWire } from '@/shared/layouts.ts';
import type { LayoutProblem } from '@/strategy/path/plate/index.ts';

type PieceListProps = {
  placements: readonly PlacementWire[];
  nameOf: (partId: string) => string;
  problems: readonly LayoutProblem[];
  chosen: number | null;
  onChoose: (number: number | null) => void;
};

/** Every piece as a row with where it lies: the same as the drawing, for keyboard and ear as well. */
export function PieceList({ placements, nameOf, problems, chosen, onChoose }: PieceListProps) {
  const system = useUnitSystem();
  const wrong = new Set(problems.flatMap((problem) => problem.placements));
  return (
    <Panel title={layoutsText.pieces}>
      <Rows label={layoutsText.pieces}>
        {placements.map((piece) => {
          const inTheWay = wrong.has(piece.number);
          const lies = `${layoutsText.lies(piece, system)}${inTheWay ? `, ${layoutsText.inTheWay}` : ''}`;
          return (
            <PressRow
              key={piece.number}
              chosen={piece.number === chosen}
              spoken={`${layoutsText.chosen(piece.number, nameOf(piece.partId))}: ${lies}`}
              onPress={() => onChoose(piece.number === chosen ? null : piece.number)}
              right={inTheWay ? <Mark name="caution" tone="hot" /> : undefined}
            >
              <Body strong>{layoutsText.piece(piece.number, nameOf(piece.partId))}</Body>
              <Small>{lies}</Small>
            </PressRow>
          );
        })}
      </Rows>
    </Panel>
  );
}
