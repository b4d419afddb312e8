import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Contour, Point } from '../../../strategy/path/index.ts';
import {
  circleOf,
  contourArea,
  contourBox,
  contourContains,
  contourReverse,
  lineBetween,
  pointDistance,
  pointRotate,
  segmentPointAt,
} from '../../../strategy/path/index.ts';
import type { LayoutPart, PlacedPart, Placement } from '../../../strategy/path/plate/index.ts';
import {
  contourMoved,
  cutOrder,
  cutOrderFault,
  cutOrderKept,
  layoutProblems,
  mostProblems,
  partMoved,
  partPlaced,
  partSequence,
  partSize,
  partsPlaced,
  placementArray,
  plateRectangle,
  plateRemnant,
  startOf,
  travelLength,
} from '../../../strategy/path/plate/index.ts';
import { runs } from '../../support/runs.ts';

const polygon = (points: readonly Point[]): Contour => ({
  segments: points.map((p, i) => lineBetween(p, points[(i + 1) % points.length] ?? p)),
});
const rectangle = (x: number, y: number, width: number, height: number) =>
  polygon([
    { x, y },
    { x: x + width, y },
    { x: x + width, y: y + height },
    { x, y: y + height },
  ]);
const circle = (x: number, y: number, radius: number): Contour =>
  contourReverse({ segments: [circleOf({ x, y }, radius)] });

/** A bracket that is neither symmetric nor at the origin: 0.2 × 0.1 m, with two holes. */
const bracket: LayoutPart = {
  id: 'bracket',
  name: 'bracket',
  contours: [
    {
      id: '1',
      role: 'outer',
      parent: null,
      contour: polygon([
        { x: 0.5, y: 0.3 },
        { x: 0.7, y: 0.3 },
        { x: 0.7, y: 0.34 },
        { x: 0.58, y: 0.4 },
        { x: 0.5, y: 0.4 },
      ]),
    },
    { id: '2', role: 'hole', parent: '1', contour: circle(0.66, 0.33, 0.008) },
    { id: '3', role: 'hole', parent: '1', contour: circle(0.53, 0.36, 0.012) },
  ],
};
/** A ring 0.3 m wide with a hole 0.26 m wide. */
const frame: LayoutPart = {
  id: 'frame',
  name: 'frame',
  contours: [
    { id: '1', role: 'outer', parent: null, contour: rectangle(0, 0, 0.3, 0.3) },
    { id: '2', role: 'hole', parent: '1', contour: contourReverse(rectangle(0.02, 0.02, 0.26, 0.26)) },
  ],
};
const block: LayoutPart = {
  id: 'block',
  name: 'block',
  contours: [{ id: '1', role: 'outer', parent: null, contour: rectangle(0, 0, 0.1, 0.05) }],
};
const parts = [bracket, frame, block];
const placed = (...placements: Partial<Placement>[]): PlacedPart[] =>
  partsPlaced(
    parts,
    placements.map((one, i) => ({
      number: i + 1,
      partId: 'block',
      at: { x: 0, y: 0 },
      turn: 0,
      mirrored: false,
      ...one,
    })),
  );
const room = { kerfWidth: 7e-4, clearance: 8e-3, edgeMargin: 0.01 };
const plate = plateRectangle(3, 1.5);
const problemsOf = (all: PlacedPart[], on = plate, free = room) => layoutProblems(all, on, free).problems;

const anyPlacement = fc.record({
  partId: fc.constantFrom('bracket', 'frame', 'block'),
  at: fc.record({ x: fc.double({ min: 0, max: 2, noNaN: true }), y: fc.double({ min: 0, max: 1, noNaN: true }) }),
  turn: fc.double({ min: -Math.PI, max: Math.PI, noNaN: true }),
  mirrored: fc.boolean(),
});

describe('a part placed on a plate', () => {
  it('lies with the corner of its box where it was put, as large as before, outline to the left and holes to the right', () => {
    fc.assert(
      fc.property(anyPlacement, (lies) => {
        const [part] = placed(lies);
        if (!part) throw new Error('nothing was placed');
        expect(part.box.minX).toBeCloseTo(lies.at.x, 12);
        expect(part.box.minY).toBeCloseTo(lies.at.y, 12);
        const drawn = parts.find(({ id }) => id === lies.partId)?.contours ?? [];
        part.contours.forEach(({ contour, role, name }, i) => {
          const area = contourArea(contour);
          expect(area).toBeCloseTo(contourArea(drawn[i]?.contour ?? { segments: [] }), 12);
          expect(area > 0).toBe(role === 'outer');
          expect(name).toContain(`of part 1, ${lies.partId}`);
        });
        const { width, height } = partSize(parts.find(({ id }) => id === lies.partId) ?? block, lies);
        expect(part.box.maxX - part.box.minX).toBeCloseTo(width, 12);
        expect(part.box.maxY - part.box.minY).toBeCloseTo(height, 12);
      }),
      { numRuns: runs(60, 600) },
    );
  });

  it('is turned over when mirrored: what was on the right is on the left, and twice is as before', () => {
    const hole = (part: PlacedPart | undefined) => contourBox(part?.contours[1]?.contour ?? { segments: [] });
    const [as, over] = placed({ partId: 'bracket' }, { partId: 'bracket', mirrored: true });
    // the small hole is 40 mm from the right edge of a bracket 200 mm wide
    expect((hole(as).minX + hole(as).maxX) / 2).toBeCloseTo(0.16, 12);
    expect((hole(over).minX + hole(over).maxX) / 2).toBeCloseTo(0.04, 12);
    expect((hole(over).minY + hole(over).maxY) / 2).toBeCloseTo(0.03, 12);
  });

  it('names its contours with their place, so that a sentence needs no drawing', () => {
    const [, third] = placed({}, { number: 3, partId: 'bracket' });
    expect(third?.name).toBe('part 3, bracket');
    expect(third?.contours.map(({ id, name }) => [id, name])).toEqual([
      ['3.1', 'outline of part 3, bracket'],
      ['3.2', 'hole 1 of part 3, bracket'],
      ['3.3', 'hole 2 of part 3, bracket'],
    ]);
  });

  it('is refused when there is no such part', () => {
    expect(() => placed({ partId: 'nobody' })).toThrow(RangeError);
  });
});

describe('an array', () => {
  const array = {
    rows: 2,
    columns: 3,
    gap: { x: 0.01, y: 0.02 },
    at: { x: 0.1, y: 0.2 },
    turn: Math.PI / 2,
    mirrored: false,
    alternate: false,
  };

  it('stands in rows from the lower left, the box and the gap apart', () => {
    const made = placementArray(block, array, 5);
    expect(made.map(({ number }) => number)).toEqual([5, 6, 7, 8, 9, 10]);
    // turned by a right angle the block is 50 mm wide and 100 mm high
    made.forEach(({ at }, i) => {
      expect(at.x).toBeCloseTo(0.1 + (i % 3) * 0.06, 12);
      expect(at.y).toBeCloseTo(0.2 + Math.floor(i / 3) * 0.12, 12);
    });
  });

  it('leaves exactly the gap between neighbours, turned and mirrored as may be', () => {
    fc.assert(
      fc.property(
        fc.constantFrom(...parts),
        fc.record({
          rows: fc.integer({ min: 1, max: 4 }),
          columns: fc.integer({ min: 1, max: 4 }),
          gap: fc.record({
            x: fc.double({ min: 0, max: 0.1, noNaN: true }),
            y: fc.double({ min: 0, max: 0.1, noNaN: true }),
          }),
          at: fc.constant({ x: 0.02, y: 0.03 }),
          turn: fc.double({ min: -4, max: 4, noNaN: true }),
          mirrored: fc.boolean(),
          alternate: fc.boolean(),
        }),
        (part, asked) => {
          const lies = partsPlaced([part], placementArray(part, asked, 1));
          expect(lies).toHaveLength(asked.rows * asked.columns);
          lies.forEach(({ box }, i) => {
            const right = (i + 1) % asked.columns === 0 ? undefined : lies[i + 1];
            const above = lies[i + asked.columns];
            if (right) expect(right.box.minX - box.maxX).toBeCloseTo(asked.gap.x, 10);
            if (above) expect(above.box.minY - box.maxY).toBeCloseTo(asked.gap.y, 10);
          });
        },
      ),
      { numRuns: runs(60, 600) },
    );
  });

  it('turns every second one half round when asked', () => {
    const turns = placementArray(bracket, { ...array, turn: 0, alternate: true }, 1).map(({ turn }) => turn);
    expect(turns).toEqual([0, Math.PI, 0, Math.PI, 0, Math.PI]);
  });

  it.each([{ rows: 0 }, { columns: 1.5 }, { gap: { x: -1e-3, y: 0 } }])('of %j is refused', (wrong) => {
    expect(() => placementArray(block, { ...array, ...wrong }, 1)).toThrow(RangeError);
  });
});

describe('the checks of a layout', () => {
  it('say nothing when there is room', () => {
    expect(layoutProblems(placed({ at: { x: 0.02, y: 0.02 } }, { at: { x: 0.14, y: 0.02 } }), plate, room)).toEqual({
      problems: [],
      more: false,
    });
  });

  it('count two kerfs and the clearance between two pieces, to the micrometre', () => {
    const apart = 2 * room.kerfWidth + room.clearance;
    const beside = (gap: number) =>
      problemsOf(placed({ at: { x: 0.02, y: 0.02 } }, { at: { x: 0.12 + gap, y: 0.02 } }));
    expect(beside(apart)).toEqual([]);
    const [near] = beside(apart - 5e-6);
    expect(near).toMatchObject({ kind: 'near', placements: [1, 2] });
    expect(near?.at.x).toBeCloseTo(0.12 + apart / 2, 4);
    expect(beside(0.002)[0]?.why).toBe(
      'only 2 mm stay between part 1, block, and part 2, block: two kerfs and the clearance take 9.4 mm',
    );
  });

  it('call it an overlap when pieces cross, touch, lie in each other or on the very same place', () => {
    const kinds = (...at: Point[]) => problemsOf(placed(...at.map((one) => ({ at: one })))).map(({ kind }) => kind);
    expect(kinds({ x: 0.1, y: 0.1 }, { x: 0.15, y: 0.12 })).toEqual(['overlap']);
    expect(kinds({ x: 0.1, y: 0.1 }, { x: 0.2, y: 0.1 })).toEqual(['overlap']);
    expect(kinds({ x: 0.1, y: 0.1 }, { x: 0.1, y: 0.1 })).toEqual(['overlap']);
    const inSteel = placed({ partId: 'frame', at: { x: 0.1, y: 0.1 } }, { partId: 'frame', at: { x: 0.1, y: 0.1 } });
    expect(problemsOf(inSteel)[0]?.kind).toBe('overlap');
  });

  it('let a piece lie in another’s hole, and say when it comes too near its edge', () => {
    const inHole = (x: number) =>
      problemsOf(placed({ partId: 'frame', at: { x: 0.1, y: 0.1 } }, { at: { x, y: 0.2 } })).map(({ kind }) => kind);
    expect(inHole(0.2)).toEqual([]);
    expect(inHole(0.125)).toEqual(['near']);
    expect(inHole(0.11)).toEqual(['overlap']);
  });

  it('ask for the kerf and the margin at the plate’s edge, and name what reaches over it', () => {
    const at = (x: number) => problemsOf(placed({ at: { x, y: 0.5 } }));
    expect(at(0.0107)).toEqual([]);
    expect(at(0.004)[0]).toMatchObject({
      kind: 'edge',
      placements: [1],
      why: "only 4 mm stay between part 1, block, and the plate's edge: the kerf and the margin take 10.7 mm",
    });
    expect(at(-0.01)[0]?.kind).toBe('outside');
    expect(at(4)[0]?.kind).toBe('outside');
    expect(at(0)[0]?.kind).toBe('outside');
  });

  it('keep clear of what was cut from a remnant before', () => {
    const remnant = plateRemnant([
      { id: '1', role: 'outer', parent: null, contour: rectangle(-2, -1, 1, 1) },
      { id: '2', role: 'hole', parent: '1', contour: circle(-1.5, -0.5, 0.2) },
      { id: '3', role: 'outer', parent: null, contour: rectangle(5, 5, 0.1, 0.1) },
    ]);
    if (!remnant) throw new Error('the remnant has an outline');
    expect(remnant.box).toEqual({ minX: 0, minY: 0, maxX: 1, maxY: 1 });
    const at = (x: number, y: number, partId = 'block') =>
      problemsOf(placed({ partId, at: { x, y } }), remnant)[0]?.kind;
    expect(at(0.05, 0.05)).toBeUndefined();
    expect(at(0.45, 0.48)).toBe('outside');
    expect(at(0.25, 0.6)).toBe('outside');
    expect(at(0.194, 0.5)).toBe('edge');
    // a ring of which the opening is all steel it would need
    const opened = plateRemnant([
      { id: '1', role: 'outer', parent: null, contour: rectangle(0, 0, 1, 1) },
      { id: '2', role: 'hole', parent: '1', contour: circle(0.51, 0.4, 0.002) },
    ]);
    if (!opened) throw new Error('the remnant has an outline');
    expect(problemsOf(placed({ at: { x: 0.45, y: 0.38 } }), opened)[0]?.kind).toBe('outside');
    expect(plateRemnant([])).toBeNull();
  });

  it('agree with places sampled all over two pieces on whether they overlap', () => {
    let overlaps = 0;
    fc.assert(
      fc.property(anyPlacement, anyPlacement, (one, other) => {
        const [a, b] = placed(one, { ...other, at: { x: one.at.x + other.at.x / 5, y: one.at.y + other.at.y / 5 } });
        if (!a || !b) throw new Error('nothing was placed');
        const found = problemsOf([a, b], plateRectangle(50, 50), { kerfWidth: 0, clearance: 0, edgeMargin: 0 }).some(
          ({ kind }) => kind === 'overlap',
        );
        const deepest = sampledOverlap(a, b);
        // a place well inside both proves an overlap; without one there may still be a sliver, where the rims meet
        if (deepest > 1e-4) {
          overlaps++;
          expect(found).toBe(true);
        }
        if (found) expect(deepest > 0 || rimGap(a, b) < 5e-3).toBe(true);
        else expect(deepest).toBeLessThanOrEqual(0);
      }),
      { numRuns: runs(100, 1500) },
    );
    expect(overlaps).toBeGreaterThan(10);
  });

  it('say the same of a layout wherever on a large plate it lies, and in whichever order its pieces are listed', () => {
    fc.assert(
      fc.property(fc.array(anyPlacement, { minLength: 2, maxLength: 6 }), (lies) => {
        const at = (by: number) =>
          placed(...lies.map((one) => ({ ...one, at: { x: one.at.x + by, y: one.at.y + by } })));
        const told = (all: PlacedPart[]) =>
          layoutProblems(all, plateRectangle(100, 100), room)
            .problems.map(({ kind, placements }) => `${kind} ${placements.join(' ')}`)
            .sort();
        expect(told(at(40))).toEqual(told(at(10)));
        expect(told([...at(10)].reverse())).toEqual(told(at(10)));
      }),
      { numRuns: runs(40, 400) },
    );
  });

  it('stop at what somebody can mend before looking again', () => {
    const heap = placed(...Array.from({ length: 60 }, () => ({ at: { x: 0.5, y: 0.5 } })));
    const { problems, more } = layoutProblems(heap, plate, room);
    expect(problems).toHaveLength(mostProblems);
    expect(more).toBe(true);
  });
});

describe('the cut order', () => {
  const many = fc.array(
    fc.record({
      partId: fc.constantFrom('bracket', 'block'),
      column: fc.integer({ min: 0, max: 5 }),
      row: fc.integer({ min: 0, max: 4 }),
      turn: fc.double({ min: -3, max: 3, noNaN: true }),
      mirrored: fc.boolean(),
    }),
    { minLength: 1, maxLength: 12 },
  );
  const lying = (all: readonly { partId: string; column: number; row: number; turn: number; mirrored: boolean }[]) =>
    placed(...all.map(({ column, row, ...one }) => ({ ...one, at: { x: column * 0.4, y: row * 0.3 } })));

  it('cuts holes before their outline, and part after part', () => {
    const order = cutOrder(placed({ partId: 'bracket' }, { partId: 'bracket', at: { x: 0.3, y: 0 } }));
    expect(order.map((id) => id.split('.')[0])).toEqual(['1', '1', '1', '2', '2', '2']);
    expect([order[2], order[5]]).toEqual(['1.1', '2.1']);
  });

  it('holds each contour once, breaks no rule, and each time takes the nearest that may be cut', () => {
    fc.assert(
      fc.property(many, (all) => {
        const lies = lying(all);
        const order = cutOrder(lies);
        expect(cutOrderFault(lies, order)).toBeNull();
        const contours = new Map(lies.flatMap((part) => part.contours.map((one) => [one.id, one] as const)));
        const done = new Set<string>();
        let at: Point = { x: 0, y: 0 };
        for (const id of order) {
          const own = contours.get(id);
          if (!own) throw new Error(`${id} is no contour`);
          const begun = own.placement;
          const isBegun = [...done].some((one) => one.startsWith(`${begun}.`));
          // independent of the order's own bookkeeping: all that may be cut now
          const may = [...contours.values()].filter(
            (one) =>
              !done.has(one.id) &&
              (isBegun ? one.placement === begun : ![...done].some((d) => d.startsWith(`${one.placement}.`))) &&
              ![...contours.values()].some((inner) => inner.parent === one.id && !done.has(inner.id)),
          );
          const least = Math.min(...may.map((one) => pointDistance(at, startOf(one))));
          expect(pointDistance(at, startOf(own))).toBeCloseTo(least, 8);
          done.add(id);
          at = startOf(own);
        }
        expect(done.size).toBe(contours.size);
      }),
      { numRuns: runs(60, 600) },
    );
  });

  it('is the same however the placements are listed, and when plate and pieces are moved or turned together', () => {
    fc.assert(
      fc.property(many, fc.double({ min: -3, max: 3, noNaN: true }), (all, angle) => {
        // no two pieces on the same place: equal distances go by the number, and the rest of the law needs none
        const once = all.filter((one, i) => all.findIndex((o) => o.column === one.column && o.row === one.row) === i);
        const lies = lying(once);
        const order = cutOrder(lies);
        expect(cutOrder([...lies].reverse())).toEqual(order);
        const turned = lies.map((part) => ({
          ...part,
          contours: part.contours.map((one) => ({
            ...one,
            contour: {
              segments: one.contour.segments.map((segment) =>
                segment.kind === 'line'
                  ? lineBetween(move(segment.start, angle), move(segment.end, angle))
                  : {
                      ...segment,
                      centre: move(segment.centre, angle),
                      startAngle: segment.startAngle + angle,
                    },
              ),
            },
          })),
        }));
        const again = cutOrder(turned, move({ x: 0, y: 0 }, angle));
        expect(travelLength(turned, again, move({ x: 0, y: 0 }, angle))).toBeCloseTo(travelLength(lies, order), 9);
      }),
      { numRuns: runs(40, 400) },
    );
  });

  it('cuts a piece that lies in another’s hole before the hole falls out with it', () => {
    const lies = placed({ partId: 'frame', at: { x: 0.1, y: 0.1 } }, { at: { x: 0.2, y: 0.2 } });
    const order = cutOrder(lies);
    expect(order).toEqual(['2.1', '1.2', '1.1']);
    expect(cutOrderFault(lies, ['1.2', '2.1', '1.1'])).toBe(
      'outline of part 2, block, must be cut before the hole around it falls out',
    );
    expect(partMoved(lies, order, 1, -1)).toMatchObject({ kind: 'none' });
  });

  it('counts the way from the plate’s corner to each contour’s beginning', () => {
    const lies = placed({ at: { x: 0.3, y: 0.4 } }, { at: { x: 0.9, y: 1.2 } });
    expect(travelLength(lies, ['1.1', '2.1'])).toBeCloseTo(1.5, 12);
    expect(travelLength(lies, ['2.1', '1.1'])).toBeCloseTo(2.5, 12);
  });

  it('says what is wrong with one that somebody sends', () => {
    const lies = placed({ partId: 'bracket' });
    expect(cutOrderFault(lies, ['1.2', '1.3', '1.1'])).toBeNull();
    expect(cutOrderFault(lies, ['1.2', '1.1', '1.3'])).toBe(
      'hole 2 of part 1, bracket, must be cut before the outline around it falls out',
    );
    expect(cutOrderFault(lies, ['1.2', '1.3'])).toBe('outline of part 1, bracket, is missing');
    expect(cutOrderFault(lies, ['1.2', '1.2', '1.3', '1.1'])).toBe('a contour stands in the order twice');
    expect(cutOrderFault(lies, ['1.2', '1.3', '1.1', '7.1'])).toBe('there is no contour 7.1 on the plate');
  });
});

describe('the cut order by hand', () => {
  const lies = placed({ partId: 'bracket' }, { at: { x: 0.3, y: 0 } }, { partId: 'bracket', at: { x: 0.6, y: 0 } });
  const order = ['1.3', '1.2', '1.1', '2.1', '3.3', '3.2', '3.1'];

  it('moves one contour, but no hole behind its outline', () => {
    expect(contourMoved(lies, order, '1.2', -1)).toEqual({
      kind: 'ok',
      order: ['1.2', '1.3', '1.1', '2.1', '3.3', '3.2', '3.1'],
    });
    expect(contourMoved(lies, order, '1.2', 1)).toMatchObject({ kind: 'none' });
    expect(contourMoved(lies, order, '1.3', -1)).toEqual({ kind: 'none', why: 'it is the first' });
    expect(contourMoved(lies, order, '3.1', 1)).toEqual({ kind: 'none', why: 'it is the last' });
  });

  it('moves a whole part before or behind its neighbour, and back', () => {
    const earlier = partMoved(lies, order, 3, -1);
    expect(earlier).toEqual({ kind: 'ok', order: ['1.3', '1.2', '1.1', '3.3', '3.2', '3.1', '2.1'] });
    if (earlier.kind === 'ok') expect(partMoved(lies, earlier.order, 3, 1)).toEqual({ kind: 'ok', order });
    expect(partMoved(lies, order, 1, -1).kind).toBe('none');
    expect(partSequence(order)).toEqual([1, 2, 3]);
  });

  it('keeps what it can when parts come and go', () => {
    const fewer = placed({ partId: 'bracket' }, { at: { x: 0.3, y: 0 } }, { at: { x: 0.9, y: 0 } });
    const kept = cutOrderKept(fewer, ['3.3', '2.1', '1.2', '1.1', '1.3']);
    expect(kept).toEqual(['2.1', '1.2', '1.3', '1.1', '3.1']);
    expect(cutOrderFault(fewer, kept)).toBeNull();
  });

  it('whatever somebody wants, what is kept is an order that can be cut', () => {
    const ids = lies.flatMap(({ contours }) => contours.map(({ id }) => id));
    fc.assert(
      fc.property(fc.shuffledSubarray([...ids, '9.1', '1.9']), (wanted) => {
        const kept = cutOrderKept(lies, wanted);
        expect(cutOrderFault(lies, kept)).toBeNull();
        expect(cutOrderKept(lies, kept)).toEqual(kept);
      }),
      { numRuns: runs(100, 1000) },
    );
  });
});

const move = (p: Point, angle: number): Point => {
  const turned = pointRotate(p, angle);
  return { x: turned.x + 3, y: turned.y - 2 };
};

/** Places along all edges of a part, at most 4 mm apart. */
const rim = (part: PlacedPart): Point[] =>
  part.contours.flatMap(({ contour }) =>
    contour.segments.flatMap((segment) => Array.from({ length: 80 }, (_, i) => segmentPointAt(segment, i / 80))),
  );
const gap = (p: Point, places: readonly Point[]) =>
  places.reduce((least, q) => Math.min(least, pointDistance(p, q)), Infinity);
const rimGap = (a: PlacedPart, b: PlacedPart): number => {
  const others = rim(b);
  return rim(a).reduce((least, p) => Math.min(least, gap(p, others)), Infinity);
};

/** How deep the deepest of a net of places lies in the steel of both, m, by sampled edges alone; −∞ when none lies in both. */
function sampledOverlap(a: PlacedPart, b: PlacedPart): number {
  const cells = 40;
  const inside = (part: PlacedPart, p: Point) =>
    part.contours.filter(({ contour }) => contourContains(contour, p)).length % 2 === 1;
  const box = {
    minX: Math.max(a.box.minX, b.box.minX),
    minY: Math.max(a.box.minY, b.box.minY),
    maxX: Math.min(a.box.maxX, b.box.maxX),
    maxY: Math.min(a.box.maxY, b.box.maxY),
  };
  if (box.minX > box.maxX || box.minY > box.maxY) return -Infinity;
  const places = Array.from({ length: (cells + 1) ** 2 }, (_, i) => ({
    x: box.minX + ((i % (cells + 1)) / cells) * (box.maxX - box.minX),
    y: box.minY + (Math.floor(i / (cells + 1)) / cells) * (box.maxY - box.minY),
  })).filter((p) => inside(a, p) && inside(b, p));
  const edges = [...rim(a), ...rim(b)];
  return places.slice(0, 60).reduce((most, p) => Math.max(most, gap(p, edges)), -Infinity);
}

describe('the plate', () => {
  it('of no size is refused', () => {
    expect(() => plateRectangle(0, 1)).toThrow(RangeError);
    expect(() => partPlaced({ id: 'x', name: 'x', contours: [] }, placed()[0] as never)).toThrow();
  });
});
