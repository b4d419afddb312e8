import type { ComparedFigure, PlanVariant } from '@/strategy/estimate/compare.ts';
import { numberText, quantityText, type QuantityTextOptions, type UnitSystem } from '@/strategy/units/index.ts';

type Shown = (value: number, system: UnitSystem, sign: boolean) => string;

/** A figure to three places, as estimates deserve, and a difference to two. */
const figures = (sign: boolean, more: QuantityTextOptions = {}): QuantityTextOptions => ({
  figures: sign ? 2 : 3,
  sign,
  ...more,
});

const time: Shown = (value, system, sign) => quantityText(value, 'time', system, figures(sign)).text;
const energy =
  (unit: string): Shown =>
  (value, system, sign) =>
    quantityText(value, 'energy', system, figures(sign, { unit })).text;
const kelvin: Shown = (value, system, sign) =>
  quantityText(value, sign ? 'temperatureDifference' : 'temperature', system, { sign, decimals: 0 }).text;
const signed = (text: string, value: number, sign: boolean) => (sign && value > 0 ? `+${text}` : text);
const count: Shown = (value, _system, sign) => signed(numberText(value, 0), value, sign);
const mass: Shown = (value, system, sign) => quantityText(value, 'mass', system, figures(sign)).text;
/** At 0 °C and 1.013 bar. */
const volume: Shown = (value, _system, sign) => {
  const decimals = Math.abs(value) < 10 ? 2 : 1;
  return signed(`${numberText(value, decimals)} m³`, value, sign);
};
const money: Shown = (value, _system, sign) => signed(amountText(value), value, sign);

/** An amount to the hundredth, with the minus that figures have. */
const amountText = (value: number): string => (value < 0 ? `−${(-value).toFixed(2)}` : value.toFixed(2));

/** How each line of the comparison is called and shown, and what it is a part of. */
export const figureText: Readonly<
  Record<ComparedFigure, { readonly label: string; readonly show: Shown; readonly part?: true }>
> = {
  time: { label: 'time on the machine', show: time },
  pierce: { label: 'piercing', show: time, part: true },
  cut: { label: 'cutting', show: time, part: true },
  loop: { label: 'loops', show: time, part: true },
  dwell: { label: 'waits and restarts', show: time, part: true },
  rapid: { label: 'ways between', show: time, part: true },
  height: { label: 'head up and down', show: time, part: true },
  loading: { label: 'loading, as far as it adds', show: time, part: true },
  loops: { label: 'loops', show: count },
  overLimit: { label: 'tips over the limit', show: count },
  hottestReturn: { label: 'hottest tip', show: kelvin },
  oxygen: { label: 'oxygen', show: mass },
  oxygenVolume: { label: 'at 0 °C, 1.013 bar', show: volume, part: true },
  laser: { label: 'laser energy', show: energy('kWh') },
  heat: { label: 'heat left in the plate', show: energy('MJ') },
  meanBackground: { label: 'plate’s mean when all is cut', show: kelvin },
  highestBackground: { label: 'plate where hottest', show: kelvin },
  machine: { label: 'machine', show: money, part: true },
  oxygenMoney: { label: 'oxygen', show: money, part: true },
  electricity: { label: 'electricity', show: money, part: true },
  money: { label: 'cost', show: money },
};

export const estimateText = {
  title: 'What it costs',
  words: 'The plan beside the same plate cut in other ways, all computed the same way.',
  fetching: 'Working out four ways to cut this plate',
  again: 'Working it out for the plan as it is now',
  old: 'These figures are of the plan as it was before.',
  ask: 'Work out what it costs',
  stop: 'Don’t wait for it',
  large: (corners: number) => `${corners} corners: working it out takes some seconds.`,
  variant: (variant: PlanVariant, revision: number) =>
    variant === 'previous' ? `Revision ${revision}` : estimateText.variants[variant],
  variants: {
    untreated: 'Untreated',
    allLoops: 'All loops',
    planned: 'Planned',
    previous: 'Revision before',
  } satisfies Record<PlanVariant, string>,
  missing: (variant: PlanVariant, why: string) => `${estimateText.variants[variant]}: ${why}`,
  caution: (name: string, why: string) => `${name}: ${why}`,
  bars: 'Shown as bars',
  measure: { time: 'Time', oxygen: 'Oxygen', heat: 'Heat', money: 'Money' },
  parts: {
    pierce: 'piercing',
    cut: 'cutting',
    loop: 'loops',
    wait: 'waits',
    way: 'ways, head',
    loading: 'loading',
    machine: 'machine',
    oxygen: 'oxygen',
    electricity: 'electricity',
  },
  /** A bar aloud. */
  spoken: (name: string, parts: readonly string[]) => `${name}: ${parts.join(', ')}`,
  amount: (value: number, currency: string) => `${amountText(value)} ${currency}`,
  over: (tips: number) =>
    tips === 0 ? 'no tip over the limit' : tips === 1 ? '1 tip over the limit' : `${tips} tips over the limit`,
  against: 'Differences from',
  table: 'Plans side by side',
  figure: 'figure',
  noFigure: '–',
  currency: (currency: string) => `cost, ${currency}`,
  hidden: (seconds: number, system: UnitSystem) =>
    `${time(seconds, system, false)} of loading is hidden behind the cut by the second table.`,
  noMoney: 'No rates given: a lead writes what the plant pays for an hour, oxygen and electricity under House rules.',
  origin: 'Where these figures come from',
  origins: [
    'Time: the path at its feed within the axes’ acceleration and jerk, ways between pierces, the head up and down, each pierce’s routine, waits with what getting the cut going again takes. Loading counts as far as a second table does not hide it; how long it takes, and how high the head travels, are own assumptions where the machine’s profile does not say.',
    'Oxygen: flow through the nozzle at the cut’s pressure, an ideal gas with a discharge coefficient, while the beam cuts and while the cut waits; over a pierce as its prediction says. Shut between cuts.',
    'Laser energy: mean power while it cuts, less where a corner is eased; a pierce as its stages say.',
    'Heat: what the strategy says a cut leaves per area of cut face, and what the pierce model leaves. Loops leave theirs in slugs, in part: those fall.',
    'Plate: heat conducted on a grid through plate and open kerfs, with losses to the air. Where it is hottest is often within a loop, before its slug falls, or between two cuts. The tips themselves are hotter; the drawing has them.',
    'All loops: a loop at every corner that is treated or in trouble, where the rules allow one and it fits.',
  ],
  ledger: 'Energy of the planned cut, pierces left out',
  ledgerLines: {
    absorbed: 'absorbed light',
    oxidation: 'burning iron',
    melt: 'melting the kerf',
    inPlate: 'left in the plate',
    rest: 'superheat and losses',
  },
  absorption: (share: string) => `That is ${share} of the laser’s energy absorbed.`,
} as const;
