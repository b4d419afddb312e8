import { describe, expect, it } from 'vitest';
import { noSteps, stepsAfter } from '@/components/corners/choice-steps.ts';
import { cutMoment, cutTimeline, timeOfSegments } from '@/components/corners/cut-timeline.ts';
import { planPath } from '@/components/corners/plan-path.ts';
import { planRun } from '@/components/corners/plan-run.ts';
import { countBefore } from '@/components/corners/run-layer.tsx';
import { snapAt } from '@/components/parts/measure.ts';
import type { CutPath } from '@/strategy/path/cut-path.ts';
import { pathTime } from '@/strategy/motion/index.ts';
import { circleOf, lineBetween, pathLength, pointDistance } from '@/strategy/path/index.ts';
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
  const path: CutPath = {
    runs: [
      {
        contourId: 'a',
        name: 'hole a',
        pierce: { x: 0, y: 0 },
        pieces: [
          { kind: 'contour', segments: [lineBetween({ x: 0, y: 0 }, { x: 0.1, y: 0 })] },
          { kind: 'dwell', at: { x: 0.1, y: 0 }, duration: 2 },
          { kind: 'contour', segments: [lineBetween({ x: 0.1, y: 0 }, { x: 0.1, y: 0.05 })] },
        ],
      },
      {
        contourId: 'b',
        name: 'outline b',
        pierce: { x: 1.1, y: 0.05 },
        pieces: [{ kind: 'contour', segments: [lineBetween({ x: 1.1, y: 0.05 }, { x: 1.2, y: 0.05 })] }],
      },
    ],
  };
  const { cutting } = plan;
  const timeline = cutTimeline(path, cutting);
  const along = (length: number) => pathTime([lineBetween({ x: 0, y: 0 }, { x: length, y: 0 })], cutting).time;

  it('is the pierces, the waits, the paths from rest to rest and the ways between', () => {
    const [first, second] = timeline.runs;
    expect(first?.end).toBeCloseTo(1.5 + along(0.1) + 2 + along(0.05), 9);
    // 1 m at 1 m/s and 2 m/s² takes longer than at full speed all the way
    expect((second?.start ?? 0) - (first?.end ?? 0)).toBe(0);
    expect(timeline.duration - (first?.end ?? 0)).toBeGreaterThan(1 + 1.5 + along(0.1));
    expect(timeline.duration - (first?.end ?? 0)).toBeLessThan(1.8 + 1.5 + along(0.1));
  });

  it('goes at the lower feed where a corner is eased', () => {
    const [before, eased, after] = [0, 0.1, 0.2].map((x) => lineBetween({ x, y: 0 }, { x: x + 0.1, y: 0 }));
    if (!before || !eased || !after) throw new Error('three pieces');
    const { duration } = cutTimeline(
      {
        runs: [
          {
            contourId: 'a',
            name: 'outline a',
            pierce: { x: 0, y: 0 },
            pieces: [
              { kind: 'contour', segments: [before] },
              { kind: 'contour', segments: [eased], feedShare: 0.25, powerShare: 0.5 },
              { kind: 'contour', segments: [after] },
            ],
          },
        ],
      },
      cutting,
    );
    const whole = pathTime([before, eased, after], {
      ...cutting,
      bounds: [undefined, 0.25 * cutting.feed, undefined],
    }).time;
    expect(duration).toBeCloseTo(1.5 + whole, 9);
    expect(whole - along(0.3)).toBeGreaterThan((0.99 * 3 * 0.1) / cutting.feed);
  });

  it('pierces, cuts, waits and travels, and the head never leaves its path', () => {
    const at = (time: number) => cutMoment(timeline, time);
    expect(at(0)).toMatchObject({ phase: 'pierce', at: { x: 0, y: 0 } });
    const middle = at(1.5 + along(0.1) / 2);
    expect(middle).toMatchObject({ phase: 'cut', run: 0, segment: 0 });
    expect(middle?.at.x).toBeCloseTo(0.05, 4);
    expect(at(1.5 + along(0.1) + 1)).toMatchObject({ phase: 'wait', segment: 1, at: { x: 0.1, y: 0 } });
    expect(at((timeline.runs[0]?.end ?? 0) + 0.5)).toMatchObject({ phase: 'travel', run: 1 });
    expect(at(1e9)?.at).toEqual({ x: 1.2, y: 0.05 });
    let before = at(0)?.at;
    for (let time = 0; time <= timeline.duration; time += 0.01) {
      const now = at(time)?.at;
      // no faster than it travels
      if (before && now) expect(pointDistance(before, now)).toBeLessThan(0.02);
      before = now;
    }
  });

  it('tells when so many pieces of a contour are cut', () => {
    expect(timeOfSegments(timeline, 0, 1)).toBeCloseTo(1.5 + along(0.1), 9);
    expect(timeOfSegments(timeline, 0, 2)).toBeCloseTo(timeline.runs[0]?.end ?? 0, 9);
  });

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
    expect(piece?.time).toBeCloseTo(run.timeline.duration);
    expect(countBefore(run.dropped, (slug?.time ?? 0) + 1e-6)).toBe(2);
    expect(countBefore(run.dropped, 0)).toBe(0);
  });

  it('of nothing is no time, and the head nowhere', () => {
    const empty = cutTimeline({ runs: [] }, cutting);
    expect(empty.duration).toBe(0);
    expect(cutMoment(empty, 3)).toBeNull();
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
