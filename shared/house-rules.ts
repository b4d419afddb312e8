import { z } from 'zod';
import { houseRuleTable, type HouseRuleName } from '../strategy/rules/names.ts'; // not the folder's face: that one brings the reader of expressions along
import { idSchema, instantSchema, listOf, personSchema, versionSchema } from './basics.ts';
import { endpoint } from './endpoint.ts';
import { limits } from './limits.ts';

const names = houseRuleTable.map(({ name }) => name) as [HouseRuleName, ...HouseRuleName[]]; // the table is never empty

const expressionSchema = z
  .string()
  .trim()
  .min(1, 'Write the rule, as in reserveHot >= 2.')
  .max(limits.ruleExpression, `At most ${limits.ruleExpression} characters.`);
const sentenceSchema = z
  .string()
  .trim()
  .min(1, 'Say in a sentence what the rule asks for.')
  .max(limits.ruleSentence, `At most ${limits.ruleSentence} characters.`);

/** What a lead writes; whether the expression can be read is the server's to say. */
export const houseRuleTextSchema = z.strictObject({
  expression: expressionSchema,
  sentence: sentenceSchema,
  /** A draft that does not keep it can't be handed in. */
  blocks: z.boolean(),
});

export const houseRuleSchema = z.object({
  id: idSchema,
  version: versionSchema,
  expression: z.string(),
  sentence: z.string(),
  blocks: z.boolean(),
  endedAt: instantSchema.nullable(),
  changedAt: instantSchema,
  /** Null for what the plant was founded with. */
  changedBy: personSchema.nullable(),
});
export type HouseRule = z.infer<typeof houseRuleSchema>;

/**
 * What a rule says of a revision. `unclear` when it can't be said, as of the reserve of a pierce that is never through; a rule that
 * blocks must hold, so it blocks then too.
 */
export const houseRuleVerdictSchema = z.object({
  ruleId: idSchema,
  expression: z.string(),
  sentence: z.string(),
  blocks: z.boolean(),
  state: z.enum(['holds', 'broken', 'unclear']),
  /** The values it was judged by, or why it can't be. */
  why: z.string(),
});
export type HouseRuleVerdict = z.infer<typeof houseRuleVerdictSchema>;

/** Whether a verdict keeps a draft from being handed in. */
export const verdictBlocks = ({ blocks, state }: Pick<HouseRuleVerdict, 'blocks' | 'state'>): boolean =>
  blocks && state !== 'holds';

/** Named results of one revision, for whoever writes a rule to see what it would meet. */
export const houseRuleExampleSchema = z.object({
  revisionId: idSchema,
  strategyName: z.string(),
  number: z.number().int(),
  /** SI; null where there is none. */
  results: z.array(z.object({ name: z.enum(names), value: z.number().nullable() })),
});
export type HouseRuleExample = z.infer<typeof houseRuleExampleSchema>;

export const houseRuleReadingSchema = z.discriminatedUnion('kind', [
  z.object({
    kind: z.literal('ok'),
    uses: z.array(z.enum(names)),
    /** What it would say of the example; null while the plant has no revision. */
    example: houseRuleVerdictSchema.pick({ state: true, why: true }).nullable(),
  }),
  z.object({ kind: z.literal('none'), why: z.string() }),
]);
export type HouseRuleReading = z.infer<typeof houseRuleReadingSchema>;

const ruleParams = z.object({ ruleId: idSchema });

export const houseRuleEndpoints = {
  list: endpoint({
    method: 'GET',
    path: '/api/house-rules',
    summary: 'What this plant asks of every pierce; ended rules last',
    access: 'strategy.read',
    answer: listOf(houseRuleSchema),
  }),
  example: endpoint({
    method: 'GET',
    path: '/api/house-rules/example',
    summary: 'The named results of the revision changed last',
    access: 'rule.write',
    answer: z.object({ example: houseRuleExampleSchema.nullable() }),
  }),
  read: endpoint({
    method: 'POST',
    path: '/api/house-rules/read',
    summary: 'Whether an expression is a rule, which results it uses, and what it says of the example',
    access: 'rule.write',
    // Of any length: what is too long is told as any other reason.
    body: z.strictObject({ expression: z.string() }),
    answer: houseRuleReadingSchema,
    idempotencyKey: false, // it changes nothing
  }),
  add: endpoint({
    method: 'POST',
    path: '/api/house-rules',
    summary: 'Add a rule',
    access: 'rule.write',
    body: houseRuleTextSchema.extend({ id: idSchema }),
    answer: houseRuleSchema,
  }),
  change: endpoint({
    method: 'PUT',
    path: '/api/house-rules/:ruleId',
    summary: 'Rewrite a rule as its next version; what it said of revisions handed in stays',
    access: 'rule.write',
    params: ruleParams,
    body: houseRuleTextSchema,
    answer: houseRuleSchema,
    ifMatch: true,
  }),
  end: endpoint({
    method: 'POST',
    path: '/api/house-rules/:ruleId/end',
    summary: 'End a rule: from now on it is asked of no pierce',
    access: 'rule.write',
    params: ruleParams,
    answer: houseRuleSchema,
    ifMatch: true,
  }),
};
