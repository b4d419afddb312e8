import { describe, expect, it, vi } from 'vitest';
import { returnOf } from '../../strategy/heat/index.ts';
import { runs } from '../support/runs.ts';
import { cornerSet, questionOf } from './corners.ts';
import { errorsOf, quickError, quickErrors } from './errors.ts';
import { setWithResults } from './results.ts';
import { solveCorner } from './solve.ts';

// a solver takes seconds, and many on a busy machine
vi.setConfig({ testTimeout: runs(120_000, 3_600_000) });

describe('the quick return temperature against the reference solver', () => {
  const gated = setWithResults().filter(({ one }) => one.gated);
  const worst = errorsOf(
    'gated',
    gated.map(({ one, kept }) => quickError(one, kept)),
  );

  it('errs by at most 3 % of the temperature rise in the mean', () => {
    expect(worst.count).toBeGreaterThanOrEqual(60);
    expect(worst.mean, JSON.stringify(quickErrors())).toBeLessThanOrEqual(0.03);
  });

  it('errs by at most 10 % of the temperature rise anywhere', () => {
    const beyond = gated
      .filter(({ one, kept }) => !(Math.abs(quickError(one, kept)) <= 0.1))
      .map(({ one }) => one.name);
    expect(beyond).toEqual([]);
  });

  it('keeps to both on corners that were drawn by another seed and never kept', () => {
    const others = cornerSet(7).filter((one) => one.gated);
    const tried = others.filter((_, i) => i % runs(35, 1) === runs(34, 0));
    const errors = tried.map((one) => {
      // cells twice as large as those of the kept results: good for 1 %
      const { returnRise } = solveCorner(one, { finest: 0.2e-3 });
      return (returnOf(questionOf(one)) - one.plateTemperature) / returnRise - 1;
    });
    const { mean, max } = errorsOf('another seed', errors);
    expect(errors.length).toBeGreaterThan(1);
    expect(mean).toBeLessThanOrEqual(0.03);
    expect(max).toBeLessThanOrEqual(0.1);
  });
});
