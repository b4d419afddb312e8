import { memo, useMemo, useState } from 'react';
import { cornerToolText } from '@/components/text/corner-preview.ts';
import { summaryText } from '@/components/text/corner-summary.ts';
import { cornerText, cornerWords, treatmentText } from '@/components/text/corners.ts';
import { Button } from '@/components/ui/button.tsx';
import { Choice } from '@/components/ui/choice.tsx';
import { Rows } from '@/components/ui/link-row.tsx';
import { PressRow } from '@/components/ui/press-row.tsx';
import { Row, Stack } from '@/components/ui/stack.tsx';
import { Body, Small } from '@/components/ui/text.tsx';
import { useUnitSystem } from '@/components/ui/unit-system.ts';
import { treatments, type PlannedCorner, type Treatment } from '@/shared/corner-plans.ts';
import { quantityText } from '@/strategy/units/index.ts';
import { TemperatureFigure } from './temperature-scale.tsx';
import { TreatmentBadge } from './treatment-badge.tsx';

type CornerListProps = {
  corners: readonly PlannedCorner[];
  /** K */
  limit: number;
  chosen: string | null;
  onChoose: (id: string) => void;
};
type Order = 'burn' | 'number';
type Kind = 'every' | 'trouble' | Treatment;

/** Rows shown at once: a plate of thousands of corners is turned through like a book. */
const pageRows = 40;
/** Fewer corners than this are seen at a glance. */
const fewCorners = 12;

/**
 * Every corner as a row: the same as the drawing says, for keyboard and ear as well; what would burn most as drawn comes first. The page with the chosen one
 * is open.
 */
export function CornerList({ corners, limit, chosen, onChoose }: CornerListProps) {
  const [kind, setKind] = useState<Kind>('every');
  const [order, setOrder] = useState<Order>('burn');
  const [turned, setTurned] = useState<{ page: number; by: string | null } | null>(null);
  const numbered = useMemo(() => {
    const all = corners.map((corner, i) => ({ corner, number: i + 1 }));
    return order === 'number' ? all : all.sort((a, b) => b.corner.untreated - a.corner.untreated);
  }, [corners, order]);
  if (corners.length === 0) return <Body>{cornerText.none}</Body>;

  const shown = numbered.filter(({ corner }) => isOf(corner, kind));
  const pages = Math.max(1, Math.ceil(shown.length / pageRows));
  const chosenAt = shown.findIndex(({ corner }) => corner.id === chosen);
  const own = chosenAt < 0 ? 0 : Math.floor(chosenAt / pageRows);
  // turned by hand since the corner was chosen? Then as it was turned
  const page = Math.min(pages - 1, turned && turned.by === chosen ? turned.page : own);
  const first = page * pageRows;
  const turnTo = (next: number) => setTurned({ page: next, by: chosen });

  return (
    <Stack gap="s">
      {corners.length > 1 && (
        <Choice
          kind="segments"
          label={summaryText.order}
          options={[
            { value: 'burn', label: summaryText.byBurn },
            { value: 'number', label: summaryText.byNumber },
          ]}
          value={order}
          onChange={setOrder}
        />
      )}
      {corners.length > fewCorners && (
        <Choice
          kind="list"
          label={cornerToolText.filter}
          options={kindsOf(corners)}
          value={kind}
          onChange={(next) => {
            setKind(next);
            setTurned(null);
          }}
        />
      )}
      {shown.length === 0 && <Body>{cornerToolText.noneOf}</Body>}
      <Rows label={cornerText.corners}>
        {shown.slice(first, first + pageRows).map(({ corner, number }) => (
          <CornerRow
            key={corner.id}
            corner={corner}
            number={number}
            limit={limit}
            chosen={corner.id === chosen}
            onChoose={onChoose}
          />
        ))}
      </Rows>
      {pages > 1 && (
        <Row justify="space-between" gap="s">
          <Button label={cornerToolText.before} disabled={page === 0} onPress={() => turnTo(page - 1)} />
          <Small>{cornerToolText.page(first + 1, Math.min(shown.length, first + pageRows), shown.length)}</Small>
          <Button label={cornerToolText.after} disabled={page === pages - 1} onPress={() => turnTo(page + 1)} />
        </Row>
      )}
    </Stack>
  );
}

const CornerRow = memo(function CornerRow({
  corner,
  number,
  limit,
  chosen,
  onChoose,
}: {
  corner: PlannedCorner;
  number: number;
  limit: number;
  chosen: boolean;
  onChoose: (id: string) => void;
}) {
  const system = useUnitSystem();
  return (
    <PressRow
      chosen={chosen}
      spoken={cornerWords(corner, number, system)}
      onPress={() => onChoose(corner.id)}
      left={<TreatmentBadge treatment={corner.treatment} trouble={corner.trouble !== null} />}
    >
      <Body strong>{`${number}  ${treatmentText[corner.treatment]}`}</Body>
      <Small>{cornerText.angle(corner.angle)}</Small>
      <Row gap="s">
        <TemperatureFigure kelvin={corner.untreated} strong={false} />
        <Small>→</Small>
        <TemperatureFigure kelvin={corner.treated} />
      </Row>
      <Small>
        {corner.untreated > limit
          ? summaryText.over(
              quantityText(corner.untreated - limit, 'temperatureDifference', system, { decimals: 0 }).text,
            )
          : summaryText.under}
      </Small>
    </PressRow>
  );
});

const isOf = (corner: PlannedCorner, kind: Kind): boolean =>
  kind === 'every' || (kind === 'trouble' ? corner.trouble !== null : corner.treatment === kind);

/** The kinds that occur, each with how many there are. */
function kindsOf(corners: readonly PlannedCorner[]): { value: Kind; label: string }[] {
  const kinds: { value: Kind; label: string }[] = [
    { value: 'every', label: cornerToolText.every },
    { value: 'trouble', label: cornerToolText.trouble },
    ...treatments.map((value) => ({ value, label: treatmentText[value] })),
  ];
  return kinds.flatMap(({ value, label }) => {
    const found = corners.filter((corner) => isOf(corner, value)).length;
    return found > 0 || value === 'every' ? [{ value, label: `${label} (${found})` }] : [];
  });
}
