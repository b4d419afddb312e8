import { useState } from 'react';
import { useLayout } from '@/components/theme/layout.ts';
import { space } from '@/components/theme/space.ts';
import {
  conditionWords,
  laneText,
  nozzleWords,
  reserveText,
  revisionText,
  sectionText,
  thicknessRangeText,
} from '@/components/text/pierce.ts';
import { Choice } from '@/components/ui/choice.tsx';
import { Panel } from '@/components/ui/panel.tsx';
import { Sheet } from '@/components/ui/sheet.tsx';
import { Stack } from '@/components/ui/stack.tsx';
import { Small } from '@/components/ui/text.tsx';
import { useUnitSystem } from '@/components/ui/unit-system.ts';
import type { StrategyContent } from '@/shared/strategies.ts';
import { quantityText } from '@/strategy/units/index.ts';
import { laneNames, type LaneName } from './section-layout.ts';
import { SectionView } from './section-view.tsx';
import type { LivePrediction } from './use-prediction.ts';

type SectionPanelProps = {
  live: LivePrediction;
  /** As it stands on the screen, for the title block. */
  content: StrategyContent;
  machine: { name: string; revisionNumber: number } | null;
  nozzle: { name: string; type: 'single' | 'double'; diameter: number } | null;
  chosen: number | null;
};

/** The section with its lanes, and the title block that says what it is of. On a phone one lane at a time. */
export function SectionPanel({ live, content, machine, nozzle, chosen }: SectionPanelProps) {
  const { wide, width } = useLayout();
  const system = useUnitSystem();
  const [lane, setLane] = useState<LaneName>('meanPower');
  const { prediction } = live;
  const reserve = (which: 'cold' | 'hot') => {
    const { reserve: one } = prediction[which];
    return reserveText(one.kind === 'ok' ? one.value : null);
  };
  return (
    <Stack gap="m">
      <Panel flush>
        <div style={{ padding: wide ? space.l : space.s, paddingBottom: space.s }}>
          <SectionView
            prediction={prediction}
            stages={live.content.stages}
            system={system}
            lanes={wide ? laneNames : [lane]}
            chosen={chosen}
            depth={wide ? 260 : 190}
          />
        </div>
      </Panel>
      {!wide && (
        <Choice
          label={sectionText.lanes}
          // four words beside each other need this much
          kind={width < 372 ? 'list' : 'segments'}
          options={laneNames.map((name) => ({ value: name, label: laneText[name].short }))}
          value={lane}
          onChange={setLane}
        />
      )}
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
          { label: revisionText.block.cold, value: reserve('cold') },
          { label: revisionText.block.hot, value: reserve('hot') },
        ]}
      />
      <Sheet
        label={revisionText.block.energy}
        cells={[
          { label: revisionText.block.crater, value: quantityText(prediction.craterRadius, 'length', system).text },
          { label: revisionText.block.energy, value: quantityText(prediction.energy, 'energy', system).text },
          { label: revisionText.block.oxygen, value: quantityText(prediction.oxygenUsed, 'mass', system).text },
        ]}
      />
    </Stack>
  );
}
