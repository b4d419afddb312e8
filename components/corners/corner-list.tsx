import { cornerText, cornerWords, treatmentText } from '@/components/text/corners.ts';
import { Rows } from '@/components/ui/link-row.tsx';
import { PressRow } from '@/components/ui/press-row.tsx';
import { Row } from '@/components/ui/stack.tsx';
import { Body, Small } from '@/components/ui/text.tsx';
import { useUnitSystem } from '@/components/ui/unit-system.ts';
import type { PlannedCorner } from '@/shared/corner-plans.ts';
import { TemperatureFigure } from './temperature-scale.tsx';
import { TreatmentBadge } from './treatment-badge.tsx';

type CornerListProps = { corners: readonly PlannedCorner[]; chosen: string | null; onChoose: (id: string) => void };

/** Every corner as a row: the same as the drawing says, for keyboard and ear as well. */
export function CornerList({ corners, chosen, onChoose }: CornerListProps) {
  const system = useUnitSystem();
  if (corners.length === 0) return <Body>{cornerText.none}</Body>;
  return (
    <Rows label={cornerText.corners}>
      {corners.map((corner, index) => (
        <PressRow
          key={corner.id}
          chosen={corner.id === chosen}
          spoken={cornerWords(corner, index + 1, system)}
          onPress={() => onChoose(corner.id)}
          left={<TreatmentBadge treatment={corner.treatment} trouble={corner.trouble !== null} />}
        >
          <Body strong>{`${index + 1}  ${treatmentText[corner.treatment]}`}</Body>
          <Small>{cornerText.angle(corner.angle)}</Small>
          <Row gap="s">
            <TemperatureFigure kelvin={corner.untreated} strong={false} />
            <Small>→</Small>
            <TemperatureFigure kelvin={corner.treated} />
          </Row>
        </PressRow>
      ))}
    </Rows>
  );
}
