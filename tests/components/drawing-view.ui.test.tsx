import { act, fireEvent, render, screen, waitFor } from '@testing-library/react';
import { userEvent } from '@testing-library/user-event';
import { createRef } from 'react';
import { describe, expect, it, vi } from 'vitest';
import { contourCircle } from '@/components/parts/drawing-geometry.ts';
import { detailTolerance, pathThinned } from '@/components/parts/drawing-detail.ts';
import { dotsData, markNearest, marksSpread } from '@/components/parts/drawing-marks.ts';
import { DrawingView, type DrawingControl } from '@/components/parts/drawing-view.tsx';
import {
  windowAround,
  windowFit,
  windowPan,
  windowServes,
  windowShift,
  windowToFrame,
  windowToPlace,
  windowZoom,
} from '@/components/parts/view-window.ts';
import {
  arcOf,
  circleOf,
  lineBetween,
  segmentEnd,
  segmentPointAt,
  segmentPointDistance,
  segmentStart,
  type Segment,
} from '@/strategy/path/index.ts';

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

describe('a drawing that is pushed without being drawn again', () => {
  it('shows each place where the new window has it', () => {
    const drawn = windowFit(box, frame, 28);
    const shown = windowZoom(windowPan(drawn, 31, -12), frame, { x: 90, y: 300 }, 1.7, bounds);
    const { x, y, scale } = windowShift(drawn, shown, frame);
    for (const place of [
      { x: 1, y: 2 },
      { x: 1.17, y: 2.06 },
    ]) {
      const before = windowToFrame(drawn, frame, place);
      const after = windowToFrame(shown, frame, place);
      expect(x + scale * before.x).toBeCloseTo(after.x, 9);
      expect(y + scale * before.y).toBeCloseTo(after.y, 9);
    }
  });

  it('serves until its edge would come into the frame or its lines would blur', () => {
    const near = windowAround({ x: 1.1, y: 2.05 }, 0.02, frame, bounds);
    expect(windowServes(near, near, frame, 0.5, box)).toBe(true);
    expect(windowServes(near, windowPan(near, 0.4 * frame.width, 0), frame, 0.5, box)).toBe(true);
    expect(windowServes(near, windowPan(near, 0.6 * frame.width, 0), frame, 0.5, box)).toBe(false);
    expect(windowServes(near, windowPan(near, 0, -0.6 * frame.height), frame, 0.5, box)).toBe(false);
    expect(windowServes(near, { ...near, scale: 4 * near.scale }, frame, 0.5, box)).toBe(false);
    // beyond the drawing there is nothing to miss
    const whole = windowFit(box, frame, 28);
    expect(windowServes(whole, windowPan(whole, 5 * frame.width, 0), frame, 0.5, box)).toBe(true);
  });
});

describe('a drawing of very many pieces', () => {
  const wave = (count: number): Segment[] =>
    Array.from({ length: count }, (_, i) => {
      const at = (k: number) => ({ x: k * 1e-4, y: 2e-4 * Math.sin(k / 3) });
      return lineBetween(at(i), at(i + 1));
    });

  it('loses only what is smaller than half a pixel, and still joins end to start', () => {
    const path = wave(3000);
    const scale = 700; // px/m
    const tolerance = detailTolerance(scale, path.length);
    expect(tolerance * scale).toBeLessThanOrEqual(0.5);
    const thin = pathThinned(path, tolerance);
    expect(thin.length).toBeLessThan(path.length / 2);
    thin.forEach((segment, i) => {
      const next = thin[i + 1];
      if (next) expect(segmentEnd(segment)).toEqual(segmentStart(next));
    });
    for (const segment of path) {
      const middle = segmentPointAt(segment, 0.5);
      const off = Math.min(...thin.map((one) => segmentPointDistance(one, middle)));
      expect(off).toBeLessThanOrEqual(tolerance * (1 + 1e-9));
    }
  });

  it('is drawn as it is when it has few pieces or is near', () => {
    expect(detailTolerance(700, 200)).toBe(0);
    const path = wave(3000);
    expect(pathThinned(path, detailTolerance(2e5, path.length))).toHaveLength(3000);
  });
});

describe('marks on a drawing', () => {
  it('lie on their corners as dots where there are too many to tell apart, but for what is in trouble', () => {
    const marks = Array.from({ length: 300 }, (_, i) => ({
      id: String(i),
      at: { x: 0.005 * (i % 20), y: 0.006 * Math.floor(i / 20) },
      off: { x: 0.7, y: 0.7 },
      weight: i === 150 ? 2 : 1,
      draw: <circle r={9} />,
    }));
    const contours = [{ segments: [circleOf({ x: 0.05, y: 0.05 }, 0.05)] }];
    render(<DrawingView label="Part" contours={contours} marks={marks} height={300} />);
    expect(screen.getAllByTestId('drawing-mark')).toHaveLength(1);
    const dots = screen.getAllByTestId('drawing-dots').map((path) => path.getAttribute('d') ?? '');
    expect(dots.join('').match(/M/g)?.length).toBe(299);
  });

  it('draws only so many in full, and dots that would lie on each other once', () => {
    const many = Array.from({ length: 50 }, (_, i) => ({ id: String(i), x: 40 * i, y: 0 }));
    expect(marksSpread(many, 24, 12).filter(({ full }) => full)).toHaveLength(12);
    const data = dotsData([...many, ...many.map(({ x, y }) => ({ x: x + 1, y }))], 5);
    expect(data.match(/M/g)).toHaveLength(50);
  });

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
      /scale\(([\d.]+)\)/.exec(container.querySelector('g[transform^=scale]')?.getAttribute('transform') ?? '')?.[1],
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

  it('follows a drag by pushing what is drawn, and draws anew at rest', async () => {
    const { container } = render(<DrawingView label="Part" contours={contours} height={300} />);
    const drawing = screen.getByRole('group', { name: /Arrow keys move it/ });
    const layers = drawing.firstElementChild;
    const drawn = () => container.querySelector('svg > g')?.getAttribute('transform');
    const before = drawn();
    fireEvent.pointerDown(drawing, { pointerId: 1, clientX: 300, clientY: 100 });
    fireEvent.pointerMove(drawing, { pointerId: 1, clientX: 340, clientY: 110 });
    await new Promise((resolve) => requestAnimationFrame(resolve));
    expect(layers?.getAttribute('style')).toMatch(/transform: translate\(40.00px, 10.00px\) scale\(1\)/);
    expect(drawn()).toBe(before);
    fireEvent.pointerUp(drawing, { pointerId: 1, clientX: 340, clientY: 110 });
    await waitFor(() => expect(drawn()).not.toBe(before));
    expect(layers?.getAttribute('style')).toMatch(/transform: translate\(0.00px, 0.00px\) scale\(1\)/);
  });

  it('goes where it is told to, and takes places instead of marks when a place is asked for', async () => {
    const control = createRef<DrawingControl>();
    const onAim = vi.fn<(place: { x: number; y: number }, reach: number) => void>();
    const { container } = render(
      <DrawingView label="Part" contours={contours} control={control} onAim={onAim} height={300} />,
    );
    const whole = scaleOf(container);
    act(() => control.current?.goTo({ x: 0.02, y: 0.03 }, 0.01));
    expect(scaleOf(container)).toBeGreaterThan(whole);
    const drawing = screen.getByRole('group', { name: /Enter takes the place/ });
    drawing.focus();
    await userEvent.keyboard('{Enter}');
    const [place, reach] = onAim.mock.calls[0] ?? [{ x: 0, y: 0 }, 0];
    expect(place.x).toBeCloseTo(0.02);
    expect(place.y).toBeCloseTo(0.03);
    expect(reach).toBeCloseTo(0.001);
    fireEvent.pointerDown(drawing, { pointerId: 1, clientX: 320, clientY: 120 });
    fireEvent.pointerUp(drawing, { pointerId: 1, clientX: 320, clientY: 120 });
    // 30 px above the middle of 300 px that show 10 mm
    expect(onAim.mock.calls[1]?.[0].y).toBeCloseTo(0.031);
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
