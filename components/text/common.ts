/** Words that every page shares. */
export const common = {
  product: 'Cinderpath',
  retry: 'Try again',
  loading: 'Fetching',
  cancel: 'Cancel',
  close: 'Close',
  none: '–',
  loadNewest: 'Load the newest',
  lostConnection: {
    title: 'No connection',
    detail: 'The server could not be reached. What you typed is kept; try again when the connection is back.',
  },
  unreadable: {
    title: 'The answer could not be read',
    detail: 'This page and the server may be of different versions. Reload the page; if it stays, tell the lead.',
  },
  unknown: {
    title: 'Something went wrong on this page',
    detail: 'Reload the page. What was saved before is safe.',
  },
  conflict: {
    title: 'Somebody changed this meanwhile',
    detail:
      'What you typed is still here and has not been saved. Load the newest to see it; your text stays in the fields.',
  },
  newest: {
    title: 'The newest is loaded',
    words:
      'The sheet above shows what the other person saved. The fields still hold your text; saving now puts it in place of theirs.',
    take: 'Drop my text and take theirs',
  },
} as const;

/** Kept on one line, as a number and its unit. */
export const unbroken = (words: string): string => words.replaceAll(' ', '\u00a0');
