import { strategyContentSchema, type StrategyContent } from '@/shared/strategies.ts';
import { stageQuantitiesAt, type Stage, type StageQuantities } from '@/strategy/pierce/index.ts';

/**
 * A strategy being edited. `content` holds every number that could be read, in range or not; `typed` the texts that are no number yet,
 * by field, so that nothing typed is ever lost. Stages carry keys of their own, so a text follows its stage when stages move.
 */
export type Draft = {
  readonly content: StrategyContent;
  readonly stageKeys: readonly string[];
  readonly typed: Readonly<Record<string, string>>;
  readonly nextKey: number;
};

export type DraftAction =
  | { do: 'load'; content: StrategyContent }
  | { do: 'change'; change: (content: StrategyContent) => StrategyContent; field?: string }
  | { do: 'type'; field: string; text: string }
  | { do: 'stage'; index: number; change: (stage: Stage) => Stage; field?: string }
  | { do: 'ramp'; index: number; quantity: RampQuantity; end: 'from' | 'to' | 'both'; value: number; field?: string }
  | { do: 'add'; at: number }
  | { do: 'duplicate'; index: number }
  | { do: 'split'; index: number }
  | { do: 'remove'; index: number }
  | { do: 'move'; index: number; by: -1 | 1 }
  /** All stages at once: a knot moved, a proposal taken. */
  | { do: 'stages'; change: (stages: readonly Stage[]) => readonly Stage[]; field?: string };

/** Any of a stage's quantities. */
export type RampQuantity = keyof StageQuantities;

export function draftOf(content: StrategyContent): Draft {
  return {
    content,
    stageKeys: content.stages.map((_, index) => `s${index}`),
    typed: {},
    nextKey: content.stages.length,
  };
}

export function draftReduce(draft: Draft, action: DraftAction): Draft {
  switch (action.do) {
    case 'load':
      return draftOf(action.content);
    case 'change':
      return { ...draft, content: action.change(draft.content), typed: without(draft.typed, action.field) };
    case 'type':
      return { ...draft, typed: { ...draft.typed, [action.field]: action.text } };
    case 'stage':
      return {
        ...withStages(draft, (stages) => stages.map((stage, i) => (i === action.index ? action.change(stage) : stage))),
        typed: without(draft.typed, action.field),
      };
    case 'ramp':
      return {
        ...withStages(draft, (stages) => rampChange(stages, action)),
        typed: without(draft.typed, action.field),
      };
    case 'add': {
      // the new stage holds what the one before it ends with
      const before = draft.content.stages[action.at - 1];
      return before ? withStageAt(draft, action.at, { ...before, from: before.to }) : draft;
    }
    case 'duplicate': {
      const same = draft.content.stages[action.index];
      return same ? withStageAt(draft, action.index + 1, same) : draft;
    }
    case 'split': {
      // both halves lie on the lines of the whole
      const whole = draft.content.stages[action.index];
      if (!whole) return draft;
      const middle = stageQuantitiesAt(whole, 0.5);
      const half = whole.duration / 2;
      const second = withStageAt(draft, action.index + 1, { duration: half, from: middle, to: whole.to });
      return withStages(second, (stages) =>
        stages.map((stage, i) => (i === action.index ? { duration: half, from: whole.from, to: middle } : stage)),
      );
    }
    case 'remove': {
      if (draft.content.stages.length < 2) return draft;
      const key = draft.stageKeys[action.index];
      return {
        ...withStages(draft, (stages) => stages.filter((_, i) => i !== action.index)),
        stageKeys: draft.stageKeys.filter((_, i) => i !== action.index),
        typed: Object.fromEntries(Object.entries(draft.typed).filter(([field]) => !field.startsWith(`${key}.`))),
      };
    }
    case 'move': {
      const to = action.index + action.by;
      if (to < 0 || to >= draft.content.stages.length) return draft;
      return {
        ...withStages(draft, (stages) => swapped(stages, action.index, to)),
        stageKeys: swapped(draft.stageKeys, action.index, to),
      };
    }
    case 'stages': {
      const stages = action.change(draft.content.stages).map(({ duration, from, to }) => ({
        duration,
        from: { ...from },
        to: { ...to },
      }));
      const kept = stages.length === draft.stageKeys.length;
      const typed = Object.entries(draft.typed).filter(
        ([field]) => !draft.stageKeys.some((key) => field.startsWith(`${key}.`)),
      );
      return {
        content: { ...draft.content, stages },
        stageKeys: kept ? draft.stageKeys : stages.map((_, index) => `s${draft.nextKey + index}`),
        typed: Object.fromEntries(typed),
        nextKey: kept ? draft.nextKey : draft.nextKey + stages.length,
      };
    }
  }
}

/** Changing where a ramp ends takes the next stage's beginning along while the two were one: a knot, not a step. */
function rampChange(
  stages: readonly Stage[],
  { index, quantity, end, value }: Extract<DraftAction, { do: 'ramp' }>,
): Stage[] {
  const before = stages[index];
  return stages.map((stage, i) => {
    if (i === index) {
      return {
        ...stage,
        from: end === 'to' ? stage.from : { ...stage.from, [quantity]: value },
        to: end === 'from' ? stage.to : { ...stage.to, [quantity]: value },
      };
    }
    if (i === index + 1 && end !== 'from' && before && stage.from[quantity] === before.to[quantity]) {
      return { ...stage, from: { ...stage.from, [quantity]: value } };
    }
    return stage;
  });
}

/** Pulsed at a frequency throughout, or continuous throughout, and then duty is one. */
export const stagePulsed = (stage: Stage, frequency: number | null): Stage => ({
  ...stage,
  from: { ...stage.from, pulseFrequency: frequency, duty: frequency === null ? 1 : stage.from.duty },
  to: { ...stage.to, pulseFrequency: frequency, duty: frequency === null ? 1 : stage.to.duty },
});

/** What is not right yet, by field: `<stage key>.from.standoff` for a stage, the schema's own path for everything else. */
export function draftProblems(draft: Draft): ReadonlyMap<string, string> {
  const problems = new Map<string, string>();
  const read = strategyContentSchema.safeParse(draft.content);
  for (const issue of read.success ? [] : read.error.issues) {
    const field = fieldOfPath(issue.path, draft.stageKeys);
    if (!problems.has(field)) problems.set(field, issue.message);
  }
  for (const field of Object.keys(draft.typed)) problems.set(field, rangeOf(draft, field));
  return problems;
}

/** The range of a field in the schema's own words, asked with something that is no number. */
function rangeOf(draft: Draft, field: string): string {
  const asked = contentWithout(draft, field);
  const read = strategyContentSchema.safeParse(asked);
  const issue = read.success
    ? undefined
    : read.error.issues.find((one) => fieldOfPath(one.path, draft.stageKeys) === field);
  return issue?.message ?? 'Give a number.';
}

function contentWithout(draft: Draft, field: string): unknown {
  const path = pathOfField(field, draft.stageKeys);
  const blank = (value: unknown, [head, ...rest]: readonly PropertyKey[]): unknown => {
    if (head === undefined) return 'no number';
    if (Array.isArray(value)) return value.map((one: unknown, i) => (i === head ? blank(one, rest) : one));
    if (typeof value !== 'object' || value === null) return value;
    return Object.fromEntries(
      Object.entries(value).map(([name, one]) => [name, name === head ? blank(one, rest) : one]),
    );
  };
  return blank(draft.content, path);
}

function fieldOfPath(path: readonly PropertyKey[], stageKeys: readonly string[]): string {
  const [head, index, ...rest] = path;
  if (head === 'stages' && typeof index === 'number') return [stageKeys[index] ?? index, ...rest].map(String).join('.');
  return path.map(String).join('.');
}

function pathOfField(field: string, stageKeys: readonly string[]): PropertyKey[] {
  const [head = '', ...rest] = field.split('.');
  const index = stageKeys.indexOf(head);
  return index < 0 ? [head, ...rest] : ['stages', index, ...rest];
}

/** The same numbers? Content is plain data in a fixed order. */
export const contentSame = (a: StrategyContent, b: StrategyContent): boolean =>
  a === b || JSON.stringify(ordered(a)) === JSON.stringify(ordered(b));

function ordered(value: unknown): unknown {
  if (Array.isArray(value)) return value.map(ordered);
  if (typeof value !== 'object' || value === null) return value;
  return Object.fromEntries(
    Object.entries(value)
      .sort(([a], [b]) => (a < b ? -1 : 1))
      .map(([name, one]) => [name, ordered(one)]),
  );
}

function withStages(draft: Draft, change: (stages: readonly Stage[]) => Stage[]): Draft {
  return { ...draft, content: { ...draft.content, stages: change(draft.content.stages) } };
}

function withStageAt(draft: Draft, at: number, stage: Stage): Draft {
  return {
    ...withStages(draft, (stages) => [...stages.slice(0, at), stage, ...stages.slice(at)]),
    stageKeys: [...draft.stageKeys.slice(0, at), `s${draft.nextKey}`, ...draft.stageKeys.slice(at)],
    nextKey: draft.nextKey + 1,
  };
}

function swapped<T>(list: readonly T[], a: number, b: number): T[] {
  return list.map((one, i) => (i === a ? (list[b] ?? one) : i === b ? (list[a] ?? one) : one));
}

function without(typed: Draft['typed'], field: string | undefined): Draft['typed'] {
  if (field === undefined || !(field in typed)) return typed;
  return Object.fromEntries(Object.entries(typed).filter(([name]) => name !== field));
}
