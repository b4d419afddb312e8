import { layoutsText } from '@/components/text/layouts.ts';
import { Sheet } from '@/components/ui/sheet.tsx';
import { useUnitSystem } from '@/components/ui/unit-system.ts';
import { contourArea } from '@/strategy/path/index.ts';
import type { LayoutJudgement, PlacedPart } from '@/strategy/path/plate/index.ts';
import { quantityText } from '@/strategy/units/index.ts';
import type { LayoutDraft } from './layout-draft.ts';

/** The title block: of which plate, how much of it, and what the order costs. */
export function LayoutBlock({
  draft,
  lies,
  judgement,
}: {
  draft: LayoutDraft;
  lies: readonly PlacedPart[];
  judgement: LayoutJudgement;
}) {
  const system = useUnitSystem();
  const { outline, of, form } = draft;
  const { maxX: width, maxY: height } = outline.box;
  // holes run the other way round and count off
  const steel = lies.reduce(
    (sum, { contours }) => contours.reduce((area, { contour }) => area + contourArea(contour), sum),
    0,
  );
  const plate = [outline.edge, ...outline.openings].reduce(
    (area, one, i) => area + (i === 0 ? 1 : -1) * Math.abs(contourArea(one)),
    0,
  );
  const metres = (length: number) =>
    quantityText(length, 'length', system, { unit: system === 'metric' ? 'm' : 'ft', figures: 3 }).text;
  return (
    <Sheet
      label={form.name}
      cells={[
        { label: layoutsText.block.plate, value: layoutsText.on({ width, height, of }, system), share: 2.6 },
        { label: layoutsText.block.pieces, value: String(lies.length), share: 0.8 },
        { label: layoutsText.block.contours, value: String(judgement.order.length), share: 0.8 },
        { label: layoutsText.block.used, value: quantityText(steel / plate, 'ratio', system).text },
        { label: layoutsText.block.cut, value: metres(judgement.cutLength) },
        { label: layoutsText.block.way, value: metres(judgement.travel) },
        {
          label: layoutsText.block.order,
          value: layoutsText.orderBy[form.order === null ? 'computed' : 'hand'],
          share: 1.35,
        },
        { label: layoutsText.block.problems, value: String(judgement.problems.length), share: 0.8 },
      ]}
    />
  );
}
