import { common } from '@/components/text/common.ts';
import { cornerText } from '@/components/text/corners.ts';
import { momentText } from '@/components/text/moments.ts';
import { stateText } from '@/components/text/pierce.ts';
import { Sheet } from '@/components/ui/sheet.tsx';
import { Stack } from '@/components/ui/stack.tsx';
import { Small } from '@/components/ui/text.tsx';
import { useUnitSystem } from '@/components/ui/unit-system.ts';
import type { CornerPlan } from '@/shared/corner-plans.ts';
import { quantityText } from '@/strategy/units/index.ts';

/** The title block: of what, with which strategy, and what it costs. */
export function PlanTotals({ plan }: { plan: CornerPlan }) {
  const system = useUnitSystem();
  const { totals } = plan;
  const hot = (kelvin: number | null) =>
    kelvin === null ? common.none : quantityText(kelvin, 'temperature', system).text;
  return (
    <Stack gap="s">
      <Sheet
        label={plan.part.name}
        cells={[
          {
            label: cornerText.block.strategy,
            value: cornerText.revisionOption(
              plan.revision.strategyName,
              plan.revision.number,
              stateText[plan.revision.state],
            ),
            share: 3,
          },
          { label: cornerText.block.thickness, value: quantityText(plan.thickness, 'length', system).text },
          {
            label: cornerText.block.plateTemperature,
            value: quantityText(plan.plateTemperature, 'temperature', system).text,
          },
        ]}
      />
      <Sheet
        label={cornerText.page}
        cells={[
          { label: cornerText.block.corners, value: String(totals.corners) },
          { label: cornerText.block.loops, value: String(totals.loops) },
          { label: cornerText.block.dwells, value: String(totals.dwells) },
          ...(totals.eases ? [{ label: cornerText.block.eases, value: String(totals.eases) }] : []),
          ...(totals.rounds ? [{ label: cornerText.block.rounds, value: String(totals.rounds) }] : []),
          { label: cornerText.block.trouble, value: String(totals.trouble) },
          { label: cornerText.block.time, value: quantityText(totals.addedTime, 'time', system, { figures: 3 }).text },
          {
            label: cornerText.block.length,
            value: quantityText(totals.addedLength, 'length', system, { figures: 3 }).text,
          },
          {
            label: cornerText.block.oxygen,
            value: quantityText(totals.addedOxygen, 'mass', system, { figures: 3 }).text,
          },
          { label: cornerText.block.untreated, value: hot(totals.hottestUntreated) },
          { label: cornerText.block.treated, value: hot(totals.hottestTreated) },
        ]}
      />
      <Small>{`${plan.changedBy.name}, ${momentText(plan.changedAt)}`}</Small>
    </Stack>
  );
}
