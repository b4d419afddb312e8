import { useCallback, useEffect, useLayoutEffect, useRef, useState, type RefObject } from 'react';
import type { Box, Point } from '@/strategy/path/index.ts';
import {
  windowAround,
  windowFit,
  windowPan,
  windowServes,
  windowShift,
  windowZoom,
  type Frame,
  type ViewWindow,
} from './view-window.ts';

/** A finger or mouse that moves less than this has tapped, px. */
const tapSlack = 6;
const keyStep = 60;
const fineKeyStep = 6;
const zoomStep = 1.4;
const fitMargin = 28;
/** After so long without a movement what is seen is drawn anew, sharp and with its details, ms. */
const restTime = 200;
/** How far beyond each edge of the frame is drawn, in frames: so far the drawing is pushed without being drawn again. */
export const drawnAround = 0.5;

type PanZoom = {
  /** The window that is drawn. While the drawing moves its layers are pushed, and this stays. */
  view: ViewWindow;
  fitted: boolean;
  fit: () => void;
  zoomBy: (factor: number) => void;
  /** Shows a stretch of so many metres around a place. */
  goTo: (place: Point, metres: number) => void;
};

/** Something of the drawing that a pointer holds. Distances in px of the frame since it was taken. */
export type Held = {
  readonly move: (dx: number, dy: number) => void;
  readonly drop: () => void;
  /** It was not meant: a second finger came, or the browser took the pointer. */
  readonly cancel: () => void;
};

type Asked = {
  frameRef: RefObject<HTMLElement | null>;
  /** All that moves with the drawing. Its top left corner lies `drawnAround` frames beyond the frame's. */
  layersRef: RefObject<HTMLElement | null>;
  box: Box;
  frame: Frame;
  /** A tap, px of the frame. */
  onTap: (at: Point, view: ViewWindow) => void;
  /** Enter was pressed on the drawing. */
  onEnter?: (view: ViewWindow) => void;
  /** May hand over what lies under the pointer: then that is pushed, and the drawing stays. */
  onTake?: (at: Point, view: ViewWindow) => Held | null;
};

/**
 * Moving and enlarging a drawing: one pointer pushes, two pinch, the wheel enlarges about the pointer, arrows (finer with Shift), + − and 0 do the
 * same. While the whole drawing is in view a finger still scrolls the page up and down. Each movement is one transform of the layers in
 * the next frame; only at rest, or where what was drawn doesn't reach any more, is the window drawn again.
 */
export function usePanZoom({ frameRef, layersRef, box, frame, onTap, onEnter, onTake }: Asked): PanZoom {
  const [moved, setMoved] = useState<ViewWindow | null>(null);
  const fitView = windowFit(box, frame, fitMargin);
  const view = moved ?? fitView;
  const bounds = { least: fitView.scale * 0.5, most: Math.max(fitView.scale * 60, 40_000) };
  /** What is seen: null while it is the whole. */
  const seen = useRef<ViewWindow | null>(null);
  const latest = useRef({ view, fitView, frame, bounds, box, onTap, onEnter, onTake });
  const pending = useRef<{ frame: number | null; rest: number | null }>({ frame: null, rest: null });
  /** While a finger or the mouse holds the drawing it is not at rest, however still it is held. */
  const holding = useRef(false);

  const push = useCallback(() => {
    const layers = layersRef.current;
    if (!layers) return;
    const { view: drawn, fitView: whole, frame: size } = latest.current;
    const { x, y, scale } = windowShift(drawn, seen.current ?? whole, size);
    layers.style.transform = `translate(${x.toFixed(2)}px, ${y.toFixed(2)}px) scale(${scale})`;
  }, [layersRef]);

  // before the browser paints: what is drawn and how it is pushed must agree
  useLayoutEffect(() => {
    latest.current = { view, fitView, frame, bounds, box, onTap, onEnter, onTake };
    push();
  });

  const draw = useCallback((next: ViewWindow | null) => {
    const { current } = pending;
    if (current.frame !== null) cancelAnimationFrame(current.frame);
    if (current.rest !== null) window.clearTimeout(current.rest);
    pending.current = { frame: null, rest: null };
    seen.current = next;
    setMoved(next);
  }, []);

  const move = useCallback(
    (next: ViewWindow) => {
      seen.current = next;
      const { current } = pending;
      if (current.rest !== null) window.clearTimeout(current.rest);
      current.rest = holding.current ? null : window.setTimeout(() => draw(seen.current), restTime);
      current.frame ??= requestAnimationFrame(() => {
        current.frame = null;
        const { view: drawn, fitView: whole, frame: size, box: all } = latest.current;
        push();
        if (!windowServes(drawn, seen.current ?? whole, size, drawnAround, all)) draw(seen.current);
      });
    },
    [draw, push],
  );

  useEffect(
    () => () => {
      const { frame: waiting, rest } = pending.current;
      if (waiting !== null) cancelAnimationFrame(waiting);
      if (rest !== null) window.clearTimeout(rest);
    },
    [],
  );

  useEffect(() => {
    const element = frameRef.current;
    if (!element) return undefined;
    const pointers = new Map<number, Point>();
    let travelled = 0;
    let before: ViewWindow | null = null;
    let held: { from: Point; what: Held } | null = null;
    const letGo = () => {
      held?.what.cancel();
      held = null;
    };
    const now = () => seen.current ?? latest.current.fitView;
    const zoom = (at: Point, factor: number) =>
      windowZoom(now(), latest.current.frame, at, factor, latest.current.bounds);
    const placeOf = (event: MouseEvent): Point => {
      const rect = element.getBoundingClientRect();
      return { x: event.clientX - rect.left, y: event.clientY - rect.top };
    };
    const middle = () => ({ x: latest.current.frame.width / 2, y: latest.current.frame.height / 2 });

    const down = (event: PointerEvent) => {
      if (pointers.size === 0) {
        travelled = 0;
        before = seen.current;
        const what = event.button === 0 ? latest.current.onTake?.(placeOf(event), now()) : null;
        held = what ? { from: placeOf(event), what } : null;
      } else letGo();
      pointers.set(event.pointerId, placeOf(event));
      holding.current = true;
    };
    const drag = (event: PointerEvent) => {
      const was = pointers.get(event.pointerId);
      if (!was) return;
      // a mouse let go outside the frame comes back without its button
      if (event.pointerType === 'mouse' && event.buttons === 0) return cancel(event);
      const at = placeOf(event);
      const step = Math.hypot(at.x - was.x, at.y - was.y);
      if (step === 0) return;
      travelled += step;
      if (travelled > tapSlack && !element.hasPointerCapture(event.pointerId)) {
        element.setPointerCapture(event.pointerId);
      }
      const other = [...pointers].find(([id]) => id !== event.pointerId)?.[1];
      pointers.set(event.pointerId, at);
      if (travelled <= tapSlack) return;
      if (held) {
        held.what.move(at.x - held.from.x, at.y - held.from.y);
        return;
      }
      if (!other) {
        move(windowPan(now(), at.x - was.x, at.y - was.y));
        return;
      }
      const apart = Math.hypot(at.x - other.x, at.y - other.y);
      const wasApart = Math.hypot(was.x - other.x, was.y - other.y);
      move(windowPan(now(), (at.x - was.x) / 2, (at.y - was.y) / 2));
      if (wasApart > 0) move(zoom({ x: (at.x + other.x) / 2, y: (at.y + other.y) / 2 }, apart / wasApart));
    };
    const up = (event: PointerEvent) => {
      const known = pointers.delete(event.pointerId);
      holding.current = pointers.size > 0;
      if (known && held && travelled > tapSlack) {
        held.what.drop();
        held = null;
      }
      letGo();
      if (!known || pointers.size > 0) return;
      if (travelled <= tapSlack) latest.current.onTap(placeOf(event), now());
      else if (seen.current) move(seen.current);
    };
    // the browser has taken the finger to scroll the page: then the drawing was not meant
    const cancel = (event: PointerEvent) => {
      letGo();
      const known = pointers.delete(event.pointerId);
      holding.current = pointers.size > 0;
      if (known && pointers.size === 0) draw(before);
    };
    const wheel = (event: WheelEvent) => {
      // does the page need the wheel to scroll? then the drawing takes it only once it was clicked, or with the control key
      const page = document.documentElement;
      const pageScrolls = page.scrollHeight > page.clientHeight + 1;
      if (pageScrolls && !event.ctrlKey && !event.metaKey && document.activeElement !== element) return;
      event.preventDefault();
      const lines = event.deltaMode === 1 ? 16 : 1;
      move(zoom(placeOf(event), Math.exp((-event.deltaY * lines) / 400)));
    };
    const key = (event: KeyboardEvent) => {
      if (event.target !== element || event.altKey || event.ctrlKey || event.metaKey) return;
      const by = event.shiftKey ? fineKeyStep : keyStep;
      const pushes: Record<string, [number, number]> = {
        ArrowLeft: [by, 0],
        ArrowRight: [-by, 0],
        ArrowUp: [0, by],
        ArrowDown: [0, -by],
      };
      // a key held down moves like a drag; a single press is drawn at once
      const show = event.repeat ? move : draw;
      const pushed = pushes[event.key];
      if (pushed) show(windowPan(now(), ...pushed));
      else if (event.key === '+' || event.key === '=') show(zoom(middle(), zoomStep));
      else if (event.key === '-') show(zoom(middle(), 1 / zoomStep));
      else if (event.key === '0') draw(null);
      else if (event.key === 'Enter' && latest.current.onEnter) latest.current.onEnter(now());
      else return;
      event.preventDefault();
    };
    element.addEventListener('pointerdown', down);
    element.addEventListener('pointermove', drag);
    element.addEventListener('pointerup', up);
    element.addEventListener('pointercancel', cancel);
    element.addEventListener('wheel', wheel, { passive: false });
    element.addEventListener('keydown', key);
    return () => {
      element.removeEventListener('pointerdown', down);
      element.removeEventListener('pointermove', drag);
      element.removeEventListener('pointerup', up);
      element.removeEventListener('pointercancel', cancel);
      element.removeEventListener('wheel', wheel);
      element.removeEventListener('keydown', key);
    };
  }, [draw, frameRef, move]);

  return {
    view,
    fitted: moved === null,
    fit: () => draw(null),
    zoomBy: (factor) =>
      draw(windowZoom(seen.current ?? fitView, frame, { x: frame.width / 2, y: frame.height / 2 }, factor, bounds)),
    goTo: useCallback(
      (place: Point, metres: number) => {
        const { frame: size, bounds: limits } = latest.current;
        draw(windowAround(place, metres, size, limits));
      },
      [draw],
    ),
  };
}
