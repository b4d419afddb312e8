import type { Box, Point } from '@/strategy/path/index.ts';

/** How a drawing (m, y up) lies in a frame (px, y down): px = centre of frame + (place − middle) × scale. */
export type ViewWindow = {
  readonly middle: Point; // m, the place shown in the frame's centre
  readonly scale: number; // px a metre
};

export type Frame = { readonly width: number; readonly height: number };

/** The window that shows the whole box with `margin` px around it. */
export function windowFit(box: Box, frame: Frame, margin: number): ViewWindow {
  const width = Math.max(box.maxX - box.minX, 1e-6);
  const height = Math.max(box.maxY - box.minY, 1e-6);
  const scale = Math.min(
    Math.max(frame.width - 2 * margin, 1) / width,
    Math.max(frame.height - 2 * margin, 1) / height,
  );
  return { middle: { x: (box.minX + box.maxX) / 2, y: (box.minY + box.maxY) / 2 }, scale };
}

export const windowToFrame = ({ middle, scale }: ViewWindow, frame: Frame, place: Point): Point => ({
  x: frame.width / 2 + (place.x - middle.x) * scale,
  y: frame.height / 2 - (place.y - middle.y) * scale,
});

export const windowToPlace = ({ middle, scale }: ViewWindow, frame: Frame, at: Point): Point => ({
  x: middle.x + (at.x - frame.width / 2) / scale,
  y: middle.y - (at.y - frame.height / 2) / scale,
});

/** The window after the drawing was pushed by so many px. */
export const windowPan = (view: ViewWindow, dx: number, dy: number): ViewWindow => ({
  ...view,
  middle: { x: view.middle.x - dx / view.scale, y: view.middle.y + dy / view.scale },
});

/** The window enlarged by a factor about a point of the frame, whose place stays where it is; bounded by least and greatest scale. */
export function windowZoom(
  view: ViewWindow,
  frame: Frame,
  at: Point,
  factor: number,
  bounds: { least: number; most: number },
): ViewWindow {
  const scale = Math.min(bounds.most, Math.max(bounds.least, view.scale * factor));
  const held = windowToPlace(view, frame, at);
  return {
    scale,
    middle: {
      x: held.x - (at.x - frame.width / 2) / scale,
      y: held.y + (at.y - frame.height / 2) / scale,
    },
  };
}

/** The window in which a stretch of so many metres around a place fills the frame; bounded like any enlarging. */
export const windowAround = (
  place: Point,
  metres: number,
  frame: Frame,
  bounds: { least: number; most: number },
): ViewWindow => ({
  middle: place,
  scale: Math.min(bounds.most, Math.max(bounds.least, Math.min(frame.width, frame.height) / Math.max(metres, 1e-9))),
});

/** How what was drawn for one window is pushed and enlarged to show another, without drawing it again: px = (x, y) + scale × px before. */
export function windowShift(
  drawn: ViewWindow,
  shown: ViewWindow,
  frame: Frame,
): { x: number; y: number; scale: number } {
  const scale = shown.scale / drawn.scale;
  return {
    scale,
    x: (frame.width / 2) * (1 - scale) + (drawn.middle.x - shown.middle.x) * shown.scale,
    y: (frame.height / 2) * (1 - scale) - (drawn.middle.y - shown.middle.y) * shown.scale,
  };
}

/**
 * Whether what was drawn for one window, `around` frames beyond its edges, still serves for another: nothing of the box is missing in the frame, and
 * nothing is enlarged so far that its lines blur.
 */
export function windowServes(drawn: ViewWindow, shown: ViewWindow, frame: Frame, around: number, box: Box): boolean {
  const { x, y, scale } = windowShift(drawn, shown, frame);
  if (scale > 3) return false;
  const low = windowToFrame(shown, frame, { x: box.minX, y: box.maxY });
  const high = windowToFrame(shown, frame, { x: box.maxX, y: box.minY });
  const reach = (size: number, at: number) => [at - around * size * scale, at + (1 + around) * size * scale] as const;
  const [left, right] = reach(frame.width, x);
  const [top, bottom] = reach(frame.height, y);
  return (
    Math.max(low.x, 0) >= left - 1 &&
    Math.min(high.x, frame.width) <= right + 1 &&
    Math.max(low.y, 0) >= top - 1 &&
    Math.min(high.y, frame.height) <= bottom + 1
  );
}
