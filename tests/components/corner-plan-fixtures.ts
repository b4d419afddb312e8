import type { CornerPlan, PlannedCorner } from '@/shared/corner-plans.ts';
import type { ShownPath } from '@/shared/take-away.ts';
import { arcOf, lineBetween, segmentStart } from '@/strategy/path/index.ts';
import { ids } from '../support/page.tsx';

const square = [
  { x: 0, y: 0 },
  { x: 0.1, y: 0 },
  { x: 0.1, y: 0.1 },
  { x: 0, y: 0.1 },
];
const segments = square.map((start, i) => lineBetween(start, square[(i + 1) % 4] ?? start));

export const corner = (n: number, more: Partial<PlannedCorner> = {}): PlannedCorner => ({
  id: `c0-${n}`,
  contourId: '0',
  at: square[n] ?? { x: 0, y: 0 },
  angle: Math.PI / 2,
  convex: true,
  treatment: 'leave',
  why: 'the tip returns at 180 °C, under the limit',
  chosenBy: 'rule',
  untreated: 453.15,
  treated: 453.15,
  straightEdge: 330,
  addedTime: 0,
  dwell: null,
  loop: null,
  options: [
    {
      treatment: 'leave',
      fits: true,
      returnTemperature: 453.15,
      addedTime: 0,
      why: 'the tip returns at 180 °C',
      at: null,
    },
    {
      treatment: 'loop',
      fits: false,
      returnTemperature: null,
      addedTime: null,
      why: 'the loop would come within 1 mm of the plate’s edge',
      at: { x: 0.12, y: -0.005 },
    },
    { treatment: 'dwell', fits: true, returnTemperature: 400, addedTime: 1.2, why: 'after waiting 1.2 s', at: null },
  ],
  trouble: null,
  ...more,
});

/** A square of 100 mm: its corners left, looped, in trouble and with a wait, in that order. */
export const planOf = (more: Partial<CornerPlan> = {}): CornerPlan => ({
  id: ids.report,
  version: 5,
  part: {
    id: ids.plate,
    name: 'Bracket',
    contours: [{ id: '0', depth: 0, role: 'outer', parent: null, layer: 'CUT', segments }],
  },
  layout: null,
  revision: {
    id: ids.revision,
    number: 3,
    strategyId: ids.strategy,
    strategyName: 'Bearing plate',
    state: 'approved',
    approved: true,
  },
  thickness: 0.02,
  plateTemperature: 293.15,
  skeleton: { left: 0.02, right: 0.02, below: 0.02, above: 0.02 },
  overrides: {},
  limit: 523.15,
  cutting: {
    feed: 0.02,
    acceleration: 2,
    jerk: 50,
    travel: 1,
    pierce: 1.5,
    kerfWidth: 5e-4,
    restart: 0.5,
    heights: { travel: 0.015, pierceFrom: 0.01, pierceTo: 0.004, cut: 0.001, speed: 0.15, acceleration: 2, jerk: 50 },
    heatIntoPlate: 6.5e6,
    pierceHeat: 6000,
    meanPower: 3000,
    pierceEnergy: 4500,
    oxygenFlow: 8e-4,
    pierceOxygen: 1.2e-3,
    lossCoefficient: 20,
  },
  corners: [
    corner(0),
    corner(1, {
      treatment: 'loop',
      untreated: 700,
      treated: 450,
      addedTime: 2.6,
      loop: {
        radius: 5e-3,
        extension: 5e-3,
        length: 0.0336,
        slugArea: 4e-5,
        segments: [arcOf({ x: 0.105, y: -0.005 }, 5e-3, 0, 4)],
        slug: [],
      },
    }),
    corner(2, { trouble: 'nothing keeps this tip under the limit', treated: 700, untreated: 700 }),
    corner(3, { treatment: 'dwell', dwell: 1.2, treated: 400, addedTime: 1.2 }),
  ],
  totals: {
    corners: 4,
    loops: 1,
    dwells: 1,
    trouble: 1,
    addedTime: 3.8,
    addedLength: 0.0336,
    addedOxygen: 0.004,
    hottestUntreated: 700,
    hottestTreated: 700,
  },
  changedAt: '2031-03-03T14:02:00Z',
  changedBy: { id: ids.user, name: 'Programmer' },
  ...more,
});

/** The plan's path as the server would answer it, without lead-ins' room to be looked for: pierced 5 mm below each contour's start. */
export function pathOf({ part, corners }: Pick<CornerPlan, 'part' | 'corners'>): ShownPath {
  const inside = [...part.contours].sort((a, b) => b.depth - a.depth);
  return {
    problems: [],
    runs: inside.map(({ id, role, segments: own }) => {
      const start = segmentStart(own[0] ?? lineBetween({ x: 0, y: 0 }, { x: 0, y: 0 }));
      const pierce = { x: start.x, y: start.y - 5e-3 };
      const pieces: ShownPath['runs'][number]['pieces'] = [{ kind: 'lead-in', segments: [lineBetween(pierce, start)] }];
      own.forEach((segment, i) => {
        pieces.push({ kind: 'contour', segments: [segment] });
        const next = corners.find((one) => one.id === `c${id}-${(i + 1) % own.length}`);
        if (next?.loop) pieces.push({ kind: 'loop', segments: next.loop.segments });
        else if (next?.dwell) pieces.push({ kind: 'dwell', at: next.at, duration: next.dwell });
      });
      return { contourId: id, name: `${role === 'outer' ? 'outline' : role} ${id}`, pierce, pieces };
    }),
  };
}
