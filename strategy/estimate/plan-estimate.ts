import type { PlateField } from '../heat/plate/plate-field.ts';
import { heatOfClock } from '../motion/clock-heat.ts';
import type { Loading } from '../motion/loading.ts';
import { loadingCost } from '../motion/loading.ts';
import type { PlateClock } from '../motion/plate-clock.ts';
import { OXYGEN_NORMAL_DENSITY } from '../pierce/oxygen-flow.ts';
import type { CutLedger } from './ledger.ts';
import { cutLedger } from './ledger.ts';
import type { Money, Rates } from './money.ts';
import { moneyOf } from './money.ts';
import type { CutSpent, TimeSpent } from './spent.ts';
import { cutSpent } from './spent.ts';

/** What a strategy's cut and pierce take and leave. */
export type CutFigures = {
  readonly kerfWidth: number; // m
  /** J per m² of cut face, and J of one pierce; null where the model can't follow it. */
  readonly heatIntoPlate: number;
  readonly pierceHeat: number | null;
  /** Mean power of the straight cut, W: peak × duty; laser energy of one pierce, J. */
  readonly meanPower: number;
  readonly pierceEnergy: number;
  /** Through the nozzle while cutting, kg/s, and over one pierce, kg. */
  readonly oxygenFlow: number;
  readonly pierceOxygen: number;
};

/** What is known of the plate's temperature in the course of the cut, K: its mean when the cut ends, and the highest anywhere at any time. */
export type Background = { readonly mean: number; readonly highest: number };

export type EstimateInput = {
  readonly clock: PlateClock;
  readonly cut: CutFigures;
  readonly thickness: number; // m
  readonly plateTemperature: number; // K, before the cut
  /** No loading is counted when left out. */
  readonly loading?: Loading;
  readonly field?: Pick<PlateField, 'mean' | 'hottest'>;
  readonly rates?: Rates | null;
};

export type PlanEstimate = {
  /** s; the sum of all of them is `total`, what loading hides behind the cut is beside it. */
  readonly time: TimeSpent & { readonly loading: number; readonly total: number };
  readonly hiddenLoading: number;
  readonly length: CutSpent['length']; // m
  readonly pierces: number;
  /** kg, and m³ at 0 °C and 101 325 Pa. */
  readonly oxygen: {
    readonly pierces: number;
    readonly cutting: number;
    readonly total: number;
    readonly normalVolume: number;
  };
  readonly laser: { readonly pierces: number; readonly cutting: number; readonly total: number }; // J
  /** Left in plate and slugs, J; of the pierces null where the model can't follow them. */
  readonly heat: { readonly pierces: number | null; readonly cutting: number; readonly total: number };
  readonly ledger: CutLedger;
  readonly background: Background | null;
  readonly money: Money;
};

/**
 * What a plate's cut costs: time, s, oxygen, kg, laser energy, J, heat left in the plate, J, its temperature, K, and money. Oxygen flows while the beam cuts and blows on
 * through waits and restarts, and through each pierce's routine; it is shut on the way between cuts (own assumption). The beam gives its mean power all along the path, less where it is eased, and none
 * while the cut waits or starts again. Machine time is the cut and what loading adds to it. Throws RangeError for a thickness that is not positive and as `cutLedger` and `moneyOf`.
 */
export function planEstimate(input: EstimateInput): PlanEstimate {
  const { clock, cut, thickness, plateTemperature, loading, field, rates = null } = input;
  if (!(thickness > 0)) throw new RangeError(`thickness ${thickness} m is outside (0, ∞)`);
  const { time, length, pierces, beam } = cutSpent(clock);
  const load = loading ? loadingCost(clock.duration, loading) : { hidden: 0, added: 0 };
  const spent = Object.values(time).reduce((sum, one) => sum + one, 0);
  const total = spent + load.added;

  const oxygenCutting = cut.oxygenFlow * (time.cut + time.loop + time.dwell + time.restart);
  const oxygenPierces = cut.pierceOxygen * pierces;
  const oxygen = oxygenCutting + oxygenPierces;
  const laserCutting = cut.meanPower * beam;
  const laserPierces = cut.pierceEnergy * pierces;
  const laser = laserCutting + laserPierces;

  const { heat } = heatOfClock(clock, { heatIntoPlate: cut.heatIntoPlate, pierceHeat: 0 });
  const heatCutting =
    thickness * heat.reduce((sum, { from, to, powerPerLength }) => sum + powerPerLength * (to - from), 0);
  const heatPierces = cut.pierceHeat === null ? null : cut.pierceHeat * pierces;

  return {
    time: { ...time, loading: load.added, total },
    hiddenLoading: load.hidden,
    length,
    pierces,
    oxygen: {
      pierces: oxygenPierces,
      cutting: oxygenCutting,
      total: oxygen,
      normalVolume: oxygen / OXYGEN_NORMAL_DENSITY,
    },
    laser: { pierces: laserPierces, cutting: laserCutting, total: laser },
    heat: { pierces: heatPierces, cutting: heatCutting, total: heatCutting + (heatPierces ?? 0) },
    ledger: cutLedger({
      volume: cut.kerfWidth * thickness * (length.cut + length.loop),
      plateTemperature,
      laser: laserCutting,
      inPlate: heatCutting,
    }),
    background: field ? { mean: field.mean(clock.duration), highest: field.hottest.temperature } : null,
    money: moneyOf({ time: total, oxygen, laser }, rates),
  };
}
