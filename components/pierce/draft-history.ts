import { contentSame, draftOf, draftReduce, type Draft, type DraftAction } from './draft.ts';
import type { StrategyContent } from '@/shared/strategies.ts';

/** A draft with what it was before and, after an undo, what it was then. */
export type DraftHistory = {
  readonly past: readonly Draft[];
  readonly draft: Draft;
  readonly future: readonly Draft[];
  /** The field being edited: what is typed into one field, or nudged at one knot, is one step until it is left. */
  readonly open: string | null;
};

export type HistoryAction = DraftAction | { do: 'undo' } | { do: 'redo' } | { do: 'settle' };

/** Steps that can be taken back. */
const MOST_STEPS = 200;

export const historyOf = (draft: Draft): DraftHistory => ({ past: [], draft, future: [], open: null });

export const historyOfContent = (content: StrategyContent): DraftHistory => historyOf(draftOf(content));

export function historyReduce(history: DraftHistory, action: HistoryAction): DraftHistory {
  const { past, draft, future, open } = history;
  switch (action.do) {
    case 'undo': {
      const before = past.at(-1);
      return before ? { past: past.slice(0, -1), draft: before, future: [draft, ...future], open: null } : history;
    }
    case 'redo': {
      const [after, ...later] = future;
      return after ? { past: [...past, draft], draft: after, future: later, open: null } : history;
    }
    case 'settle':
      return open === null ? history : { ...history, open: null };
    case 'load':
      return historyOfContent(action.content);
    default: {
      const next = draftReduce(draft, action);
      if (next === draft || sameDraft(next, draft)) return history;
      const field = 'field' in action ? (action.field ?? null) : null;
      const goesOn = field !== null && field === open;
      return {
        past: goesOn ? past : [...past, draft].slice(-MOST_STEPS),
        draft: next,
        future: [],
        open: field,
      };
    }
  }
}

const sameDraft = (a: Draft, b: Draft): boolean =>
  contentSame(a.content, b.content) &&
  a.stageKeys.join() === b.stageKeys.join() &&
  JSON.stringify(a.typed) === JSON.stringify(b.typed);
