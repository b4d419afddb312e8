import { fireEvent, render, screen } from '@testing-library/react';
import { userEvent } from '@testing-library/user-event';
import { useState } from 'react';
import { describe, expect, it } from 'vitest';
import { CoolingChart } from '@/components/corners/cooling-chart.tsx';
import { coolingCurves } from '@/components/corners/cooling-curves.ts';
import { cornerQuestions } from '@/components/corners/corner-questions.ts';
import { returnPoints, type ReturnPoint } from '@/components/corners/return-points.ts';
import { ReturnScatter } from '@/components/corners/return-scatter.tsx';
import { createRunClock } from '@/components/corners/run-clock.ts';
import type { PlannedCorner } from '@/shared/corner-plans.ts';
import { returnOf } from '@/strategy/heat/index.ts';
import { plateClock } from '@/strategy/motion/index.ts';
import { lineBetween } from '@/strategy/path/index.ts';
import { corner, pathOf, planOf } from './corner-plan-fixtures.ts';

const limit = 523.15;
const point = (number: number, more: Partial<ReturnPoint> = {}): ReturnPoint => ({
  id: `c${number}`,
  number,
  time: 10 * number,
  untreated: 650,
  treated: 450,
  treatment: 'loop',
  trouble: false,
  ...more,
});

function shown(points: readonly ReturnPoint[], first: string | null = null) {
  const chosen: string[] = [];
  const clock = createRunClock();
  function Chart() {
    const [own, setOwn] = useState(first);
    return (
      <ReturnScatter
        points={points}
        limit={limit}
        duration={100}
        clock={clock}
        chosen={own}
        onChoose={(id) => {
          chosen.push(id);
          setOwn(id);
        }}
        height={260}
      />
    );
  }
  render(<Chart />);
  return { chosen, clock, chart: screen.getByRole('slider', { name: 'Corners by time of return' }) };
}

describe('the corners of a cut, time against temperature', () => {
  const some = [
    point(1),
    point(2, { treatment: 'dwell', treated: 500 }),
    point(3, { treatment: 'leave', untreated: 400, treated: 400 }),
    point(4, { treated: 640, trouble: true }),
  ];

  it('are told apart by their shapes, each kind one path', () => {
    shown(some);
    const data = (id: string) => screen.getByTestId(id).getAttribute('d') ?? '';
    expect(data('scatter-loop').match(/M/g)).toHaveLength(2);
    expect(data('scatter-dwell').match(/M/g)).toHaveLength(1);
    expect(data('scatter-trouble').match(/M/g)).toHaveLength(1);
    expect(data('scatter-ease')).toBe('');
  });

  it('are gone through by keys, along the cut and by heat, and said in words', async () => {
    const { chosen, chart } = shown(some);
    expect(chart.getAttribute('aria-valuetext')).toBe('4 corners; none is chosen.');
    chart.focus();
    await userEvent.keyboard('{ArrowRight}{ArrowRight}');
    expect(chart.getAttribute('aria-valuetext')).toBe('Corner 2, back at 20 s: 227 °C with a dwell, 377 °C untreated.');
    await userEvent.keyboard('{ArrowUp}{End}{Home}');
    expect(chosen).toEqual(['c1', 'c2', 'c4', 'c4', 'c1']);
    await userEvent.keyboard('{ArrowDown}');
    expect(chart.getAttribute('aria-valuetext')).toBe('Corner 3, back at 30 s: 127 °C.');
  });

  it('are taken by a tap near them, and tried under a finger that drags', () => {
    const { chosen, chart } = shown(some);
    const at = (id: string) => {
      const [, x, y] = /M([\d.]+) ([\d.]+)/.exec(screen.getByTestId(id).getAttribute('d') ?? '') ?? [];
      return { clientX: Number(x) + 3, clientY: Number(y) + 4, pointerId: 1, button: 0 };
    };
    fireEvent.pointerDown(chart, at('scatter-dwell'));
    fireEvent.pointerMove(chart, at('scatter-leave'));
    expect(chart.getAttribute('aria-valuetext')).toMatch(/^Corner 3/);
    expect(chosen).toEqual([]);
    fireEvent.pointerUp(chart, at('scatter-trouble'));
    expect(chosen).toEqual(['c4']);
    expect(screen.getByTestId('scatter-chosen')).toBeTruthy();
    expect(screen.getByText(/^Corner 4, .* over the limit\.$/)).toBeTruthy();
  });

  it('have the moment of the drawing among them', () => {
    const { clock } = shown(some);
    expect(screen.queryByTestId('scatter-now')).toBeNull();
    fireEvent(window, new Event('resize'));
    clock.set(50);
    return screen.findByTestId('scatter-now');
  });

  it('know when the cut comes back to each: as planned, or from the path of a plan that was made before that was kept', () => {
    const plan = planOf();
    const clock = plateClock(pathOf(plan), plan.cutting);
    const found = returnPoints(plan, clock);
    expect(found.map(({ number }) => number)).toEqual([2, 3, 4, 1]);
    const [second, third] = found;
    // 100 mm at 20 mm/s between them, and a loop of 20 mm
    expect((third?.time ?? 0) - (second?.time ?? 0)).toBeCloseTo(6, 0);
    const corners = plan.corners.map((one, i) => ({ ...one, returnTime: 50 - i }));
    expect(returnPoints({ corners }, clock).map(({ number }) => number)).toEqual([4, 3, 2, 1]);
  });
});

describe('how a tip cools', () => {
  const options: PlannedCorner['options'] = [
    { treatment: 'leave', fits: true, returnTemperature: 453, addedTime: 0, why: '', at: null },
    {
      treatment: 'loop',
      fits: true,
      returnTemperature: 400,
      addedTime: 2.6,
      why: '',
      at: null,
      form: { loop: { shape: 'tangent', radius: 5e-3, extension: 5e-3 } },
    },
    { treatment: 'dwell', fits: true, returnTemperature: 410, addedTime: 1.7, why: '', at: null, form: { dwell: 1.2 } },
    { treatment: 'ease', fits: false, returnTemperature: null, addedTime: null, why: '', at: null },
  ];
  const planned = corner(1, { options, treatment: 'dwell', dwell: 1.2, background: 320 });
  const plan = planOf({ corners: [planned] });

  it('is asked of the model for each treatment that fits, on the plate as warm as it is by then', () => {
    const questions = cornerQuestions(plan, planned);
    expect(questions.map(({ treatment }) => treatment)).toEqual(['leave', 'loop', 'dwell']);
    for (const { question } of questions) expect(question.plateTemperature).toBe(320);
    const [leave, loop, dwell] = questions.map(({ question }) => returnOf(question));
    expect(loop ?? 0).toBeLessThan(leave ?? 0);
    expect(dwell ?? 0).toBeLessThan(leave ?? 0);
  });

  it('counts the tip of the corner before, where the cut came by it first', () => {
    const short = [
      { x: 0, y: 0 },
      { x: 0.1, y: 0 },
      { x: 0.1, y: 6e-3 },
      { x: 0, y: 6e-3 },
    ];
    const strip = planOf();
    const contour = strip.part.contours[0];
    if (!contour) throw new Error('the plan has a contour');
    const segments = short.map((start, i) => lineBetween(start, short[(i + 1) % 4] ?? start));
    const asked = (first: number, second: number) => {
      const behind = corner(2, { options, treatment: 'dwell', dwell: 1.2, background: 320, returnTime: second });
      const corners = [corner(1, { returnTime: first }), behind];
      const part = { ...strip.part, contours: [{ ...contour, segments }] };
      return cornerQuestions({ ...strip, part, corners }, behind).map(({ question }) => returnOf(question));
    };
    const [known, unknown] = [asked(10, 11), asked(30, 11)];
    for (const i of [0, 1, 2]) expect(known[i] ?? 0).toBeGreaterThan((unknown[i] ?? 0) + 5);
  });

  it('falls from the corner until the cut comes back, and peaks after that', () => {
    const curves = coolingCurves(cornerQuestions(plan, planned));
    const dwell = curves.find(({ treatment }) => treatment === 'dwell');
    if (!dwell) throw new Error('there is no curve');
    expect(dwell.back.time).toBeCloseTo(1.2);
    const at = (time: number) => dwell.kelvin[dwell.times.findIndex((one) => one >= time)] ?? 0;
    expect(at(0.5)).toBeGreaterThan(at(1.1));
    expect(dwell.peak.kelvin).toBeGreaterThan(at(0.5));
    expect(dwell.peak.time).toBeGreaterThan(1.2);
  });

  it('is drawn a line a treatment, told apart by dashes, shapes and words', () => {
    render(<CoolingChart curves={coolingCurves(cornerQuestions(plan, planned))} limit={limit} height={240} />);
    const dashes = ['leave', 'loop', 'dwell'].map((treatment) =>
      screen.getByTestId(`cooling-${treatment}`).getAttribute('stroke-dasharray'),
    );
    expect(new Set(dashes).size).toBe(3);
    expect(screen.getByTestId('cooling-back-dwell')).toBeTruthy();
    expect(screen.getByText(/^Dwell: back after 1\.2 s at 137 °C; then at most \d+ °C/)).toBeTruthy();
    expect(screen.getByRole('img', { name: /^Temperature at the tip against time\. Dwell: back after/ })).toBeTruthy();
  });

  it('of a corner that the drawing does not know is not asked', () => {
    expect(cornerQuestions(plan, corner(2, { id: 'c9-9', contourId: '9' }))).toEqual([]);
  });
});
