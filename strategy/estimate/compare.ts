import type { PlanEstimate } from './plan-estimate.ts';

/** Ways to cut the same plate: every corner left, a loop wherever a treated corner has room for one, as planned, and as planned with the revision before. */
export const planVariants = ['untreated', 'allLoops', 'planned', 'previous'] as const;
export type PlanVariant = (typeof planVariants)[number];

/** How the corners of a plan fare. */
export type CornersFare = {
  readonly loops: number;
  readonly dwells: number;
  readonly eases: number;
  readonly rounds: number;
  /** Tips that return above the limit, and the hottest, K; null without corners. */
  readonly overLimit: number;
  readonly hottestReturn: number | null;
};

export type VariantEstimate = {
  readonly variant: PlanVariant;
  readonly estimate: PlanEstimate;
  readonly corners: CornersFare;
};

export const comparedFigures = [
  'time',
  'pierce',
  'cut',
  'loop',
  'dwell',
  'rapid',
  'height',
  'loading',
  'loops',
  'overLimit',
  'hottestReturn',
  'oxygen',
  'oxygenVolume',
  'laser',
  'heat',
  'meanBackground',
  'highestBackground',
  'money',
  'machine',
  'oxygenMoney',
  'electricity',
] as const;
export type ComparedFigure = (typeof comparedFigures)[number];

/** One line of the comparison: SI, or the plant's currency; a value of each variant, null where it has none, and what that is more than the one compared against. */
export type ComparedRow = {
  readonly figure: ComparedFigure;
  readonly values: readonly (number | null)[];
  readonly differences: readonly (number | null)[];
};

/**
 * The figures of several plans side by side, in the order given, with their differences from one of them (the untreated cut when left out); differences are null where either
 * side has no value. Lines without any value are left out. Throws RangeError when the one to compare against is not among them.
 */
export function comparePlans(
  plans: readonly VariantEstimate[],
  against: PlanVariant = 'untreated',
): readonly ComparedRow[] {
  const base = plans.find(({ variant }) => variant === against);
  if (!base) throw new RangeError(`there is no ${against} plan to compare against`);
  return comparedFigures.flatMap((figure): ComparedRow[] => {
    const own = figureOf(base, figure);
    const values = plans.map((plan) => figureOf(plan, figure));
    if (values.every((value) => value === null)) return [];
    const differences = values.map((value) => (value === null || own === null ? null : value - own));
    return [{ figure, values, differences }];
  });
}

function figureOf({ estimate, corners }: VariantEstimate, figure: ComparedFigure): number | null {
  const { time, oxygen, laser, heat, background, money } = estimate;
  switch (figure) {
    case 'time':
      return time.total;
    case 'pierce':
    case 'cut':
    case 'loop':
    case 'rapid':
    case 'height':
    case 'loading':
      return time[figure];
    case 'dwell':
      return time.dwell + time.restart;
    case 'loops':
    case 'overLimit':
    case 'hottestReturn':
      return corners[figure];
    case 'oxygen':
      return oxygen.total;
    case 'oxygenVolume':
      return oxygen.normalVolume;
    case 'laser':
      return laser.total;
    case 'heat':
      return heat.total;
    case 'meanBackground':
      return background?.mean ?? null;
    case 'highestBackground':
      return background?.highest ?? null;
    case 'machine':
    case 'electricity':
      return money.kind === 'ok' ? money[figure] : null;
    case 'oxygenMoney':
      return money.kind === 'ok' ? money.oxygen : null;
    case 'money':
      return money.kind === 'ok' ? money.total : null;
  }
}
