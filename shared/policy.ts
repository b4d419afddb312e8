/** Who may do what, in one place. The server is the lock; screens ask the same questions so as not to offer a closed door. */

export const roles = ['operator', 'programmer', 'engineer', 'lead'] as const;
export type Role = (typeof roles)[number];

export type Actor = {
  readonly userId: string;
  readonly plantId: string;
  readonly role: Role;
  /** The lead's grant: an engineer who may approve. */
  readonly mayApprove: boolean;
};

/** What an action may depend on beside the role. */
export type Target = {
  /** Everybody who wrote any of a revision's content. */
  readonly touchedBy?: readonly string[];
};

const everyone: readonly Role[] = roles;
const programmersUp: readonly Role[] = ['programmer', 'engineer', 'lead'];
const engineersUp: readonly Role[] = ['engineer', 'lead'];
const leads: readonly Role[] = ['lead'];

const byRole = {
  'session.use': everyone,
  'card.read': everyone,
  'plate.read': everyone,
  'machine.read': everyone,
  'grade.read': everyone,
  'report.write': everyone,
  /** Ask the engineers for a strategy that is missing. */
  'request.write': everyone,
  'plate.write': programmersUp,
  'part.read': programmersUp,
  'part.write': programmersUp,
  'layout.read': programmersUp,
  'layout.write': programmersUp,
  'cornerPlan.write': programmersUp,
  /** Take a plan’s cut path away as a file, and read what the machine’s blocks begin and end with. */
  'cutPath.take': programmersUp,
  /** Operators read approved strategies on the plate card, never drafts. */
  'strategy.read': programmersUp,
  'strategy.write': engineersUp,
  'machine.write': engineersUp,
  'nozzle.write': engineersUp,
  'grade.write': engineersUp,
  'report.read': engineersUp,
  'request.read': engineersUp,
  'review.read': engineersUp,
  /** Approve, return or withdraw; see `can` for the grant and for one's own work. */
  'review.decide': engineersUp,
  /** House rules: what every pierce of the plant must keep. Whoever reads strategies reads them. */
  'rule.write': leads,
  /** What the plant pays for an hour, oxygen and energy; estimates say it in money. Whoever plans reads it. */
  'rate.read': programmersUp,
  'rate.write': leads,
  'people.manage': leads,
  'record.read': leads,
} as const satisfies Record<string, readonly Role[]>;

export type Action = keyof typeof byRole;
export const actions = Object.keys(byRole) as Action[]; // Object.keys loses the key type

export type Verdict =
  { readonly ok: true } | { readonly ok: false; readonly code: 'not-allowed' | 'own-work'; readonly why: string };

/** May this actor do this to that? With the reason when not. */
export function can(actor: Actor, action: Action, target: Target = {}): Verdict {
  const allowed: readonly Role[] = byRole[action];
  if (!allowed.includes(actor.role)) {
    return {
      ok: false,
      code: 'not-allowed',
      why: `This needs ${orList(allowed)}; you are signed in as ${actor.role}.`,
    };
  }
  if (action === 'review.decide') {
    if (actor.role !== 'lead' && !actor.mayApprove) {
      return { ok: false, code: 'not-allowed', why: 'An engineer decides reviews only with the lead’s grant.' };
    }
    if (target.touchedBy?.includes(actor.userId)) {
      return { ok: false, code: 'own-work', why: 'You wrote part of this revision. A second person must decide.' };
    }
  }
  return { ok: true };
}

/** The same as a plain yes or no, for what a screen offers. */
export const may = (actor: Actor, action: Action, target?: Target): boolean => can(actor, action, target).ok;

function orList(list: readonly Role[]): string {
  const named = list.map((role) => (role === 'operator' || role === 'engineer' ? `an ${role}` : `a ${role}`));
  return named.length < 2 ? (named[0] ?? 'nobody') : `${named.slice(0, -1).join(', ')} or ${named.at(-1)}`;
}
