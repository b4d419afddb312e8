import { knotText, type KnotWordings } from '@/components/text/pierce-designer.ts';
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
): KnotWordings {
  const [{ stage, end }] = knot.ends;
  return knotText.value(knot, stages[stage]?.[end].standoff ?? 0, scale, system);
}
