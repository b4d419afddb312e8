import type { Transaction } from '../../db/database.ts';
import { strategyEndpoints, type Revision } from '../../shared/strategies.ts';
import { AppError, notFound } from '../errors.ts';
import { houseRulesOf } from '../house-rules/verdicts.ts';
import { namesOf } from '../people/names.ts';
import { note } from '../record/note.ts';
import { judged } from '../revisions/judge.ts';
import { presentRevision } from '../revisions/present.ts';
import { addAuthors, addRevision, authorsOf, findRevision, wholeRevisions } from '../revisions/repository.ts';
import { replyWithRevision } from '../revisions/routes.ts';
import type { Mount } from '../route.ts';
import { presentSummary } from './present.ts';
import {
  addStrategy,
  findStrategy,
  lockStrategy,
  newestNumber,
  openDraft,
  raiseStrategyVersion,
  standing,
  strategyLines,
} from './repository.ts';

export function strategyRoutes({ route }: Mount): void {
  route(strategyEndpoints.list, async ({ tx }) => {
    const lines = await strategyLines(tx);
    const stand = await standing(
      tx,
      lines.map((line) => line.strategyId),
    );
    const names = await namesOf(tx);
    return { body: { items: lines.map((line) => presentSummary(line, stand, names)) } };
  });

  route(strategyEndpoints.get, async ({ tx, params }) => replyWith(tx, params.strategyId));

  route(strategyEndpoints.add, async ({ tx, actor, body }) => {
    const { plantId, userId } = actor;
    const columns = await judged(tx, body.content);
    await addStrategy(tx, { plantId, id: body.id, name: body.name, createdBy: userId });
    await addRevision(tx, {
      ...columns,
      plantId,
      id: body.revisionId,
      strategyId: body.id,
      number: 1,
      changedBy: userId,
    });
    await note(
      tx,
      actor,
      'strategy.added',
      { kind: 'strategy', id: body.id },
      {
        name: body.name,
        revisionId: body.revisionId,
        content: body.content,
      },
    );
    return { ...(await replyWith(tx, body.id)), status: 201 };
  });

  route(strategyEndpoints.draft, async ({ tx, actor, params, body, unchanged }) => {
    const strategy = await lockStrategy(tx, params.strategyId);
    if (!strategy) throw notFound('There is no such strategy');
    unchanged(strategy.version);
    const source = await findRevision(tx, body.fromRevisionId);
    if (source?.strategyId !== strategy.id) throw notFound('The strategy has no such revision');
    const draft = await openDraft(tx, strategy.id);
    if (draft) throw new AppError('wrong-state', `Revision ${draft.number} is still a draft. Go on with that one.`);
    const number = (await newestNumber(tx, strategy.id)) + 1;
    const { plantId, userId } = actor;
    await addRevision(tx, {
      ...(await judged(tx, source.content)),
      plantId,
      id: body.id,
      strategyId: strategy.id,
      number,
      changedBy: userId,
    });
    // What was never approved nobody else has judged yet: its authors stay authors. Approved content starts afresh.
    if (['draft', 'inReview', 'returned'].includes(source.state)) {
      await addAuthors(tx, { plantId, revisionId: body.id, userIds: await authorsOf(tx, source.id) });
    }
    await raiseStrategyVersion(tx, strategy);
    await note(
      tx,
      actor,
      'revision.begun',
      { kind: 'revision', id: body.id },
      {
        strategyId: strategy.id,
        number,
        from: source.id,
      },
    );
    return { ...(await replyWithRevision(tx, body.id)), status: 201 };
  });
}

async function replyWith(tx: Transaction, id: string) {
  const strategy = await findStrategy(tx, id);
  if (!strategy) throw notFound('There is no such strategy');
  const names = await namesOf(tx);
  const revisions: Revision[] = [];
  for (const whole of await wholeRevisions(tx, { strategyId: id })) {
    revisions.push(presentRevision(whole, names, await houseRulesOf(tx, whole.revision)));
  }
  return {
    body: {
      id: strategy.id,
      version: strategy.version,
      name: strategy.name,
      revisions,
    },
    version: strategy.version,
  };
}
