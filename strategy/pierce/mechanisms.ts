import type { PierceParameterName } from './parameters.ts';
import type { StageQuantities } from './stage.ts';

export type PierceMechanism = {
  readonly quantity: keyof StageQuantities;
  /** How it acts on depth, as an engineer would say it. */
  readonly depth: string;
  /** What else it changes, or that it changes nothing else. */
  readonly beside: string;
  /** The parameters that its action stands or falls with; power itself acts by the coupling. */
  readonly parameters: readonly PierceParameterName[];
};

/** How each of the six quantities acts. What is not said here does not happen in the model. */
export const pierceMechanismTable: readonly PierceMechanism[] = [
  {
    quantity: 'peakPower',
    depth:
      'Peak power times the time the beam is on is the energy sent down; the bottom gets what is coupled in and not lost on the way.',
    beside: 'More of it makes melt faster, so the bore fills and the pierce comes nearer to erupting.',
    parameters: ['coupling', 'attenuationLength'],
  },
  {
    quantity: 'duty',
    depth:
      'The share of the time the beam is on: mean power is peak times duty. What the source needs to rise is lost of each pulse.',
    beside: 'A longer duty leaves shorter pauses, in which less freezes and less melt can leave.',
    parameters: ['coupling', 'attenuationLength', 'pauseLoss', 'remeltTime', 'meltSpeed'],
  },
  {
    quantity: 'pulseFrequency',
    depth:
      'Slow pulses leave pauses in which the bottom freezes and must be melted again; pulses hardly longer than the source’s rise lose most of their energy.',
    beside: 'Slow pulses make more melt each, which fills more of the bore.',
    parameters: ['pauseLoss', 'remeltTime', 'meltSpeed'],
  },
  {
    quantity: 'standoff',
    depth:
      'The jet widens on its way, so less of the oxygen meets the bore from higher up. On a dial referred to the nozzle the focus moves with it; the focus position written here is of the plate and does not.',
    beside: 'The oxygen used stays the same: it is set by nozzle and pressure.',
    parameters: ['jetSpread', 'oxygenUse'],
  },
  {
    quantity: 'focusPosition',
    depth:
      'It sets how wide the beam is at the top, which makes the bore wide or narrow and lets more or less light in, and how wide it is at the bottom.',
    beside: 'A wider bore takes more steel out, and its crater is at least as wide.',
    parameters: ['boreRadius', 'spotFollowing', 'guidedShare'],
  },
  {
    quantity: 'oxygenPressure',
    depth:
      'More pressure sends more oxygen through the nozzle, up to and beyond choking, and what reaches the bottom bounds how much of the melt burns.',
    beside:
      'It drives the melt out faster, so the bore fills less; that acts on erupting and on the crater, not on depth.',
    parameters: ['burntShare', 'oxygenUse', 'oxygenDepth', 'dischargeCoefficient', 'meltSpeed'],
  },
];
