import type { CornerPlan, PlannedCorner } from '@/shared/corner-plans.ts';
import {
  answered,
  cornerHeatInterval,
  diffusivity,
  ignitionThreshold,
  leftOutStretch,
  measuringDepth,
  midZoneProperties,
  notFitted,
  straightEdgeBurnBack,
  type ReturnQuestion,
} from '@/strategy/heat/index.ts';
import { cutEdgeCoolingTime } from '@/strategy/steel/index.ts';
import { MINUS, numberText, quantityText, type UnitSystem } from '@/strategy/units/index.ts';
import { cornerText, treatmentText } from './corners.ts';

type Row = { readonly label: string; readonly value: string };

/** Where a return temperature comes from, ready to be read. */
export type ReturnExplained = {
  readonly title: string;
  readonly value: string;
  readonly what: string;
  readonly formula: string;
  /** They add up to the value. */
  readonly terms: readonly Row[];
  /** What the heat does to the finished tip and edge; and what these figures are worth. */
  readonly edge: readonly Row[];
  readonly edgeNote: string;
  readonly inputs: readonly Row[];
  readonly sources: readonly string[];
  /** How far off the return temperature may be. */
  readonly range: Row;
  readonly standing: string;
};

export const cornerExplainText = {
  spoken: (value: string) => `Return temperature as planned: ${value}. Where this number comes from`,
  open: 'Where this number comes from',
  terms: 'It adds up from',
  edge: 'What the finished edge gets',
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
  const seconds = (value: number, figures = 3) => quantityText(value, 'time', 'metric', { figures }).text;
  const burnt = (metres: number) => (metres < leastBurnt ? cornerText.notBurnt : length(metres));
  const { background = null, treated, untreated, treatment, returnTime = null, angle } = corner;
  const plate = background ?? plan.plateTemperature;
  const { feed, heatIntoPlate, kerfWidth } = plan.cutting;
  const properties = question?.properties ?? midZoneProperties;
  const cooling = answered(() => cutEdgeCoolingTime(heatIntoPlate, plan.plateTemperature));
  const straightBurnt = answered(() => straightEdgeBurnBack(plan.cutting, plan.plateTemperature));
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
    edge: [
      ...(corner.peak == null
        ? []
        : [{ label: 'at most at this tip, while the second edge is cut', value: hot(corner.peak) }]),
      ...(corner.burnBack == null ? [] : [{ label: 'burnt back at this tip', value: burnt(corner.burnBack) }]),
      ...(straightBurnt === null
        ? []
        : [
            {
              label: `burnt back beside a straight edge, where ${hot(ignitionThreshold)} burns`,
              value: burnt(straightBurnt),
            },
          ]),
      ...(cooling === null
        ? []
        : [
            {
              label: `a cut edge cools from ${hot(kelvin800)} to ${hot(kelvin500)} in about`,
              value: seconds(cooling, 1),
            },
          ]),
    ],
    edgeNote:
      'Burnt back: as deep as the tip gets hot enough to take fire in the oxygen, an estimate. The cooling time is an order of magnitude only: the standard’s form for a plate heated through, its constants fitted to arc welds. So fast a cooling hardens the edge of most steels, whatever the corner gets.',
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
      'Held against a slow solver of our own, in which the kerf opens as the cut passes: within 2.5 % of the rise for sharp corners of 30° to 150°, 7 % for rounds. Behind an edge of 4 to 15 mm it may come out up to 15 % too low.',
      'Constant properties are a known limit: with properties that follow the temperature (EN 1993-1-2) the slow solver finds a rise 1 to 35 % higher, most at obtuse corners and straight edges. Test cuts take that up.',
      'Conductivity and specific heat of carbon steel: EN 1993-1-2:2005, 3.4.1, taken as constant at 450 °C.',
      'Heat into the plate: of the strategy revision; where nobody has fitted it, what a moving kerf loses by conduction, by a finite-volume solution of our own.',
      'Burnt back: bulk iron takes fire where its oxide melts, at 1371 °C, thin foil from 960 °C (abstract of doi 10.1023/A:1017523922778).',
      'Cooling time: EN 1011-2:2001, annex D, heat flowing in two directions.',
      'Place, moment and the stretch left out: our own definition, the same for every corner.',
    ],
    ...certaintyOf(corner, question, hot),
  };
}

/** Depth below which nothing is burnt, m: the least that the model looks at. */
const leastBurnt = 1e-5;
const [kelvin800, kelvin500] = [1073.15, 773.15];

/** With a fit the range it leaves open, without one the model's reason why there is none. */
function certaintyOf(
  { intervals }: PlannedCorner,
  question: ReturnQuestion | null,
  hot: (kelvin: number) => string,
): Pick<ReturnExplained, 'range' | 'standing'> {
  const label = 'range that test cuts leave open';
  const estimate = 'An estimate until a test cut on this machine confirms it.';
  const range = intervals?.treated;
  if (range) {
    const [low, high] = [hot(range.low), hot(range.high)];
    return {
      range: { label, value: `${low} to ${high}` },
      standing: `By this machine’s test cuts it lies between ${low} and ${high}. ${estimate}`,
    };
  }
  const interval = question && cornerHeatInterval(question, null);
  const why = interval?.kind === 'none' ? interval.why : notFitted;
  return { range: { label, value: 'none yet' }, standing: `${why} ${estimate}` };
}
