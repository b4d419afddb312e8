import type { drawingUnits, DrawingReadingWire, PartSummary } from '@/shared/parts.ts';
import { numberText, quantityText, type UnitSystem } from '@/strategy/units/index.ts';
import { count } from './corners.ts';

export const drawingText = {
  keys: 'Drawing. Arrow keys move it, plus and minus enlarge and reduce, 0 shows the whole.',
  placeKeys: 'Enter takes the place under the cross in the middle.',
  waysTitle: 'How to move it',
  ways: 'Drag to move it; pinch, or click it and turn the wheel, to enlarge. Keys: arrows (finer with Shift), + and −, 0 for the whole.',
  larger: 'Enlarge the drawing',
  smaller: 'Reduce the drawing',
  whole: 'Fit',
  wholeSpoken: 'Show the whole drawing',
} as const;

/** Width by height, in the person's own system. */
export function sizeText(width: number, height: number, system: UnitSystem): string {
  const h = quantityText(height, 'length', system);
  return `${quantityText(width, 'length', system).number} × ${h.text}`;
}

/** The same in millimetres and in inches: to know which reading of a drawing is meant. */
export const sizeBoth = (width: number, height: number): string =>
  `${sizeText(width, height, 'metric')} (${sizeText(width, height, 'inch')})`;

type DrawingUnit = (typeof drawingUnits)[number];

const unitNames: Readonly<Record<DrawingUnit, string>> = {
  µm: 'Micrometres',
  mil: 'Thousandths of an inch',
  mm: 'Millimetres',
  cm: 'Centimetres',
  dm: 'Decimetres',
  m: 'Metres',
  km: 'Kilometres',
  inch: 'Inches',
  foot: 'Feet',
  yard: 'Yards',
  px: 'Pixels, 96 to the inch',
};

export const partsText = {
  title: 'Parts',
  one: 'Part',
  new: 'Add a part',
  newTitle: 'Add a part',
  list: 'Parts',
  loading: 'Fetching parts',
  search: 'Find by name or file',
  empty: 'No part yet',
  emptyHint: 'A part is read from a DXF or SVG drawing. Then its corners can be planned with a strategy.',
  noneFound: (text: string) => `No part matches “${text}”.`,
  holds: (part: Pick<PartSummary, 'outlines' | 'holes'>) =>
    `${count(part.outlines, 'outline')}, ${count(part.holes, 'hole')}`,
  plans: (number: number) => (number === 0 ? 'no corner plan' : count(number, 'corner plan')),
  file: 'Drawing',
  fileHint: 'DXF or SVG, at most 10 MiB. It is read here and kept only when you say so.',
  reading: 'Reading the drawing',
  rereading: 'Reading it again with your answers',
  questions: 'Questions',
  unitQuestion: 'In which unit is it drawn?',
  unitOption: (unit: DrawingUnit) => unitNames[unit],
  gapQuestion: 'Gaps in the outlines',
  gapWhat: 'What should become of them?',
  gapOption: {
    leave: 'Leave them open',
    leaveHint: 'What does not close bounds nothing and is not cut.',
    close: (metres: number, system: UnitSystem) =>
      `Close gaps of up to ${quantityText(metres, 'length', system, { figures: 3 }).text}`,
    closeHint: 'Look at the marked places first: a gap may be a piece that is missing.',
    other: 'Close gaps up to another size',
  },
  gapSize: 'Largest gap to close',
  layers: 'Layers to take',
  layer: (name: string, pieces: number) => `${name} (${count(pieces, 'piece')})`,
  noted: 'What was read',
  leftOut: (what: string, number: number) => `Left out: ${number} × ${what}`,
  repaired: (what: string, number: number, largest: number | null, system: UnitSystem) =>
    `Repaired: ${number} × ${what}${
      largest === null
        ? ''
        : `, ${number === 1 ? '' : 'at most '}${quantityText(largest, 'length', system, { figures: 3 }).text}`
    }`,
  branches: (places: number) =>
    `More than two ends meet at ${count(places, 'place')}: there the way that keeps each outline to itself was taken. Look whether it is the right one.`,
  aside: 'Lines that were left out are drawn dotted where they were.',
  tooDense: 'So many lines touch each other that not every overlap and crossing was looked for.',
  joined: (metres: number, system: UnitSystem) =>
    `Ends up to ${quantityText(metres, 'length', system, { figures: 2 }).text} apart were joined.`,
  joinWider: 'Join ends that are farther apart',
  showPlaces: 'Show on the drawing where',
  openChains: (number: number) => `${count(number, 'chain')} not closed, shown dashed: not part of the cut.`,
  deviation: (metres: number) =>
    `Curves are drawn with arcs that stay within ${numberText(metres * 1e6, 1)} µm of them.`,
  allTaken: 'Everything in the drawing was taken as it stands.',
  name: 'Name of the part',
  keep: 'Keep as a part',
  gapsFirst: 'Say what should become of the gaps first.',
  unitFirst: 'Answer the unit first: the size of the part depends on it.',
  crossing: (places: number) =>
    `Outlines cross each other at ${count(places, 'place')}, marked with an X. Mend the drawing and choose it again.`,
  nothingClosed:
    'Nothing in this drawing closes yet, so there is no part to keep. Close its gaps, or mend the drawing and choose it again.',
  tooLarge: 'Draw the part alone, without its sheet and the parts around it, and export it again.',
  needFile: 'Choose a drawing.',
  block: {
    size: 'size',
    outlines: 'outlines',
    holes: 'holes',
    corners: 'corners',
    unit: 'drawn in',
    file: 'file',
    added: 'added',
  },
  download: 'Download the drawing as it came',
  open: 'Open the part',
  plansTitle: 'Corner plans',
  noPlans: 'No corner plan yet.',
  planRow: (strategy: string, number: number) => `${strategy}, revision ${number}`,
  planWith: 'Plan corners with …',
  planButton: 'Plan the corners',
  noStrategies: 'No strategy was handed in yet to plan with.',
  drawing: (name: string, reading: DrawingReadingWire, system: UnitSystem) => {
    const { min, max } = reading.bounds;
    const holes = reading.contours.filter(({ role }) => role === 'hole').length;
    return `Drawing of ${name}: ${sizeText(max.x - min.x, max.y - min.y, system)}, ${count(
      reading.contours.filter(({ role }) => role === 'outer').length,
      'outline',
    )}, ${count(holes, 'hole')}.`;
  },
} as const;
