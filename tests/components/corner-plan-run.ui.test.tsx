import { describe, expect, it } from 'vitest';
import { noSteps, stepsAfter } from '@/components/corners/choice-steps.ts';
import { planPath } from '@/components/corners/plan-path.ts';
import { planRun } from '@/components/corners/plan-run.ts';
import { countBefore } from '@/components/corners/run-layer.tsx';
import { snapAt } from '@/components/parts/measure.ts';
import { circleOf, lineBetween, pathLength } from '@/strategy/path/index.ts';
import { corner, pathOf, planOf } from './corner-plan-fixtures.ts';

const plan = planOf();
const hole = { id: '1', depth: 1, role: 'hole' as const, parent: '0', layer: 'CUT' };
const withHole = planOf({
  part: {
    ...plan.part,
    contours: [...plan.part.contours, { ...hole, segments: [circleOf({ x: 0.05, y: 0.05 }, 0.02)] }],
  },
});

describe('the cut along the edges of a plan', () => {
  it('takes holes before the outline around them, and puts loops and waits where their corners are', () => {
    const { runs } = planPath(withHole);
    expect(runs.map(({ name }) => name)).toEqual(['hole 1', 'outline 0']);
    expect(runs[1]?.pieces.map(({ kind }) => kind)).toEqual(['contour', 'loop', 'contour', 'dwell', 'contour']);
  });
});

describe('the cut in time', () => {
  it('lets a loop’s slug fall with its loop, then what a hole leaves, the piece itself last', () => {
    const corners = [
      corner(0, { id: 'c0-0' }),
      corner(1, {
        id: 'c0-1',
        loop: {
          radius: 5e-3,
          extension: 5e-3,
          length: 0.04,
          slugArea: 7e-5,
          segments: [
            lineBetween({ x: 0.1, y: 0 }, { x: 0.105, y: 0 }),
            lineBetween({ x: 0.105, y: 0 }, { x: 0.1, y: 0 }),
          ],
          slug: [circleOf({ x: 0.105, y: -0.005 }, 4e-3)],
        },
      }),
    ];
    const run = planRun({ ...withHole, corners }, pathOf({ ...withHole, corners }));
    expect(run.dropped.map(({ scrap }) => scrap)).toEqual([true, true, false]);
    const [fromHole, slug, piece] = run.dropped;
    expect(pathLength(fromHole?.segments ?? [])).toBeCloseTo(2 * Math.PI * 0.02);
    expect(pathLength(slug?.segments ?? [])).toBeCloseTo(2 * Math.PI * 4e-3);
    expect(piece?.time).toBeCloseTo(run.timeline.runs.at(-1)?.end ?? 0);
    // then the head is raised
    expect(piece?.time).toBeLessThan(run.timeline.duration);
    expect(countBefore(run.dropped, (slug?.time ?? 0) + 1e-6)).toBe(2);
    expect(countBefore(run.dropped, 0)).toBe(0);
  });
});

describe('what was chosen for corners', () => {
  const [a, b, c] = [{}, { one: 'loop' as const }, { one: 'dwell' as const }];

  it('is taken back and made again in order, and forgotten ahead of a new choice', () => {
    const two = stepsAfter(stepsAfter(noSteps, 'chosen', a), 'chosen', b);
    expect(two.past).toEqual([a, b]);
    const back = stepsAfter(two, 'undone', c);
    expect(back).toEqual({ past: [a], future: [c] });
    expect(stepsAfter(back, 'redone', b)).toEqual({ past: [a, b], future: [] });
    expect(stepsAfter(back, 'chosen', b).future).toEqual([]);
  });
});

describe('a measured place', () => {
  const shown = { paths: withHole.part.contours, corners: withHole.corners.map(({ at }) => at) };

  it('is the corner, end or centre within a finger’s reach, and else where the finger was', () => {
    expect(snapAt({ x: 0.0996, y: 0.0003 }, 1e-3, shown)).toEqual({ kind: 'corner', at: { x: 0.1, y: 0 } });
    expect(snapAt({ x: 0.0503, y: 0.0498 }, 1e-3, shown).kind).toBe('centre');
    expect(snapAt({ x: 0.0703, y: 0.05 }, 1e-3, shown)).toEqual({ kind: 'end', at: { x: 0.07, y: 0.05 } });
    expect(snapAt({ x: 0.03, y: 0.02 }, 1e-3, shown)).toEqual({ kind: 'free', at: { x: 0.03, y: 0.02 } });
  });
});
