import { desc, eq } from 'drizzle-orm';
import type { Transaction } from '../../db/database.ts';
import { strategies } from '../../db/schema/strategies.ts';
import { strategyRevisions } from '../../db/schema/strategy-revisions.ts';
import type { Person } from '../../shared/basics.ts';
import { houseRuleEndpoints, type HouseRule } from '../../shared/house-rules.ts';
import { limits } from '../../shared/limits.ts';
import { houseRuleRead, houseRuleTable } from '../../strategy/rules/index.ts';
import { AppError, notFound } from '../errors.ts';
import { namesOf } from '../people/names.ts';
import { note } from '../record/note.ts';
import type { Mount } from '../route.ts';
import { addRule, allRules, endRule, lockRule, rewriteRule, rulesInForce, type HouseRuleRow } from './repository.ts';
import { judgement, namedResults } from './verdicts.ts';

export function houseRuleRoutes({ route }: Mount): void {
  route(houseRuleEndpoints.list, async ({ tx }) => {
    const names = await namesOf(tx);
    return { body: { items: (await allRules(tx)).map((rule) => present(rule, names)) } };
  });

  route(houseRuleEndpoints.example, async ({ tx }) => {
    const example = await exampleOf(tx);
    // A pierce that the model can't follow shows nothing.
    if (example?.named.kind !== 'ok') return { body: { example: null } };
    const { id, number, strategyName, named } = example;
    const results = houseRuleTable.map(({ name }) => ({ name, value: named.results[name] }));
    return { body: { example: { revisionId: id, strategyName, number, results } } };
  });

  route(houseRuleEndpoints.read, async ({ tx, body: { expression } }) => {
    const read = houseRuleRead(expression);
    if (read.kind === 'none') return { body: read };
    const example = await exampleOf(tx);
    const said = example ? judgement(expression, example.named) : null;
    return { body: { kind: 'ok' as const, uses: [...read.uses], example: said } };
  });

  route(houseRuleEndpoints.add, async ({ tx, actor, body }) => {
    mustBeRule(body.expression);
    if ((await rulesInForce(tx)).length >= limits.rules) {
      throw new AppError('wrong-state', `A plant keeps at most ${limits.rules} rules in force. End one first.`);
    }
    const { plantId, userId } = actor;
    const rule = await addRule(tx, { ...body, plantId, changedBy: userId });
    await note(tx, actor, 'houseRule.added', subject(rule), written(rule));
    return { ...(await replyWith(tx, rule)), status: 201 };
  });

  route(houseRuleEndpoints.change, async ({ tx, actor, params, body, unchanged }) => {
    const before = await inForce(tx, params.ruleId, unchanged);
    mustBeRule(body.expression);
    const rule = await rewriteRule(tx, before, body, actor.userId);
    await note(tx, actor, 'houseRule.changed', subject(rule), {
      version: rule.version,
      from: written(before),
      to: written(rule),
    });
    return replyWith(tx, rule);
  });

  route(houseRuleEndpoints.end, async ({ tx, actor, params, unchanged }) => {
    const rule = await endRule(tx, await inForce(tx, params.ruleId, unchanged), actor.userId);
    await note(tx, actor, 'houseRule.ended', subject(rule), written(rule));
    return replyWith(tx, rule);
  });
}

const subject = ({ id }: HouseRuleRow) => ({ kind: 'houseRule', id }) as const;
const written = ({ expression, sentence, blocks }: HouseRuleRow) => ({ expression, sentence, blocks });

const present = (rule: HouseRuleRow, names: (userId: string) => Person): HouseRule => ({
  id: rule.id,
  version: rule.version,
  expression: rule.expression,
  sentence: rule.sentence,
  blocks: rule.blocks,
  endedAt: rule.endedAt?.toISOString() ?? null,
  changedAt: rule.changedAt.toISOString(),
  changedBy: rule.changedBy === null ? null : names(rule.changedBy),
});

async function replyWith(tx: Transaction, rule: HouseRuleRow) {
  return { body: present(rule, await namesOf(tx)), version: rule.version };
}

async function inForce(tx: Transaction, id: string, unchanged: (version: number) => void): Promise<HouseRuleRow> {
  const rule = await lockRule(tx, id);
  if (!rule) throw notFound('There is no such rule');
  unchanged(rule.version);
  if (rule.endedAt !== null) throw new AppError('wrong-state', 'The rule has ended. Add it anew to ask for it again.');
  return rule;
}

function mustBeRule(expression: string): void {
  const read = houseRuleRead(expression);
  if (read.kind === 'ok') return;
  throw new AppError('invalid-fields', read.why, { errors: [{ pointer: '/expression', detail: read.why }] });
}

/** The revision changed last, to try a rule on. */
async function exampleOf(tx: Transaction) {
  const [row] = await tx
    .select({
      id: strategyRevisions.id,
      number: strategyRevisions.number,
      content: strategyRevisions.content,
      strategyName: strategies.name,
    })
    .from(strategyRevisions)
    .innerJoin(strategies, eq(strategies.id, strategyRevisions.strategyId))
    .orderBy(desc(strategyRevisions.changedAt), desc(strategyRevisions.id))
    .limit(1);
  return row ? { ...row, named: await namedResults(tx, row.content) } : null;
}
