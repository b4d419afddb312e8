import { useImperativeHandle, useRef, type Ref } from 'react';
import { paintHeat } from './heat-paint.ts';

/** Temperatures, K, row by row, and how they become a picture. */
type Painted = {
  readonly temperatures: Float32Array;
  readonly columns: number;
  readonly rows: number;
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
      paint: ({ temperatures, columns, rows, levels, limit }, clip) => {
        const shown = canvas.current;
        const context = shown?.getContext('2d');
        const behind = (beside.current ??= document.createElement('canvas'));
        const points = behind.getContext('2d');
        // no canvas here? Then the numbers stand beside the drawing alone
        if (!shown || !context || !points) return;
        const picture = paintHeat(temperatures, columns, rows, { ink: inkOf(shown), levels, limit });
        for (const one of [shown, behind]) {
          if (one.width !== columns) one.width = columns;
          if (one.height !== rows) one.height = rows;
        }
        points.putImageData(new ImageData(picture, columns, rows), 0, 0);
        context.setTransform(1, 0, 0, 1, 0, 0);
        context.clearRect(0, 0, columns, rows);
        context.save();
        context.setTransform(clip.scaleX, 0, 0, clip.scaleY, clip.x, clip.y);
        context.clip(new Path2D(clip.data), 'evenodd');
        context.setTransform(1, 0, 0, 1, 0, 0);
        context.drawImage(behind, 0, 0);
        context.restore();
      },
    }),
    [],
  );
  return <canvas ref={canvas} data-testid="heat" aria-hidden style={{ display: 'block', width, height }} />;
}

/** The theme's ink as red, green and blue. */
function inkOf(element: Element): readonly [number, number, number] {
  const hex = /^#([\da-f]{2})([\da-f]{2})([\da-f]{2})$/i.exec(
    getComputedStyle(element).getPropertyValue('--ink').trim(),
  );
  const [red = 0, green = 0, blue = 0] = hex ? hex.slice(1).map((two) => Number.parseInt(two, 16)) : [];
  return [red, green, blue];
}
