import type { TakeAwayFormat, takeAwayUnits } from '@/shared/take-away.ts';

type Unit = (typeof takeAwayUnits)[number];

export const takeAwayText = {
  title: 'Take the cut path away',
  words: 'Middle of the kerf, with lead-ins and loops, in the order of cutting. Nothing is sent to a machine.',
  unit: 'Unit',
  units: { mm: 'Millimetres', inch: 'Inches' } satisfies Record<Unit, string>,
  as: {
    dxf: 'DXF drawing',
    svg: 'SVG picture',
    iso: 'ISO 6983 blocks',
    pdf: 'PDF sheet',
  } satisfies Record<TakeAwayFormat, string>,
  hints: 'An SVG is in millimetres whichever unit is chosen. Blocks begin and end with the machine’s own lines.',
  cautions: 'Before it is used',
  notApproved: 'The strategy revision is not approved: every file says so.',
  saved: (name: string) => `${name} is saved with this device’s downloads.`,
} as const;

export const blockFrameText = {
  title: 'Lines around this machine’s blocks',
  words:
    'What files of ISO 6983 blocks for this machine begin and end with, such as what sets the unit, the plane and absolute positions. They are copied as they are and never read.',
  caution:
    'What stands here is the plant’s own responsibility: a line that starts beam, gas or a movement does so in every file.',
  fetching: 'Fetching the lines',
  unit: 'Unit that these lines set',
  unitHint: 'Blocks in the other unit are written without them.',
  header: 'Before the blocks',
  footer: 'After the blocks',
  plain: 'Plain letters, figures and signs.',
  save: 'Save the lines',
  saved: 'Saved. The next files have them.',
  none: 'none',
  readOnly: 'An engineer or the lead writes them.',
} as const;
