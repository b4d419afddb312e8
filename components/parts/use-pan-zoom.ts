import { useEffect, useRef, useState, type RefObject } from 'react';
import type { Box, Point } from '@/strategy/path/index.ts';
import { windowFit, windowPan, windowZoom, type Frame, type ViewWindow } from './view-window.ts';

/** A finger or mouse that moves less than this has tapped, px. */
const tapSlack = 6;
const keyStep = 60;
const zoomStep = 1.4;
const fitMargin = 28;

type PanZoom = {
  view: ViewWindow;
  fitted: boolean;
  fit: () => void;
  zoomBy: (factor: number) => void;
};

/**
 * Moving and enlarging a drawing: one pointer pushes, two pinch, the wheel enlarges about the pointer, arrows, + − and 0 do the
 * same. While the whole drawing is in view a finger still scrolls the page up and down.
 */
export function usePanZoom(
  frameRef: RefObject<HTMLElement | null>,
  box: Box,
  frame: Frame,
  onTap: (at: Point, view: ViewWindow) => void,
): PanZoom {
  const [moved, setMoved] = useState<ViewWindow | null>(null);
  const fitView = windowFit(box, frame, fitMargin);
  const view = moved ?? fitView;
  const bounds = { least: fitView.scale * 0.5, most: Math.max(fitView.scale * 60, 40_000) };
  const latest = useRef({ view, moved, frame, bounds, onTap });
  useEffect(() => {
    latest.current = { view, moved, frame, bounds, onTap };
  });

  useEffect(() => {
    const element = frameRef.current;
    if (!element) return undefined;
    const pointers = new Map<number, Point>();
    let travelled = 0;
    let before: ViewWindow | null = null;
    const show = (next: ViewWindow) => {
      latest.current = { ...latest.current, view: next };
      setMoved(next);
    };
    const zoom = (at: Point, factor: number) => {
      const now = latest.current;
      show(windowZoom(now.view, now.frame, at, factor, now.bounds));
    };
    const placeOf = (event: MouseEvent): Point => {
      const rect = element.getBoundingClientRect();
      return { x: event.clientX - rect.left, y: event.clientY - rect.top };
    };
    const middle = () => ({ x: latest.current.frame.width / 2, y: latest.current.frame.height / 2 });

    const down = (event: PointerEvent) => {
      if (pointers.size === 0) {
        travelled = 0;
        before = latest.current.moved;
      }
      pointers.set(event.pointerId, placeOf(event));
    };
    const move = (event: PointerEvent) => {
      const was = pointers.get(event.pointerId);
      if (!was) return;
      const now = placeOf(event);
      const step = Math.hypot(now.x - was.x, now.y - was.y);
      if (step === 0) return;
      travelled += step;
      if (travelled > tapSlack && !element.hasPointerCapture(event.pointerId)) {
        element.setPointerCapture(event.pointerId);
      }
      const other = [...pointers].find(([id]) => id !== event.pointerId)?.[1];
      pointers.set(event.pointerId, now);
      if (travelled <= tapSlack) return;
      if (!other) {
        show(windowPan(latest.current.view, now.x - was.x, now.y - was.y));
        return;
      }
      const apart = Math.hypot(now.x - other.x, now.y - other.y);
      const wasApart = Math.hypot(was.x - other.x, was.y - other.y);
      show(windowPan(latest.current.view, (now.x - was.x) / 2, (now.y - was.y) / 2));
      if (wasApart > 0) zoom({ x: (now.x + other.x) / 2, y: (now.y + other.y) / 2 }, apart / wasApart);
    };
    const up = (event: PointerEvent) => {
      const known = pointers.delete(event.pointerId);
      if (known && pointers.size === 0 && travelled <= tapSlack)
        latest.current.onTap(placeOf(event), latest.current.view);
    };
    // the browser has taken the finger to scroll the page: then the drawing was not meant
    const cancel = (event: PointerEvent) => {
      if (pointers.delete(event.pointerId) && pointers.size === 0) setMoved(before);
    };
    const wheel = (event: WheelEvent) => {
      // does the page need the wheel to scroll? then the drawing takes it only once it was clicked, or with the control key
      const page = document.documentElement;
      const pageScrolls = page.scrollHeight > page.clientHeight + 1;
      if (pageScrolls && !event.ctrlKey && !event.metaKey && document.activeElement !== element) return;
      event.preventDefault();
      const lines = event.deltaMode === 1 ? 16 : 1;
      zoom(placeOf(event), Math.exp((-event.deltaY * lines) / 400));
    };
    const key = (event: KeyboardEvent) => {
      if (event.target !== element || event.altKey || event.ctrlKey || event.metaKey) return;
      const push: Record<string, [number, number]> = {
        ArrowLeft: [keyStep, 0],
        ArrowRight: [-keyStep, 0],
        ArrowUp: [0, keyStep],
        ArrowDown: [0, -keyStep],
      };
      const by = push[event.key];
      if (by) show(windowPan(latest.current.view, ...by));
      else if (event.key === '+' || event.key === '=') zoom(middle(), zoomStep);
      else if (event.key === '-') zoom(middle(), 1 / zoomStep);
      else if (event.key === '0') setMoved(null);
      else return;
      event.preventDefault();
    };
    element.addEventListener('pointerdown', down);
    element.addEventListener('pointermove', move);
    element.addEventListener('pointerup', up);
    element.addEventListener('pointercancel', cancel);
    element.addEventListener('wheel', wheel, { passive: false });
    element.addEventListener('keydown', key);
    return () => {
      element.removeEventListener('pointerdown', down);
      element.removeEventListener('pointermove', move);
      element.removeEventListener('pointerup', up);
      element.removeEventListener('pointercancel', cancel);
      element.removeEventListener('wheel', wheel);
      element.removeEventListener('keydown', key);
    };
  }, [frameRef]);

  return {
    view,
    fitted: moved === null,
    fit: () => setMoved(null),
    zoomBy: (factor) => setMoved(windowZoom(view, frame, { x: frame.width / 2, y: frame.height / 2 }, factor, bounds)),
  };
}
