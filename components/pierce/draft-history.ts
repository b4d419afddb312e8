import { contentSame, draftOf, draftReduce, type Draft, type DraftAction } from './draft.ts';
import { historyMoved, historyNext, historyOf, type History } from '@/components/ui/history.ts';
import type { StrategyContent } from '@/shared/strategies.ts';

export type DraftHistory = History<Draft>;

export type HistoryAction = DraftAction | { do: 'undo' } | { do: 'redo' } | { do: 'settle' };

export const historyOfContent = (content: StrategyContent): DraftHistory => historyOf(draftOf(content));

export function historyReduce(history: DraftHistory, action: HistoryAction): DraftHistory {
  const { draft, open } = history;
  switch (action.do) {
    case 'undo':
    case 'redo':
      return historyMoved(history, action.do);
    case 'settle':
      return open === null ? history : { ...history, open: null };
    case 'load':
      return historyOfContent(action.content);
    default: {
      const next = draftReduce(draft, action);
      if (next === draft || sameDraft(next, draft)) return history;
      return historyNext(history, next, 'field' in action ? (action.field ?? null) : null);
    }
  }
}

const sameDraft = (a: Draft, b: Draft): boolean =>
  contentSame(a.content, b.content) &&
  a.stageKeys.join() === b.stageKeys.join() &&
  JSON.stringify(a.typed) === JSON.stringify(b.typed);
