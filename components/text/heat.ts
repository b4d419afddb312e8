import { asSentence } from './corners.ts';

/** Of the plate's heat behind the drawing. */
export const heatText = {
  show: 'Show the heat',
  hide: 'Hide the heat',
  working: 'Working out the plate’s heat',
  stop: 'Stop',
  stopSpoken: 'Stop working out the plate’s heat',
  again: 'Work out the heat',
  stopped: 'The plate’s heat was not worked out to its end.',
  old: 'The heat behind the drawing is of the plan before. The new one is not there yet.',
  refused: (why: string) => `The plate’s heat can’t be worked out: ${asSentence(why)}`,
  crashed:
    'Working out the plate’s heat broke off on this device. Try again; with less open at once there is more room.',
  aboutTitle: 'What is counted in the heat',
  keptOld: 'What is drawn is the last that was worked out.',
  legend:
    'Behind the drawing: the plate’s temperature at the slider’s moment, in the steel’s own colours. Lines with figures stand at named temperatures; hatched is hotter than the limit.',
  counted:
    'Counted: all that is cut and pierced so far, conduction in the plate with its edge, open kerfs once their heat has spread, and what the faces give to the air. Not counted: kerfs in the first seconds, slats below, melt on the plate.',
} as const;
