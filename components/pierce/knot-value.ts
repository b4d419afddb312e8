import { knotText } from '@/components/text/pierce-designer.ts';
import type { FocusScale } from '@/strategy/machine.ts';
import type { Stage } from '@/strategy/pierce/stage.ts';
import type { UnitSystem } from '@/strategy/units/index.ts';
import type { Knot } from './knots.ts';

/** A knot's value as it is read, with the dial's number beside a focus position. */
export function knotValueText(knot: Knot, stages: readonly Stage[], scale: FocusScale, system: UnitSystem): string {
  const [{ stage, end }] = knot.ends;
  return knotText.value(knot, stages[stage]?.[end].standoff ?? 0, scale, system);
}
