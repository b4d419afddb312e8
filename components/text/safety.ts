/** Stands wherever numbers stand. */
export const safety = {
  estimate: 'Every number here is an estimate until a test cut confirms it.',
  hazards: 'Class 4 laser radiation, oxygen-fed burning, fume, a hot plate, ejected slag.',
  first:
    'The machine maker’s limits, local codes and the judgement of the licensed or responsible person come first. Nothing is sent to a machine from here.',
} as const;
