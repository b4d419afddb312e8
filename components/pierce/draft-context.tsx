import { createContext, use, type Dispatch, type ReactNode } from 'react';
import { InlineNumber } from '@/components/ui/inline-number.tsx';
import type { FocusScale } from '@/strategy/machine.ts';
import type { Dimension } from '@/strategy/units/index.ts';
import type { HistoryAction } from './draft-history.ts';
import type { Draft } from './draft.ts';

export type DraftEditing = {
  readonly draft: Draft;
  readonly dispatch: Dispatch<HistoryAction>;
  /** What is not right yet, by field. */
  readonly problems: ReadonlyMap<string, string>;
  readonly readOnly: boolean;
  /** How the chosen machine's dial reads; null until the machine is known. */
  readonly scale: FocusScale | null;
};

const Context = createContext<DraftEditing | null>(null);

export function DraftProvider({ value, children }: { value: DraftEditing; children: ReactNode }) {
  return <Context value={value}>{children}</Context>;
}

export function useDraft(): DraftEditing {
  const editing = use(Context);
  if (!editing) throw new Error('A draft field stands outside a draft.');
  return editing;
}

type DraftNumberProps = {
  /** Its name in the draft's problems. */
  field: string;
  label: string;
  dimension: Dimension;
  value: number;
  onValue: (si: number) => void;
  unit?: string;
  sign?: boolean;
};

/** A number of the draft, edited in place; its range is said beside it when it is left. */
export function DraftNumber({ field, ...rest }: DraftNumberProps) {
  const { draft, dispatch, problems, readOnly } = useDraft();
  return (
    <InlineNumber
      {...rest}
      unread={draft.typed[field]}
      onUnread={(text) => dispatch({ do: 'type', field, text })}
      error={problems.get(field)}
      readOnly={readOnly}
    />
  );
}
