import { returnOf } from '../../strategy/heat/index.ts';
import { questionOf, type SetCase } from './corners.ts';
import { type KeptResult, setWithResults } from './results.ts';

/** Error of the quick model's return temperature, relative to the reference's rise over the plate temperature; positive is too hot. */
export function quickError(one: SetCase, kept: KeptResult): number {
  const rise = returnOf(questionOf(one)) - one.plateTemperature;
  return rise / kept.returnRise - 1;
}

export type GroupErrors = {
  readonly group: string;
  readonly count: number;
  readonly mean: number;
  readonly max: number;
};

/** Mean and greatest error, absolute, of some cases. */
export function errorsOf(group: string, errors: readonly number[]): GroupErrors {
  const sizes = errors.map(Math.abs);
  return {
    group,
    count: sizes.length,
    mean: sizes.reduce((sum, e) => sum + e, 0) / sizes.length,
    max: Math.max(...sizes),
  };
}

/** By group and for all gated cases, the last line. */
export function quickErrors(): GroupErrors[] {
  const cases = setWithResults().map(({ one, kept }) => ({ one, error: quickError(one, kept) }));
  const groups = [...new Set(cases.map(({ one }) => one.group))];
  return [
    ...groups.map((group) =>
      errorsOf(
        group,
        cases.filter(({ one }) => one.group === group).map(({ error }) => error),
      ),
    ),
    errorsOf(
      'all gated',
      cases.filter(({ one }) => one.gated).map(({ error }) => error),
    ),
  ];
}

/** The errors as text: each case, then each group. */
export function errorTable(): string {
  const percent = (value: number): string => `${(100 * value).toFixed(2)} %`.padStart(9);
  const cases = setWithResults().map(({ one, kept }) => {
    const rise = returnOf(questionOf(one)) - one.plateTemperature;
    return `${one.name.padEnd(52)} reference ${kept.returnRise.toFixed(2).padStart(8)} K  quick ${rise.toFixed(2).padStart(8)} K ${percent(quickError(one, kept))}${one.gated ? '' : '  (no gate)'}`;
  });
  const groups = quickErrors().map(
    ({ group, count, mean, max }) =>
      `${group.padEnd(16)}${String(count).padStart(4)}  mean ${percent(mean)}  max ${percent(max)}`,
  );
  return [...cases, '', ...groups].join('\n');
}
