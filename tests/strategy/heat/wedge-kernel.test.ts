import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  bisectorKernel,
  diffusivity,
  erfc,
  instantaneousLine,
  wedgeKernelScaled,
  wedgeRise,
  wedgeRiseByImages,
} from '../../../strategy/heat/index.ts';
import { runs } from '../../support/runs.ts';

const plate = { conductivity: 45, density: 7850, specificHeat: 600 };
const heat = 3e5;
const alpha = diffusivity(plate);

/** The rise that the kernel stands for. */
const rise = (angle: number, r: number, theta: number, rs: number, source: number, age: number): number =>
  (heat / (4 * Math.PI * plate.conductivity * age)) *
  Math.exp(-((r - rs) ** 2) / (4 * alpha * age)) *
  wedgeKernelScaled(angle, theta, source, (r * rs) / (2 * alpha * age));

const share = fc.double({ min: 0, max: 1, noNaN: true });

describe('the kernel of a wedge', () => {
  it('is the series of Bessel functions, for any angle, place and age', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 0.2, max: 2 * Math.PI, noNaN: true }),
        share,
        share,
        fc.double({ min: -3, max: 6, noNaN: true }),
        (angle, of, from, logZ) => {
          const [r, rs] = [3e-3, 4e-3];
          const age = (r * rs) / (2 * alpha * Math.exp(logZ));
          const [theta, source] = [of * angle, from * angle];
          const series = wedgeRise(heat, angle, { r, theta }, { r: rs, theta: source }, age, plate);
          const most = instantaneousLine(heat, Math.abs(r - rs), age, plate);
          expect(Math.abs(rise(angle, r, theta, rs, source, age) - series)).toBeLessThan(1e-6 * (series + most));
        },
      ),
      { numRuns: runs(200, 5000) },
    );
  });

  it('is the sum of images where there are images, also where one of them just grazes the tip', () => {
    for (const n of [1, 2, 3, 4, 6]) {
      const angle = Math.PI / n;
      for (const [of, from] of [
        [0, 0],
        [0, 1],
        [0.5, 1],
        [0.3, 0.8],
      ] as const) {
        for (const age of [0.05, 1, 20]) {
          const [at, source] = [
            { r: 3e-3, theta: of * angle },
            { r: 5e-3, theta: from * angle },
          ];
          const images = wedgeRiseByImages(heat, angle, source, at, age, plate);
          expect(rise(angle, at.r, at.theta, source.r, source.theta, age) / images).toBeCloseTo(1, 6);
        }
      }
    }
  });

  it('about a slit is Sommerfeld’s two error functions', () => {
    // Carslaw and Jaeger, ch. 14: free heat times ½(1 + erf(√(r·rs/αt)·cos(φ/2))) for the source and for its image
    const slit = (r: number, theta: number, rs: number, source: number, age: number): number => {
      const part = (phi: number) => {
        const square = r * r + rs * rs - 2 * r * rs * Math.cos(phi);
        const edge = Math.sqrt((r * rs) / (alpha * age)) * Math.cos(phi / 2);
        return instantaneousLine(heat, Math.sqrt(square), age, plate) * (1 - erfc(edge) / 2);
      };
      return part(theta - source) + part(theta + source);
    };
    fc.assert(
      fc.property(share, share, fc.double({ min: 0.05, max: 20, noNaN: true }), (of, from, age) => {
        const [theta, source] = [of * 2 * Math.PI, from * 2 * Math.PI];
        const expected = slit(3e-3, theta, 2e-3, source, age);
        expect(Math.abs(rise(2 * Math.PI, 3e-3, theta, 2e-3, source, age) - expected)).toBeLessThan(
          2e-6 * instantaneousLine(heat, 0, age, plate),
        );
      }),
      { numRuns: runs(100, 2000) },
    );
  });

  it('on the bisector is 2π/β times the infinite plate near the tip, and twice it far from it', () => {
    fc.assert(
      fc.property(fc.double({ min: 0.2, max: 3, noNaN: true }), (angle) => {
        expect(bisectorKernel(angle, 1e-9)).toBeCloseTo((2 * Math.PI) / angle, 6);
        expect(bisectorKernel(angle, 300)).toBeCloseTo(2, 0);
      }),
    );
  });
});
