import { describe, expect, test } from 'vitest';
import { endpoints } from '../../shared/api.ts';
import { actions, can, roles, type Action, type Actor, type Role } from '../../shared/policy.ts';

const actor = (role: Role, mayApprove = false): Actor => ({ userId: 'me', plantId: 'here', role, mayApprove });

/** What each role gets beside what those before it may: the plant's table of roles, written a second time on purpose. */
const added: Readonly<Record<Role, readonly Action[]>> = {
  operator: ['session.use', 'card.read', 'plate.read', 'machine.read', 'grade.read', 'report.write', 'request.write'],
  programmer: [
    'plate.write',
    'part.read',
    'part.write',
    'layout.read',
    'layout.write',
    'cornerPlan.write',
    'cutPath.take',
    'strategy.read',
    'rate.read',
  ],
  engineer: [
    'strategy.write',
    'machine.write',
    'nozzle.write',
    'grade.write',
    'report.read',
    'request.read',
    'review.read',
  ],
  lead: ['review.decide', 'rule.write', 'rate.write', 'people.manage', 'record.read'],
};

describe('a role', () => {
  test.each(roles.map((role, index) => ({ role, allowed: roles.slice(0, index + 1).flatMap((one) => added[one]) })))(
    '$role may do what its job needs, and nothing else',
    ({ role, allowed }) => {
      expect(actions.filter((action) => can(actor(role), action).ok).sort()).toEqual([...allowed].sort());
    },
  );

  test('is asked for nothing that no route does', () => {
    const opened = new Set(Object.values(endpoints).map(({ access }) => access));
    expect(actions.filter((action) => !opened.has(action))).toEqual([]);
  });

  test('that may not says what it would take', () => {
    expect(can(actor('operator'), 'strategy.write')).toEqual({
      ok: false,
      code: 'not-allowed',
      why: 'This needs an engineer or a lead; you are signed in as operator.',
    });
  });
});

describe('deciding on a revision', () => {
  test('is the lead’s, and an engineer’s only with the lead’s grant', () => {
    expect(can(actor('lead'), 'review.decide').ok).toBe(true);
    expect(can(actor('engineer', true), 'review.decide').ok).toBe(true);
    expect(can(actor('engineer'), 'review.decide')).toMatchObject({ ok: false, code: 'not-allowed' });
    // A grant makes nobody an engineer.
    expect(can(actor('programmer', true), 'review.decide')).toMatchObject({ ok: false, code: 'not-allowed' });
  });

  test('is nobody’s who wrote any of it, the lead’s neither', () => {
    for (const one of [actor('lead'), actor('engineer', true)]) {
      expect(can(one, 'review.decide', { touchedBy: ['somebody', 'me'] })).toMatchObject({
        ok: false,
        code: 'own-work',
      });
      expect(can(one, 'review.decide', { touchedBy: ['somebody'] }).ok).toBe(true);
    }
  });
});
