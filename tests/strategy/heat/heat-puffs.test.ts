import { describe, expect, it } from 'vitest';
import { addPuffs, heatPuffs, puffsRise } from '../../../strategy/heat/heat-puffs.ts';
import { heatedPath, midZoneProperties, pathRise } from '../../../strategy/heat/index.ts';
import { arcOf, lineBetween } from '../../../strategy/path/index.ts';

const feed = 0.012;
const path = [lineBetween({ x: 0, y: 0 }, { x: 0.1, y: 0 }), arcOf({ x: 0.1, y: 0.03 }, 0.03, -Math.PI / 2, Math.PI)];
const end = 20;
const pieces = heatedPath(path, feed, end, 1e5);
const begun = pieces[0]?.from ?? 0;

describe('heat of a path let go in puffs', () => {
  it('is the path’s closed form within a per cent a width away from it, at every age', () => {
    for (const later of [0.5, 5, 60]) {
      const time = end + later;
      const puffs = heatPuffs(pieces, begun, time, 1e-4, midZoneProperties);
      for (const at of [
        { x: 0.05, y: 0.004 },
        { x: 0.11, y: 0.03 },
        { x: 0.1, y: 0.055 },
        { x: 0.03, y: -0.02 },
      ]) {
        const exact = pathRise(pieces, at, time, midZoneProperties);
        expect(Math.abs(puffsRise(puffs, at.x, at.y, time, midZoneProperties) - exact)).toBeLessThan(
          0.01 * exact + 0.01,
        );
      }
    }
  });

  it('needs few of them: tens for a cut of a quarter of a minute', () => {
    expect(heatPuffs(pieces, begun, end, 1e-3, midZoneProperties).length / 5).toBeLessThan(80);
  });

  it('keeps its energy however coarse the grain, and takes no heat from before or after', () => {
    for (const grain of [1e-4, 1e-2, 1]) {
      const puffs = heatPuffs(pieces, begun + 3, end - 2, grain, midZoneProperties);
      let heat = 0;
      for (let i = 0; i < puffs.length; i += 5) heat += puffs[i + 3] ?? 0;
      expect(heat).toBeCloseTo(1e5 * (end - 2 - begun - 3), 4);
    }
  });

  it('on a raster is the same as at each of its places', () => {
    const puffs = heatPuffs(pieces, begun, end, 1e-3, midZoneProperties);
    const raster = { x: -0.02, y: 0.08, dx: 0.004, dy: -0.004, columns: 45, rows: 30 };
    const field = new Float32Array(raster.columns * raster.rows).fill(300);
    addPuffs(field, raster, puffs, end + 1, midZoneProperties);
    for (const [column, row] of [
      [5, 20],
      [30, 18],
      [32, 7],
      [44, 29],
    ] as const) {
      const at = { x: raster.x + column * raster.dx, y: raster.y + row * raster.dy };
      const there = 300 + puffsRise(puffs, at.x, at.y, end + 1, midZoneProperties);
      expect(Math.abs((field[row * raster.columns + column] ?? 0) - there)).toBeLessThan(0.02 + 1e-3 * (there - 300));
    }
  });
});
