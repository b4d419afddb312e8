import { v7 as newId } from 'uuid';
import type { Transaction } from '../../db/database.ts';
import { verdictBlocks, type HouseRuleVerdict } from '../../shared/house-rules.ts';
import { can, type Actor } from '../../shared/policy.ts';
import { revisionEndpoints, type RevisionState } from '../../shared/strategies.ts';
import { AppError, notFound } from '../errors.ts';
import { houseRulesOf, verdictsOn } from '../house-rules/verdicts.ts';
import { namesOf } from '../people/names.ts';
import { note } from '../record/note.ts';
import type { Mount } from '../route.ts';
import { judged } from './judge.ts';
import { presentRevision } from './present.ts';
import {
  addApproval,
  addReview,
  approvedRevision,
  authorsOf,
  endApproval,
  liveApproval,
  lockRevision,
  moveRevision,
  overlapping,
  saveContent,
  wholeRevisions,
  type RevisionRow,
} from './repository.ts';

export function revisionRoutes({ route }: Mount): void {
  route(revisionEndpoints.get, async ({ tx, params }) => replyWithRevision(tx, params.revisionId));

  route(revisionEndpoints.save, async ({ tx, actor, params, body, unchanged }) => {
    const revision = await locked(tx, params.revisionId);
    unchanged(revision.version);
    mustBe(revision, 'draft', 'Only a draft can be changed. Begin the next draft from it.');
    await saveContent(tx, revision, await judged(tx, body.content), actor.userId);
    await note(tx, actor, 'revision.saved', subject(revision), {
      version: revision.version + 1,
      content: body.content,
    });
    return replyWithRevision(tx, revision.id);
  });

  route(revisionEndpoints.judge, async ({ tx, body }) => ({ body: { items: await verdictsOn(tx, body.content) } }));

  route(revisionEndpoints.submit, async ({ tx, actor, params, body, unchanged }) => {
    const revision = await locked(tx, params.revisionId);
    unchanged(revision.version);
    mustBe(revision, 'draft', 'Only a draft can be handed in.');
    const houseRules = await houseRulesOf(tx, revision);
    mustKeep(houseRules);
    await decide(tx, actor, revision, { state: 'inReview', verdict: 'submitted', words: body.words, houseRules });
    await note(tx, actor, 'revision.submitted', subject(revision), {
      version: revision.version,
      words: body.words,
      houseRules: houseRules.map(({ ruleId, expression, state }) => ({ ruleId, expression, state })),
    });
    return replyWithRevision(tx, revision.id);
  });

  route(revisionEndpoints.approve, async ({ tx, actor, params, body, unchanged }) => {
    const revision = await locked(tx, params.revisionId);
    await mustBeAnothersWork(tx, actor, revision);
    unchanged(revision.version);
    mustBe(revision, 'inReview', 'Only a revision in review can be approved.');
    const others = await overlapping(tx, revision);
    if (others.length > 0) {
      const named = others.map(({ name, min, max }) => `“${name}” (${min / 1000} to below ${max / 1000} mm)`);
      throw new AppError(
        'overlap',
        `Approved already for part of this range: ${named.join(', ')}. Withdraw it or narrow one of the ranges.`,
      );
    }
    const former = await approvedRevision(tx, revision.strategyId);
    const formerApproval = former ? await liveApproval(tx, former.id) : null;
    if (former && formerApproval) {
      await endApproval(tx, formerApproval, 'superseded', actor.userId);
      await decide(tx, actor, former, { state: 'superseded', verdict: 'superseded', words: '' });
    }
    await addApproval(tx, newId(), revision, actor.userId);
    await decide(tx, actor, revision, { state: 'approved', verdict: 'approved', words: body.words });
    if (former) await note(tx, actor, 'revision.superseded', subject(former), { by: revision.id });
    await note(tx, actor, 'revision.approved', subject(revision), { version: revision.version, words: body.words });
    return replyWithRevision(tx, revision.id);
  });

  route(revisionEndpoints.giveBack, async ({ tx, actor, params, body, unchanged }) => {
    const revision = await locked(tx, params.revisionId);
    await mustBeAnothersWork(tx, actor, revision);
    unchanged(revision.version);
    mustBe(revision, 'inReview', 'Only a revision in review can be returned.');
    await decide(tx, actor, revision, { state: 'returned', verdict: 'returned', words: body.words });
    await note(tx, actor, 'revision.returned', subject(revision), { version: revision.version, words: body.words });
    return replyWithRevision(tx, revision.id);
  });

  // Taking a strategy out of use is the safe side: whoever may decide may do it, with their own work too.
  route(revisionEndpoints.withdraw, async ({ tx, actor, params, body, unchanged }) => {
    const revision = await locked(tx, params.revisionId);
    unchanged(revision.version);
    mustBe(revision, 'approved', 'Only an approved revision can be withdrawn.');
    const approval = await liveApproval(tx, revision.id);
    if (approval) await endApproval(tx, approval, 'withdrawn', actor.userId);
    await decide(tx, actor, revision, { state: 'withdrawn', verdict: 'withdrawn', words: body.words });
    await note(tx, actor, 'revision.withdrawn', subject(revision), { version: revision.version, words: body.words });
    return replyWithRevision(tx, revision.id);
  });
}

export async function replyWithRevision(tx: Transaction, id: string) {
  const [whole] = await wholeRevisions(tx, { id });
  if (!whole) throw notFound('There is no such revision');
  const houseRules = await houseRulesOf(tx, whole.revision);
  return { body: presentRevision(whole, await namesOf(tx), houseRules), version: whole.revision.version };
}

const subject = ({ id }: RevisionRow) => ({ kind: 'revision', id }) as const;

async function locked(tx: Transaction, id: string): Promise<RevisionRow> {
  const revision = await lockRevision(tx, id);
  if (!revision) throw notFound('There is no such revision');
  return revision;
}

async function mustBeAnothersWork(tx: Transaction, actor: Actor, revision: RevisionRow): Promise<void> {
  const verdict = can(actor, 'review.decide', { touchedBy: await authorsOf(tx, revision.id) });
  if (!verdict.ok) throw new AppError(verdict.code, verdict.why);
}

const inWords: Record<RevisionState, string> = {
  draft: 'a draft',
  inReview: 'in review',
  returned: 'returned',
  approved: 'approved',
  superseded: 'superseded',
  withdrawn: 'withdrawn',
};

function mustBe(revision: RevisionRow, state: RevisionState, why: string): void {
  if (revision.state !== state) throw new AppError('wrong-state', `It is ${inWords[revision.state]}. ${why}`);
}

/** A rule that blocks must hold: where nothing can be said of it, nobody can say that it does. */
function mustKeep(verdicts: readonly HouseRuleVerdict[]): void {
  const inTheWay = verdicts.filter(verdictBlocks);
  if (inTheWay.length === 0) return;
  const errors = inTheWay.map(({ ruleId, sentence, why }) => ({
    pointer: `/houseRules/${ruleId}`,
    detail: `${sentence} ${why}`,
  }));
  const what = errors.length === 1 ? 'A house rule is not kept:' : `${errors.length} house rules are not kept:`;
  throw new AppError('wrong-state', `${what} ${errors.map(({ detail }) => detail).join(' ')}`, { errors });
}

async function decide(
  tx: Transaction,
  actor: Actor,
  revision: RevisionRow,
  to: {
    state: RevisionState;
    verdict: 'submitted' | 'approved' | 'returned' | 'withdrawn' | 'superseded';
    words: string;
    houseRules?: readonly HouseRuleVerdict[];
  },
): Promise<void> {
  await moveRevision(tx, revision, to.state, actor.userId, to.houseRules);
  await addReview(tx, {
    plantId: actor.plantId,
    id: newId(),
    revisionId: revision.id,
    revisionVersion: revision.version,
    verdict: to.verdict,
    by: actor.userId,
    words: to.words,
  });
}
