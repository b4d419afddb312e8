import { historyMoved, historyNext, historyOf, type History } from '@/components/ui/history.ts';
import type { Layout, LayoutForm, PlacementWire } from '@/shared/layouts.ts';
import type { LayoutPart, PlateOutline } from '@/strategy/path/plate/index.ts';

/** A layout as it is being laid out, with the drawings that it needs: none of it is saved yet. */
export type LayoutDraft = {
  readonly form: LayoutForm;
  readonly outline: PlateOutline;
  /** Tag of the plate or name of the remnant's drawing. */
  readonly of: string | null;
  readonly parts: readonly LayoutPart[];
};

export type DraftHistory = History<LayoutDraft>;

export type LayoutAction =
  | { do: 'place'; pieces: readonly PlacementWire[]; part: LayoutPart }
  | { do: 'put'; number: number; change: Partial<Omit<PlacementWire, 'number' | 'partId'>>; field?: string }
  | { do: 'remove'; number: number }
  | { do: 'order'; order: readonly string[] | null }
  | {
      do: 'settings';
      settings: Pick<LayoutForm, 'name' | 'plate' | 'kerfWidth' | 'clearance' | 'edgeMargin'>;
      outline: PlateOutline;
      of: string | null;
    }
  | { do: 'undo' }
  | { do: 'redo' }
  | { do: 'load'; draft: LayoutDraft }
  /** What was sent is saved; what was changed since then stays changed. */
  | { do: 'saved'; sent: LayoutForm; draft: LayoutDraft };

export function layoutReduce(history: DraftHistory, action: LayoutAction): DraftHistory {
  const { draft } = history;
  switch (action.do) {
    case 'undo':
    case 'redo':
      return historyMoved(history, action.do);
    case 'load':
      return historyOf(action.draft);
    case 'saved':
      return draft.form === action.sent ? { ...history, draft: action.draft, open: null } : history;
    default: {
      const next = draftReduce(draft, action);
      if (next === draft) return history;
      const field = action.do === 'put' && action.field !== undefined ? `${action.number} ${action.field}` : null;
      return historyNext(history, next, field);
    }
  }
}

function draftReduce(
  draft: LayoutDraft,
  action: Exclude<LayoutAction, { do: 'undo' | 'redo' | 'load' | 'saved' }>,
): LayoutDraft {
  const { form } = draft;
  switch (action.do) {
    case 'place': {
      const known = draft.parts.some(({ id }) => id === action.part.id);
      return {
        ...draft,
        form: { ...form, placements: [...form.placements, ...action.pieces] },
        parts: known ? draft.parts : [...draft.parts, action.part],
      };
    }
    case 'put': {
      const placements = form.placements.map((one) =>
        one.number === action.number ? { ...one, ...action.change } : one,
      );
      return { ...draft, form: { ...form, placements } };
    }
    case 'remove':
      return {
        ...draft,
        form: { ...form, placements: form.placements.filter(({ number }) => number !== action.number) },
      };
    case 'order':
      return { ...draft, form: { ...form, order: action.order === null ? null : [...action.order] } };
    case 'settings':
      return { ...draft, form: { ...form, ...action.settings }, outline: action.outline, of: action.of };
  }
}

/** What of a layout a person decides. */
export const formOf = (layout: Layout): LayoutForm => ({
  name: layout.name,
  plate: layout.plate,
  kerfWidth: layout.kerfWidth,
  clearance: layout.clearance,
  edgeMargin: layout.edgeMargin,
  placements: layout.placements,
  order: layout.orderBy === 'hand' ? layout.order : null,
});

export const formSame = (a: LayoutForm, b: LayoutForm): boolean => JSON.stringify(a) === JSON.stringify(b);

/** The next free number for a piece: those taken away are used again only when none is left above. */
export function nextNumber(placements: readonly PlacementWire[], most = 9999): number {
  const highest = Math.max(0, ...placements.map(({ number }) => number));
  if (highest < most) return highest + 1;
  const taken = new Set(placements.map(({ number }) => number));
  let free = 1;
  while (taken.has(free)) free++;
  return free;
}

/** A turn within (−π, π], so that turning on and on stays what can be saved. */
export function turnWithin(angle: number): number {
  const turn = 2 * Math.PI;
  const within = angle - turn * Math.ceil(angle / turn - 0.5);
  // rounding of quarter turns
  return Math.abs(within) < 1e-12 ? 0 : within;
}
