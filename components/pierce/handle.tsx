import { useRef, type KeyboardEvent, type RefCallback } from 'react';
import { StyleSheet, View, type PointerEvent } from 'react-native';
import { webStyle } from '@/components/theme/web-style.ts';
import type { KnotEditing } from './knot-editing.ts';
import type { Place } from './knot-places.ts';
import { clamped, snapped, stepped, type Range, type Steps } from './knots.ts';

type HandleProps = {
  editing: KnotEditing;
  place: Place;
  axis: 'x' | 'y';
  label: string;
  valueText: string;
  value: number;
  /** SI for a pixel to the right or up. */
  perPixel: number;
  range: Range;
  steps: Steps;
  tabbable: boolean;
  onNeighbour?: (by: 1 | -1) => void;
  /** What takes the keys. */
  ref?: RefCallback<View>;
};

type Drag = { pointer: number; at: number; value: number; perPixel: number; last: number };

/** One number taken hold of: by pointer and touch along its axis, by keys in steps. What is seen of it is drawn below. */
export function Handle(props: HandleProps) {
  const { editing, place, axis, label, valueText, value, perPixel, range, steps, tabbable, onNeighbour, ref } = props;
  const { target, zone, mark } = place;
  const drag = useRef<Drag | null>(null);
  const slider = useRef<View>(null);

  const down = (event: PointerEvent) => {
    const { button, pointerId, clientX, clientY } = event.nativeEvent;
    if (button !== 0 || drag.current) return;
    event.preventDefault(); // no text is selected, and the focus is set here
    elementOf(event.currentTarget)?.setPointerCapture(pointerId);
    elementOf(slider.current)?.focus({ preventScroll: true });
    editing.onTarget(target);
    drag.current = { pointer: pointerId, at: axis === 'x' ? clientX : clientY, value, perPixel, last: value };
  };
  const move = ({ nativeEvent: { pointerId, clientX, clientY } }: PointerEvent) => {
    const held = drag.current;
    if (held?.pointer !== pointerId) return;
    const pixels = axis === 'x' ? clientX - held.at : held.at - clientY;
    // a tremble is no drag
    const next =
      Math.abs(pixels) < 2 && held.last === held.value
        ? held.value
        : clamped(snapped(held.value + pixels * held.perPixel, steps.snap), range);
    if (next === held.last || !Number.isFinite(next)) return;
    held.last = next;
    editing.onPreview({ target, value: next });
  };
  const up = ({ nativeEvent: { pointerId } }: PointerEvent) => {
    const held = drag.current;
    if (held?.pointer !== pointerId) return;
    drag.current = null;
    if (held.last !== held.value) editing.onCommit(target, held.last);
    editing.onPreview(null);
    editing.onSettle();
  };
  const cancel = () => {
    drag.current = null;
    editing.onPreview(null);
  };
  const key = (event: KeyboardEvent) => {
    if (event.ctrlKey || event.metaKey || event.altKey) return;
    if (event.key === 'Escape' && drag.current) return cancel();
    const neighbour = onNeighbour && (event.key === 'ArrowLeft' ? -1 : event.key === 'ArrowRight' ? 1 : null);
    if (onNeighbour && neighbour) {
      event.preventDefault();
      onNeighbour(neighbour);
      return;
    }
    const next = keyed(event.key, event.shiftKey, value, range, steps);
    if (next === null) return;
    event.preventDefault();
    if (next !== value) editing.onCommit(target, next);
  };

  return (
    <View
      onPointerDown={down}
      onPointerMove={move}
      onPointerUp={up}
      onPointerCancel={cancel}
      style={[
        styles.zone,
        axis === 'x' ? styles.sideways : styles.upright,
        { left: zone.x, top: zone.y, width: zone.width, height: zone.height },
      ]}
    >
      {/* as large as the mark alone, so that the ring of the focus stays close to it and off the lane's name */}
      <View
        ref={(view) => {
          slider.current = view;
          ref?.(view);
        }}
        role="slider"
        tabIndex={tabbable ? 0 : -1}
        aria-label={label}
        aria-orientation={axis === 'x' ? 'horizontal' : 'vertical'}
        aria-valuemin={range.min}
        aria-valuemax={range.max}
        aria-valuenow={value}
        aria-valuetext={valueText}
        onFocus={() => editing.onTarget(target)}
        onBlur={editing.onSettle}
        onKeyDown={key}
        onKeyUp={editing.onSettle}
        style={[styles.slider, { left: mark.x - zone.x, top: mark.y - zone.y, width: mark.width, height: mark.height }]}
      />
    </View>
  );
}

/** On the web a view's host is the page's own element. */
const elementOf = (host: unknown): HTMLElement | null => (host instanceof HTMLElement ? host : null);

/** What a key makes of a number; null for a key that means nothing here. */
function keyed(key: string, shift: boolean, value: number, range: Range, steps: Steps): number | null {
  const by = (direction: 1 | -1, step: number) => clamped(stepped(value, direction, step), range);
  switch (key) {
    case 'ArrowUp':
    case 'ArrowRight':
      return by(1, shift ? steps.coarse : steps.fine);
    case 'ArrowDown':
    case 'ArrowLeft':
      return by(-1, shift ? steps.coarse : steps.fine);
    // on many keyboards plus itself is typed with Shift
    case '+':
    case '=':
      return by(1, steps.fine);
    case '-':
    case '−':
      return by(-1, steps.fine);
    case '_':
      return by(-1, steps.coarse);
    case 'PageUp':
      return by(1, steps.coarse);
    case 'PageDown':
      return by(-1, steps.coarse);
    case 'Home':
      return range.min;
    case 'End':
      return range.max;
    default:
      return null;
  }
}

const styles = StyleSheet.create({
  // the page scrolls under all the rest of the drawing
  zone: { position: 'absolute', ...webStyle({ touchAction: 'none' }) },
  sideways: webStyle({ cursor: 'ew-resize' }),
  upright: webStyle({ cursor: 'ns-resize' }),
  // what is touched is the zone alone
  slider: { position: 'absolute', pointerEvents: 'none' },
});
