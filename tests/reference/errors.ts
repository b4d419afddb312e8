import { peakAfter, returnOf } from '../../strategy/heat/index.ts';
import { questionOf, type SetCase } from './corners.ts';
import { type KeptResult, setWithResults } from './results.ts';

/** Error of the quick model's return temperature, relative to the reference's rise over the plate temperature; positive is too hot. */
export function quickError(one: SetCase, kept: KeptResult): number {
  const rise = returnOf(questionOf(one)) - one.plateTemperature;
  return rise / kept.returnRise - 1;
}

/** Error of the quick model's peak at a depth inside the finished tip, relative to the reference's rise; the second edge's own heat included. */
export function quickPeakError(one: SetCase, kept: KeptResult, depth: number): number {
  const peak = kept.peaks.find((p) => Math.abs(p.depth - depth) < 1e-9);
  if (!peak) throw new RangeError(`no peak was kept at ${depth} m`);
  return (peakAfter(questionOf(one), depth).temperature - one.plateTemperature) / peak.rise - 1;
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

/** Depths whose peaks stand in the table, m. */
const shownDepths = [0.5e-3, 1.5e-3, 3e-3] as const;

/** The errors as text: each case, then each group; then those of the peaks at some depths, which no gate holds. */
export function errorTable(): string {
  const percent = (value: number): string => `${(100 * value).toFixed(2)} %`.padStart(9);
  const whole = setWithResults();
  const cases = whole.map(({ one, kept }) => {
    const rise = returnOf(questionOf(one)) - one.plateTemperature;
    const [reference, quick] = [kept.returnRise, rise].map((k) => k.toFixed(2).padStart(7));
    const peaks = shownDepths.map((depth) => percent(quickPeakError(one, kept, depth))).join('');
    const gate = one.gated ? '' : '  (no gate)';
    return `${one.name.padEnd(50)}${reference} K, quick ${quick} K ${percent(quickError(one, kept))}, peaks${peaks}${gate}`;
  });
  const line = ({ group, count, mean, max }: GroupErrors): string =>
    `${group.padEnd(24)}${String(count).padStart(4)}  mean ${percent(mean)}  max ${percent(max)}`;
  const gated = whole.filter(({ one }) => one.gated);
  const peaks = shownDepths.map((depth) =>
    errorsOf(
      `peak at ${depth * 1e3} mm, gated`,
      gated.map(({ one, kept }) => quickPeakError(one, kept, depth)),
    ),
  );
  return [...cases, '', ...quickErrors().map(line), ...peaks.map(line)].join('\n');
}
