import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { ReturnQuestion, ReturnTreatment } from '../../../strategy/heat/index.ts';
import {
  burnBack,
  coolingCurve,
  ignitionRange,
  peakAfter,
  returnDelay,
  returnOf,
  straightEdgeBurnBack,
} from '../../../strategy/heat/index.ts';
import type { LoopCorner } from '../../../strategy/path/index.ts';
import { flatLoopAt, loopAt } from '../../../strategy/path/index.ts';
import { runs } from '../../support/runs.ts';

const cut = { feed: 1 / 60, kerfWidth: 6e-4, heatIntoPlate: 6.5e6 };
const cold = 293.15;
const tip = (degrees: number): LoopCorner => {
  const angle = (degrees * Math.PI) / 180;
  return {
    point: { x: 0, y: 0 },
    incoming: { x: 1, y: 0 },
    outgoing: { x: Math.cos(Math.PI - angle), y: Math.sin(Math.PI - angle) },
    angle,
  };
};
const ask = (degrees: number, treatment: ReturnTreatment = { kind: 'leave' }): ReturnQuestion => ({
  corner: tip(degrees),
  treatment,
  cut,
  plateTemperature: cold,
});
const loop = (degrees: number, radius = 3e-3): ReturnTreatment => ({
  kind: 'loop',
  loop: loopAt(tip(degrees), radius),
});
const treatments = (degrees: number): ReturnTreatment[] => [
  { kind: 'leave' },
  { kind: 'dwell', duration: 1.5 },
  loop(degrees),
  { kind: 'loop', loop: flatLoopAt(tip(degrees), 1e-3, 6e-3) },
  { kind: 'ease', length: 5e-3, feedShare: 0.4, powerShare: 0.4 },
];

describe('the peak after the second edge has begun', () => {
  it('is the hotter the sharper the tip and the nearer to it, and comes the later the deeper', () => {
    const byAngle = [150, 120, 90, 60, 45, 30].map((degrees) => peakAfter(ask(degrees)).temperature);
    expect([...byAngle].sort((a, b) => a - b)).toEqual(byAngle);
    const depths = [0.3e-3, 0.6e-3, 1e-3, 2e-3, 4e-3].map((depth) => peakAfter(ask(60), depth));
    const temperatures = depths.map(({ temperature }) => temperature);
    expect([...temperatures].sort((a, b) => b - a)).toEqual(temperatures);
    const times = depths.map(({ time }) => time);
    expect([...times].sort((a, b) => a - b)).toEqual(times);
  });

  it('is the highest of the cooling curve after the return, wherever it is looked at', () => {
    fc.assert(
      fc.property(fc.double({ min: 30, max: 150, noNaN: true }), fc.nat(3), (degrees, which) => {
        const treatment = treatments(degrees < 130 ? degrees : 60)[which] ?? { kind: 'leave' };
        const question = ask(degrees < 130 ? degrees : 60, treatment);
        const peak = peakAfter(question);
        const delay = returnDelay(question);
        const times = Array.from({ length: 60 }, (_, i) => delay + (i / 60) ** 2 * 4);
        const highest = Math.max(...coolingCurve(question, times));
        expect(highest).toBeLessThan(peak.temperature + 0.01 * (peak.temperature - cold));
        expect(coolingCurve(question, [delay + peak.time])[0]).toBeCloseTo(peak.temperature, 6);
      }),
      { numRuns: runs(15, 300) },
    );
  });

  it('beside a straight edge is that of the moving source in the finished edge: π/β times less than at the tip of a wedge', () => {
    // near the tip, once both edges are long open, the wedge gives π/β times a straight edge of the same heat; the peak stays below it
    const straight: ReturnQuestion = {
      ...ask(90),
      corner: { point: { x: 0, y: 0 }, incoming: { x: 1, y: 0 }, outgoing: { x: 1, y: 0 }, angle: Math.PI },
    };
    for (const degrees of [120, 90, 60, 45]) {
      const aside = peakAfter(straight, 2e-3 * Math.sin((degrees * Math.PI) / 360)).temperature - cold;
      const there = peakAfter(ask(degrees, { kind: 'dwell', duration: 60 }), 2e-3).temperature - cold;
      expect(there).toBeLessThan((180 / degrees) * aside);
      expect(there).toBeGreaterThan(0.5 * aside);
    }
  });

  it('on a hot plate is higher by what the plate is hotter', () => {
    const [a, b] = [cold, cold + 150].map((plateTemperature) => peakAfter({ ...ask(60), plateTemperature }));
    expect((b?.temperature ?? 0) - (a?.temperature ?? 0)).toBeCloseTo(150, 6);
  });
});

describe('a cooling curve', () => {
  it('begins at the plate’s temperature, passes through the return temperature of a loop, and comes back to the plate’s', () => {
    const question = ask(60, loop(60));
    const delay = returnDelay(question);
    const [before, back, late] = coolingCurve(question, [-5, delay, delay + 3000]);
    expect(before).toBeCloseTo(cold, 3);
    expect(back).toBeCloseTo(returnOf(question), 6);
    expect((late ?? 0) - cold).toBeLessThan(10);
  });

  it('counts the last 2 mm that the return temperature leaves out: hotter where the front has just come', () => {
    expect(coolingCurve(ask(60), [0])[0]).toBeGreaterThan(returnOf(ask(60)) + 20);
  });

  it('has no step, for any treatment, also where the second edge begins', () => {
    for (const degrees of [45, 90]) {
      for (const treatment of treatments(degrees)) {
        const question = ask(degrees, treatment);
        const delay = returnDelay(question);
        const times = Array.from({ length: 400 }, (_, i) => -1 + ((delay + 3) * i) / 400);
        const fine = times.map((time) => time + 1e-6);
        const [a, b] = [coolingCurve(question, times), coolingCurve(question, fine)];
        a.forEach((temperature, i) => {
          expect(Math.abs((b[i] ?? 0) - temperature)).toBeLessThan(0.05);
        });
        const [just, then] = coolingCurve(question, [delay - 1e-6, delay + 1e-6]);
        expect(Math.abs((then ?? 0) - (just ?? 0))).toBeLessThan(0.05);
      }
    }
  });

  it('of ever shorter waits comes to that of none', () => {
    const times = [-0.2, 0, 0.05, 0.2, 1];
    const none = coolingCurve(ask(60), times);
    const short = coolingCurve(ask(60, { kind: 'dwell', duration: 1e-6 }), times);
    none.forEach((temperature, i) => {
      expect(short[i]).toBeCloseTo(temperature, 1);
    });
  });

  it('has the shape of the times asked for', () => {
    expect(coolingCurve(ask(60), [])).toEqual([]);
    expect(coolingCurve(ask(60), [1, 0.5, 1])).toHaveLength(3);
  });
});

describe('the delay before the second edge', () => {
  it('is the way of a loop, a wait, the arc of a round, and else nothing', () => {
    expect(returnDelay(ask(60))).toBe(0);
    expect(returnDelay(ask(60, { kind: 'dwell', duration: 2 }))).toBe(2);
    expect(returnDelay(ask(60, loop(60)))).toBeCloseTo(loopAt(tip(60), 3e-3).length / cut.feed, 12);
    expect(returnDelay({ ...ask(60), round: 2e-3 })).toBeCloseTo((2e-3 * (2 * Math.PI)) / 3 / cut.feed, 12);
  });
});

describe('the burn-back estimate', () => {
  it('is where the peak passes the threshold', () => {
    for (const degrees of [30, 60, 90]) {
      for (const threshold of [ignitionRange.min, 1400, ignitionRange.max]) {
        const depth = burnBack(ask(degrees), threshold);
        expect(depth).toBeGreaterThan(0);
        expect(peakAfter(ask(degrees), depth * 1.02).temperature).toBeLessThan(threshold);
        expect(peakAfter(ask(degrees), depth * 0.98).temperature).toBeGreaterThan(threshold);
      }
    }
  });

  it('grows with a sharper tip, a hotter plate and a lower threshold, and is more than beside a straight edge', () => {
    const depths = [120, 90, 60, 45, 30].map((degrees) => burnBack(ask(degrees)));
    expect([...depths].sort((a, b) => a - b)).toEqual(depths);
    expect(burnBack({ ...ask(60), plateTemperature: cold + 200 })).toBeGreaterThan(burnBack(ask(60)));
    expect(burnBack(ask(60), ignitionRange.min)).toBeGreaterThan(burnBack(ask(60)));
    expect(straightEdgeBurnBack(cut, cold)).toBeLessThan(burnBack(ask(120)));
    expect(burnBack(ask(60, loop(60)))).toBeLessThan(burnBack(ask(60)));
  });

  it('is nothing for a cut that leaves no heat', () => {
    expect(burnBack({ ...ask(60), cut: { ...cut, heatIntoPlate: 0 } })).toBe(0);
    expect(straightEdgeBurnBack({ ...cut, heatIntoPlate: 0 }, cold)).toBe(0);
  });
});

describe('a question without an answer', () => {
  const refused = (change: Partial<ReturnQuestion>, why: RegExp) => {
    const question = { ...ask(60), ...change };
    for (const asked of [returnOf, peakAfter, returnDelay, burnBack]) expect(() => asked(question)).toThrow(why);
    expect(() => coolingCurve(question, [0])).toThrow(RangeError);
  };

  it('is refused with the value and its range', () => {
    refused({ cut: { ...cut, feed: 0 } }, /feed 0 m\/s is outside/);
    refused({ cut: { ...cut, feed: Number.NaN } }, /feed NaN m\/s is outside/);
    refused({ cut: { ...cut, kerfWidth: 0 } }, /kerf width 0 m is outside/);
    refused({ cut: { ...cut, heatIntoPlate: -1 } }, /heat into the plate -1 J\/m² is outside/);
    refused({ plateTemperature: 0 }, /plate temperature 0 K is outside/);
    refused({ corner: { ...tip(60), angle: 0 } }, /corner angle 0 rad is outside/);
    refused({ corner: { ...tip(60), angle: 7 } }, /corner angle 7 rad is outside/);
    refused({ round: -1e-3 }, /radius of the round -0.001 m is outside/);
    refused({ treatment: { kind: 'dwell', duration: -1 } }, /dwell -1 s is outside/);
    refused({ treatment: { kind: 'ease', length: -1, feedShare: 1, powerShare: 1 } }, /length of the ease -1 m/);
    refused({ treatment: { kind: 'ease', length: 1e-3, feedShare: 0, powerShare: 1 } }, /shares of feed 0/);
  });

  it('also a depth and a threshold', () => {
    expect(() => peakAfter(ask(60), 0)).toThrow(/depth 0 m is outside/);
    expect(() => burnBack(ask(60), 1000)).toThrow(/ignition threshold 1000 K is outside \[1233, 1644\] K/);
  });
});
