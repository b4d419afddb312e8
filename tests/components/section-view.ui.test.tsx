import { render, screen } from '@testing-library/react';
import { describe, expect, it } from 'vitest';
import { KnotMarks } from '@/components/pierce/knot-marks.tsx';
import { knotPlaces } from '@/components/pierce/knot-places.ts';
import { laneScale } from '@/components/pierce/lane-scale.ts';
import { sectionGeometry } from '@/components/pierce/section-geometry.ts';
import { niceCeiling, niceTicks } from '@/components/pierce/nice-ticks.ts';
import { dimensionSpan, lanePoints, letteringWidth, traceUntilThrough } from '@/components/pierce/section-layout.ts';
import { SectionView } from '@/components/pierce/section-view.tsx';
import type { Prediction } from '@/shared/strategies.ts';
import { TEN_KILOWATT } from '../support/machines.ts';
import { content, prediction } from './strategy-fixtures.ts';

const notThrough: Prediction = {
  ...prediction,
  cold: {
    ...prediction.cold,
    breakthrough: { kind: 'none', why: 'It stalls at 13 mm.' },
    reserve: { kind: 'none', why: 'It stalls at 13 mm.' },
    trace: { time: [0, 5, 10], depth: [0, 0.011, 0.013] },
  },
};

describe('the section', () => {
  it('says in words all that it draws: thickness, stages, breakthrough and reserve, cold and hot', () => {
    render(<SectionView prediction={prediction} stages={content.stages} system="metric" />);
    const words = screen.getByRole('img').getAttribute('aria-label') ?? '';
    expect(words).toContain('22 mm plate');
    expect(words).toContain('4 stages');
    expect(words).toMatch(/Cold plate at 20 °C: through after [\d.]+ s, reserve 2\.\d\d/);
    expect(words).toMatch(/Plate at 200 °C: through after [\d.]+ s, reserve 2\.\d\d/);
  });

  it.each([
    ['a pierce with reserve', prediction],
    ['a pierce that is not through', notThrough],
  ])('has only finite numbers in it for %s', (_what, shown) => {
    const { container } = render(<SectionView prediction={shown} stages={content.stages} system="inch" />);
    expect(container.innerHTML).not.toMatch(/NaN|Infinity|undefined/);
  });

  it('says that a stalled pierce is not through, and draws neither its breakthrough nor a reserve', () => {
    render(<SectionView prediction={notThrough} stages={content.stages} system="metric" />);
    expect(screen.getByRole('img').getAttribute('aria-label')).toContain('not through. It stalls at 13 mm.');
    expect(screen.queryByTestId('section-through-cold')).toBeNull();
    expect(screen.queryByTestId('section-reserve')).toBeNull();
    expect(screen.getByTestId('section-through-hot')).toBeTruthy();
  });

  it('has a boundary between stages, one knot where two stages meet, and two where they meet in a step', () => {
    const { rerender } = render(
      <SectionView prediction={prediction} stages={content.stages} system="metric" lanes={['standoff']} />,
    );
    expect(screen.getAllByTestId('section-boundary')).toHaveLength(content.stages.length - 1);
    expect(screen.getAllByTestId('lane-knot')).toHaveLength(content.stages.length + 1);
    const stepping = content.stages.map((stage, index) =>
      index === 0 ? { ...stage, to: { ...stage.to, standoff: stage.to.standoff + 2e-3 } } : stage,
    );
    rerender(<SectionView prediction={prediction} stages={stepping} system="metric" lanes={['standoff']} />);
    expect(screen.getAllByTestId('lane-knot')).toHaveLength(content.stages.length + 2);
  });
});

describe('the chosen knot of a focus position', () => {
  it.each([
    [1000, 'metric', '+5 mm, type '],
    [326, 'inch', '+0.1969 in, type '],
    // so narrow that a word must go: the unit, which stands in the lane's name, and never what is typed
    [230, 'metric', '+5, type '],
    [200, 'inch', '+0.1969, type '],
  ] as const)('in a drawing %d px wide, %s, has the dial’s number beside it', (measured, system, begins) => {
    const { stages } = content;
    const [lane, top] = ['focusPosition', 300] as const;
    const geometry = sectionGeometry({ measured, depth: 190, lanes: 1, box: 110, timeSpan: 20, editable: true });
    const scale = laneScale([stages], lane, system);
    const chosen = { kind: 'knot', lane, stage: 0, end: 'from' } as const;
    const knots = knotPlaces({ stages, lane, scale, top, geometry, system, chosen });
    const { container } = render(
      <KnotMarks
        lanes={[{ lane, top, knots }]}
        ends={[]}
        dial={TEN_KILOWATT.focusScale}
        {...{ stages, geometry, system }}
      />,
    );
    const said = container.querySelector('text')?.textContent ?? '';
    expect(said.startsWith(begins), said).toBe(true);
    expect(said).toMatch(/type −\d+\.\d+$/);
  });
});

describe('the layout of the section', () => {
  it('keeps a dimension’s lettering between its ticks, or leaves it away', () => {
    for (const room of [10, 40, 90, 150, 300]) {
      const span = dimensionSpan(100, 100 + room, ['cold plate: through after 8.04 s', 'cold: 8.04 s', '8.04 s']);
      if (span.text === null || !span.gap) continue;
      expect(span.gap.from).toBeGreaterThan(span.from);
      expect(span.gap.to).toBeLessThan(span.to);
      expect(span.gap.to - span.gap.from).toBeGreaterThan(letteringWidth(span.text));
    }
    expect(dimensionSpan(0, 20, ['8.04 s']).text).toBeNull();
    expect(dimensionSpan(0, 300, ['long', 's']).text).toBe('long');
  });

  it('ends the trace at the bottom of the plate, at the moment of breakthrough', () => {
    const last = traceUntilThrough(prediction.cold).at(-1);
    expect(last?.depth).toBe(prediction.cold.thickness);
    expect(prediction.cold.breakthrough).toEqual({ kind: 'ok', value: last?.time });
  });

  it('draws mean power as peak times duty, between the knots too', () => {
    const [first] = content.stages;
    if (!first) throw new Error('the draft has a stage');
    const ramp = {
      duration: 2,
      from: { ...first.from, peakPower: 1000, duty: 0.2 },
      to: { ...first.to, peakPower: 3000, duty: 0.6 },
    };
    const points = lanePoints([ramp], 'meanPower');
    expect(points[0]?.value).toBeCloseTo(200);
    expect(points.at(-1)?.value).toBeCloseTo(1800);
    expect(points.find(({ time }) => time === 1)?.value).toBeCloseTo(2000 * 0.4);
  });

  it('puts ticks at round values that stay on the axis', () => {
    expect(niceTicks(22, 5)).toEqual([0, 5, 10, 15, 20]);
    expect(niceTicks(0.866, 5)).toEqual([0, 0.2, 0.4, 0.6, 0.8]);
    expect(niceTicks(0, 5)).toEqual([0]);
    expect(niceCeiling(2.55)).toBe(3);
    expect(niceCeiling(0.7)).toBeCloseTo(0.8);
  });
});
