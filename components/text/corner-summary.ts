import type { Treatment } from '@/shared/corner-plans.ts';
import { treatments } from '@/shared/corner-plans.ts';
import { numberText } from '@/strategy/units/index.ts';
import { count, treatmentText } from './corners.ts';

type Cured = Readonly<Record<Treatment, number>>;

const plural: Readonly<Record<Treatment, string>> = {
  loop: 'loop',
  dwell: 'dwell',
  ease: 'ease',
  round: 'round',
  leave: 'left as drawn',
};

const doneWords = (cured: Cured): string => {
  const parts = treatments
    .filter((one) => one !== 'leave' && cured[one] > 0)
    .map((one) => count(cured[one], plural[one]));
  return parts.length === 0 ? 'Nothing was done about it' : `Done about it: ${parts.join(', ')}`;
};

/** Of the summary of a corner plan, and of the list of what burns. */
export const summaryText = {
  wouldBurn: 'corners would burn as drawn',
  treated: 'treated and cool enough',
  left: 'still in trouble',
  cost: 'more time',
  costOf: (percent: number) => `more time, ${numberText(percent, 1)} % of the cut as drawn`,
  more: (time: string, less: boolean) => `${time} ${less ? 'less' : 'more'}`,
  part: (kind: Treatment | 'trouble', corners: number): string =>
    kind === 'trouble'
      ? `${corners} in trouble`
      : kind === 'leave'
        ? `${corners} left as drawn`
        : count(corners, plural[kind]),
  bar: (cured: Cured, trouble: number): string =>
    `All corners by what was done: ${treatments.map((one) => `${treatmentText[one].toLowerCase()} ${cured[one]}`).join(', ')}, in trouble ${trouble}.`,
  sentence: ({
    corners,
    burning,
    cured,
    trouble,
    cost,
    limit,
  }: {
    corners: number;
    burning: number;
    cured: Cured;
    trouble: number;
    cost: string;
    limit: string;
  }): string =>
    [
      burning === 0
        ? `Cut as drawn, none of ${count(corners, 'corner')} comes back hotter than ${limit}.`
        : `Cut as drawn, ${burning} of ${count(corners, 'corner')} ${burning === 1 ? 'comes' : 'come'} back hotter than ${limit} and would burn.`,
      `${doneWords(cured)}, for ${cost}.`,
      trouble === 0 ? 'None is left in trouble.' : `${trouble} ${trouble === 1 ? 'is' : 'are'} still in trouble.`,
    ].join(' '),
  order: 'In order of',
  byBurn: 'what burns most',
  byNumber: 'the drawing',
  over: (by: string) => `as drawn ${by} over the limit`,
  under: 'as drawn under the limit',
  suggestions: {
    title: 'Another order of cutting',
    costs: (time: string) => `costs ${time} more between the cuts`,
    spares: (time: string) => `spares ${time} of treatments`,
    fewer: (corners: number) => `${count(corners, 'corner')} fewer over a limit`,
    inLayout: 'Change the order in the layout',
    order: (contours: string) => `Order: ${contours}`,
  },
} as const;
