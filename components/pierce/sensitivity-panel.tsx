import { useMemo } from 'react';
import { sensitivityText } from '@/components/text/pierce-designer.ts';
import { reserveText } from '@/components/text/pierce.ts';
import { BarList, type Bar } from '@/components/ui/bar-list.tsx';
import { Panel } from '@/components/ui/panel.tsx';
import { Small } from '@/components/ui/text.tsx';
import type { StrategyContent } from '@/shared/strategies.ts';
import type { MachineProfile, Nozzle } from '@/strategy/machine.ts';
import { pierceSensitivity, type ReserveRules, type SensitivityRow } from '@/strategy/pierce/index.ts';

type SensitivityPanelProps = { content: StrategyContent; profile: MachineProfile; nozzle: Nozzle; rules: ReserveRules };

/** What a dirty or clean plate, a worn nozzle, a thicker and a hot plate do to the reserve, as bars on one scale. */
export function SensitivityPanel({ content, profile, nozzle, rules }: SensitivityPanelProps) {
  const rows = useMemo(() => sensitivityOf(content, profile, nozzle), [content, profile, nozzle]);
  if (rows.length === 0) return null;
  const { cold } = rules;
  const most = Math.max(cold, ...rows.map(({ reserve }) => (reserve.kind === 'ok' ? reserve.value : 0))) * 1.05;
  const bars = rows.map(({ id, what, reserve, change }): Bar => {
    const value = reserve.kind === 'ok' ? reserve.value : null;
    const changed = id === 'as-set' || change === null ? '' : changeText(change);
    const figure = value === null ? sensitivityText.notThrough : reserveText(value);
    const short = value === null || value < cold;
    return {
      id,
      label: what,
      figure,
      aside: changed === '' ? undefined : changed,
      spoken: sensitivityText.row(what, figure, changed),
      share: (value ?? 0) / most,
      tone: short ? 'hot' : 'cold',
      open: short,
    };
  });
  return (
    <Panel title={sensitivityText.title}>
      <Small>{`${sensitivityText.hint} ${sensitivityText.asked(reserveText(cold))}`}</Small>
      <BarList label={sensitivityText.title} bars={bars} mark={cold / most} />
    </Panel>
  );
}

/** Empty where the model can't follow. */
function sensitivityOf(content: StrategyContent, profile: MachineProfile, nozzle: Nozzle): readonly SensitivityRow[] {
  try {
    return pierceSensitivity({
      stages: content.stages,
      thickness: { min: content.thickness.min * 1e-6, max: content.thickness.max * 1e-6 },
      hottestPlateTemperature: content.hottestPlate,
      profile,
      nozzle,
    });
  } catch (error) {
    if (error instanceof RangeError) return [];
    throw error;
  }
}

const changeText = (change: number): string =>
  Math.abs(change) < 0.005 ? sensitivityText.same : sensitivityText.change(change);
