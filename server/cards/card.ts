import type { Card } from '../../shared/cards.ts';
import type { CardEstimate } from '../../shared/prediction.ts';
import type { Plate } from '../../shared/plates.ts';
import type { Check, StrategyContent } from '../../shared/strategies.ts';
import { dialForFocus } from '../../strategy/beam/index.ts';
import type { FocusScale } from '../../strategy/machine.ts';
import type { ReserveRules } from '../../strategy/pierce/index.ts';
import { estimatesFor } from './estimates.ts';
import type { Approved } from './repository.ts';

type Match = Extract<Card['match'], { kind: 'approved' }>;

export type CardFacts = {
  readonly found: Approved;
  readonly newestMachineRevision: number;
  readonly approvedBy: string;
  readonly plate: Plate | null;
  /** Least reserves that the plant asks for. */
  readonly reserve: ReserveRules;
  readonly nominalThickness: number; // µm
  readonly cornerPlans: Match['cornerPlans'];
};

/** The approved strategy as this machine's operator reads it: dial numbers, and estimates for this very plate. */
export function cardMatch(facts: CardFacts): Match {
  const { found, newestMachineRevision, plate, nominalThickness } = facts;
  const { approval, strategy, revision, machineRevision, nozzle } = found;
  const { content } = revision;
  const scale = machineRevision.profile.focusScale;
  const thickness = (plate?.measuredThickness ?? nominalThickness) / 1e6;
  const judged = {
    content,
    profile: machineRevision.profile,
    nozzle: { type: nozzle.type, diameter: nozzle.diameter },
    thickness,
  };
  const { cold, hot } = estimatesFor(approval, judged);
  const stages = content.stages.map(({ duration, from, to }) => ({
    duration,
    from: { ...from, dial: dialOf(scale, from) },
    to: { ...to, dial: dialOf(scale, to) },
  }));
  const cut = { ...content.cut, dial: dialOf(scale, content.cut) };
  return {
    kind: 'approved',
    strategy: { id: strategy.id, name: strategy.name },
    revision: {
      id: revision.id,
      number: revision.number,
      approvedAt: approval.approvedAt.toISOString(),
      approvedBy: facts.approvedBy,
    },
    machineRevision: { number: machineRevision.number, newest: newestMachineRevision, focusScale: scale },
    nozzle: { name: nozzle.name, type: nozzle.type, diameter: nozzle.diameter },
    thickness: content.thickness,
    hottestPlate: content.hottestPlate,
    cautions: [
      ...measuredCaution(plate, content),
      ...dialCautions([...stages.flatMap(({ from, to }) => [from.dial, to.dial]), cut.dial]),
      ...machineCaution(machineRevision.number, newestMachineRevision),
      ...reserveCautions(cold, hot, facts.reserve),
      {
        id: 'estimate',
        state: 'caution',
        sentence:
          'Every number is an estimate until a test cut confirms it. The machine maker’s limits and the responsible person’s judgement come first.',
      },
    ],
    stages,
    cut,
    routineTime: cold.routineTime,
    thicknessUsed: thickness,
    cold: estimateOf(cold),
    hot: estimateOf(hot),
    craterRadius: hot.craterRadius,
    bands: [...cold.bands],
    cornerPlans: facts.cornerPlans,
  };
}

const dialOf = (scale: FocusScale, at: { focusPosition: number; standoff: number }) =>
  dialForFocus(scale, at.focusPosition, at.standoff);

const estimateOf = ({ plateTemperature, breakthrough, reserve, why }: CardEstimate) => ({
  plateTemperature,
  breakthrough,
  reserve,
  why,
});

const millimetres = (micrometres: number) => `${micrometres / 1000} mm`;
const celsius = (kelvin: number) => `${Math.round(kelvin - 273.15)} °C`;

/** The plate was matched by its nominal thickness; what the calliper says may be another matter. */
function measuredCaution(plate: Plate | null, { thickness }: StrategyContent): Check[] {
  const measured = plate?.measuredThickness ?? null;
  if (measured === null || (measured >= thickness.min && measured < thickness.max)) return [];
  return [
    {
      id: 'measured-thickness',
      state: 'wrong',
      sentence: `This plate measures ${millimetres(measured)}. The strategy is approved for ${millimetres(thickness.min)} to below ${millimetres(thickness.max)}: ask before you cut.`,
    },
  ];
}

function dialCautions(dials: readonly ReturnType<typeof dialOf>[]): Check[] {
  const beyond = dials.find((dial) => dial.kind === 'none');
  if (!beyond) return [];
  return [{ id: 'dial', state: 'wrong', sentence: `A focus position is out of this machine’s reach. ${beyond.why}` }];
}

function machineCaution(number: number, newest: number): Check[] {
  if (number === newest) return [];
  return [
    {
      id: 'machine-revised',
      state: 'caution',
      sentence: `The machine was revised since: the strategy was made for revision ${number}, now it is at ${newest}. Check the focus before you pierce.`,
    },
  ];
}

/** The approver saw the reserve at the thickest of the range; this is the plate in hand. */
function reserveCautions(cold: CardEstimate, hot: CardEstimate, rules: ReserveRules): Check[] {
  const cases = [
    { id: 'reserve-cold', on: 'a cold plate', least: rules.cold, estimate: cold },
    {
      id: 'reserve-hot',
      on: `a plate at ${celsius(hot.plateTemperature)}`,
      least: rules.hot,
      estimate: hot,
    },
  ];
  return cases.flatMap(({ id, on, least, estimate }): Check[] => {
    const { reserve, why } = estimate;
    if (reserve === null) {
      return [
        { id, state: 'wrong', sentence: `On ${on} the pierce is not predicted to get through. ${why ?? ''}`.trim() },
      ];
    }
    if (reserve >= least) return [];
    return [
      {
        id,
        state: 'caution',
        sentence: `On ${on} the reserve is ${reserve.toFixed(1)}, below ${least.toFixed(1)}: the hole may not be through when the cut begins.`,
      },
    ];
  });
}
