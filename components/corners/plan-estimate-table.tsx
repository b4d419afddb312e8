import { estimateText, figureText } from '@/components/text/plan-estimate.ts';
import { useLayout } from '@/components/theme/layout.ts';
import { FigureTable } from '@/components/ui/figure-table.tsx';
import { useUnitSystem } from '@/components/ui/unit-system.ts';
import type { PlanComparison } from '@/shared/estimates.ts';
import { comparePlans, type PlanVariant } from '@/strategy/estimate/compare.ts'; // not the folder's face: that one brings the plate's heat along

/** Below half of the third figure a value is the same as the other: the rest is rounding. */
const differs = (value: number, difference: number): boolean =>
  Math.abs(difference) > 5e-4 * Math.max(Math.abs(value), Math.abs(value - difference));

type TableProps = {
  readonly variants: PlanComparison['variants'];
  /** What the differences are from. */
  readonly against: PlanVariant;
};

/** The figures of all plans beside each other, each with its difference; on a phone the planned one beside the one it is compared with. */
export function EstimateTable({ variants, against }: TableProps) {
  const { wide } = useLayout();
  const system = useUnitSystem();
  const columns = wide ? variants : variants.filter(({ variant }) => variant === 'planned' || variant === against);
  const paid = columns.flatMap(({ estimate: { money } }) => (money.kind === 'ok' ? [money.currency] : []))[0];
  return (
    <FigureTable
      label={estimateText.table}
      corner={estimateText.figure}
      columns={columns.map(({ variant, revision }) => ({
        id: variant,
        label: estimateText.variant(variant, revision),
        strong: variant === 'planned',
      }))}
      rows={comparePlans(columns, against).map(({ figure, values, differences }) => {
        const { label, show, part = false } = figureText[figure];
        return {
          id: figure,
          label: figure === 'money' && paid !== undefined ? estimateText.currency(paid) : label,
          part,
          cells: columns.map(({ variant }, i) => {
            const value = values[i] ?? null;
            const difference = differences[i] ?? null;
            const seen = variant !== against && difference !== null && value !== null && differs(value, difference);
            const more = seen ? show(difference, system, true) : '';
            return {
              figure: value === null ? estimateText.noFigure : show(value, system, false),
              ...(/[1-9]/.test(more) ? { below: more } : {}),
            };
          }),
        };
      })}
    />
  );
}
