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
