import { describe, expect, it } from 'vitest';
import { errorsOf, quickError, quickErrors } from './errors.ts';
import { setWithResults } from './results.ts';

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
});
