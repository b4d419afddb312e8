import { knotText } from '@/components/text/pierce-designer.ts';
import type { FocusScale } from '@/strategy/machine.ts';
import type { Stage } from '@/strategy/pierce/stage.ts';
import type { UnitSystem } from '@/strategy/units/index.ts';
import type { Knot } from './knots.ts';

/** Wordings of a knot's value, the longest first: with the dial's number beside a focus position, with the peak beside a mean. */
export function knotValueWordings(
  knot: Knot,
  stages: readonly Stage[],
  scale: FocusScale,
  system: UnitSystem,
): readonly [string, string] {
  const [{ stage, end }] = knot.ends;
  const [value, beside] = knotText.value(knot, stages[stage]?.[end].standoff ?? 0, scale, system);
  return [beside === undefined ? value : `${value}, ${beside}`, value];
}
