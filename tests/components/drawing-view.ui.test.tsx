import { fireEvent, render, screen } from '@testing-library/react';
import { userEvent } from '@testing-library/user-event';
import { describe, expect, it, vi } from 'vitest';
import { contourCircle } from '@/components/parts/drawing-geometry.ts';
import { markNearest, marksSpread } from '@/components/parts/drawing-marks.ts';
import { DrawingView } from '@/components/parts/drawing-view.tsx';
import { windowFit, windowPan, windowToFrame, windowToPlace, windowZoom } from '@/components/parts/view-window.ts';
import { arcOf, circleOf, lineBetween } from '@/strategy/path/index.ts';

const frame = { width: 640, height: 400 };
const box = { minX: 1, minY: 2, maxX: 1.2, maxY: 2.1 };
const bounds = { least: 1, most: 1e6 };

describe('the window on a drawing', () => {
  it('shows the whole box with its margin, up as up', () => {
    const view = windowFit(box, frame, 28);
    const low = windowToFrame(view, frame, { x: box.minX, y: box.minY });
    const high = windowToFrame(view, frame, { x: box.maxX, y: box.maxY });
    expect(low.x).toBeCloseTo(28);
    expect(high.x).toBeCloseTo(640 - 28);
    expect(low.y).toBeGreaterThan(high.y);
  });

  it('keeps the place under the finger where it is while enlarging', () => {
    const view = windowFit(box, frame, 28);
    const finger = { x: 123, y: 77 };
    const held = windowToPlace(view, frame, finger);
    const nearer = windowZoom(view, frame, finger, 3.7, bounds);
    const after = windowToFrame(nearer, frame, held);
    expect(after.x).toBeCloseTo(finger.x, 9);
    expect(after.y).toBeCloseTo(finger.y, 9);
    expect(nearer.scale).toBeCloseTo(3.7 * view.scale);
  });

  it('moves with the finger, and never enlarges past its bounds', () => {
    const view = windowFit(box, frame, 28);
    const before = windowToFrame(view, frame, { x: 1.1, y: 2.05 });
    const after = windowToFrame(windowPan(view, 30, -12), frame, { x: 1.1, y: 2.05 });
    expect(after.x - before.x).toBeCloseTo(30);
    expect(after.y - before.y).toBeCloseTo(-12);
    expect(windowZoom(view, frame, { x: 0, y: 0 }, 1e9, bounds).scale).toBe(bounds.most);
    expect(windowZoom(view, frame, { x: 0, y: 0 }, 1e-9, bounds).scale).toBe(bounds.least);
  });
});

describe('marks on a drawing', () => {
  it('gives room to the first and shrinks what would run into it', () => {
    const placed = marksSpread(
      [
        { id: 'a', x: 0, y: 0 },
        { id: 'b', x: 10, y: 0 },
        { id: 'c', x: 40, y: 0 },
      ],
      24,
    );
    expect(placed.map(({ full }) => full)).toEqual([true, false, true]);
  });

  it('finds the mark nearest to a tap, within a finger’s reach only', () => {
    const placed = marksSpread(
      [
        { id: 'a', x: 0, y: 0 },
        { id: 'b', x: 40, y: 0 },
      ],
      24,
    );
    expect(markNearest(placed, { x: 28, y: 5 }, 30)).toBe('b');
    expect(markNearest(placed, { x: 200, y: 0 }, 30)).toBeNull();
  });
});

describe('a circle on a drawing', () => {
  it('is known by its arcs about one centre that make a full turn', () => {
    const half = arcOf({ x: 0, y: 0 }, 0.01, 0, Math.PI);
    expect(contourCircle({ segments: [circleOf({ x: 0.1, y: 0.2 }, 0.02)] })?.radius).toBe(0.02);
    expect(contourCircle({ segments: [half, arcOf({ x: 0, y: 0 }, 0.01, Math.PI, Math.PI)] })?.radius).toBe(0.01);
    expect(contourCircle({ segments: [half, lineBetween({ x: -0.01, y: 0 }, { x: 0.01, y: 0 })] })).toBeNull();
  });
});

describe('the drawing', () => {
  const square = [
    { x: 0, y: 0 },
    { x: 0.1, y: 0 },
    { x: 0.1, y: 0.1 },
    { x: 0, y: 0.1 },
  ];
  const contours = [{ segments: square.map((start, i) => lineBetween(start, square[(i + 1) % 4] ?? start)) }];
  const scaleOf = (container: HTMLElement) =>
    Number(
      /scale\(([\d.]+)\)/.exec(
        container.querySelector('g[transform*=translate]')?.getAttribute('transform') ?? '',
      )?.[1],
    );

  it('is enlarged, reduced and fitted by keys and by buttons', async () => {
    const { container } = render(<DrawingView label="Part" contours={contours} height={300} />);
    const whole = scaleOf(container);
    const drawing = screen.getByRole('group', { name: /Arrow keys move it/ });
    drawing.focus();
    await userEvent.keyboard('+');
    const nearer = scaleOf(container);
    expect(nearer).toBeGreaterThan(whole);
    await userEvent.click(screen.getByRole('button', { name: 'Reduce the drawing' }));
    expect(scaleOf(container)).toBeLessThan(nearer);
    await userEvent.click(screen.getByRole('button', { name: 'Show the whole drawing' }));
    expect(scaleOf(container)).toBe(whole);
  });

  it('chooses a corner by a tap on its badge, and none by a push', () => {
    const onChoose = vi.fn();
    render(
      <DrawingView
        label="Part"
        contours={contours}
        marks={[{ id: 'corner', at: { x: 0.05, y: 0.05 }, draw: <circle r={9} /> }]}
        onChoose={onChoose}
        height={300}
      />,
    );
    const drawing = screen.getByRole('group', { name: /Arrow keys move it/ });
    fireEvent.pointerDown(drawing, { pointerId: 1, clientX: 322, clientY: 152 });
    fireEvent.pointerUp(drawing, { pointerId: 1, clientX: 322, clientY: 152 });
    expect(onChoose).toHaveBeenLastCalledWith('corner');
    fireEvent.pointerDown(drawing, { pointerId: 1, clientX: 322, clientY: 152 });
    fireEvent.pointerMove(drawing, { pointerId: 1, clientX: 360, clientY: 152 });
    fireEvent.pointerUp(drawing, { pointerId: 1, clientX: 360, clientY: 152 });
    expect(onChoose).toHaveBeenCalledTimes(1);
  });
});
