import type { ReturnQuestion } from '../../strategy/heat/index.ts';
import type { Loop, LoopCorner } from '../../strategy/path/loop.ts';
import { flatLoopAt, loopAt } from '../../strategy/path/loop.ts';
import { seededNumbers } from '../bench/line.ts';
import { cornerOf } from './way.ts';

/** What happens between the two edges, as data. */
export type CaseTreatment =
  | { readonly kind: 'leave' }
  | { readonly kind: 'dwell'; readonly duration: number } // s
  | { readonly kind: 'loop'; readonly shape: 'tangent'; readonly radius: number } // m
  | { readonly kind: 'loop'; readonly shape: 'flat'; readonly radius: number; readonly extension: number } // m
  | { readonly kind: 'ease'; readonly length: number; readonly feedShare: number; readonly powerShare: number };

/** One corner of the reference set. SI. */
export type CornerCase = {
  readonly name: string;
  /** Inside the part, rad; π is the straight edge. */
  readonly angle: number;
  readonly feed: number; // m/s
  readonly kerfWidth: number; // m
  /** J per m² of cut face, both sides together. */
  readonly heatIntoPlate: number;
  readonly plateTemperature: number; // K
  /** Radius of the path's arc round the corner, m. */
  readonly round?: number;
  readonly treatment: CaseTreatment;
};

/** The loop of a case, as the product builds it. */
export function loopOf(treatment: CaseTreatment & { readonly kind: 'loop' }, corner: LoopCorner): Loop {
  return treatment.shape === 'tangent'
    ? loopAt(corner, treatment.radius)
    : flatLoopAt(corner, treatment.radius, treatment.extension);
}

/** The same case as a question to the quick model. */
export function questionOf(one: CornerCase): ReturnQuestion {
  const corner = cornerOf(one.angle);
  const { treatment } = one;
  return {
    corner,
    ...(one.round === undefined ? {} : { round: one.round }),
    treatment: treatment.kind === 'loop' ? { kind: 'loop', loop: loopOf(treatment, corner) } : treatment,
    cut: { feed: one.feed, kerfWidth: one.kerfWidth, heatIntoPlate: one.heatIntoPlate },
    plateTemperature: one.plateTemperature,
  };
}

/** What a case is for: `gated` ones hold the quick model to its limits, the others are reported beside them. */
export type SetCase = CornerCase & {
  readonly group:
    'leave' | 'tangent loop' | 'flat loop' | 'dwell' | 'ease' | 'round' | 'straight edge' | 'sharp' | 'standard';
  readonly gated: boolean;
  /** Solved with the standard's properties that change with temperature. */
  readonly standard: boolean;
};

const degrees = Math.PI / 180;
const perMinute = 1 / 60;

/** The seeded set: corners from 30° to 150°, plates of 10 to 30 mm, feeds of 0.4 to 2 m/min, every treatment, cold and preheated. The same for the same seed. */
export function cornerSet(seed = 20261201): SetCase[] {
  const random = seededNumbers(seed);
  const between = (low: number, high: number): number => low + (high - low) * random();
  const rounded = (value: number, step: number): number => Number((Math.round(value / step) * step).toPrecision(9));
  const set: SetCase[] = [];
  let turn = 0;
  /** Cut conditions of a plate between 10 and 30 mm, slow and fast ones in turn; every fifth plate is preheated. */
  const cut = () => {
    const thickness = [10, 12, 15, 20, 25, 30][Math.floor(random() * 6)] ?? 20;
    const fast = turn++ % 2 === 1;
    return {
      thickness,
      feed: rounded(fast ? between(1.2, 2) : between(0.4, 0.8), 0.01) * perMinute,
      kerfWidth: rounded((0.4 + 0.02 * (thickness - 10)) * between(0.9, 1.1), 0.01) * 1e-3,
      heatIntoPlate: rounded(between(4.5, 8.5), 0.1) * 1e6,
      plateTemperature: turn % 5 === 0 ? rounded(between(373, 573), 1) + 0.15 : 293.15,
    };
  };
  const put = (
    group: SetCase['group'],
    angle: number,
    treatment: CaseTreatment,
    more: { gated?: boolean; standard?: boolean; round?: number } = {},
  ): void => {
    const { thickness, ...conditions } = cut();
    const { gated = true, standard = false, round } = more;
    const { feed } = conditions;
    const name = `${set.length + 1}: ${group}, ${rounded(angle, 0.1)}°, ${thickness} mm, ${(feed / perMinute).toFixed(2)} m/min`;
    const rounding = round === undefined ? {} : { round };
    set.push({
      name,
      group,
      gated,
      standard,
      angle: angle === 180 ? Math.PI : angle * degrees,
      ...conditions,
      ...rounding,
      treatment,
    });
  };
  /** Angles spread over a range, each a little off its even place. */
  const angles = (count: number, low: number, high: number): number[] =>
    Array.from({ length: count }, (_, i) => {
      const even = low + ((high - low) * i) / (count - 1);
      return rounded(i === 0 || i === count - 1 ? even : even + between(-3, 3), 0.5);
    });
  const mm = (low: number, high: number): number => rounded(between(low, high), 0.1) * 1e-3;
  const tangent = (angle: number): CaseTreatment => {
    const slope = Math.tan((angle * degrees) / 2);
    return { kind: 'loop', shape: 'tangent', radius: mm(Math.max(2, 2 * slope), Math.min(12, 15 * slope)) };
  };
  const flat = (angle: number): CaseTreatment => {
    const slope = Math.tan((angle * degrees) / 2);
    const radius = mm(2, Math.min(5, 10 * slope));
    return { kind: 'loop', shape: 'flat', radius, extension: mm(Math.max(2, (radius * 1e3) / slope + 1), 15) };
  };
  const ease = (): CaseTreatment => {
    const share = rounded(between(0.3, 0.7), 0.05);
    return { kind: 'ease', length: mm(3, 8), feedShare: share, powerShare: share };
  };
  for (const angle of angles(13, 30, 150)) put('leave', angle, { kind: 'leave' });
  for (const angle of angles(16, 30, 150)) put('tangent loop', angle, tangent(angle));
  for (const angle of angles(11, 30, 120)) put('flat loop', angle, flat(angle));
  for (const angle of angles(12, 30, 150))
    put('dwell', angle, { kind: 'dwell', duration: rounded(between(0.3, 6), 0.1) });
  for (const angle of angles(8, 35, 140)) put('ease', angle, ease());
  for (const angle of angles(6, 35, 140)) put('round', angle, { kind: 'leave' }, { round: mm(1, 3) });
  for (let i = 0; i < 3; i++) put('straight edge', 180, { kind: 'leave' });
  for (const angle of [15, 20, 25]) {
    put('sharp', angle, { kind: 'leave' }, { gated: false });
    put('sharp', angle, tangent(angle), { gated: false });
  }
  const standard = { gated: false, standard: true };
  for (const angle of [30, 60, 90, 120]) put('standard', angle, { kind: 'leave' }, standard);
  put('standard', 60, tangent(60), standard);
  put('standard', 90, tangent(90), standard);
  put('standard', 90, { kind: 'dwell', duration: 2 }, standard);
  put('standard', 180, { kind: 'leave' }, standard);
  // an ease that leaves less, or more, per metre than the straight cut, and a wait at a rounded corner
  for (const [angle, feedShare, powerShare] of [
    [45, 0.6, 0.3],
    [80, 0.5, 0.35],
    [115, 0.3, 0.5],
  ] as const) {
    put('ease', angle, { kind: 'ease', length: mm(3, 8), feedShare, powerShare });
  }
  for (const angle of [50, 95]) put('round', angle, { kind: 'dwell', duration: 1.5 }, { round: mm(1, 2) });
  return set;
}
