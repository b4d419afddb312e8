import { describe, expect, it } from 'vitest';
import type { HeatFit, ReturnQuestion } from '../../../strategy/heat/index.ts';
import {
  burnBack,
  cornerHeatInterval,
  heatParameters,
  heatParameterTable,
  peakAfter,
  returnOf,
  withParameters,
} from '../../../strategy/heat/index.ts';

const angle = Math.PI / 3;
const question: ReturnQuestion = {
  corner: {
    point: { x: 0, y: 0 },
    incoming: { x: 1, y: 0 },
    outgoing: { x: Math.cos(Math.PI - angle), y: Math.sin(Math.PI - angle) },
    angle,
  },
  treatment: { kind: 'dwell', duration: 1 },
  cut: { feed: 1 / 60, kerfWidth: 6e-4, heatIntoPlate: 6.5e6 },
  plateTemperature: 293.15,
};
/** Invented: no test cuts have been fitted. */
const fit = (variance: number, threshold = 0): HeatFit => ({
  parameters: { heatShare: 1.2, ignitionThreshold: 1450 },
  names: ['heatShare', 'ignitionThreshold'],
  covariance: [
    [variance, 0],
    [0, threshold],
  ],
  coverage: 2,
});

function interval(of: HeatFit) {
  const found = cornerHeatInterval(question, of);
  if (found.kind === 'none') throw new Error(found.why);
  return found;
}

describe('the interval of a corner’s heat', () => {
  it('is none without a fit, and says so', () => {
    expect(cornerHeatInterval(question, null)).toEqual({
      kind: 'none',
      why: 'No test cuts have been fitted: how sure the figures are is not known.',
    });
  });

  it('is that of the fitted heat at both ends, for a figure that only the heat moves', () => {
    const { returnTemperature } = interval(fit(0.04));
    // u = ln((x − 0.3)/(3 − x)) moved by two deviations of 0.2
    const u = Math.log((1.2 - 0.3) / (3 - 1.2));
    const [least, most] = [u - 0.4, u + 0.4].map((at) => 0.3 + 2.7 / (1 + Math.exp(-at)));
    const rise = returnOf(question) - 293.15;
    expect(returnTemperature.value - 293.15).toBeCloseTo(1.2 * rise, 6);
    expect(returnTemperature.least - 293.15).toBeCloseTo((least ?? 0) * rise, 3);
    expect(returnTemperature.most - 293.15).toBeCloseTo((most ?? 0) * rise, 3);
  });

  it('widens with the spread, and the threshold moves the burn-back alone', () => {
    const [narrow, wide, threshold] = [interval(fit(0.01)), interval(fit(0.04)), interval(fit(0, 0.25))];
    for (const figure of ['returnTemperature', 'peak', 'burnBack'] as const) {
      expect(wide[figure].most - wide[figure].least).toBeGreaterThan(narrow[figure].most - narrow[figure].least);
      expect(wide[figure].value).toBeGreaterThan(wide[figure].least);
    }
    expect(threshold.peak.most).toBe(threshold.peak.least);
    expect(threshold.burnBack.most).toBeGreaterThan(threshold.burnBack.least);
  });

  it('of a fit that is sure is no wider than its value', () => {
    const { returnTemperature, peak, burnBack: depth } = interval(fit(0));
    const fitted = withParameters(question, heatParameters(fit(0)));
    expect(returnTemperature).toEqual({
      value: returnOf(fitted),
      least: returnOf(fitted),
      most: returnOf(fitted),
    });
    expect(peak.value).toBe(peakAfter(fitted).temperature);
    expect(depth.value).toBe(burnBack(fitted, 1450));
  });

  it('is none where the fit took a parameter to the end of its range', () => {
    const ended = { ...fit(0.01), parameters: { heatShare: 3, ignitionThreshold: 1450 } };
    expect(cornerHeatInterval(question, ended)).toMatchObject({ kind: 'none', why: /heatShare to the end/ });
  });

  it('refuses what is no fit', () => {
    const good = fit(0.01);
    const bad: readonly [Partial<HeatFit>, RegExp][] = [
      [{ names: ['heatShare', 'heatShare'] }, /names a parameter twice/],
      [{ names: ['heatShare', 'conductivityShare'] }, /no value for conductivityShare/],
      [{ covariance: [[0.01]] }, /not 2 by 2/],
      [
        {
          covariance: [
            [0.01, 0.2],
            [0, 0.1],
          ],
        },
        /differ/,
      ],
      [
        {
          covariance: [
            [-1, 0],
            [0, 1],
          ],
        },
        /negative/,
      ],
      [
        {
          covariance: [
            [0.01, 0.5],
            [0.5, 0.01],
          ],
        },
        /variance of/,
      ],
      [{ coverage: 0 }, /coverage 0 is outside/],
      [{ parameters: { heatShare: 9, ignitionThreshold: 1450 } }, /heatShare 9/],
    ];
    for (const [change, why] of bad) expect(() => cornerHeatInterval(question, { ...good, ...change })).toThrow(why);
  });
});

describe('the parameters of a cut’s heat', () => {
  it('have defaults within their ranges, each with a meaning and a source', () => {
    const defaults = heatParameters(null);
    for (const { name, value, min, max, meaning, source } of heatParameterTable) {
      expect(defaults[name]).toBe(value);
      expect(value).toBeGreaterThanOrEqual(min);
      expect(value).toBeLessThanOrEqual(max);
      expect(meaning.length + source.length).toBeGreaterThan(20);
    }
  });

  it('change the heat and the plate of a question, and at their defaults nothing', () => {
    expect(returnOf(withParameters(question, heatParameters(null)))).toBeCloseTo(returnOf(question), 9);
    const better = withParameters(question, { ...heatParameters(null), conductivityShare: 1.5 });
    expect(returnOf(better)).toBeLessThan(returnOf(question));
  });
});
