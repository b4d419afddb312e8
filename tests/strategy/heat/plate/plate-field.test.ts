import { describe, expect, it } from 'vitest';
import { heatedPath, midZoneProperties, rectangleRise } from '../../../../strategy/heat/index.ts';
import type { HeatedPiece } from '../../../../strategy/heat/index.ts';
import { plateField } from '../../../../strategy/heat/plate/index.ts';
import type { PlateQuestion } from '../../../../strategy/heat/plate/index.ts';
import { lineBetween } from '../../../../strategy/path/index.ts';

const size = { length: 0.4, width: 0.3 };
const plate = { minX: 0, minY: 0, maxX: size.length, maxY: size.width };
const thickness = 0.02;
const cold = 293.15;
const capacity = midZoneProperties.density * midZoneProperties.specificHeat;
const bare: PlateQuestion = { plate, thickness, plateTemperature: cold, ambient: cold, lossCoefficient: 0, heat: [] };

const path = [lineBetween({ x: 0.05, y: 0.06 }, { x: 0.35, y: 0.06 })];
const heat = heatedPath(path, 0.015, 20, 1e5);
const places = [
  { x: 0.2, y: 0.061 },
  { x: 0.2, y: 0.08 },
  { x: 0.3, y: 0.1 },
  { x: 0.01, y: 0.01 },
  { x: 0.05, y: 0.06 },
];

/** The exact rise in an insulated rectangle without kerfs from moving sources: drops of a hundredth of a second. */
function exactRise(pieces: readonly HeatedPiece[], at: { x: number; y: number }, time: number): number {
  let rise = 0;
  for (const { segment, from, to, powerPerLength } of pieces) {
    if (segment.kind !== 'line') throw new Error('lines only');
    const until = Math.min(to, time);
    const drops = Math.ceil((until - from) / 0.01);
    for (let k = 0; k < drops; k++) {
      const when = from + ((k + 0.5) * (until - from)) / drops;
      const share = (when - from) / (to - from);
      const source = {
        x: segment.start.x + share * (segment.end.x - segment.start.x),
        y: segment.start.y + share * (segment.end.y - segment.start.y),
      };
      const dropped = (powerPerLength * (until - from)) / drops;
      rise += rectangleRise(dropped, size, source, at, time - when, midZoneProperties);
    }
  }
  return rise;
}

describe('the plate’s field', () => {
  it('agrees with the insulated rectangle to a fifth of a per cent of the greatest settled rise, wherever no kerf is open', () => {
    const field = plateField({ ...bare, heat, kerfs: [], until: 100 });
    const scale = field.hottest.temperature - cold;
    for (const time of [20, 30, 50, 100]) {
      for (const at of places) {
        const error = field.at(at, time) - cold - exactRise(heat, at, time);
        expect(Math.abs(error) / scale, `${at.x}, ${at.y} at ${time} s`).toBeLessThan(2e-3);
      }
    }
  });

  it('keeps all heat in an insulated plate, kerf or not', () => {
    for (const kerfs of [heat, []]) {
      const field = plateField({ ...bare, heat, kerfs, until: 200 });
      const expected = (1e5 * 20) / capacity / (size.length * size.width);
      expect((field.mean(200) - cold) / expected).toBeCloseTo(1, 8);
    }
  });
});
