import { describe, expect, it, vi } from 'vitest';
import { runs } from '../support/runs.ts';
import { cornerSet } from './corners.ts';
import { firstFinest, keptResults, resultOf, setWithResults } from './results.ts';
import { solveCorner, solverVersion } from './solve.ts';

// a solver takes seconds, and many on a busy machine
vi.setConfig({ testTimeout: runs(120_000, 3_600_000) });

const kept = keptResults();
const whole = setWithResults();

describe('the committed results', () => {
  it('were made by the solver as it stands', () => {
    expect(kept.solver).toBe(solverVersion);
  });

  it('hold every corner of the set and no other', () => {
    expect(kept.results.map(({ name }) => name)).toEqual(cornerSet().map(({ name }) => name));
  });

  it('were refined until halving moved the return rise by less than 1 %', () => {
    for (const { name, halving } of kept.results) expect(halving, name).toBeLessThan(0.01);
  });

  it('balance to 1.000', () => {
    for (const { name, balance } of kept.results) expect(balance, name).toBeCloseTo(1, 5);
  });

  it('cover 60 corners and more from 30° to 150°, slow and fast, every treatment, cold and preheated', () => {
    const gated = cornerSet().filter((one) => one.gated && one.angle < Math.PI);
    const degrees = gated.map(({ angle }) => (angle * 180) / Math.PI);
    const feeds = gated.map(({ feed }) => feed * 60);
    expect(gated.length).toBeGreaterThanOrEqual(60);
    expect([Math.min(...degrees), Math.max(...degrees)].map(Math.round)).toEqual([30, 150]);
    expect(Math.min(...feeds)).toBeLessThan(0.5);
    expect(Math.max(...feeds)).toBeGreaterThan(1.8);
    expect(new Set(gated.map(({ treatment }) => treatment.kind))).toEqual(new Set(['leave', 'loop', 'dwell', 'ease']));
    expect(gated.filter(({ round }) => round !== undefined).length).toBeGreaterThanOrEqual(5);
    expect(gated.filter(({ plateTemperature }) => plateTemperature > 350).length).toBeGreaterThanOrEqual(10);
  });

  const few = whole.filter((_, i) => i % 17 === 4).slice(0, 4);
  const deep = runs(0, 1) === 1;
  it.each(deep ? [] : few)('come again with cells twice as large: $one.name', ({ one, kept: result }) => {
    const properties = one.standard ? { properties: 'standard' as const } : {};
    const again = solveCorner(one, { finest: 2 * result.finest, ...properties });
    // the kept change is that between these very cells and half of them; another engine's rounding may turn a triangle's side
    const change = Math.abs(again.returnRise - result.returnRise) / result.returnRise;
    expect(Math.abs(change - result.halving)).toBeLessThan(0.002);
    expect(2 * result.finest).toBeLessThanOrEqual(firstFinest);
  });

  it.each(deep ? whole : [])('come again: $one.name', ({ one, kept: result }) => {
    const again = resultOf(one);
    expect(Math.abs(again.returnRise / result.returnRise - 1)).toBeLessThan(0.001);
    expect(again.finest).toBe(result.finest);
    again.peaks.forEach((peak, i) => expect(Math.abs(peak.rise / (result.peaks[i]?.rise ?? 0) - 1)).toBeLessThan(0.01));
  });
});
