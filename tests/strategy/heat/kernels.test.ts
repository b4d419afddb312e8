import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { PlateProperties } from '../../../strategy/heat/index.ts';
import {
  besselIScaled,
  besselK0,
  continuousLine,
  cutEndWake,
  cutWake,
  cutWakePeak,
  diffusivity,
  erfc,
  exponentialIntegral,
  heatedPath,
  instantaneousLine,
  logGamma,
  midZoneProperties,
  movingLine,
  panelIntegral,
  pathRise,
  rectangleRise,
  straightEdgeRise,
  surfaceWake,
  surfaceWakePeak,
  tipFactor,
  wedgeRise,
  wedgeRiseByImages,
} from '../../../strategy/heat/index.ts';
import { arcOf, lineBetween, pointRotate, segmentRotate, segmentShift } from '../../../strategy/path/index.ts';

const plate: PlateProperties = { conductivity: 45, density: 7850, specificHeat: 600 };
const heat = 3e5; // J/m

/** Integral over panels, an independent way of summing. */
function integral(f: (x: number) => number, from: number, to: number, panels: number): number {
  let sum = 0;
  for (let i = 0; i < panels; i++)
    sum += panelIntegral(f, from + ((to - from) * i) / panels, from + ((to - from) * (i + 1)) / panels);
  return sum;
}

describe('the quadrature', () => {
  it('is exact for powers up to 31 and not beyond', () => {
    for (let n = 0; n <= 31; n++) expect(panelIntegral((x) => x ** n, 0, 1)).toBeCloseTo(1 / (n + 1), 13);
    expect(Math.abs(panelIntegral((x) => (2 * x - 1) ** 32, 0, 1) - 1 / 33)).toBeGreaterThan(1e-12);
  });
});

describe('special functions', () => {
  it('K0 satisfies its differential equation x²y″ + xy′ = x²y', () => {
    for (const x of [0.02, 0.3, 1, 4, 15]) {
      const h = x * 1e-3;
      const [a, b, c] = [besselK0(x - h), besselK0(x), besselK0(x + h)];
      const residue = (x * x * (a - 2 * b + c)) / (h * h) + (x * (c - a)) / (2 * h) - x * x * b;
      expect(Math.abs(residue)).toBeLessThan(2e-5 * Math.abs(x * x * b + b));
    }
  });

  it('E1 and erfc are the integrals they stand for, on both sides of where the method changes', () => {
    for (const x of [0.05, 0.7, 0.999, 1.001, 3, 12]) {
      const direct = integral((u) => Math.exp(-x * Math.exp(u)), 0, Math.log(60 / x + 2), 60);
      expect(exponentialIntegral(x) / direct).toBeCloseTo(1, 11);
    }
    for (const x of [0, 0.4, 2.49, 2.51, 5]) {
      const direct = (2 / Math.sqrt(Math.PI)) * integral((u) => Math.exp(-u * u), x, x + 8, 80);
      expect(erfc(x) / direct).toBeCloseTo(1, 11);
    }
    expect(erfc(-0.7)).toBeCloseTo(2 - erfc(0.7), 14);
  });

  it('ln Γ gives factorials, and Γ(½) = √π', () => {
    let factorial = 1;
    for (let n = 1; n < 20; n++) {
      expect(Math.exp(logGamma(n)) / factorial).toBeCloseTo(1, 12);
      factorial *= n;
    }
    expect(Math.exp(logGamma(0.5))).toBeCloseTo(Math.sqrt(Math.PI), 12);
  });

  it('I of half order is √(2/πz)·sinh z, and orders obey I(ν−1) − I(ν+1) = 2ν/z·I(ν), also for large z', () => {
    for (const z of [0.1, 1, 10, 100, 3000]) {
      expect(besselIScaled(0.5, z)).toBeCloseTo(Math.sqrt(2 / (Math.PI * z)) * (1 - Math.exp(-2 * z)) * 0.5, 10);
      for (const order of [1, 1.7, 6.4]) {
        const left = besselIScaled(order - 1, z) - besselIScaled(order + 1, z);
        expect(left).toBeCloseTo(((2 * order) / z) * besselIScaled(order, z), 10);
      }
    }
  });

  it('refuse what has no value', () => {
    expect(() => besselK0(0)).toThrow(RangeError);
    expect(() => exponentialIntegral(-1)).toThrow(RangeError);
  });
});

describe('a line source', () => {
  it('keeps its heat: ρc times the integral of the temperature over the plate', () => {
    for (const age of [0.2, 5, 60]) {
      const reach = Math.sqrt(4 * diffusivity(plate) * age) * 7;
      const held = integral((r) => instantaneousLine(heat, r, age, plate) * 2 * Math.PI * r, 0, reach, 20);
      expect((plate.density * plate.specificHeat * held) / heat).toBeCloseTo(1, 10);
    }
  });

  it('that goes on is the sum of instants, and its temperature grows with the power alone', () => {
    const direct = integral((s) => instantaneousLine(1e5, 0.004, s, plate), 0, 3, 400);
    expect(continuousLine(1e5, 0.004, 3, plate) / direct).toBeCloseTo(1, 9);
    expect(continuousLine(3e5, 0.004, 3, plate)).toBeCloseTo(3 * continuousLine(1e5, 0.004, 3, plate), 9);
  });

  it('that moves leaves, far behind, the wake of a fast source, and per length of path the heat it was given', () => {
    const v = 1 / 60;
    const along = movingLine(1e5, v, { ahead: -0.3, aside: 0.004 }, plate);
    expect(along / cutWake(1e5 / v, 0.004, 0.3 / v, plate)).toBeCloseTo(1, 2);
    // across the track, at any distance behind, v·ρc·∫ΔT dy less what conduction carries back is q′
    const behind = -0.05;
    const h = 1e-5;
    const across = (ahead: number) => 2 * integral((y) => movingLine(1e5, v, { ahead, aside: y }, plate), 0, 0.12, 60);
    const flow =
      plate.density * plate.specificHeat * v * across(behind) +
      (plate.conductivity * (across(behind + h) - across(behind - h))) / (2 * h);
    expect(flow / 1e5).toBeCloseTo(1, 5);
  });
});

describe('the peak beside a fast cut', () => {
  it('is where the wake is greatest', () => {
    for (const aside of [1e-3, 5e-3, 2e-2]) {
      const through = cutWakePeak(6e6, aside, plate);
      const surface = surfaceWakePeak(1e5, aside, plate);
      expect(cutWake(6e6, aside, through.time, plate)).toBeCloseTo(through.rise, 9);
      expect(surfaceWake(1e5, aside, surface.time, plate)).toBeCloseTo(surface.rise, 9);
      for (const factor of [0.9, 1.1]) {
        expect(cutWake(6e6, aside, through.time * factor, plate)).toBeLessThan(through.rise);
        expect(surfaceWake(1e5, aside, surface.time * factor, plate)).toBeLessThan(surface.rise);
      }
    }
  });
});

describe('insulated edges', () => {
  const angle = fc.double({ min: 0.3, max: 2 * Math.PI, noNaN: true });
  const share = fc.double({ min: 0, max: 1, noNaN: true });
  const radius = fc.double({ min: 0, max: 0.03, noNaN: true });
  const age = fc.double({ min: 0.2, max: 30, noNaN: true });

  it('let a wedge of π/n be summed by images and by series alike', () => {
    fc.assert(
      fc.property(fc.integer({ min: 1, max: 8 }), radius, share, radius, share, age, (n, rs, a, r, b, t) => {
        const beta = Math.PI / n;
        const [source, at] = [
          { r: rs, theta: a * beta },
          { r, theta: b * beta },
        ];
        const images = wedgeRiseByImages(heat, beta, source, at, t, plate);
        expect(Math.abs(wedgeRise(heat, beta, source, at, t, plate) - images)).toBeLessThan(1e-9 * images + 1e-9);
      }),
      { numRuns: 150 },
    );
  });

  it('make the tip 2π/β times as hot as an infinite plate, whatever the angle and wherever the source', () => {
    fc.assert(
      fc.property(angle, radius, share, age, (beta, rs, a, t) => {
        const tip = wedgeRise(heat, beta, { r: rs, theta: a * beta }, { r: 0, theta: 0 }, t, plate);
        const open = instantaneousLine(heat, rs, t, plate);
        expect(Math.abs(tip - tipFactor(beta) * open)).toBeLessThan(1e-9 * tip + 1e-12);
      }),
    );
  });

  it('keep reciprocity: source and place may change roles', () => {
    fc.assert(
      fc.property(angle, radius, share, radius, share, age, (beta, rs, a, r, b, t) => {
        const [source, at] = [
          { r: rs, theta: a * beta },
          { r, theta: b * beta },
        ];
        const there = wedgeRise(heat, beta, source, at, t, plate);
        expect(Math.abs(there - wedgeRise(heat, beta, at, source, t, plate))).toBeLessThan(1e-9 * there + 1e-12);
      }),
    );
  });

  it('keep all heat in the wedge', () => {
    const beta = 1.1;
    const held = integral(
      (r) =>
        r * integral((theta) => wedgeRise(heat, beta, { r: 0.006, theta: 0.4 }, { r, theta }, 2, plate), 0, beta, 2),
      0,
      0.05,
      8,
    );
    expect((plate.density * plate.specificHeat * held) / heat).toBeCloseTo(1, 8);
  });

  it('let no heat through: a straight edge is as hot a little inside as at the edge', () => {
    const source = { x: 0.005, y: 0 };
    const at = (x: number) => straightEdgeRise(heat, source, { x, y: 0.003 }, 2, plate);
    expect(Math.abs(at(1e-6) - at(0))).toBeLessThan(1e-6 * at(0));
    expect(at(0)).toBeCloseTo(2 * instantaneousLine(heat, Math.hypot(0.005, 0.003), 2, plate), 9);
    expect(straightEdgeRise(heat, source, { x: 0.008, y: 0.002 }, 2, plate)).toBeCloseTo(
      wedgeRise(
        heat,
        Math.PI,
        { r: 0.005, theta: Math.PI / 2 },
        { r: Math.hypot(0.008, 0.002), theta: Math.PI / 2 + Math.atan2(0.002, 0.008) },
        2,
        plate,
      ),
      8,
    );
  });

  it('make a rectangle even in the end, at its heat over its heat capacity, and no step where the sum changes', () => {
    const size = { length: 0.3, width: 0.2 };
    const [source, at] = [
      { x: 0.1, y: 0.02 },
      { x: 0.05, y: 0.03 },
    ];
    expect(rectangleRise(heat, size, source, at, 1e5, plate)).toBeCloseTo(
      heat / (plate.density * plate.specificHeat * 0.06),
      9,
    );
    const change = (0.05 * 0.3 ** 2) / diffusivity(plate);
    const [before, after] = [change * (1 - 1e-12), change * (1 + 1e-12)].map((t) =>
      rectangleRise(heat, size, source, at, t, plate),
    );
    expect(before).toBeCloseTo(after ?? NaN, 9);
  });

  it('refuse places outside and angles that have no images', () => {
    expect(() => straightEdgeRise(heat, { x: -1, y: 0 }, { x: 0, y: 0 }, 1, plate)).toThrow(RangeError);
    expect(() => wedgeRiseByImages(heat, 1, { r: 0, theta: 0 }, { r: 0, theta: 0 }, 1, plate)).toThrow(/whole number/);
    expect(() => wedgeRise(heat, 1, { r: 1, theta: 2 }, { r: 0, theta: 0 }, 1, plate)).toThrow(/outside the wedge/);
  });
});

describe('superposition along a path', () => {
  const v = 1 / 60;
  const incoming = lineBetween({ x: -0.1, y: 0 }, { x: 0, y: 0 });
  const arc = arcOf({ x: 0, y: -5e-3 }, 5e-3, Math.PI / 2, -4.5);
  const path = [incoming, arc];
  const place = { x: -1e-3, y: 1.5e-3 };

  it('is the plain sum of many instants', () => {
    const end = 2;
    const pieces = heatedPath(path, v, end, 1e5);
    const found = pathRise(pieces, place, end + 0.4, plate);
    let sum = 0;
    const steps = 200_000;
    for (const { segment, from, to } of pieces) {
      for (let i = 0; i < steps; i++) {
        const share = (i + 0.5) / steps;
        const s = from + share * (to - from);
        const p =
          segment.kind === 'line'
            ? { x: segment.start.x + share * (segment.end.x - segment.start.x), y: 0 }
            : {
                x: segment.centre.x + segment.radius * Math.cos(segment.startAngle + share * segment.sweep),
                y: segment.centre.y + segment.radius * Math.sin(segment.startAngle + share * segment.sweep),
              };
        sum += instantaneousLine(
          (1e5 * (to - from)) / steps,
          Math.hypot(p.x - place.x, p.y - place.y),
          end + 0.4 - s,
          plate,
        );
      }
    }
    expect(found / sum).toBeCloseTo(1, 8);
  });

  it('does not change when path and place are turned and shifted together, or when a line is drawn in pieces', () => {
    fc.assert(
      fc.property(
        fc.double({ min: -4, max: 4, noNaN: true }),
        fc.double({ min: -1, max: 1, noNaN: true }),
        fc.double({ min: 0.05, max: 3, noNaN: true }),
        (angle, by, wait) => {
          const found = pathRise(heatedPath(path, v, 0, 1e5), place, wait, plate);
          const shift = { x: by, y: 2 * by };
          const moved = path.map((s) => segmentShift(segmentRotate(s, angle), shift));
          const turned = pointRotate(place, angle);
          const there = pathRise(
            heatedPath(moved, v, 0, 1e5),
            { x: turned.x + shift.x, y: turned.y + shift.y },
            wait,
            plate,
          );
          expect(there / found).toBeCloseTo(1, 9);
          const pieces = [
            lineBetween({ x: -0.1, y: 0 }, { x: -0.03, y: 0 }),
            lineBetween({ x: -0.03, y: 0 }, { x: 0, y: 0 }),
            arc,
          ];
          expect(pathRise(heatedPath(pieces, v, 0, 1e5), place, wait, plate) / found).toBeCloseTo(1, 9);
        },
      ),
    );
  });

  it('of a long straight path is the moving line source', () => {
    const long = lineBetween({ x: -2, y: 0 }, { x: 0, y: 0 });
    const rise = pathRise(heatedPath([long], v, 0, 1e5), { x: -3e-3, y: 1e-3 }, 0, plate);
    expect(rise / movingLine(1e5, v, { ahead: -3e-3, aside: 1e-3 }, plate)).toBeCloseTo(1, 9);
  });

  it('of a source that stands still is the continuous line source', () => {
    const still = { segment: lineBetween({ x: 0, y: 0 }, { x: 1e-12, y: 0 }), from: 0, to: 4, powerPerLength: 1e5 };
    expect(pathRise([still], { x: 3e-3, y: 0 }, 4, plate) / continuousLine(1e5, 3e-3, 4, plate)).toBeCloseTo(1, 8);
  });

  it('falls at the end of a cut as one over the root of time: four times the wait, half the rise', () => {
    const long = heatedPath([lineBetween({ x: -3, y: 0 }, { x: 0, y: 0 })], v, 0, 1e5);
    const [early, late] = [8, 32].map((wait) => pathRise(long, { x: 0, y: 0 }, wait, plate));
    expect((late ?? NaN) / (early ?? NaN)).toBeCloseTo(0.5, 1);
    expect((late ?? NaN) / cutEndWake(1e5 / v, 32, plate)).toBeCloseTo(1, 2);
  });

  it('leaves out what is cut later, and refuses the place where the source stands', () => {
    const pieces = heatedPath([incoming], v, 0, 1e5);
    expect(pathRise(pieces, place, -10, plate)).toBe(0);
    const half = heatedPath([lineBetween({ x: -0.1, y: 0 }, { x: -0.05, y: 0 })], v, -0.05 / v, 1e5);
    expect(pathRise(pieces, place, -0.05 / v, plate)).toBeCloseTo(pathRise(half, place, -0.05 / v, plate), 9);
    expect(() => pathRise(pieces, { x: 0, y: 0 }, 0, plate)).toThrow(/not finite/);
  });
});

it('the default properties are those of EN 1993-1-2 at 450 °C', () => {
  const t = 450;
  expect(midZoneProperties.conductivity).toBeCloseTo(54 - 0.0333 * t, 9);
  expect(midZoneProperties.specificHeat).toBeCloseTo(425 + 0.773 * t - 1.69e-3 * t * t + 2.22e-6 * t ** 3, 9);
  expect(midZoneProperties.density).toBe(7850);
});
