import { describe, expect, it } from 'vitest';
import { heatMoment, temperatureAt, temperaturesOn } from '@/components/corners/heat-field.ts';
import { heatLevels } from '@/components/corners/heat-levels.ts';
import { levelLabels, paintHeat } from '@/components/corners/heat-paint.ts';
import { addPuffs, heatPuffs } from '@/strategy/heat/heat-puffs.ts';
import { pathRise } from '@/strategy/heat/index.ts';
import { plateHeatOf } from './corner-heat-fixtures.ts';

const heat = plateHeatOf();
const at = (time: number) => {
  const moment = heatMoment(heat, time, 5e-4);
  if (!moment) throw new Error('there is no moment');
  return moment;
};

describe('the plate at a moment', () => {
  it('is what lies on the raster between two of its times, and hotter near the front', () => {
    // up to 14 s the frame of 20 s holds heat that is still to come
    expect(temperatureAt(at(12), { x: 0.09, y: 0.11 })).toBeCloseTo(303.15, 2);
    expect(temperatureAt(at(17), { x: 0.115, y: -0.015 })).toBeCloseTo(308.15, 2);
    expect(temperatureAt(at(15), { x: 0.073, y: 0.05 })).toBeGreaterThan(600);
    // ahead of the cut it is still cold
    expect(temperatureAt(at(15), { x: 0.115, y: 0.05 })).toBeLessThan(309);
  });

  it('is held before the cut and after it', () => {
    expect(at(-3).time).toBe(0);
    expect(at(1e6).time).toBe(20);
    expect(heatMoment({ ...heat, frames: [] }, 3, 1e-3)).toBeNull();
  });

  it('is the same on a finer raster as at each of its places', () => {
    const raster = { x: 0.04, y: 0.08, dx: 0.002, dy: -0.002, columns: 40, rows: 30 };
    const found = temperaturesOn(at(12), raster);
    for (const [column, row] of [
      [0, 0],
      [9, 14],
      [39, 29],
    ] as const) {
      const place = { x: raster.x + column * raster.dx, y: raster.y + row * raster.dy };
      const there = temperatureAt(at(12), place);
      expect(Math.abs((found[row * 40 + column] ?? 0) - there)).toBeLessThan(0.05 + 2e-3 * (there - 293));
    }
  });
});

describe('the plate between two of its frames', () => {
  it('does not jump where one frame takes over from the other', () => {
    const { heat: pieces, properties, raster } = heat;
    // frames as a field makes them: all heat older than 6 s, on cells that carry it well
    const frame = (time: number) => {
      const temperatures = new Float32Array(raster.columns * raster.rows).fill(293.15);
      addPuffs(temperatures, raster, heatPuffs(pieces, 0, time - 6, 1e-4, properties), time, properties);
      return { time, since: time - 6, temperatures };
    };
    const real = { ...heat, pierces: [], frames: [0, 6, 12, 18].map(frame) };
    for (const place of [
      { x: 0.03, y: 0.053 },
      { x: 0.045, y: 0.06 },
    ]) {
      const [before, after] = [11.999, 12.001].map((time) => {
        const moment = heatMoment(real, time, 1e-4);
        return moment ? temperatureAt(moment, place) : Number.NaN;
      });
      expect(Math.abs((before ?? 0) - (after ?? 0))).toBeLessThan(0.5);
      const exact = 293.15 + pathRise(pieces, place, 15, properties);
      const moment = heatMoment(real, 15, 1e-4);
      expect(Math.abs((moment ? temperatureAt(moment, place) : 0) - exact)).toBeLessThan(0.08 * (exact - 293.15));
    }
  });
});

describe('the picture of the plate', () => {
  const columns = 60;
  // from 20 °C on the left, 10 K a point
  const slope = Float32Array.from({ length: columns * 8 }, (_, i) => 293.15 + 10 * (i % columns));
  const opacity = (picture: Uint8ClampedArray, column: number, row = 3) =>
    picture[4 * (row * columns + column) + 3] ?? 0;
  const red = (picture: Uint8ClampedArray, column: number, row = 3) => picture[4 * (row * columns + column)] ?? 0;
  const palette = { ink: [0, 0, 0] as const, levels: [473.15], limit: Infinity };

  it('leaves cold steel as it is and has its full colour where the temper colours begin', () => {
    const picture = paintHeat(slope, columns, 8, palette);
    expect(opacity(picture, 0)).toBe(0);
    expect(opacity(picture, 10)).toBeLessThan(opacity(picture, 16));
    expect(opacity(picture, 30)).toBeGreaterThan(220);
  });

  it('draws a dark line at a named temperature, and none where lines would run into each other', () => {
    const gentle = slope.map((kelvin) => 293.15 + (kelvin - 293.15) / 2);
    const picture = paintHeat(gentle, columns, 8, palette);
    // 200 °C is at point 36
    expect(red(picture, 36)).toBeLessThan(red(picture, 33) / 2);
    const crowded = paintHeat(gentle, columns, 8, { ...palette, levels: [463.15, 473.15, 483.15] });
    expect(red(crowded, 36)).toBeGreaterThan(red(picture, 36) + 30);
  });

  it('is hatched above the limit, so that it can be told without its colours', () => {
    const picture = paintHeat(slope, columns, 8, { ...palette, levels: [], limit: 500 });
    const rows = [0, 1, 2, 3, 4, 5, 6, 7];
    const along = (column: number) => new Set(rows.map((row) => red(picture, column, row))).size;
    expect(along(10)).toBe(1);
    expect(along(40)).toBeGreaterThan(1);
  });

  it('has a figure on each line that lies in the frame, apart from each other, and none where lines crowd', () => {
    const levels = heatLevels('metric');
    const wide = 400;
    const gentle = Float32Array.from({ length: wide * 8 }, (_, i) => 293.15 + (i % wide));
    const inside = { left: 0, top: 0, right: wide, bottom: 5 };
    const labels = levelLabels(gentle, wide, levels, inside, 4);
    for (const { kelvin, column } of labels) expect(293.15 + column).toBeCloseTo(kelvin, 3);
    const crowded = levelLabels(slope, columns, levels, { ...inside, right: columns }, 4);
    expect(crowded.every(({ kelvin }) => kelvin > 600)).toBe(true);
    expect(new Set(labels.map(({ kelvin }) => kelvin)).size).toBeGreaterThan(5);
    labels.forEach((one, i) =>
      labels.slice(i + 1).forEach((other) => {
        expect(Math.hypot(one.column - other.column, 2 * (one.row - other.row))).toBeGreaterThan(4);
      }),
    );
  });
});
