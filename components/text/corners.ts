import type { CornerPlan, PlannedCorner, Treatment } from '@/shared/corner-plans.ts';
import { numberText, quantityText, type UnitSystem } from '@/strategy/units/index.ts';

export const treatmentText: Readonly<Record<Treatment, string>> = {
  loop: 'Loop',
  dwell: 'Dwell',
  ease: 'Ease',
  round: 'Round',
  leave: 'Leave',
};

export const cornerText = {
  scale: 'Temperature scale: temper and glow of steel',
  page: 'Corner plan',
  drawing: (part: string, plan: CornerPlan['totals']) =>
    `Drawing of ${part} on its plate with ${count(plan.corners, 'corner')}: ${count(plan.loops, 'loop')}, ${count(plan.dwells, 'dwell')}, ${
      plan.eases ? `${count(plan.eases, 'ease')}, ` : ''
    }${plan.rounds ? `${count(plan.rounds, 'round')}, ` : ''}${
      plan.trouble === 0 ? 'no trouble' : `${plan.trouble} in trouble`
    }. The list beside it says the same.`,
  corners: 'Corners',
  none: 'This part has no corner below the angle that the rules treat.',
  row: (number: number) => `Corner ${number}`,
  angle: (radians: number) => `${quantityText(radians, 'angle', 'metric').text} inside the part`,
  chooseOne: 'Choose a corner on the drawing or in the list to see what was decided there and why.',
  without: 'without treatment',
  with: 'as planned',
  straight: 'straight edge beside it',
  background: 'plate there when the cut comes back',
  peak: 'hottest afterwards',
  burnBack: 'burnt back, estimate',
  notBurnt: 'not at all',
  returnTime: 'time of return in the cut',
  afterwards: (peak: string, burnBack: string | null) =>
    `Afterwards at most ${peak}${burnBack === null ? '' : `, hot enough to burn ${burnBack} in from the tip`}.`,
  added: 'added time',
  limit: 'limit',
  loopSize: 'loop',
  loopOf: (radius: string, extension: string, length: string) =>
    `radius ${radius}, runs on ${extension}, ${length} long`,
  slugArea: (squareMetres: number) => `${numberText(squareMetres * 1e6, 0)} mm²`,
  slug: 'slug that falls',
  dwellFor: 'wait',
  flatLoopOf: (radius: string, extension: string, length: string) =>
    `flat, arcs of ${radius}, runs on ${extension}, ${length} long`,
  easeOver: 'eased',
  easeOf: (before: string, after: string) =>
    before === after ? `${before} each way` : `${before} into, ${after} out of it`,
  easeTo: 'in the corner',
  easeShares: (feed: string, power: string) => `${feed} of the feed, ${power} of the mean power`,
  roundSize: 'round',
  roundOf: (radius: string, deviation: string) => `radius ${radius}, ${deviation} off the drawing`,
  chosenBy: { rule: 'Chosen by the rules.', person: 'Chosen by hand.' },
  options: 'What else would do',
  fits: 'fits',
  doesNotFit: 'does not fit',
  choose: {
    loop: 'Choose the loop',
    dwell: 'Choose the dwell',
    ease: 'Choose the ease',
    round: 'Choose the round',
    leave: 'Leave it as it is',
  },
  byRule: 'Leave it to the rules',
  close: 'All corners',
  otherVersion: (planned: number, newest: number) =>
    `This plan was made for version ${planned} of the layout, which was laid out anew since then: version ${newest} is the newest. The drawing shows the pieces as they were planned.`,
  planNewest: 'Plan the newest layout',
  openLayout: 'Open the layout',
  settings: 'Plan again',
  settingsSave: 'Plan with these',
  operator: 'Read only: the programmer changes the plan.',
  notApproved: (state: string) =>
    `This plan uses a strategy revision that is not approved (${state}). It is not shown on a card.`,
  stale: 'Somebody planned these corners again meanwhile. What you typed is still here.',
  takeTheirs: 'Show their plan',
  replanMine: 'Plan again with mine',
  plateTemperature: 'Plate temperature',
  thickness: 'Thickness',
  skeleton: { left: 'Left', right: 'Right', below: 'Below', above: 'Above' },
  skeletonTitle: 'Free skeleton around the part',
  skeletonHint: 'Plate that may be cut into on each side; loops need it.',
  strategy: 'Strategy revision',
  chooseStrategy: 'Choose the strategy revision.',
  revisionOption: (name: string, number: number, state: string) =>
    `${name}, revision ${number} (${state.toLowerCase()})`,
  overrides: (number: number) => `${count(number, 'corner')} chosen by hand`,
  clearOverrides: 'Leave all corners to the rules',
  trouble: 'Trouble',
  block: {
    part: 'part',
    strategy: 'strategy',
    thickness: 'thickness',
    plateTemperature: 'plate temperature',
    corners: 'corners',
    loops: 'loops',
    dwells: 'dwells',
    eases: 'eases',
    rounds: 'rounds',
    trouble: 'in trouble',
    time: 'added time',
    length: 'added path',
    oxygen: 'added oxygen',
    untreated: 'hottest untreated',
    treated: 'hottest as planned',
  },
} as const;

export function count(number: number, one: string): string {
  return `${number} ${number === 1 ? one : `${one}s`}`;
}

/** The planner's reasons are clauses; on the screen they are sentences. */
export const asSentence = (clause: string): string =>
  `${clause.charAt(0).toUpperCase()}${clause.slice(1)}${/[.!?]$/.test(clause) ? '' : '.'}`;

/** A corner in one sentence, for its row's name. */
export function cornerWords(corner: PlannedCorner, number: number, system: UnitSystem): string {
  const hot = (kelvin: number) => quantityText(kelvin, 'temperature', system).text;
  const plan = `${treatmentText[corner.treatment].toLowerCase()}, back at ${hot(corner.treated)} instead of ${hot(corner.untreated)}`;
  return `Corner ${number}, ${cornerText.angle(corner.angle)}: ${plan}${corner.trouble === null ? '' : `. Trouble: ${corner.trouble}`}`;
}

/** The next best treatment, and what it costs more. */
export function runnerUpWords(
  { treatment, costsMore, why }: NonNullable<PlannedCorner['runnerUp']>,
  seconds: (value: number) => string,
): string {
  if (treatment === null) return `Nothing else keeps the limits here: ${why}${/[.!?]$/.test(why) ? '' : '.'}`;
  const cost =
    costsMore === null ? '' : costsMore < 0 ? `, ${seconds(-costsMore)} less` : `, for ${seconds(costsMore)} more`;
  return `Next best: ${treatmentText[treatment].toLowerCase()}${cost}. ${asSentence(why)}`;
}
