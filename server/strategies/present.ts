import type { Person } from '../../shared/basics.ts';
import type { StrategySummary } from '../../shared/strategies.ts';
import type { standing, StrategyLine } from './repository.ts';

export function presentSummary(
  line: StrategyLine,
  { approved, open }: Awaited<ReturnType<typeof standing>>,
  names: (userId: string) => Person,
): StrategySummary {
  return {
    id: line.strategyId,
    name: line.strategyName,
    machine: { id: line.machineId, name: line.machineName },
    gradeGroup: line.gradeGroup,
    thickness: { min: line.thicknessMin, max: line.thicknessMax },
    latest: {
      id: line.id,
      number: line.number,
      state: line.state,
      changedAt: line.changedAt.toISOString(),
      changedBy: names(line.changedBy),
      reserveCold: line.core.reserveCold,
      reserveHot: line.core.reserveHot,
      bands: [...line.core.bands],
    },
    approved: approved.get(line.strategyId) ?? null,
    openReports: open.get(line.strategyId) ?? 0,
  };
}
