import type { CornerPlan } from '../../shared/corner-plans.ts';
import type { StrategyContent } from '../../shared/strategies.ts';
import type { MachineProfile, Nozzle } from '../../strategy/machine.ts';
import { usualLoss } from '../../strategy/heat/plate/index.ts';
import { heightMoves } from '../../strategy/motion/index.ts';
import {
  oxygenMassFlow,
  PIERCE_DEFAULTS,
  pierceOutline,
  routineTime,
  stageMeanPower,
} from '../../strategy/pierce/index.ts';

/** What a plan is cut on. */
export type CutOn = Pick<CornerPlan, 'thickness' | 'plateTemperature'> & { readonly nozzle: Nozzle };

/**
 * What the time and the heat of a cut follow from. The machine's own greatest feed bounds the cut's, as in the plan, and is what it travels at. What a pierce
 * leaves and uses is the pierce model's own ledger for this plate, at its temperature before the cut.
 */
export function cuttingOf(content: StrategyContent, profile: MachineProfile, on: CutOn): CornerPlan['cutting'] {
  const { axes } = profile;
  const { cut, stages, cornerRules } = content;
  const [first, last] = [stages[0], stages.at(-1)];
  const pierce = pierceOn(content, profile, on);
  return {
    feed: Math.min(cut.feed, axes.maxFeed),
    acceleration: axes.acceleration,
    jerk: axes.jerk,
    travel: axes.maxFeed,
    pierce: routineTime(stages),
    kerfWidth: cut.kerfWidth,
    restart: cornerRules.dwell.restart,
    heights: {
      ...heightMoves(profile, {
        pierceFrom: first?.from.standoff ?? cut.standoff,
        pierceTo: last?.to.standoff ?? cut.standoff,
        cut: cut.standoff,
      }),
      jerk: axes.jerk,
    },
    heatIntoPlate: cut.heatIntoPlate,
    pierceHeat: pierce?.heatLeft ?? null,
    meanPower: cut.peakPower * cut.duty,
    pierceEnergy: stages.reduce((sum, stage) => sum + stageMeanPower(stage) * stage.duration, 0),
    oxygenFlow: oxygenMassFlow(on.nozzle.diameter, cut.oxygenPressure, PIERCE_DEFAULTS.dischargeCoefficient),
    pierceOxygen: pierce?.oxygenUsed ?? oxygenOver(stages, on.nozzle),
    lossCoefficient: usualLoss,
  };
}

/** Null where the model can't follow the pierce on this plate: too thick, too hot. */
function pierceOn(
  { stages }: StrategyContent,
  profile: MachineProfile,
  { thickness, plateTemperature, nozzle }: CutOn,
) {
  try {
    return pierceOutline({ stages, thickness, plateTemperature, profile, nozzle });
  } catch (error) {
    if (error instanceof RangeError) return null;
    throw error;
  }
}

/** Oxygen over a routine, kg, from the flow at both ends of each stage. */
function oxygenOver(stages: StrategyContent['stages'], { diameter }: Nozzle): number {
  const flow = (pressure: number) => oxygenMassFlow(diameter, pressure, PIERCE_DEFAULTS.dischargeCoefficient);
  return stages.reduce(
    (sum, { from, to, duration }) => sum + ((flow(from.oxygenPressure) + flow(to.oxygenPressure)) / 2) * duration,
    0,
  );
}
