import { appendFileSync } from 'node:fs';
import { env } from 'node:process';
import { describe, expect, it } from 'vitest';

/** How sure an outside value is. */
export type Standing = 'published' | 'computed from a published formula' | 'memory' | 'common practice';

/** Relative to the expected value, or absolute in its unit (0 is an exact table value); or the value is a bound. */
export type Tolerance =
  { readonly rel: number } | { readonly abs: number } | { readonly bound: 'at most' | 'at least' };

/** One value of the program against one from outside. */
export type OutsideCheck = {
  /** Unlike any other, over all files. */
  readonly id: string;
  readonly what: string;
  readonly unit: string;
  /** Called inside the test, so that what throws counts as failed and not as missing. */
  readonly got: () => number;
  readonly expected: number;
  readonly tolerance: Tolerance;
  /** Standard, book or paper, and how it was seen. */
  readonly source: string;
  readonly standing: Standing;
};

/** One line of the report: what `npm run outside` prints from. */
export type OutsideResult = Omit<OutsideCheck, 'got'> & { readonly got: number | null; readonly ok: boolean };

/** Whether a value lies within the tolerance. A value that is none never does. */
export function withinTolerance(got: number, expected: number, tolerance: Tolerance): boolean {
  if ('bound' in tolerance) return tolerance.bound === 'at most' ? got <= expected : got >= expected;
  const allowed = 'rel' in tolerance ? tolerance.rel * Math.abs(expected) : tolerance.abs;
  return Math.abs(got - expected) <= allowed;
}

/**
 * Declares a test a check. With OUTSIDE_REPORT set, each appends its result to that file as a line of JSON, failed ones too.
 */
export function outsideChecks(title: string, checks: readonly OutsideCheck[]): void {
  describe(title, () => {
    it('has an id of its own for each value', () => {
      const ids = checks.map(({ id }) => id);
      expect(new Set(ids).size).toBe(ids.length);
    });
    for (const check of checks) {
      it(`${check.id} ${check.what}`, () => {
        const { got: ask, ...rest } = check;
        let got: number | null = null;
        try {
          got = ask();
        } finally {
          const ok = got !== null && withinTolerance(got, check.expected, check.tolerance);
          report({ ...rest, got, ok });
        }
        const { expected, tolerance, unit, source } = check;
        const message = `${check.what}: ${got} ${unit}, outside ${expected} ${unit} (${JSON.stringify(tolerance)}; ${source})`;
        expect(got !== null && withinTolerance(got, expected, tolerance), message).toBe(true);
      });
    }
  });
}

function report(result: OutsideResult): void {
  const file: unknown = env.OUTSIDE_REPORT;
  if (typeof file === 'string' && file !== '') appendFileSync(file, `${JSON.stringify(result)}\n`);
}
