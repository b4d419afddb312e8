import { useImperativeHandle, useRef, type Ref } from 'react';
import { paintHeat } from './heat-paint.ts';

/** Temperatures, K, row by row, of the picture of so many columns and rows without those skipped on each side, and how they are drawn. */
type Painted = {
  readonly temperatures: Float32Array;
  readonly columns: number;
  readonly rows: number;
  readonly skipped: number;
  readonly above: number;
  readonly levels: readonly number[];
  readonly limit: number;
};

/** What bounds the picture: the text of a path, where its origin lies, in points of the picture, and how many of them a unit of it is. */
type Clip = {
  readonly data: string;
  readonly x: number;
  readonly y: number;
  readonly scaleX: number;
  readonly scaleY: number;
};

export type HeatPicture = { readonly paint: (painted: Painted, clip: Clip) => void };

/** A picture of temperatures, stretched over its place; painted by whoever holds its ref, beside React. */
export function HeatCanvas({ width, height, ref }: { width: number; height: number; ref: Ref<HeatPicture> }) {
  const canvas = useRef<HTMLCanvasElement>(null);
  const beside = useRef<HTMLCanvasElement | null>(null);
  useImperativeHandle(
    ref,
    () => ({
      paint: ({ temperatures, columns, rows, skipped, above, levels, limit }, clip) => {
        const shown = canvas.current;
        const context = shown?.getContext('2d');
        const behind = (beside.current ??= document.createElement('canvas'));
        const points = behind.getContext('2d');
        // no canvas here? Then the numbers stand beside the drawing alone
        if (!shown || !context || !points) return;
        const [wide, high] = [columns - 2 * skipped, rows - 2 * above];
        const picture = paintHeat(temperatures, wide, high, { ink: inkOf(shown), levels, limit });
        sized(shown, columns, rows);
        sized(behind, wide, high);
        points.putImageData(new ImageData(picture, wide, high), 0, 0);
        context.setTransform(1, 0, 0, 1, 0, 0);
        context.clearRect(0, 0, columns, rows);
        context.save();
        context.setTransform(clip.scaleX, 0, 0, clip.scaleY, clip.x, clip.y);
        context.clip(new Path2D(clip.data), 'evenodd');
        context.setTransform(1, 0, 0, 1, 0, 0);
        context.drawImage(behind, skipped, above);
        context.restore();
      },
    }),
    [],
  );
  return <canvas ref={canvas} data-testid="heat" aria-hidden style={{ display: 'block', width, height }} />;
}

/** Giving a canvas its size clears it and costs time: only where it differs. */
function sized(canvas: HTMLCanvasElement, width: number, height: number): void {
  if (canvas.width !== width) canvas.width = width;
  if (canvas.height !== height) canvas.height = height;
}

/** The theme's ink as red, green and blue. */
function inkOf(element: Element): readonly [number, number, number] {
  const hex = /^#([\da-f]{2})([\da-f]{2})([\da-f]{2})$/i.exec(
    getComputedStyle(element).getPropertyValue('--ink').trim(),
  );
  const [red = 0, green = 0, blue = 0] = hex ? hex.slice(1).map((two) => Number.parseInt(two, 16)) : [];
  return [red, green, blue];
}
