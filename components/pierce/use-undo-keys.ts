import { useEffect, type Dispatch } from 'react';

/**
 * Ctrl or Cmd with Z takes a step back, with Shift as well (or Y) it does it again; free texts and dialogs keep their own, and whatever
 * else `keep` selects.
 */
export function useUndoKeys(
  enabled: boolean,
  dispatch: Dispatch<{ do: 'undo' } | { do: 'redo' }>,
  keep = 'textarea, dialog',
): void {
  useEffect(() => {
    if (!enabled) return undefined;
    const pressed = (event: KeyboardEvent) => {
      if (!(event.ctrlKey || event.metaKey) || event.altKey) return;
      const key = event.key.toLowerCase();
      if (key !== 'z' && !(key === 'y' && !event.shiftKey)) return;
      if (event.target instanceof Element && event.target.closest(keep)) return;
      event.preventDefault();
      dispatch({ do: key === 'y' || event.shiftKey ? 'redo' : 'undo' });
    };
    // on the way down: a text input of react-native-web keeps its keys to itself on the way up
    window.addEventListener('keydown', pressed, true);
    return () => window.removeEventListener('keydown', pressed, true);
  }, [enabled, dispatch, keep]);
}
