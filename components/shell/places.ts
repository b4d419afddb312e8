import type { Href } from 'expo-router';
import { shell } from '@/components/text/shell.ts';
import { may, type Action, type Actor } from '@/shared/policy.ts';

export type Place = { readonly href: Href; readonly path: string; readonly name: string; readonly action: Action };

const place = (path: Place['path'] & Href, name: string, action: Action): Place => ({ href: path, path, name, action });

const places: readonly Place[] = [
  place('/at-the-machine', shell.menuOf.atTheMachine, 'card.read'),
  place('/strategies', shell.menuOf.strategies, 'strategy.read'),
  place('/parts', shell.menuOf.parts, 'part.read'),
  place('/layouts', shell.menuOf.layouts, 'layout.read'),
  place('/reviews', shell.menuOf.reviews, 'review.read'),
  place('/plates', shell.menuOf.plates, 'plate.read'),
  place('/machines', shell.menuOf.machines, 'machine.read'),
  place('/reports', shell.menuOf.reports, 'report.read'),
  place('/house-rules', shell.menuOf.houseRules, 'rule.write'),
  place('/people', shell.menuOf.people, 'people.manage'),
  place('/record', shell.menuOf.record, 'record.read'),
];

/** Pages that stand below another in the list of pages. */
const below: readonly (readonly [string, string])[] = [
  ['/card', '/at-the-machine'],
  ['/revisions', '/strategies'],
  ['/corner-plans', '/parts'],
];

/** The pages a person's role opens, in the order of the job. */
export const placesOf = (actor: Actor): readonly Place[] => places.filter((one) => may(actor, one.action));

/** Whether an address belongs to a place. */
export function isWithin(pathname: string, path: string): boolean {
  const moved = below.find(([from]) => pathname === from || pathname.startsWith(`${from}/`));
  const address = moved === undefined ? pathname : moved[1];
  return address === path || address.startsWith(`${path}/`);
}

/** Where the day begins: an operator at the machine, everybody else at the strategies. */
export const startOf = (actor: Actor): Href => (actor.role === 'operator' ? '/at-the-machine' : '/strategies');

/** A way back that stays on this site, from what stands in an address. */
export const wayBack = (next: string | null): Href | null => (isOwnPath(next) ? next : null);

/** One slash only: `//name` and `/\\name` lead to other sites. A path that leads nowhere shows that nothing is there. */
const isOwnPath = (text: string | null): text is string & Href =>
  text !== null && /^\/(?![/\\])/.test(text) && !text.startsWith('/sign-in');
