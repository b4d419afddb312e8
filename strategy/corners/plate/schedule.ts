import type { HeatedPiece } from '../../heat/path-heat.ts';
import type { ClockHeat, PierceDeposit } from '../../motion/index.ts';
import type { CutLegs } from './legs.ts';
import type { OwnWay, WayJudged } from './plate-model.ts';

/** A cut with its treatments in time, leg by leg: when the front is in each corner and what the treatment there adds, s. */
export type Schedule = { readonly arrives: Float64Array; readonly addedTime: Float64Array; readonly late: number };

/** When each corner is come to with the ways chosen, s. */
export function scheduleOf<Way extends OwnWay>({ legs }: CutLegs, ways: readonly WayJudged<Way>[]): Schedule {
  const arrives = new Float64Array(legs.length);
  const addedTime = new Float64Array(legs.length);
  let late = 0;
  legs.forEach((leg, k) => {
    arrives[k] = leg.arrives + late;
    addedTime[k] = ways[k]?.addedTime ?? 0;
    late += addedTime[k];
  });
  return { arrives, addedTime, late };
}

/** All heat of a cut with its treatments, pieces of path with their times, s, in order, and pierces. */
export function scheduledHeat<Way extends OwnWay>(
  { legs, tail }: CutLegs,
  ways: readonly WayJudged<Way>[],
  { arrives, late }: Schedule,
): ClockHeat {
  const heat: HeatedPiece[] = [];
  const pierces: PierceDeposit[] = [];
  let latest = 0;
  /** A piece begins no sooner than the one before it ends: where a treatment spares a stop, the path after it is there sooner. */
  const put = ({ segment, from, to, powerPerLength }: HeatedPiece, by: number): void => {
    const [begins, ends] = [Math.max(latest, from + by), to + by];
    if (!(ends > begins)) return;
    heat.push({ segment, from: begins, to: ends, powerPerLength: (powerPerLength * (to - from)) / (ends - begins) });
    latest = ends;
  };
  const pierced = ({ at, time, heat: amount }: PierceDeposit, by: number): void => {
    pierces.push({ at, time: Math.max(pierces.at(-1)?.time ?? 0, time + by), heat: amount });
  };
  legs.forEach((leg, k) => {
    const arrival = arrives[k] ?? 0;
    for (const piece of leg.heat) put(piece, arrival - leg.arrives);
    for (const pierce of leg.pierces) pierced(pierce, arrival - leg.arrives);
    const judged = ways[k];
    const own = judged?.way.heat ?? [];
    const whole = own.at(-1)?.to ?? 0;
    if (!judged || !(whole > 0 && judged.addedTime > 0)) return;
    // the loop's own time and what it spares of a stop are within a few hundredths of a second
    const share = judged.addedTime / whole;
    for (const piece of own)
      put(
        { ...piece, from: piece.from * share, to: piece.to * share, powerPerLength: piece.powerPerLength / share },
        arrival,
      );
  });
  for (const piece of tail.heat) put(piece, late);
  for (const pierce of tail.pierces) pierced(pierce, late);
  return { heat, pierces };
}
