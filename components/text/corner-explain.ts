import type { CornerPlan, PlannedCorner } from '@/shared/corner-plans.ts';
import {
  diffusivity,
  leftOutStretch,
  measuringDepth,
  midZoneProperties,
  type ReturnQuestion,
} from '@/strategy/heat/index.ts';
import { MINUS, numberText, quantityText, type UnitSystem } from '@/strategy/units/index.ts';
import { treatmentText } from './corners.ts';

type Row = { readonly label: string; readonly value: string };

/** Where a return temperature comes from, ready to be read. */
export type ReturnExplained = {
  readonly title: string;
  readonly value: string;
  readonly what: string;
  readonly formula: string;
  /** They add up to the value. */
  readonly terms: readonly Row[];
  readonly inputs: readonly Row[];
  readonly sources: readonly string[];
  readonly standing: string;
};

export const cornerExplainText = {
  spoken: (value: string) => `Return temperature as planned: ${value}. Where this number comes from`,
  open: 'Where this number comes from',
  terms: 'It adds up from',
  inputs: 'With these numbers',
  sources: 'Sources',
  standing: 'How sure it is',
} as const;

/** Where the return temperature of a corner comes from. */
export function returnExplained(
  plan: Pick<CornerPlan, 'plateTemperature' | 'limit' | 'cutting' | 'thickness'>,
  corner: PlannedCorner,
  number: number,
  question: ReturnQuestion | null,
  away: number | null,
  system: UnitSystem,
): ReturnExplained {
  const hot = (kelvin: number) => quantityText(kelvin, 'temperature', system).text;
  const rise = (kelvin: number) => {
    const text = quantityText(Math.abs(kelvin), 'temperatureDifference', system, { decimals: 0 }).text;
    return `${kelvin < 0 ? MINUS : '+'}${text}`;
  };
  const length = (metres: number) => quantityText(metres, 'length', system, { figures: 3 }).text;
  const seconds = (value: number) => quantityText(value, 'time', 'metric', { figures: 3 }).text;
  const { background = null, treated, untreated, treatment, returnTime = null, angle } = corner;
  const plate = background ?? plan.plateTemperature;
  const { feed, heatIntoPlate, kerfWidth } = plan.cutting;
  const properties = question?.properties ?? midZoneProperties;
  return {
    title: `Return temperature at corner ${number}`,
    value: hot(treated),
    what: `What waits at the tip when cutting along the second edge begins: on the line that halves the corner, ${length(measuringDepth)} inside the finished tip. It is left there by the plate’s own temperature and by everything cut before the last ${length(leftOutStretch)} of path.`,
    formula:
      'Each metre of cut lets go the same heat, evenly through the thickness, and that heat spreads in the plate: the rise from each moment of the cut is q′/(4πk·t)·e^(−r²/(4αt)), with r the distance and t the time since, added up along the path. An open kerf carries no heat: what is let go beside the first edge stays on its side and counts there as if thrown back by a mirror; once both edges are open the tip is a wedge, and the narrower it is, the less steel takes the heat.',
    terms: [
      { label: 'plate before the cut', value: hot(plan.plateTemperature) },
      ...(background === null
        ? []
        : [
            {
              label: 'what was cut and pierced before, less what the air took',
              value: rise(background - plan.plateTemperature),
            },
          ]),
      { label: 'first edge of this corner, cut as drawn', value: rise(untreated - plate) },
      ...(treatment === 'leave'
        ? []
        : [
            {
              label: `${treatmentText[treatment].toLowerCase()} instead of cutting on`,
              value: rise(treated - untreated),
            },
          ]),
      { label: 'return temperature', value: hot(treated) },
      { label: 'a straight edge at this feed', value: hot(corner.straightEdge) },
      { label: 'limit: straight edge and what the rules allow above it', value: hot(plan.limit) },
    ],
    inputs: [
      { label: 'angle inside the part', value: quantityText(angle, 'angle', system).text },
      { label: 'feed', value: quantityText(feed, 'speed', system).text },
      {
        label: 'heat into the plate, both sides, of the strategy',
        value: `${numberText(heatIntoPlate * 1e-6, 2)} J per mm² of cut face`,
      },
      {
        label: 'q′, heat let go per second and mm of thickness',
        value: `${numberText(heatIntoPlate * feed * 1e-3, 1)} W/mm`,
      },
      { label: 'kerf', value: length(kerfWidth) },
      { label: 'k, conductivity at 450 °C', value: `${numberText(properties.conductivity, 1)} W/(m K)` },
      { label: 'α, diffusivity at 450 °C', value: `${numberText(diffusivity(properties) * 1e6, 2)} mm²/s` },
      ...(away === null ? [] : [{ label: 'from the corner to the return', value: seconds(away) }]),
      ...(returnTime === null ? [] : [{ label: 'time of return in the cut', value: seconds(returnTime) }]),
    ],
    sources: [
      'Line sources along a path: Carslaw and Jaeger, Conduction of Heat in Solids, 2nd edition 1959, chapter 10 (chapter from memory).',
      'Held against a slow solver of our own, in which the kerf opens as the cut passes: within 2.5 % of the rise for sharp corners of 30° to 150°, 7 % for rounds. Properties that follow the temperature would move it by 3 to 35 %; that is for test cuts to settle.',
      'Conductivity and specific heat of carbon steel: EN 1993-1-2:2005, 3.4.1, taken as constant at 450 °C.',
      'Heat into the plate: of the strategy revision; where nobody has fitted it, what a moving kerf loses by conduction, by a finite-volume solution of our own.',
      'Place, moment and the stretch left out: our own definition, the same for every corner.',
    ],
    standing: standingOf(corner, hot),
  };
}

function standingOf({ intervals }: PlannedCorner, hot: (kelvin: number) => string): string {
  const range = intervals?.treated;
  const estimate = 'An estimate until a test cut on this machine confirms it.';
  return range
    ? `By this machine’s test cuts it lies between ${hot(range.low)} and ${hot(range.high)}. ${estimate}`
    : `No test cuts have been fitted, so how far it may be off is not known. ${estimate}`;
}
