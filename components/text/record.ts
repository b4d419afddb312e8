/** What was done, in words. An event without its own words is shown by its name. */
const events: Readonly<Record<string, string>> = {
  'member.added': 'added a person',
  'member.changed': 'changed what a person may do',
  'machine.added': 'added a machine',
  'machine.blockFrameWritten': 'wrote what a machine’s blocks begin and end with',
  'machine.revised': 'wrote a machine’s next revision',
  'nozzle.added': 'added a nozzle',
  'grade.added': 'added a grade',
  'plate.added': 'booked a plate in',
  'plate.changed': 'corrected a plate',
  'strategy.added': 'began a strategy',
  'revision.begun': 'began a draft',
  'revision.saved': 'saved a draft',
  'revision.submitted': 'handed a revision in',
  'revision.approved': 'approved a revision',
  'revision.returned': 'returned a revision',
  'revision.withdrawn': 'withdrew a revision',
  'revision.superseded': 'put a revision in place of another',
  'part.added': 'kept a part',
  'layout.added': 'began a plate layout',
  'layout.changed': 'laid a plate out anew',
  'cornerPlan.added': 'planned corners',
  'cornerPlan.redone': 'planned corners again',
  'report.made': 'reported trouble',
  'report.closed': 'closed a report',
  'houseRule.added': 'added a house rule',
  'houseRule.changed': 'rewrote a house rule',
  'houseRule.ended': 'ended a house rule',
  'rates.changed': 'wrote what the plant pays',
  'request.made': 'asked for a strategy',
};

/** What an entry is about, in words. */
const subjects: Readonly<Record<string, string>> = {
  cornerPlan: 'corner plan',
  layout: 'plate layout',
  member: 'person',
  houseRule: 'house rule',
};
export const subjectText = (kind: string): string => subjects[kind] ?? kind;

export const eventText = (event: string): string => events[event] ?? event;

export const recordText = {
  title: 'Record',
  words:
    'Who decided what, in order. Each entry carries a hash over itself and the one before it, so that none can be changed or taken out unseen.',
  list: 'Entries, newest first',
  fetching: 'Fetching the record',
  empty: { title: 'Nothing is recorded yet', words: 'The first thing that somebody does in this plant stands here.' },
  somebody: 'The service',
  older: 'Older entries',
  chain: 'Is it whole?',
  check: 'Check the chain',
  checking: 'Recomputing every hash',
  whole: (entries: number) =>
    entries === 1 ? 'The one entry fits its hash.' : `All ${entries} entries fit their hashes and each other.`,
  broken: (sequence: number, why: string) => `The chain breaks at entry ${sequence}: ${why}`,
  brokenTitle: 'The record was tampered with or damaged',
  wholeTitle: 'The record is whole',
  facts: 'Facts',
  open: 'Open',
  hash: 'hash',
} as const;
