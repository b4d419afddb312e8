import { describe, expect, it } from 'vitest';
import type { DrawingAnswers, DrawingReading } from '../../../strategy/path/drawing/index.ts';
import { drawingRead } from '../../../strategy/path/drawing/index.ts';
import { contourArea, contourBox, contourCorners } from '../../../strategy/path/index.ts';
import type { DxfDrawing, Tag } from '../../support/drawings/make-dxf.ts';
import {
  arc,
  circle,
  insert,
  line,
  makeDxf,
  oldPolyline,
  polyline,
  rectangle,
  ring,
  spline,
  text,
} from '../../support/drawings/make-dxf.ts';

function read(drawing: DxfDrawing, answers?: DrawingAnswers): DrawingReading {
  const result = drawingRead(makeDxf(drawing), answers);
  if (result.kind === 'none') throw new Error(result.why);
  return result;
}
function refused(drawing: DxfDrawing): string {
  const result = drawingRead(makeDxf(drawing));
  if (result.kind === 'drawing') throw new Error('it was read');
  return result.why;
}
/** Areas in mm², as signed as the contours are turned. */
const areas = (r: DrawingReading) => r.contours.map(({ contour }) => Math.round(contourArea(contour) * 1e8) / 100);
const roles = (r: DrawingReading) => r.contours.map(({ role }) => role);
const boxes = (r: DrawingReading) =>
  r.contours.map(({ contour }) => {
    const { minX, minY, maxX, maxY } = contourBox(contour);
    return [minX, minY, maxX, maxY].map((v) => Math.round(v * 1e6) / 1e3 + 0);
  });
const repaired = (r: DrawingReading) => r.repaired.map(({ what }) => what);
/** A place within a nanometre; vitest types its matchers as any. */
const near = (x: number, y: number): unknown => ({
  x: expect.closeTo(x, 9) as number,
  y: expect.closeTo(y, 9) as number,
});
const mm = { units: 4 } as const;

describe('a drawing with its dimensions around', () => {
  const dimension: Tag[] = [
    [0, 'DIMENSION'],
    [8, 'DIM'],
    [2, '*D1'],
    [10, 50],
    [20, -20],
    [13, 0],
    [23, 0],
    [14, 100],
    [24, 0],
  ];
  const drawing: DxfDrawing = {
    version: 'AC1009',
    lineEnd: '\r\n',
    blocks: [{ name: '*D1', entities: [line([0, -20], [100, -20], 'DIM'), line([0, 0], [0, -22], 'DIM')] }],
    entities: [
      oldPolyline([
        [0, 0],
        [100, 0, 0.4142135623730951],
        [120, 20],
        [120, 60],
        [0, 60],
      ]),
      circle([30, 30], 8),
      dimension,
      text([10, -30], 'BRACKET'),
      [
        [0, 'HATCH'],
        [8, 'HATCH'],
        [10, 0],
        [20, 0],
        [30, 0],
        [10, 7],
        [20, 9],
      ],
      [
        [0, 'VIEWPORT'],
        [8, '0'],
        [67, 1],
        [10, 500],
        [20, 500],
      ],
    ],
  };

  it('is the part alone, and says what stood around it and where', () => {
    const part = read(drawing, { unit: 'mm' });
    expect(roles(part)).toEqual(['outer', 'hole']);
    expect(areas(part)[0]).toBeCloseTo(120 * 60 - 20 * 20 * (1 - Math.PI / 4), 1);
    expect(part.leftOut).toEqual([
      { what: 'DIMENSION', count: 1, at: [near(0.05, -0.02)] },
      { what: 'TEXT', count: 1, at: [near(0.01, -0.03)] },
      { what: 'HATCH', count: 1, at: [near(0.007, 0.009)] },
      { what: 'VIEWPORT on a paper-space sheet', count: 1, at: [] },
    ]);
  });

  it('asks for the unit it does not state, with the size in either', () => {
    const question = read(drawing).questions.find(({ kind }) => kind === 'unit');
    expect(question).toMatchObject({ readings: [{ unit: 'mm' }, { unit: 'inch' }] });
  });
});

describe('blocks', () => {
  const half = { name: 'HALF', entities: [arc([0, 0], 10, -90, 90, '0'), line([0, 10], [0, -10], '0')] };
  const pair = {
    name: 'PAIR',
    base: [5, 0] as const,
    entities: [
      insert('HALF', [5, 0], [], '0'),
      insert(
        'half',
        [-15, 0],
        [
          [41, -1],
          [50, 0],
        ],
        '0',
      ),
    ],
  };

  it('within blocks, mirrored, turned and scaled, lie where they must', () => {
    const r = read({
      ...mm,
      version: 'AC1032',
      blocks: [half, pair],
      entities: [
        insert(
          'PAIR',
          [100, 0],
          [
            [50, 90],
            [41, 2],
            [42, 2],
          ],
        ),
      ],
    });
    expect(boxes(r)).toEqual([
      [80, 0, 120, 20],
      [80, -60, 120, -40],
    ]);
    for (const area of areas(r)) expect(area).toBeCloseTo((Math.PI * 400) / 2, 1);
  });

  it('scaled unequally turn their circles into ellipses of arcs, within a hundredth of a millimetre', () => {
    const r = read({
      ...mm,
      blocks: [{ name: 'O', entities: [circle([0, 0], 10, '0')] }],
      entities: [
        insert(
          'O',
          [0, 0],
          [
            [41, 3],
            [42, -1],
            [50, 30],
          ],
        ),
      ],
    });
    expect(areas(r)[0]).toBeCloseTo(Math.PI * 300, 0);
    expect(r.deviation).toBeGreaterThan(0);
    expect(r.deviation).toBeLessThanOrEqual(1e-5);
    expect(contourCorners(r.contours[0]?.contour ?? { segments: [] }, 0.01)).toEqual([]);
  });

  it('in turned arrays are spaced along their own axes', () => {
    const r = read({
      ...mm,
      blocks: [{ name: 'O', entities: [circle([0, 0], 1, '0')] }],
      entities: [
        insert(
          'O',
          [0, 0],
          [
            [50, 90],
            [70, 3],
            [71, 2],
            [44, 10],
            [45, 5],
          ],
        ),
      ],
    });
    expect(boxes(r).map(([x, y]) => [(x ?? 0) + 1, (y ?? 0) + 1])).toEqual([
      [0, 0],
      [0, 10],
      [0, 20],
      [-5, 0],
      [-5, 10],
      [-5, 20],
    ]);
  });

  it('that hold each other are refused by name', () => {
    const blocks = [
      { name: 'A', entities: [insert('B', [0, 0])] },
      { name: 'B', entities: [insert('A', [0, 0]), circle([0, 0], 3)] },
    ];
    expect(refused({ ...mm, blocks, entities: [insert('A', [0, 0])] })).toMatch(
      /Block "[AB]" is inserted within blocks more than 16 deep/,
    );
  });

  it('of no size, or missing, are left out where they stand', () => {
    const r = read({
      ...mm,
      blocks: [half],
      entities: [circle([0, 0], 9), insert('HALF', [3, 4], [[41, 0]]), insert('LOST', [5, 6])],
    });
    expect(r.leftOut).toEqual([
      { what: 'INSERT of "HALF" with scale 0', count: 1, at: [{ x: 0.003, y: 0.004 }] },
      { what: 'INSERT of the missing block "LOST"', count: 1, at: [{ x: 0.005, y: 0.006 }] },
    ]);
  });

  it('a thousand times a thousand, of nothing, are refused before they cost anything', () => {
    const blocks = [
      { name: 'EMPTY', entities: [] },
      {
        name: 'MANY',
        entities: [
          insert(
            'EMPTY',
            [0, 0],
            [
              [70, 400],
              [71, 400],
            ],
          ),
        ],
      },
    ];
    expect(
      refused({
        ...mm,
        blocks,
        entities: [
          insert(
            'MANY',
            [0, 0],
            [
              [70, 400],
              [71, 400],
            ],
          ),
        ],
      }),
    ).toContain('more than 200000 entities');
  });
});

describe('a plane that points down', () => {
  it('mirrors its arcs, circles and polylines alike, so that they still meet', () => {
    const down: Tag[] = [
      [210, 0],
      [220, 0],
      [230, -1],
    ];
    const r = read({
      ...mm,
      version: 'AC1021',
      entities: [
        polyline(
          [
            [-40, 0],
            [0, 0],
            [0, 20],
            [-40, 20],
          ],
          false,
          'CUT',
          down,
        ),
        // from its own (−40, 20) round to (−40, 0): in the world at x = 40, bulging right
        arc([-40, 10], 10, 90, 270, 'CUT', down),
        circle([-10, 10], 3, 'CUT', down),
      ],
    });
    expect(boxes(r)).toEqual([
      [0, 0, 50, 20],
      [7, 7, 13, 13],
    ]);
    expect(roles(r)).toEqual(['outer', 'hole']);
  });
});

describe('splines', () => {
  const s = Math.SQRT1_2;
  const square: [number, number][] = [
    [10, 0],
    [10, 10],
    [0, 10],
    [-10, 10],
    [-10, 0],
    [-10, -10],
    [0, -10],
    [10, -10],
    [10, 0],
  ];

  it('that are rational quarters make a circle', () => {
    const weights = [1, s, 1, s, 1, s, 1, s, 1].map((w): Tag => [41, w]);
    const r = read({ ...mm, entities: [spline(2, [0, 0, 0, 1, 1, 2, 2, 3, 3, 4, 4, 4], square, weights)] });
    expect(areas(r)[0]).toBeCloseTo(Math.PI * 100, 1);
    expect(r.deviation).toBeLessThanOrEqual(1e-5);
  });

  it('given by fit points alone pass through each of them', () => {
    const fit = Array.from(
      { length: 12 },
      (_, i) => [30 * Math.cos((i * Math.PI) / 6), 20 * Math.sin((i * Math.PI) / 6)] as const,
    );
    const points = [...fit, fit[0] ?? [0, 0]].flatMap(([x, y]): Tag[] => [
      [11, x],
      [21, y],
    ]);
    const r = read({ ...mm, version: 'AC1032', entities: [[[0, 'SPLINE'], [8, 'CUT'], [70, 1], [71, 3], ...points]] });
    expect(roles(r)).toEqual(['outer']);
    // a smooth closed curve through points of an ellipse is that ellipse within half a percent
    expect(Math.abs((areas(r)[0] ?? 0) / (Math.PI * 600) - 1)).toBeLessThan(5e-3);
    expect(contourCorners(r.contours[0]?.contour ?? { segments: [] }, 0.02)).toEqual([]);
  });

  it('given by fit points leave and arrive along the directions given', () => {
    const ends: Tag[] = [
      [12, 0],
      [22, 1],
      [13, 0],
      [23, -1],
    ];
    const points: Tag[] = [
      [11, 0],
      [21, 0],
      [11, 20],
      [21, 10],
      [11, 40],
      [21, 0],
    ];
    const r = read({
      ...mm,
      entities: [[[0, 'SPLINE'], [8, 'CUT'], [71, 3], ...ends, ...points], line([40, 0], [0, 0])],
    });
    const corners = contourCorners(r.contours[0]?.contour ?? { segments: [] }, 0.1);
    expect(corners.map(({ angle }) => Math.round((angle * 180) / Math.PI))).toEqual([90, 90]);
  });

  it('whose knots fall by a rounding, or lack their ends, are mended and named with their place', () => {
    const bent: [number, number][] = [
      [0, 0],
      [10, 20],
      [30, 20],
      [40, 0],
    ];
    const closing = line([40, 0], [0, 0]);
    const good = read({ ...mm, entities: [spline(3, [0, 0, 0, 0, 1, 1, 1, 1], bent), closing] });
    for (const knots of [
      [0, 0, 0, 0, 1, 1, 1 - 1e-12, 1],
      [0, 0, 0, 1, 1, 1],
    ]) {
      const r = read({ ...mm, entities: [spline(3, knots, bent), closing] });
      expect(areas(r)).toEqual(areas(good));
      expect(r.mended).toMatchObject([{ count: 1, at: [{ x: 0, y: 0 }] }]);
    }
  });

  it('whose knots make no sense are left out with their place, or drawn through their fit points', () => {
    const bent: [number, number][] = [
      [3, 4],
      [10, 20],
      [30, 20],
      [40, 0],
    ];
    const broken = spline(3, [0, 0, 0, 0, 5, 1, 1, 1], bent);
    const r = read({ ...mm, entities: [circle([0, 0], 9), broken] });
    expect(r.leftOut).toEqual([
      { what: 'SPLINE whose knots, points and weights do not fit together', count: 1, at: [{ x: 0.003, y: 0.004 }] },
    ]);
    const fit: Tag[] = [
      [11, 0],
      [21, 0],
      [11, 20],
      [21, 10],
      [11, 40],
      [21, 0],
    ];
    const drawn = read({ ...mm, entities: [[...broken, ...fit], line([40, 0], [0, 0])] });
    expect(roles(drawn)).toEqual(['outer']);
    expect(drawn.mended.map(({ what }) => what)).toEqual([
      'SPLINE whose knots are broken, drawn through its fit points',
    ]);
  });
});

describe('pieces drawn twice', () => {
  it('between two parts of lines are kept for both', () => {
    const r = read({ ...mm, entities: [...ring(rectangle(0, 0, 100, 60)), ...ring(rectangle(100, 0, 80, 60))] });
    expect(areas(r)).toEqual([6000, 4800]);
    expect(roles(r)).toEqual(['outer', 'outer']);
    expect(r.openChains).toEqual([]);
    expect(r.repaired).toMatchObject([
      { what: 'edge drawn twice, kept for the outline on either side', at: { x: 0.1, y: 0.03 } },
    ]);
    expect(r.crossings).toEqual([]);
  });

  it('between parts whose edges are of different length are kept for both, and each part is whole again', () => {
    const r = read({ ...mm, entities: [...ring(rectangle(0, 0, 100, 60)), ...ring(rectangle(100, 20, 50, 25))] });
    expect(areas(r)).toEqual([6000, 1250]);
    expect(r.contours.map(({ contour }) => contour.segments.length)).toEqual([4, 4]);
  });

  it('between four parts that meet in a corner are kept for all', () => {
    const parts = [
      rectangle(0, 0, 50, 40),
      rectangle(50, 0, 30, 40),
      rectangle(0, 40, 50, 20),
      rectangle(50, 40, 30, 20),
    ];
    const r = read({ ...mm, entities: parts.flatMap((corners) => ring(corners)) });
    expect(areas(r).sort((a, b) => b - a)).toEqual([2000, 1200, 1000, 600]);
  });

  it('between a part that is one polyline and one of lines are kept', () => {
    const r = read({ ...mm, entities: [polyline(rectangle(0, 0, 100, 60)), ...ring(rectangle(100, 0, 80, 60))] });
    expect(areas(r)).toEqual([6000, 4800]);
    expect(r.openChains).toEqual([]);
  });

  it('within one outline are dropped, whole or in part, and said with their place', () => {
    const [bottom, right, top, left] = ring(rectangle(0, 0, 100, 60));
    const r = read({
      ...mm,
      entities: [
        line([0, 0], [60, 0]),
        line([40, 0], [100, 0]),
        line([100, 60], [100, 0]),
        line([100, 10], [100, 30]),
        ...[top, left, left, right, bottom].flatMap((one) => (one ? [one] : [])),
      ],
    });
    expect(areas(r)).toEqual([6000]);
    expect(r.openChains).toEqual([]);
    expect(new Set(repaired(r))).toEqual(
      new Set(['duplicate dropped', 'duplicate drawn the other way dropped', 'overlapping piece dropped']),
    );
    for (const { at } of r.repaired) expect([0, 0.1]).toContainEqual(expect.closeTo(at.y === 0 ? 0 : at.x, 9));
  });

  it('on one circle are one circle', () => {
    const r = read({
      ...mm,
      entities: [...ring(rectangle(-50, -50, 100, 100)), arc([0, 0], 20, 0, 200), arc([0, 0], 20, 180, 20)],
    });
    expect(roles(r)).toEqual(['outer', 'hole']);
    expect(areas(r)[1]).toBeCloseTo(-Math.PI * 400, 1);
    expect(r.openChains).toEqual([]);
    expect(repaired(r)).toEqual(['overlapping piece dropped', 'overlapping piece dropped']);
  });

  it('as a whole outline from another corner the other way are dropped', () => {
    const corners = rectangle(0, 0, 100, 60);
    const other = [...corners.slice(2), ...corners.slice(0, 2)].reverse();
    const r = read({ ...mm, entities: [polyline(corners), polyline(other), ...ring(corners)] });
    expect(areas(r)).toEqual([6000]);
    expect(r.openChains).toEqual([]);
  });

  it('that only lie on each other and close nothing stay as they were drawn', () => {
    const r = read({ ...mm, entities: [circle([0, 50], 9), line([0, 0], [60, 0]), line([40, 0], [100, 0])] });
    expect(r.openChains.map(({ segments }) => segments.length)).toEqual([1, 1]);
    expect(r.repaired).toEqual([]);
  });
});

describe('gaps', () => {
  // in inches: the corner is open by 0.02 in, and the step beside it is 0.01 in high
  const stepped: DxfDrawing = {
    version: 'AC1021',
    units: 1,
    entities: [
      line([0, 0], [4, 0]),
      line([4, 0], [4, 0.01]),
      line([4, 0.01], [4.01, 0.01]),
      line([4.01, 0.01], [4.01, 3]),
      line([4.01, 3], [0, 3]),
      line([0, 3], [0, 0.02]),
    ],
  };

  it('wider than details nearby close without harming them', () => {
    const open = read(stepped);
    const question = open.questions.find(({ kind }) => kind === 'gaps');
    if (question?.kind !== 'gaps') throw new Error('the gap is asked about');
    expect(question.gaps).toMatchObject([{ size: expect.closeTo(0.02 * 0.0254, 9) as number }]);
    const closed = read(stepped, { gapTolerance: question.tolerance });
    expect(closed.contours.map(({ contour }) => contour.segments.length)).toEqual([6]);
    const wide = read(stepped, { gapTolerance: 5e-3 });
    expect(wide.contours.map(({ contour }) => contour.segments.length)).toEqual([6]);
  });

  it('of a polyline that is not closed at its own corner are asked about and closed', () => {
    const hook: DxfDrawing = { ...mm, entities: [polyline([...rectangle(0, 0, 100, 60), [0.3, 0.4]], false)] };
    const question = read(hook).questions.find(({ kind }) => kind === 'gaps');
    if (question?.kind !== 'gaps') throw new Error('the gap is asked about');
    expect(question.gaps[0]?.size).toBeCloseTo(5e-4, 9);
    expect(roles(read(hook, { gapTolerance: 1e-3 }))).toEqual(['outer']);
  });
});

describe('outlines that cross', () => {
  it('themselves are found with the place', () => {
    const r = read({
      ...mm,
      entities: [
        polyline([
          [0, 0],
          [100, 60],
          [100, 0],
          [0, 60],
        ]),
      ],
    });
    expect(r.crossings).toEqual([near(0.05, 0.03)]);
  });

  it('only touch where circles are tangent, which is no crossing', () => {
    const r = read({ ...mm, entities: [circle([0, 0], 30), circle([20, 0], 10), circle([50, 0], 20)] });
    expect(r.crossings).toEqual([]);
  });
});

describe('pieces of nothing', () => {
  it('are dropped, and an outline that goes and comes back is no part', () => {
    const r = read({
      ...mm,
      entities: [
        circle([0, 0], 30),
        line([5, 5], [5, 5]),
        polyline(
          [
            [40, 0],
            [60, 0],
          ],
          true,
        ),
        circle([3, 3], 0),
      ],
    });
    expect(roles(r)).toEqual(['outer']);
    expect(repaired(r)).toEqual(['zero-length piece dropped', 'outline that encloses nothing dropped']);
    expect(r.leftOut).toMatchObject([{ what: 'CIRCLE without radius', count: 1 }]);
  });
});

describe('old bytes', () => {
  it('of one byte a character, with tabs, any case of layer names and no end, are read', () => {
    const bytes = makeDxf({
      layers: [{ name: 'AUSSCHNITT É' }, { name: 'Rahmen', frozen: true }],
      entities: [circle([0, 0], 30, 'ausschnitt é'), ...ring(rectangle(-50, -50, 100, 100), 'RAHMEN')],
      oneByte: true,
      endless: true,
      lineEnd: ' \t\r\n',
    });
    const r = drawingRead(bytes, { unit: 'mm' });
    if (r.kind === 'none') throw new Error(r.why);
    expect(r.layers).toEqual([
      { name: 'AUSSCHNITT É', pieces: 1, hidden: false, taken: true },
      { name: 'Rahmen', pieces: 4, hidden: true, taken: false },
    ]);
    expect(r.aside).toHaveLength(4);
    expect(r.leftOut.map(({ what, count }) => [what, count])).toEqual([
      ['end of the file (it stops before its EOF mark)', 1],
      ['LINE on the hidden layer "Rahmen"', 4],
    ]);
  });

  it('of a spline-fit polyline are read without its frame', () => {
    const r = read(
      {
        entities: [
          oldPolyline(
            [
              [0, 0, 0, 16],
              [0, 0, 0, 8],
              [50, 0, 0, 8],
              [50, 40, 0, 8],
              [80, 90, 0, 16],
            ],
            1 | 4,
          ),
        ],
      },
      { unit: 'mm' },
    );
    expect(areas(r)).toEqual([1000]);
  });
});
