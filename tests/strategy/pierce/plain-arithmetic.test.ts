import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { PIERCE_DEFAULTS, piercePredict, type Stage } from '../../../strategy/pierce/index.ts';
import { netRemovalHeat } from '../../../strategy/pierce/parameters.ts';
import { meltingEnthalpy, STEEL_DENSITY } from '../../../strategy/steel/index.ts';
import { continuous, held, input, PLAIN, threeRamps, throughAt } from './support.ts';

const RADIUS = 0.75e-3;
const FADES_OVER = 0.012;

/** The plain arithmetic again, by another method: classical Runge–Kutta in 20 µs steps. */
function plainBreakthrough(stages: readonly Stage[], thickness: number, plateTemperature: number): number {
  const heat = 12e9 - STEEL_DENSITY * (meltingEnthalpy(293.15) - meltingEnthalpy(plateTemperature));
  const loss = (135 * (1809 - plateTemperature)) / (1809 - 293.15);
  const speed = (power: number, depth: number) =>
    Math.max(0, (0.4 * power * Math.exp(-depth / FADES_OVER) - loss) / (heat * Math.PI * RADIUS ** 2));
  const step = 2e-5;
  let depth = 0;
  let begin = 0;
  for (const { duration, from, to } of stages) {
    const power = (t: number) => from.peakPower + ((to.peakPower - from.peakPower) * t) / duration;
    for (let i = 0; i < Math.round(duration / step); i++) {
      const t = i * step;
      const k1 = speed(power(t), depth);
      const k2 = speed(power(t + step / 2), depth + (step / 2) * k1);
      const k3 = speed(power(t + step / 2), depth + (step / 2) * k2);
      const k4 = speed(power(t + step), depth + step * k3);
      const next = depth + (step / 6) * (k1 + 2 * k2 + 2 * k3 + k4);
      if (next >= thickness) return begin + t + (step * (thickness - depth)) / (next - depth);
      depth = next;
    }
    begin += duration;
  }
  return Number.POSITIVE_INFINITY;
}

describe('with every further mechanism neutral, the plain arithmetic of a pierce', () => {
  it.each([
    ['19 mm cold', [500, 700, 1400, 2200] as const, 0.019, 293.15, 6.7],
    ['19 mm at 200 °C', [500, 700, 1400, 2200] as const, 0.019, 473.15, 5.9],
    ['25 mm cold', [500, 800, 2000, 4000] as const, 0.025, 293.15, 6.8],
  ])('%s is through as by hand, and as another integrator has it', (_, powers, thickness, plateTemperature, byHand) => {
    const stages = continuous(threeRamps([...powers]));
    const prediction = piercePredict(input(stages, { thickness, plateTemperature, parameters: PLAIN }));
    const time = throughAt(prediction.breakthrough);
    expect(Math.abs(time - byHand)).toBeLessThan(0.06);
    expect(time).toBeCloseTo(plainBreakthrough(stages, thickness, plateTemperature), 5);
  });

  it('stalls at 13 mm with a flat 1 kW', () => {
    const prediction = piercePredict(input(continuous(held(1000, 40)), { parameters: PLAIN }));
    expect(prediction.breakthrough).toMatchObject({ kind: 'none' });
    // Where 0.4·1000·exp(−z/12 mm) has fallen to 135 W.
    expect((prediction.perStage[0]?.depthAtEnd ?? 0) * 1000).toBeCloseTo(12 * Math.log(400 / 135), 2);
  });

  it('is through at the moment of the closed form when the power is held', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 1500, max: 9000, noNaN: true }),
        fc.double({ min: 0.002, max: 0.015, noNaN: true }),
        (power, thickness) => {
          const prediction = piercePredict(input(continuous(held(power, 100)), { thickness, parameters: PLAIN }));
          // y = exp(z/L) obeys y′ = (A − B·y)/(L·C): an exponential approach to A/B.
          const [a, b, c] = [0.4 * power, 135, 12e9 * Math.PI * RADIUS ** 2];
          fc.pre(a / b > Math.exp(thickness / FADES_OVER) * 1.05);
          const exact = ((-FADES_OVER * c) / b) * Math.log((a / b - Math.exp(thickness / FADES_OVER)) / (a / b - 1));
          expect(throughAt(prediction.breakthrough)).toBeCloseTo(exact, 6);
        },
      ),
    );
  });
});

describe('with the default parameters under ordinary conditions', () => {
  it.each([
    ['19 mm cold', [500, 700, 1400, 2200] as const, 0.019, 293.15, 6.7],
    ['19 mm at 200 °C', [500, 700, 1400, 2200] as const, 0.019, 473.15, 5.9],
    ['25 mm cold', [500, 800, 2000, 4000] as const, 0.025, 293.15, 6.8],
  ])('%s stays within a fifth of the plain arithmetic', (_, powers, thickness, plateTemperature, plain) => {
    const prediction = piercePredict(input(threeRamps([...powers]), { thickness, plateTemperature }));
    expect(Math.abs(throughAt(prediction.breakthrough) / plain - 1)).toBeLessThan(0.2);
  });

  it('a flat 1 kW mean stalls near 13 mm and says so', () => {
    const prediction = piercePredict(input(held(1000, 30)));
    expect(prediction.breakthrough).toMatchObject({ kind: 'none', why: /^Not through: stands still at 1[1-5]\.\d mm/ });
    expect(prediction.stalls).toHaveLength(1);
    expect(prediction.stalls[0]?.why).toMatch(/stands still at .* mm: of \d+ W mean power \d+ W are absorbed there/);
  });

  it('needs 12 J/mm³ of light where oxygen is ample, 26 J/mm³ with what burns', () => {
    const net = netRemovalHeat(PIERCE_DEFAULTS, 293.15) * STEEL_DENSITY;
    expect(net / 1e9).toBeCloseTo(12, 6);
    const total = (meltingEnthalpy(293.15) + PIERCE_DEFAULTS.expulsionHeat) * STEEL_DENSITY;
    expect(total / 1e9).toBeCloseTo(26, 6);
  });
});
