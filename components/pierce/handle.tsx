import { memo, useRef, type KeyboardEvent } from 'react';
import { StyleSheet, View, type PointerEvent } from 'react-native';
import { webStyle } from '@/components/theme/web-style.ts';
import type { KnotEditing } from './knot-editing.ts';
import type { Area, Place } from './knot-places.ts';
import { clamped, snapped, stepped, targetSame, type Range, type Steps } from './knots.ts';

type HandleProps = {
  editing: KnotEditing;
  place: Place;
  /** Along x the other keys change the number too; along y left and right lead to the neighbours. */
  axis: 'x' | 'y';
  label: string;
  valueText: string;
  value: number;
  /** SI for a pixel to the right or up. */
  perPixel: number;
  range: Range;
  steps: Steps;
  tabbable: boolean;
};

type Drag = { pointer: number; at: number; value: number; perPixel: number; last: number };

/** One number taken hold of: by pointer and touch along its axis, by keys in steps. What is seen of it is drawn below. */
export const Handle = memo(function Handle(props: HandleProps) {
  const { editing, place, axis, label, valueText, value, perPixel, range, steps, tabbable } = props;
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
  const key = (event: KeyboardEvent<HTMLElement>) => {
    if (event.ctrlKey || event.metaKey || event.altKey) return;
    if (event.key === 'Escape' && drag.current) return cancel();
    if (axis === 'y' && (event.key === 'ArrowLeft' || event.key === 'ArrowRight')) {
      event.preventDefault();
      neighbourOf(event.currentTarget, event.key === 'ArrowLeft' ? -1 : 1)?.focus();
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
        ref={slider}
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
}, handleSame);

/** While one is dragged most of the others stay as they are: these are not drawn again. */
function handleSame(a: HandleProps, b: HandleProps): boolean {
  return (
    a.editing === b.editing &&
    a.value === b.value &&
    a.valueText === b.valueText &&
    a.label === b.label &&
    a.perPixel === b.perPixel &&
    a.tabbable === b.tabbable &&
    a.axis === b.axis &&
    a.range.min === b.range.min &&
    a.range.max === b.range.max &&
    a.steps.fine === b.steps.fine &&
    a.steps.coarse === b.steps.coarse &&
    a.steps.snap === b.steps.snap &&
    targetSame(a.place.target, b.place.target) &&
    areaSame(a.place.mark, b.place.mark) &&
    areaSame(a.place.zone, b.place.zone)
  );
}

const areaSame = (a: Area, b: Area) => a.x === b.x && a.y === b.y && a.width === b.width && a.height === b.height;

/** The slider before or after this one in its group. */
function neighbourOf(slider: HTMLElement, by: 1 | -1): HTMLElement | undefined {
  const all = Array.from(slider.closest('[role=group]')?.querySelectorAll<HTMLElement>('[role=slider]') ?? []);
  return all[all.indexOf(slider) + by];
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
