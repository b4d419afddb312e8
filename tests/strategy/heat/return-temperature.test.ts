import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { HeatedPiece, ReturnTreatment } from '../../../strategy/heat/index.ts';
import {
  cornerFactor,
  diffusivity,
  frontLead,
  heatedPath,
  leftOutStretch,
  measuringPlace,
  movingLine,
  partWall,
  pathRise,
  returnOf,
  returnTemperature,
  straightEdgeReturn,
} from '../../../strategy/heat/index.ts';
import type { LoopCorner, Segment } from '../../../strategy/path/index.ts';
import {
  arcOf,
  contourCorners,
  cornerInward,
  cornerOfPath,
  flatLoopAt,
  lineBetween,
  loopAt,
  loopExtension,
  pointDistance,
  pointRotate,
  pointScale,
  segmentLength,
  segmentPart,
  segmentRotate,
} from '../../../strategy/path/index.ts';

const cut = { feed: 0.7 / 60, kerfWidth: 8e-4, heatIntoPlate: 1.1e7 };
const cold = 293.15;
const properties = { conductivity: 32, density: 7850, specificHeat: 32 / (7850 * 8e-6) };

const tip = (degrees: number): LoopCorner => {
  const angle = (degrees * Math.PI) / 180;
  return {
    point: { x: 0, y: 0 },
    incoming: { x: 1, y: 0 },
    outgoing: { x: Math.cos(Math.PI - angle), y: Math.sin(Math.PI - angle) },
    angle,
  };
};
const at = (degrees: number, treatment: ReturnTreatment = { kind: 'leave' }, plateTemperature = cold) =>
  returnTemperature({ corner: tip(degrees), treatment, cut, plateTemperature, properties });
const loop = (degrees: number, radius: number): ReturnTreatment => ({
  kind: 'loop',
  loop: loopAt(tip(degrees), radius),
});

describe('the return temperature', () => {
  it('is taken 1.5 mm inside the finished tip, on the bisector', () => {
    const square = {
      segments: [
        lineBetween({ x: 0, y: 0 }, { x: 0.1, y: 0 }),
        lineBetween({ x: 0.1, y: 0 }, { x: 0.1, y: 0.1 }),
        lineBetween({ x: 0.1, y: 0.1 }, { x: 0, y: 0 }),
      ],
    };
    for (const corner of contourCorners(square)) {
      const place = measuringPlace({ ...corner, point: cornerOfPath(corner, cut.kerfWidth) }, cut.kerfWidth);
      expect(pointDistance(place, corner.point)).toBeCloseTo(1.5e-3, 12);
    }
  });

  it('of a straight edge is the moving source in the finished edge with its last 2 mm taken off', () => {
    const q = cut.heatIntoPlate * cut.feed;
    const aside = 1.5e-3;
    const alpha = diffusivity(properties);
    const lead = frontLead(cut.kerfWidth, cut.feed, alpha);
    // what the last 2 mm add, by a plain sum
    let last = 0;
    const steps = 20_000;
    for (let i = 0; i < steps; i++) {
      const age = (((i + 0.5) / steps) * leftOutStretch) / cut.feed;
      const square = (cut.feed * age - lead) ** 2 + aside * aside;
      last +=
        ((q / (4 * Math.PI * properties.conductivity * age)) * Math.exp(-square / (4 * alpha * age)) * leftOutStretch) /
        cut.feed /
        steps;
    }
    const whole = movingLine(q, cut.feed, { ahead: -lead, aside }, properties);
    expect(straightEdgeReturn(cut, cold, properties)).toBeCloseTo(cold + whole - last, 3);
  });

  it('of a corner that is nearly straight is that of the straight edge', () => {
    const { without, straightEdge, excess } = at(179.9);
    expect(without).toBeCloseTo(straightEdge, 0);
    expect(excess).toBeCloseTo(without - straightEdge, 9);
  });

  it('grows as the tip gets sharper, and with the heat in proportion', () => {
    const rises = [150, 120, 90, 60, 45, 30].map((degrees) => at(degrees).without);
    expect([...rises].sort((a, b) => a - b)).toEqual(rises);
    const twice = returnTemperature({
      corner: tip(60),
      treatment: { kind: 'leave' },
      cut: { ...cut, heatIntoPlate: 2 * cut.heatIntoPlate },
      plateTemperature: cold,
      properties,
    });
    expect(twice.without - cold).toBeCloseTo(2 * (at(60).without - cold), 6);
  });

  it('on a hot plate is higher by what the plate is hotter, and its excess is the same', () => {
    const [a, b] = [at(60), at(60, { kind: 'leave' }, cold + 150)];
    expect(b.without - a.without).toBeCloseTo(150, 9);
    expect(b.excess).toBeCloseTo(a.excess, 9);
  });

  it('falls with the size of a loop and with the length of a dwell, and never below the plate', () => {
    for (const degrees of [30, 60, 90]) {
      const loops = [2e-3, 3e-3, 5e-3, 8e-3].map((r) => at(degrees, loop(degrees, r)).withTreatment);
      expect([...loops].sort((a, b) => b - a)).toEqual(loops);
      const dwells = [0.5, 1, 2, 4, 8].map((duration) => at(degrees, { kind: 'dwell', duration }).withTreatment);
      expect([...dwells].sort((a, b) => b - a)).toEqual(dwells);
      for (const t of [...loops, ...dwells]) expect(t).toBeGreaterThan(cold);
    }
  });

  it('is without treatment the same whichever treatment is asked about, and without a wait that of leaving the corner', () => {
    expect(at(60, loop(60, 3e-3)).without).toBeCloseTo(at(60).withTreatment, 9);
    expect(at(60, { kind: 'dwell', duration: 0 }).withTreatment).toBeCloseTo(at(60).without, 9);
  });

  it('does not change when the corner and what was cut before it are turned together', () => {
    const corner = tip(60);
    const before = [
      lineBetween({ x: -0.05, y: 0.03 }, { x: -0.05, y: 0 }),
      lineBetween({ x: -0.05, y: 0 }, { x: 0, y: 0 }),
    ];
    fc.assert(
      fc.property(fc.double({ min: -4, max: 4, noNaN: true }), (angle) => {
        const turned = {
          ...corner,
          incoming: pointRotate(corner.incoming, angle),
          outgoing: pointRotate(corner.outgoing, angle),
        };
        const ask = (c: LoopCorner, path: readonly Segment[]) =>
          returnTemperature({
            corner: c,
            before: path,
            treatment: { kind: 'loop', loop: loopAt(c, 3e-3) },
            cut,
            plateTemperature: cold,
            properties,
          });
        const [a, b] = [
          ask(corner, before),
          ask(
            turned,
            before.map((s) => segmentRotate(s, angle)),
          ),
        ];
        expect(b.withTreatment).toBeCloseTo(a.withTreatment, 6);
        expect(b.without).toBeCloseTo(a.without, 6);
      }),
    );
  });

  it('counts an edge cut shortly before: a narrow strip returns hotter than a lone corner', () => {
    const strip = [
      lineBetween({ x: -0.1, y: 6e-3 }, { x: -6e-3, y: 6e-3 }),
      lineBetween({ x: -6e-3, y: 6e-3 }, { x: -6e-3, y: 0 }),
      lineBetween({ x: -6e-3, y: 0 }, { x: 0, y: 0 }),
    ];
    const ask = (before: typeof strip) =>
      returnTemperature({
        corner: tip(90),
        before,
        treatment: { kind: 'leave' },
        cut,
        plateTemperature: cold,
        properties,
      }).without;
    expect(ask(strip)).toBeGreaterThan(ask(strip.slice(2)));
  });

  it('is shut in by a tip close before: the more the shorter the edge, and not at all by a bend, a notch or a far one', () => {
    const from = (length: number, direction: { x: number; y: number }) => [
      lineBetween({ x: -length - 0.2 * direction.x, y: -0.2 * direction.y }, { x: -length, y: 0 }),
      lineBetween({ x: -length, y: 0 }, { x: 0, y: 0 }),
    ];
    const rises = (before: readonly Segment[], treatment: ReturnTreatment) =>
      returnOf({ corner: tip(90), before, treatment, cut, plateTemperature: cold, properties }) - cold;
    const down = { x: 0, y: -1 };
    for (const treatment of [{ kind: 'leave' }, { kind: 'dwell', duration: 2 }, loop(90, 3e-3)] as const) {
      const lone = rises(from(0.3, { x: 1, y: 0 }), treatment);
      const near = [4e-3, 8e-3, 15e-3, 30e-3].map((length) => rises(from(length, down), treatment));
      expect([...near].sort((a, b) => b - a)).toEqual(near);
      expect(near[0]).toBeGreaterThan(1.3 * lone);
      expect(rises(from(0.15, down), treatment)).toBeCloseTo(lone, 3);
      // the same edges the other way round a notch: what they leave on its far side stays there
      expect(rises(from(8e-3, { x: 0, y: 1 }), treatment)).toBeLessThan(near[1] ?? 0);
    }
  });

  it('is the same whether the edges before the last heat the plate or are told with it', () => {
    const wide = { ...cut, kerfWidth: 0.8e-3 };
    for (const [length, across] of [
      [4e-3, { x: 0, y: -1 }],
      [9e-3, { x: Math.cos(-2), y: Math.sin(-2) }],
      [7e-3, { x: Math.cos(-1), y: Math.sin(-1) }],
    ] as const) {
      const turn = { x: -length, y: 0 };
      const earlier = [lineBetween({ x: turn.x - 0.08 * across.x, y: turn.y - 0.08 * across.y }, turn)];
      const before = [lineBetween(turn, { x: 0, y: 0 })];
      for (const treatment of [{ kind: 'leave' }, { kind: 'dwell', duration: 1.5 }, loop(90, 3e-3)] as const) {
        const question = { corner: tip(90), treatment, cut: wide, plateTemperature: cold, properties };
        const away = length / cut.feed + (treatment.kind === 'dwell' ? treatment.duration : 0);
        const back = treatment.kind === 'loop' ? away + treatment.loop.length / cut.feed : away;
        const plate = pathRise(
          heatedPath(earlier, cut.feed, 0, cut.heatIntoPlate * cut.feed),
          measuringPlace(tip(90), wide.kerfWidth),
          back,
          properties,
        );
        const whole = returnOf({ ...question, before: [...earlier, ...before] });
        expect(plate + returnOf({ ...question, before, earlier })).toBeCloseTo(whole, 6);
        expect(plate + returnOf({ ...question, before })).toBeLessThan(whole - 5);
      }
    }
  });

  it('does not change with how the path before is parted', () => {
    const [side, third] = [0.01, Math.PI / 3];
    const apex = { x: -side, y: 0 };
    const from = { x: apex.x + 2 * side * Math.cos(third), y: 2 * side * Math.sin(third) };
    const long = lineBetween(from, apex);
    const ask = (...first: Segment[]) =>
      returnOf({
        corner: tip(60),
        before: [...first, lineBetween(apex, { x: 0, y: 0 })],
        treatment: { kind: 'leave' },
        cut,
        plateTemperature: cold,
        properties,
      });
    expect(ask(segmentPart(long, 0, 0.5), segmentPart(long, 0.5, 0.9), segmentPart(long, 0.9, 1))).toBeCloseTo(
      ask(long),
      1,
    );
  });

  it('of a flat loop that is nearly the one of a single arc is that of the single arc, and falls with its extension', () => {
    const [beta, r] = [Math.PI / 3, 3e-3];
    const nearly = flatLoopAt(tip(60), r, loopExtension(r, beta) * (1 + 1e-6));
    expect(at(60, { kind: 'loop', loop: nearly }).withTreatment).toBeCloseTo(at(60, loop(60, r)).withTreatment, 2);
    const flats = [3e-3, 5e-3, 8e-3, 12e-3].map(
      (e) => at(60, { kind: 'loop', loop: flatLoopAt(tip(60), 1e-3, e) }).withTreatment,
    );
    expect([...flats].sort((a, b) => b - a)).toEqual(flats);
  });

  it('round a corner is hotter than its walls make half a plane, and cooler than a wedge that is shut to its end', () => {
    const [beta, radius] = [Math.PI / 3, 3e-3];
    const corner = tip(60);
    const alpha = diffusivity(properties);
    const lead = frontLead(cut.kerfWidth, cut.feed, alpha);
    const taken = radius / Math.tan(beta / 2);
    const arc = arcOf({ x: -taken, y: radius }, radius, -Math.PI / 2, Math.PI - beta);
    const kept = segmentPart(arc, 0, 1 - leftOutStretch / segmentLength(arc));
    const q = cut.heatIntoPlate * cut.feed;
    const path = [lineBetween({ x: -0.3, y: 0 }, { x: -taken, y: 0 }), kept];
    const walls = heatedPath(path, cut.feed, 0, q).map((piece) => ({
      ...piece,
      segment: partWall(piece.segment, cut.kerfWidth, lead),
    }));
    // the arc's nearest place to the corner, then half a kerf and 1.5 mm towards its centre
    const apex = radius / Math.sin(beta / 2) - radius;
    const place = pointScale(cornerInward(corner), apex + cut.kerfWidth / 2 + 1.5e-3);
    const question = { corner, cut, plateTemperature: cold, properties, round: radius };
    for (const duration of [0, 2]) {
      const half = pathRise(walls, place, leftOutStretch / cut.feed + duration, properties);
      const got = returnOf({ ...question, treatment: { kind: 'dwell', duration } }) - cold;
      expect(got).toBeGreaterThan(half);
      expect(got).toBeLessThan(half * cornerFactor(beta));
    }
  });

  it('of an eased corner is that of the same walls run in steps of feed and power', () => {
    const [length, share] = [8e-3, 0.4];
    const corner = tip(90);
    const alpha = diffusivity(properties);
    const q = cut.heatIntoPlate * cut.feed;
    const steps = 8;
    const step = length / steps;
    let time = 0;
    const wall = (from: number, to: number, feed: number) =>
      partWall(lineBetween({ x: from, y: 0 }, { x: to, y: 0 }), cut.kerfWidth, frontLead(cut.kerfWidth, feed, alpha));
    const eased: HeatedPiece[] = Array.from({ length: steps }, (_, i) => {
      const by = 1 - ((i + 0.5) / steps) * (1 - share);
      const from = time;
      time += step / (cut.feed * by);
      const segment = wall(-length + i * step, -length + (i + 1) * step, cut.feed * by);
      return { segment, from, to: time, powerPerLength: q * by };
    });
    // 2 mm are the last two steps
    const pieces = [...heatedPath([wall(-0.3, -length, cut.feed)], cut.feed, 0, q), ...eased.slice(0, -2)];
    const expected = cold + pathRise(pieces, measuringPlace(corner, cut.kerfWidth), time, properties);
    const treatment = { kind: 'ease', length, feedShare: share, powerShare: share } as const;
    expect(returnOf({ corner, treatment, cut, plateTemperature: cold, properties })).toBeCloseTo(expected, 6);
  });

  it('falls as feed and power are eased further together, and is untouched where neither is', () => {
    const ease = (share: number): ReturnTreatment => ({
      kind: 'ease',
      length: 6e-3,
      feedShare: share,
      powerShare: share,
    });
    for (const degrees of [30, 60, 90]) {
      expect(at(degrees, ease(1)).withTreatment).toBeCloseTo(at(degrees).without, 6);
      const eased = [1, 0.8, 0.6, 0.4, 0.2].map((share) => at(degrees, ease(share)).withTreatment);
      expect([...eased].sort((a, b) => b - a)).toEqual(eased);
    }
    expect(() => at(60, ease(0))).toThrow(/shares of feed 0/);
  });

  it('refuses a plate below absolute zero and a dwell below 0', () => {
    expect(() => at(60, { kind: 'dwell', duration: -1 })).toThrow(/dwell -1 s/);
    expect(() => at(60, { kind: 'leave' }, 0)).toThrow(/temperature 0 K/);
  });
});
