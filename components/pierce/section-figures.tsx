import { memo, useState } from 'react';
import { useLayout } from '@/components/theme/layout.ts';
import { explainText, type Explained } from '@/components/text/pierce-explain.ts';
import { resultLabel, resultValue, type ResultName } from '@/components/text/pierce-results.ts';
import {
  conditionWords,
  nozzleWords,
  revisionText,
  sectionText,
  thicknessRangeText,
} from '@/components/text/pierce.ts';
import { FigureButton } from '@/components/ui/figure-button.tsx';
import { Sheet } from '@/components/ui/sheet.tsx';
import { Stack } from '@/components/ui/stack.tsx';
import { Small } from '@/components/ui/text.tsx';
import { useUnitSystem } from '@/components/ui/unit-system.ts';
import type { NozzleRow } from '@/shared/machines.ts';
import type { StrategyContent } from '@/shared/strategies.ts';
import type { Nozzle } from '@/strategy/machine.ts';
import type { ReserveRules } from '@/strategy/pierce/index.ts';
import { quantityText } from '@/strategy/units/index.ts';
import { ExplainDialog, ResultGrid } from './explain.tsx';
import type { LivePrediction } from './use-prediction.ts';

export type SectionFiguresProps = {
  /** What is drawn above. */
  shown: LivePrediction;
  /** As it stands on the screen, for the title block. */
  content: StrategyContent;
  machine: { name: string; revisionNumber: number } | null;
  nozzle: (Nozzle & Pick<NozzleRow, 'name'>) | null;
  /** The least reserves the plant asks for. */
  rules: ReserveRules;
};

/** What the section comes to: breakthrough and reserve in words, the title block, and every result, each of which explains itself. */
export const SectionFigures = memo(function SectionFigures(props: SectionFiguresProps) {
  const { shown, content, machine, nozzle, rules } = props;
  const { wide } = useLayout();
  const system = useUnitSystem();
  const [explained, setExplained] = useState<Explained | null>(null);
  const { prediction } = shown;
  const from = { prediction, content: shown.content, nozzle, rules, system };
  const reserve = (name: 'reserveCold' | 'reserveHot') => {
    const value = resultValue(name, prediction, system);
    return (
      <FigureButton
        value={value}
        align={wide ? 'left' : 'right'}
        spoken={explainText.spoken(resultLabel[name], value)}
        onPress={() => setExplained({ name })}
      />
    );
  };
  return (
    <>
      <Stack gap="xs">
        <Small>{conditionWords(sectionText.coldAt(prediction.cold.plateTemperature, system), prediction.cold)}</Small>
        <Small>{conditionWords(sectionText.hotAt(prediction.hot.plateTemperature, system), prediction.hot)}</Small>
      </Stack>
      <Sheet
        label={revisionText.section}
        cells={[
          {
            label: revisionText.block.plate,
            value: `${content.gradeGroup}, ${thicknessRangeText(content.thickness, system)}`,
            share: 1.5,
          },
          ...(machine
            ? [
                {
                  label: revisionText.block.machine,
                  value: revisionText.block.machineRevision(machine.name, machine.revisionNumber),
                  share: 1.6,
                },
              ]
            : []),
          ...(nozzle ? [{ label: revisionText.block.nozzle, value: nozzleWords(nozzle, system), share: 1.5 }] : []),
          { label: revisionText.block.goodTo, value: quantityText(content.hottestPlate, 'temperature', system).text },
          { label: revisionText.block.cold, value: reserve('reserveCold') },
          { label: revisionText.block.hot, value: reserve('reserveHot') },
        ]}
      />
      <ResultGrid names={resultNames} from={from} onExplain={setExplained} />
      <ExplainDialog explained={explained} from={from} onClose={() => setExplained(null)} />
    </>
  );
});

const resultNames: readonly ResultName[] = [
  'throughCold',
  'throughHot',
  'routine',
  'crater',
  'leadIn',
  'eruption',
  'meanPower',
  'peakPower',
  'energy',
  'pulses',
  'heatLeft',
  'oxygen',
];
