import type { Role } from '@/shared/policy.ts';

export const roleNames: Record<Role, string> = {
  operator: 'Operator',
  programmer: 'Programmer',
  engineer: 'Applications engineer',
  lead: 'Cutting lead',
};

/** What a role gets done here, for whoever gives it to somebody. */
export const roleDeeds: Record<Role, string> = {
  operator: 'finds the card for a plate, says what went wrong',
  programmer: 'brings drawings, lays plates out, plans corners',
  engineer: 'designs pierces and corner rules, keeps machines',
  lead: 'approves, withdraws, decides who may do what',
};

export const shell = {
  skip: 'To the content',
  navigation: 'Pages',
  menu: 'Menu',
  closeMenu: 'Close the menu',
  you: 'You and this device',
  signOut: 'Sign out',
  plant: 'Plant',
  theme: 'Colours',
  themes: { system: 'As the device', light: 'Paper', night: 'Night' },
  units: 'Numbers',
  unitSystems: { metric: 'Metric', inch: 'Inch' },
  fetchingYou: 'Looking up who is signed in',
  refused: 'This page is not for your role',
  nothing: {
    title: 'There is nothing here',
    words: 'The address leads nowhere: what it named may have been removed, or it was mistyped.',
    start: 'To the start',
  },
  expired: {
    title: 'Your sign-in has ended',
    words: 'Sign in again to go on. The page behind stays as you left it.',
  },
  menuOf: {
    atTheMachine: 'At the machine',
    strategies: 'Strategies',
    parts: 'Parts',
    layouts: 'Plate layouts',
    reviews: 'Reviews',
    plates: 'Plates',
    machines: 'Machines',
    reports: 'Reports',
    people: 'People',
    houseRules: 'House rules',
    record: 'Record',
  },
} as const;

/** Titles of the pages, for the browser's tab. */
export const titles = {
  start: 'Start',
  signIn: 'Sign in',
  atTheMachine: 'At the machine',
  card: 'Plate card',
  strategies: 'Strategies',
  strategyNew: 'New strategy',
  strategy: 'Strategy',
  revision: 'Pierce',
  reviews: 'Reviews',
  parts: 'Parts',
  partNew: 'New part',
  part: 'Part',
  layouts: 'Plate layouts',
  layoutNew: 'Lay a plate out',
  layout: 'Plate layout',
  cornerPlan: 'Corner plan',
  plates: 'Plates',
  plateNew: 'Book a plate in',
  plate: 'Plate',
  machines: 'Machines',
  machineNew: 'New machine',
  machine: 'Machine',
  reports: 'Reports',
  report: 'Report',
  reportNew: 'It went wrong',
  people: 'People',
  houseRules: 'House rules',
  record: 'Record',
  notFound: 'Nothing here',
} as const;
