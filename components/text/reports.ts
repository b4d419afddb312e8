import type { Report } from '@/shared/reports.ts';

export const troubleNames: Record<Report['kind'], string> = {
  erupted: 'It erupted',
  'not through': 'It did not get through',
  'corner burnt': 'A corner burnt',
  'cut lost': 'The cut was lost',
  'nozzle or window damaged': 'Nozzle or window was damaged',
  'something else': 'Something else',
};

export const reportsText = {
  title: 'Reports',
  kinds: 'What goes wrong',
  kindCount: (open: number, all: number) =>
    open === 0 ? `${all}` : open === all ? `${all} open` : `${all}, ${open} open`,
  open: 'Open',
  closed: 'Closed',
  fetching: 'Fetching the reports',
  fetchingOne: 'Fetching the report',
  empty: {
    title: 'Nothing was reported',
    words: 'Every plate card has a button to say that it went wrong. What is said there comes here.',
  },
  noneOpen: 'Nothing is open.',
  on: (machine: string, plate: string | null) => (plate === null ? machine : `${machine}, plate ${plate}`),
  by: (who: string, when: string) => `${who}, ${when}`,
  withPhoto: 'with a picture',
  eyebrow: (machine: string) => `Reported at ${machine}`,
  block: 'Report',
  cells: { strategy: 'strategy', revision: 'revision', machine: 'machine', plate: 'plate', at: 'when', by: 'by' },
  toRevision: 'Open the revision',
  words: 'What was seen',
  noWords: 'No words were written.',
  photo: 'Picture',
  photoAlt: (kind: string) => `Picture with the report “${kind}”`,
  noPhoto: 'No picture was taken.',
  photoLost: 'The picture could not be fetched.',
  closing: 'Close the report',
  found: 'What was found',
  foundHint: 'For whoever has the same trouble next: the cause, and what was changed',
  closedTitle: 'Closed',
} as const;
