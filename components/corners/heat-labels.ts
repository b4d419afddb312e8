import { useSyncExternalStore } from 'react';
import type { DrawnSheet } from '@/components/parts/drawing-space.ts';

/** A line's figure: at which temperature, K, and where on the drawn sheet, px. */
export type PlacedLabel = { readonly kelvin: number; readonly x: number; readonly y: number };

/** The figures of a picture, and the sheet they were placed on; none while the time runs. */
export type PlacedLabels = { readonly of: DrawnSheet; readonly at: readonly PlacedLabel[] } | null;

/** Hands the figures from the picture, which lies under the drawing's lines, to the layer above them; beside React's state. */
export type HeatLabels = {
  readonly labels: () => PlacedLabels;
  readonly set: (labels: PlacedLabels) => void;
  readonly subscribe: (listener: () => void) => () => void;
};

export function createHeatLabels(): HeatLabels {
  let now: PlacedLabels = null;
  const listeners = new Set<() => void>();
  return {
    labels: () => now,
    set: (labels) => {
      if (labels === now) return;
      now = labels;
      for (const listener of listeners) listener();
    },
    subscribe: (listener) => {
      listeners.add(listener);
      return () => listeners.delete(listener);
    },
  };
}

export const useHeatLabels = (labels: HeatLabels): PlacedLabels =>
  useSyncExternalStore(labels.subscribe, labels.labels, () => null);
