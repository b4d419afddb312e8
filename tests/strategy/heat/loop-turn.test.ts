import { describe, expect, it } from 'vitest';
import { creepingShare, frontLead, loopTurnRise, partWall } from '../../../strategy/heat/index.ts';
import {
  arcOf,
  flatLoopAt,
  lineBetween,
  loopAt,
  loopExtension,
  segmentEnd,
  segmentStart,
} from '../../../strategy/path/index.ts';

const plate = { conductivity: 39, density: 7850, specificHeat: 633 };
const corner = {
  point: { x: 0, y: 0 },
  incoming: { x: 1, y: 0 },
  outgoing: { x: Math.cos((2 * Math.PI) / 3), y: Math.sin((2 * Math.PI) / 3) },
  angle: Math.PI / 3,
};
const place = { x: -1e-3, y: 1.2e-3 };
const kerf = 6e-4;
const feed = 1 / 60;
const loop = loopAt(corner, 3e-3);
const turnTime = (loop.length - 2 * loop.extension) / feed;

describe('heat from the turn of a loop', () => {
  it('creeps round less the further the wall turns out of sight, from all of it down to nothing', () => {
    expect(creepingShare(0)).toBe(1);
    for (let x = 0; x < 6; x += 0.05) expect(creepingShare(x + 0.05)).toBeLessThan(creepingShare(x));
    expect(creepingShare(6)).toBeLessThan(0.02);
    // the power series and the sum over Airy's zeros are one function
    expect(Math.abs(creepingShare(0.8 - 1e-9) - creepingShare(0.8 + 1e-9))).toBeLessThan(2e-3);
  });

  it('is nothing before the front turns, then grows, and falls again once the turn is done', () => {
    const at = (time: number) => loopTurnRise(corner, loop, kerf, feed, 1e5, place, time, plate);
    expect(at(0)).toBe(0);
    expect(at(-1)).toBe(0);
    expect(at(turnTime)).toBeGreaterThan(0);
    expect(at(100)).toBeLessThan(at(turnTime));
    expect(at(100)).toBeGreaterThan(0);
  });

  it('is in proportion to the power, less than half of what an infinite plate would get of it twice over, and the same for a flat loop that is none', () => {
    const of = (which: typeof loop | ReturnType<typeof flatLoopAt>, power: number) =>
      loopTurnRise(corner, which, kerf, feed, power, place, 2, plate);
    expect(of(loop, 3e5)).toBeCloseTo(3 * of(loop, 1e5), 9);
    const nearly = flatLoopAt(corner, 3e-3, loopExtension(3e-3, corner.angle) * (1 + 1e-7));
    expect(of(nearly, 1e5) / of(loop, 1e5)).toBeCloseTo(1, 4);
  });

  it('falls with the distance of the loop', () => {
    const rises = [2e-3, 3e-3, 5e-3, 8e-3].map((r) =>
      loopTurnRise(corner, loopAt(corner, r), kerf, feed, 1e5, place, 3, plate),
    );
    expect([...rises].sort((a, b) => b - a)).toEqual(rises);
  });
});

describe('the wall on the part’s side', () => {
  it('lies half a kerf to the left of the path, within an arc that turns left and around one that turns right', () => {
    const wall = partWall(lineBetween({ x: 0, y: 0 }, { x: 0, y: 0.01 }), kerf, 1e-4);
    expect(segmentStart(wall)).toEqual({ x: -kerf / 2, y: 1e-4 });
    expect(segmentEnd(wall)).toEqual({ x: -kerf / 2, y: 0.01 + 1e-4 });
    const left = partWall(arcOf({ x: 0, y: 0 }, 2e-3, 0, 1), kerf, 0);
    const right = partWall(arcOf({ x: 0, y: 0 }, 2e-3, 0, -1), kerf, 0);
    expect([left, right]).toMatchObject([{ radius: 2e-3 - kerf / 2 }, { radius: 2e-3 + kerf / 2 }]);
    // an arc within the kerf has no inner wall left but a point
    expect(partWall(arcOf({ x: 0, y: 0 }, 1e-4, 0, 1), kerf, 0)).toMatchObject({ radius: 1e-9 });
  });

  it('is heated ahead of the front by less than its kerf, the further the slower the cut', () => {
    const leads = [0.3, 0.6, 1, 2].map((perMinute) => frontLead(kerf, perMinute / 60, 7.8e-6));
    expect([...leads].sort((a, b) => b - a)).toEqual(leads);
    for (const lead of leads) {
      expect(lead).toBeGreaterThan(0);
      expect(lead).toBeLessThan(kerf);
    }
  });
});
