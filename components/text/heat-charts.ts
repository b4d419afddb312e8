import type { Treatment } from '@/shared/corner-plans.ts';
import { treatmentText } from './corners.ts';

/** Of the charts of time against temperature. */
export const heatChartText = {
  scatterTitle: 'When the cut comes back, and how hot it is there',
  scatter: 'Corners by time of return',
  returnTime: 'time of return in the cut',
  returnTemperature: 'return temperature',
  limit: (text: string) => `limit ${text}`,
  scatterKeys:
    'Short bar: untreated. Shape: as treated. Arrows left and right go along the cut, up and down by heat; a tap takes the nearest.',
  noneChosen: (corners: number) => `${corners} corners; none is chosen.`,
  point: (
    number: number,
    treatment: Treatment,
    time: string,
    untreated: string,
    treated: string,
    over: boolean,
  ): string =>
    `Corner ${number}, back at ${time}: ${treated}${treatment === 'leave' ? '' : ` with a ${treatmentText[treatment].toLowerCase()}, ${untreated} untreated`}${over ? ', over the limit' : ''}.`,
  coolingTitle: 'How the tip cools',
  noCurve: 'The model has no curve for this corner: its contour is not in the plan, or it is a spike without width.',
  cooling: (lines: readonly string[]): string => `Temperature at the tip against time. ${lines.join(' ')}`,
  sinceCorner: 'time since the cut was in the corner',
  atTip: 'at the tip',
  curve: (treatment: string, back: string, at: string, peak: string, burnBack: string | null): string =>
    `${treatment}: back after ${back} at ${at}; then at most ${peak}${burnBack === null ? '' : `, hot enough to burn ${burnBack} in from the tip`}.`,
  coolingNote:
    'Shapes: the moment of return, with the return temperature, which leaves out the last 2 mm of path. Faint: with the heat of the second edge, up to its peak (small ring). At the place 1.5 mm inside the tip.',
} as const;
