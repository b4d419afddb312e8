export const machinesText = {
  title: 'Machines',
  add: 'New machine',
  list: 'Machines',
  fetching: 'Fetching the machines',
  fetchingOne: 'Fetching the machine',
  empty: {
    title: 'No machine yet',
    words:
      'A strategy is made for one machine as it is: its source, optics, oxygen, axes and how its focus dial reads.',
  },
  revision: (number: number) => `revision ${number}`,
  newTitle: 'New machine',
  addAction: 'Add the machine',
  revise: 'Write the next revision',
  reviseTitle: (name: string, number: number) => `${name}, revision ${number}`,
  reviseWords:
    'A revision is never changed afterwards: strategies point at it. Change what has changed at the machine; the rest stays as it was.',
  saveRevision: (number: number) => `Save revision ${number}`,
  newer: (number: number, by: string) =>
    `Meanwhile ${by} wrote revision ${number}. What you typed is still here; saving writes the one after it.`,
  note: 'What changed, and why',
  noteHint: 'New fibre, collimator exchanged, focus checked …',
  name: 'Name',
  nameHint: 'As people call it in the hall',
  revisions: 'Revisions',
  older: (number: number) => `This is revision ${number}, not the newest.`,
  madeBy: (who: string, when: string) => `${who}, ${when}`,
  showNewest: 'Show the newest',
  block: 'Machine',
  shuttle: 'with a shuttle table',
  noShuttle: 'one table',
} as const;

/** Groups and fields of a machine's profile, in the order in which one walks from the source to the bed. */
export const profileText = {
  source: {
    title: 'Laser source',
    maxPower: {
      label: 'Greatest peak power',
      hint: 'At the plate, if it was measured; else as the source’s sheet says',
    },
    minPower: { label: 'Least peak power', hint: 'Below it the source is unstable or goes out' },
    wavelength: { label: 'Wavelength', hint: 'A fibre laser: about 1.07 µm' },
    riseTime: { label: 'Rise time', hint: 'From off to full power; a pulse must last longer' },
    minFrequency: { label: 'Least pulse frequency' },
    maxFrequency: { label: 'Greatest pulse frequency' },
    minDuty: { label: 'Least duty', hint: 'Share of the time that the beam is on' },
  },
  optics: {
    title: 'Optics',
    coreDiameter: { label: 'Core of the fibre, diameter' },
    halfAngle: { label: 'Half-angle of the light leaving it', hint: 'ISO 11145: to 1/e² of the peak' },
    collimatorFocalLength: { label: 'Collimator, focal length' },
    focusingFocalLength: { label: 'Focusing lens, focal length' },
  },
  focusScale: {
    title: 'Focus dial',
    words:
      'The number typed at the machine is seldom the focus position itself. It may be counted from the nozzle tip or the plate, run the other way, and move the focus by more than a millimetre per millimetre. Check it before any other number.',
    reference: 'Counted from',
    references: { plate: 'The plate’s top', nozzle: 'The nozzle tip' },
    offset: { label: 'Position when the dial reads 0', hint: 'Above the reference is positive' },
    slope: {
      label: 'Travel per millimetre typed',
      hint: 'Negative when the focus moves the other way: −2.2 means that +1 moves it 2.2 mm down',
    },
    minDial: { label: 'Least number the dial takes' },
    maxDial: { label: 'Greatest number the dial takes' },
    example: 'So it reads',
    incomplete: 'Give reference, offset, slope and the dial’s range to see how it reads.',
    toHave: (position: string, typed: string) => `To have the focus at ${position}, type ${typed}.`,
    typing: (typed: string, position: string) => `Typing ${typed} puts it at ${position}.`,
    atStandoff: (standoff: string) => `At a standoff of ${standoff}, since this dial is counted from the nozzle tip.`,
    reversed: 'This dial runs the other way: a greater number moves the focus down.',
    position: 'position',
    type: 'type',
    outOfReach: 'out of reach',
    drawing: 'Focus positions around the plate’s top, with the number to type for each',
    plateTop: 'plate’s top',
    above: 'above',
    inside: 'inside',
  },
  focusCheck: {
    title: 'Checking the focus',
    words: [
      'Run a row of short, weak lines across a bright plate at one standoff, typing another number for each. The narrowest line is where the waist meets the plate’s top.',
      'Do it again at two other standoffs. A dial counted from the plate keeps its number; one counted from the nozzle moves it with the standoff.',
      'Raise or lower the head by a known distance and find the narrowest line again: distance moved ÷ change of the number typed is the slope, with its sign.',
      'Write the next revision with what was found. Strategies stay with the revision they were made for, and the card says when a newer one exists.',
    ],
  },
  standoff: { title: 'Standoff', min: { label: 'Least standoff' }, max: { label: 'Greatest standoff' } },
  oxygen: {
    title: 'Oxygen',
    minPressure: { label: 'Least pressure', hint: 'At the nozzle, above the hall’s air' },
    maxPressure: { label: 'Greatest pressure' },
  },
  axes: {
    title: 'Axes',
    maxFeed: { label: 'Greatest feed' },
    acceleration: { label: 'Acceleration along the path' },
    jerk: { label: 'Jerk' },
    smallestArc: { label: 'Smallest arc followed at cutting feed', hint: 'Loops are never drawn tighter' },
  },
  bed: {
    title: 'Bed',
    tables: 'Tables',
    length: { label: 'Length' },
    width: { label: 'Width' },
    shuttleTable: { label: 'A second table is loaded while the first is cut' },
  },
} as const;

export const nozzleText = {
  title: 'Nozzles',
  list: 'Nozzles in the drawer',
  fetching: 'Fetching the nozzles',
  empty: 'No nozzle is in the drawer yet.',
  add: 'Add a nozzle',
  name: 'Name',
  nameHint: 'As it is engraved or as the drawer says',
  type: 'Type',
  types: { single: 'Single', double: 'Double' },
  diameter: 'Diameter of the bore',
} as const;

export const gradeText = {
  title: 'Grades',
  list: 'Grades and their groups',
  fetching: 'Fetching the grades',
  empty: 'No grade is known yet.',
  add: 'Add a grade',
  name: 'Grade',
  nameHint: 'As certificates name it',
  group: 'Group',
  groupHint: 'A strategy is made for a group: grades that cut alike',
  of: (group: string) => `group ${group}`,
} as const;
