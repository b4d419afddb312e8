import { useMemo, useState } from 'react';
import { View } from 'react-native';
import { useLayout } from '@/components/theme/layout.ts';
import { space } from '@/components/theme/space.ts';
import { knotText } from '@/components/text/pierce-designer.ts';
import {
  explainText,
  resultLabel,
  resultValue,
  type Explained,
  type ResultName,
} from '@/components/text/pierce-explain.ts';
import {
  conditionWords,
  laneText,
  nozzleWords,
  revisionText,
  sectionText,
  thicknessRangeText,
} from '@/components/text/pierce.ts';
import { Choice } from '@/components/ui/choice.tsx';
import { FigureButton } from '@/components/ui/figure-button.tsx';
import { Panel } from '@/components/ui/panel.tsx';
import { Sheet } from '@/components/ui/sheet.tsx';
import { Stack } from '@/components/ui/stack.tsx';
import { Small } from '@/components/ui/text.tsx';
import { useUnitSystem } from '@/components/ui/unit-system.ts';
import type { NozzleRow } from '@/shared/machines.ts';
import type { StrategyContent } from '@/shared/strategies.ts';
import type { MachineProfile, Nozzle } from '@/strategy/machine.ts';
import { DEFAULT_RESERVE_RULES, type ReserveRules, type Stage } from '@/strategy/pierce/index.ts';
import { quantityText } from '@/strategy/units/index.ts';
import { ExplainDialog, ResultGrid } from './explain.tsx';
import type { Ghost } from './ghost.ts';
import { KnotEditor } from './knot-editor.tsx';
import type { KnotEditing } from './knot-editing.ts';
import { targetMoved, targetValue, type Target } from './knots.ts';
import { laneNames, type LaneName } from './section-layout.ts';
import { SectionView } from './section-view.tsx';
import { useFrameState } from './use-frame-state.web.ts';
import { predicted, type LivePrediction } from './use-prediction.ts';

/** What the drawing changes when something in it is moved. */
export type SectionEdit = {
  readonly profile: MachineProfile;
  readonly nozzle: Nozzle;
  readonly onStages: (change: (stages: readonly Stage[]) => readonly Stage[], field: string) => void;
  readonly onSettle: () => void;
  readonly onChoose: (stage: number) => void;
};

type SectionPanelProps = {
  live: LivePrediction;
  /** As it stands on the screen, for the title block. */
  content: StrategyContent;
  machine: { name: string; revisionNumber: number } | null;
  nozzle: (Nozzle & Pick<NozzleRow, 'name'>) | null;
  chosen: number | null;
  ghosts?: readonly Ghost[];
  /** Null where the numbers can't be changed now. */
  edit?: SectionEdit | null;
  /** The least reserves the plant asks for. */
  rules?: ReserveRules;
};

/** The section with its lanes, and the title block that says what it is of. On a phone one lane at a time. */
export function SectionPanel({
  live,
  content,
  machine,
  nozzle,
  chosen,
  ghosts,
  edit = null,
  rules = DEFAULT_RESERVE_RULES,
}: SectionPanelProps) {
  const { wide, width } = useLayout();
  const system = useUnitSystem();
  const [lane, setLane] = useState<LaneName>('meanPower');
  const [chosenTarget, setTarget] = useState<Target | null>(null);
  const [explained, setExplained] = useState<Explained | null>(null);
  const [preview, setPreview] = useFrameState<{ target: Target; value: number } | null>(null);

  const lanes = wide ? laneNames : [lane];
  // while something is dragged only this panel is drawn anew; the form gets the number when it is let go
  const dragged = useMemo(
    () => (preview && edit ? previewed(live, preview, edit, rules) : null),
    [live, preview, edit, rules],
  );
  const shown = dragged ?? live;
  const { prediction } = shown;
  const { stages } = shown.content;
  const inSight = (target: Target) => target.kind === 'duration' || lanes.includes(target.lane);
  const target =
    chosenTarget && inSight(chosenTarget) && targetValue(stages, chosenTarget) !== null ? chosenTarget : null;

  // the same while something is dragged, so that what isn't moved need not be drawn again
  const editing = useMemo<KnotEditing | undefined>(
    () =>
      edit
        ? {
            profile: edit.profile,
            target,
            onTarget: (next) => {
              setTarget(next);
              edit.onChoose(next.stage);
            },
            onPreview: setPreview,
            onCommit: (moved, value) =>
              edit.onStages((before) => targetMoved(before, moved, value), `knot ${JSON.stringify(moved)}`),
            onSettle: edit.onSettle,
          }
        : undefined,
    [edit, target, setPreview],
  );

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
    <Stack gap="m">
      <Panel flush>
        <View style={{ padding: wide ? space.l : space.s, paddingBottom: space.s }}>
          <SectionView
            prediction={prediction}
            stages={stages}
            system={system}
            lanes={lanes}
            chosen={chosen}
            depth={wide ? 260 : 190}
            laneBox={wide ? 56 : 110}
            ghosts={ghosts}
            held={dragged ? live.content.stages : undefined}
            editing={editing}
          />
        </View>
        {editing && (
          <View style={{ padding: wide ? space.l : space.m, paddingTop: 0 }}>
            {target ? (
              <KnotEditor key={JSON.stringify(target)} {...{ editing, target, stages, system }} />
            ) : (
              <Small>{knotText.none}</Small>
            )}
          </View>
        )}
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
          { label: revisionText.block.cold, value: reserve('reserveCold') },
          { label: revisionText.block.hot, value: reserve('reserveHot') },
        ]}
      />
      <ResultGrid names={resultNames} from={from} onExplain={setExplained} />
      <ExplainDialog explained={explained} from={from} onClose={() => setExplained(null)} />
    </Stack>
  );
}

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

/** The drawing as it would be if what is dragged were let go now; with the last prediction where the model can't follow. */
function previewed(
  live: LivePrediction,
  { target, value }: { target: Target; value: number },
  { profile, nozzle }: SectionEdit,
  rules: ReserveRules,
): LivePrediction {
  const stages = targetMoved(live.content.stages, target, value).map(({ duration, from, to }) => ({
    duration,
    from: { ...from },
    to: { ...to },
  }));
  const content = { ...live.content, stages };
  return { prediction: predicted(content, profile, nozzle, rules) ?? live.prediction, content, behind: false };
}
