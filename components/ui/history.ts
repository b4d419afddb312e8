/** A draft with what it was before and, after an undo, what it was then. */
export type History<Draft> = {
  readonly past: readonly Draft[];
  readonly draft: Draft;
  readonly future: readonly Draft[];
  /** The field being edited: what is typed into one field, or nudged again and again, is one step until it is left. */
  readonly open: string | null;
};

/** Steps that can be taken back. */
const mostSteps = 200;

export const historyOf = <Draft>(draft: Draft): History<Draft> => ({ past: [], draft, future: [], open: null });

/** With the draft changed: a step of its own, or one with the last when both are of the same field. */
export function historyNext<Draft>(history: History<Draft>, next: Draft, field: string | null): History<Draft> {
  const { past, draft, open } = history;
  const goesOn = field !== null && field === open;
  return { past: goesOn ? past : [...past, draft].slice(-mostSteps), draft: next, future: [], open: field };
}

/** One step back or forth; the same history where there is none. */
export function historyMoved<Draft>(history: History<Draft>, way: 'undo' | 'redo'): History<Draft> {
  const { past, draft, future } = history;
  if (way === 'undo') {
    const before = past.at(-1);
    return before ? { past: past.slice(0, -1), draft: before, future: [draft, ...future], open: null } : history;
  }
  const [after, ...later] = future;
  return after ? { past: [...past, draft], draft: after, future: later, open: null } : history;
}
