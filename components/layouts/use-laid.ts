import { useDeferredValue, useMemo } from 'react';
import {
  cutOrder,
  cutOrderKept,
  layoutJudged,
  partsPlaced,
  type LayoutJudgement,
  type PlacedPart,
} from '@/strategy/path/plate/index.ts';
import type { LayoutDraft } from './layout-draft.ts';

export type Laid = {
  readonly lies: readonly PlacedPart[];
  /** The order that is cut now: what is moved or saved is moved or saved in this one. */
  readonly order: readonly string[];
  /** What follows from it, on a large layout a moment later. */
  readonly judgement: LayoutJudgement;
};

/** The pieces of a draft as they lie, their order, and what is in the way. */
export function useLaid({ form, outline, parts }: LayoutDraft): Laid {
  const { kerfWidth, clearance, edgeMargin, order: byHand, placements } = form;
  const lies = useMemo(() => partsPlaced(parts, placements), [parts, placements]);
  const order = useMemo(() => (byHand === null ? cutOrder(lies) : cutOrderKept(lies, byHand)), [lies, byHand]);
  const asked = useDeferredValue(
    useMemo(
      () => ({ parts: lies, outline, room: { kerfWidth, clearance, edgeMargin }, order }),
      [lies, outline, kerfWidth, clearance, edgeMargin, order],
    ),
  );
  const judgement = useMemo(() => layoutJudged(asked), [asked]);
  return { lies, order, judgement };
}
