import { useSyncExternalStore } from 'react';
import { wideFrom } from './space.ts';

export type Layout = { readonly wide: boolean; readonly width: number };

/** Until the page has mounted every screen is a phone: the exported page has no width baked in. */
const phoneWidth = 390;

function subscribe(listener: () => void): () => void {
  window.addEventListener('resize', listener);
  return () => window.removeEventListener('resize', listener);
}

/** The window's width, px, and whether there is room for a side rail and panes. */
export function useLayout(): Layout {
  const width = useSyncExternalStore(
    subscribe,
    () => window.innerWidth,
    () => phoneWidth,
  );
  return { wide: width >= wideFrom, width };
}

const never = () => () => undefined;

/** False in the exported page and at the first paint, true after. What depends on the person or device waits for it. */
export const useMounted = (): boolean =>
  useSyncExternalStore(
    never,
    () => true,
    () => false,
  );
