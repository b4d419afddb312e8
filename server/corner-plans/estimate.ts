import type { CornerPlan, PlannedCorner } from '../../shared/corner-plans.ts';
import type { PlanComparison } from '../../shared/estimates.ts';
import type { Prediction, StrategyContent } from '../../shared/strategies.ts';
import { planEstimate, type CornersFare, type PlanVariant, type Rates } from '../../strategy/estimate/index.ts';
import { plateField, type PlateField, type PlateQuestion } from '../../strategy/heat/plate/index.ts';
import type { MachineProfile, Nozzle } from '../../strategy/machine.ts';
import { heatOfClock, loadingOf, plateClock, type PlateClock } from '../../strategy/motion/index.ts';
import { cutPathOf } from '../../strategy/path/compensation/index.ts';
import { contourBox } from '../../strategy/path/index.ts';
import { cutPathRequestOf } from '../take-away/cut-path.ts';
import { plannedPlate, type Choices } from './compute.ts';
import { cuttingOf } from './cutting.ts';
import type { Planned } from './planned.ts';

/** A strategy revision with what it runs on. */
export type RevisionOn = {
  readonly number: number;
  readonly content: StrategyContent;
  readonly prediction: Prediction;
  readonly profile: MachineProfile;
  readonly nozzle: Nozzle;
};

export type EstimateAsked = {
  readonly planned: Planned;
  readonly plan: Pick<CornerPlan, 'version' | 'thickness' | 'plateTemperature' | 'overrides' | 'limit' | 'corners'>;
  readonly own: RevisionOn;
  /** The revision before of the same strategy; null where there is none. */
  readonly previous: RevisionOn | null;
  readonly rates: Rates | null;
};

type Answered = PlanComparison['variants'][number];

/**
 * What a stored plan costs, beside the same plate with every corner left, with a loop wherever a treated corner has room for one, and planned with the revision before. Takes
 * seconds for thousands of corners: for a worker.
 */
export function planComparison(asked: EstimateAsked): PlanComparison {
  const { plan, own, previous } = asked;
  const missing: PlanComparison['missing'] = [];
  const tried = (variant: PlanVariant, of: () => Answered): Answered[] => {
    try {
      return [of()];
    } catch (error) {
      // what the planner or the model can't follow, it says in a sentence
      if (!(error instanceof RangeError)) throw error;
      missing.push({ variant, why: `It can’t be planned: ${error.message}.` });
      return [];
    }
  };
  const variants = [
    ...tried('untreated', () =>
      variantOf('untreated', asked, own, { limit: plan.limit, corners: plan.corners.map(leftAlone) }),
    ),
    ...tried('allLoops', () => variantOf('allLoops', asked, own, plannedAnew(asked, own, loopsAsked(plan)))),
    ...tried('planned', () => variantOf('planned', asked, own, plan)),
    ...(previous
      ? tried('previous', () => variantOf('previous', asked, previous, plannedAnew(asked, previous, plan.overrides)))
      : []),
  ];
  if (!previous) missing.push({ variant: 'previous', why: 'This is the strategy’s first revision.' });
  return { version: plan.version, variants, missing };
}

type Corners = Pick<CornerPlan, 'limit' | 'corners'>;

/** A corner as it is when nothing is done about it. */
const leftAlone = ({ treatment: _treatment, ...corner }: PlannedCorner): PlannedCorner => ({
  ...corner,
  treatment: 'leave',
  treated: corner.untreated,
  addedTime: 0,
  dwell: null,
  ease: null,
  round: null,
  caution: null,
  loop: null,
  trouble: null,
});

/** Loops asked for at every corner that is treated, or would have to be. */
const loopsAsked = ({ corners, overrides }: EstimateAsked['plan']): Choices['overrides'] => ({
  ...overrides,
  ...Object.fromEntries(
    corners
      .filter(({ treatment, trouble, convex }) => convex && (treatment !== 'leave' || trouble !== null))
      .map(({ id }) => [id, 'loop' as const]),
  ),
});

function plannedAnew(
  { planned, plan }: EstimateAsked,
  { content, prediction, profile, nozzle }: RevisionOn,
  overrides: Choices['overrides'],
): Corners {
  const { thickness, plateTemperature } = plan;
  const source = { planned, content, prediction, profile, nozzle };
  return plannedPlate({ source, choices: { thickness, plateTemperature, overrides } });
}

function variantOf(
  variant: PlanVariant,
  { planned, plan: { thickness, plateTemperature }, rates }: EstimateAsked,
  { number, content, prediction, profile, nozzle }: RevisionOn,
  { limit, corners }: Corners,
): Answered {
  const { path, problems } = cutPathOf(
    cutPathRequestOf({ planned, plan: { corners }, revision: { content, prediction } }),
  );
  const cutting = cuttingOf(content, profile, { thickness, plateTemperature, nozzle });
  const clock = plateClock(path, cutting);
  const field = fieldOf(clock, {
    ...heatOfClock(clock, { heatIntoPlate: cutting.heatIntoPlate, pierceHeat: cutting.pierceHeat ?? 0 }),
    ...plateOf(planned),
    thickness,
    plateTemperature,
    lossCoefficient: cutting.lossCoefficient,
  });
  const estimate = planEstimate({
    clock,
    cut: cutting,
    thickness,
    plateTemperature,
    loading: loadingOf(profile),
    ...(field ? { field } : {}),
    rates,
  });
  const left = problems.filter(({ leftOut }) => leftOut).length;
  return {
    variant,
    revision: number,
    estimate: { ...estimate, ledger: { ...estimate.ledger, cautions: [...estimate.ledger.cautions] } },
    corners: fareOf(corners, limit),
    cautions: [
      ...(left > 0
        ? [`${left} contour${left > 1 ? 's' : ''} can’t be cut as drawn and ${left > 1 ? 'are' : 'is'} not counted.`]
        : []),
      ...(cutting.pierceHeat === null
        ? ['The pierce model can’t follow the pierce on this plate: its heat is not counted.']
        : []),
      ...(field ? [] : ['The plate is too small for a temperature of its own at each place.']),
      ...estimate.ledger.cautions,
    ],
  };
}

/** Null for a plate too small, or too hot, for a field of temperatures. */
function fieldOf({ duration }: PlateClock, question: PlateQuestion): PlateField | null {
  try {
    return plateField({ ...question, until: duration });
  } catch (error) {
    if (error instanceof RangeError) return null;
    throw error;
  }
}

function plateOf({ plate }: Planned): Pick<PlateQuestion, 'plate' | 'shape'> {
  if ('min' in plate) {
    const { min, max } = plate;
    return { plate: { minX: min.x, minY: min.y, maxX: max.x, maxY: max.y } };
  }
  const shape = 'edge' in plate ? plate : { edge: plate, openings: [] };
  return { plate: contourBox(shape.edge), shape };
}

/** A wait ends when the tip is at the limit, to rounding, K. */
const rounding = 1e-3;

function fareOf(corners: readonly PlannedCorner[], limit: number): CornersFare {
  const of = (wanted: PlannedCorner['treatment']) => corners.filter(({ treatment }) => treatment === wanted).length;
  return {
    loops: of('loop'),
    dwells: of('dwell'),
    eases: of('ease'),
    rounds: of('round'),
    overLimit: corners.filter(({ convex, treated }) => convex && treated > limit + rounding).length,
    hottestReturn: corners.reduce<number | null>((most, { treated }) => Math.max(most ?? treated, treated), null),
  };
}
