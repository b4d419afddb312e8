import type { PlateHeat } from '@/components/corners/heat-field.ts';
import { heatedPath, midZoneProperties } from '@/strategy/heat/index.ts';
import { lineBetween } from '@/strategy/path/index.ts';

/** A plate of 0.14 m a side, cut once across its middle from left to right in 20 s; what lies on the raster rises evenly from 20 °C at 1 K/s. */
export function plateHeatOf(): PlateHeat {
  const raster = { x: -0.02, y: -0.02, dx: 0.01, dy: 0.01, columns: 15, rows: 15 };
  const even = (kelvin: number) => new Float32Array(raster.columns * raster.rows).fill(kelvin);
  return {
    raster,
    frames: [
      { time: 0, since: -6, temperatures: even(293.15) },
      { time: 10, since: 4, temperatures: even(303.15) },
      { time: 20, since: 14, temperatures: even(313.15) },
    ],
    heat: heatedPath([lineBetween({ x: 0, y: 0.05 }, { x: 0.1, y: 0.05 })], 0.005, 20, 6e4),
    pierces: [{ at: { x: 0, y: 0.05 }, time: 0.5, heat: 2e4 }],
    properties: midZoneProperties,
    plateTemperature: 293.15,
  };
}
