import { memo, useDeferredValue, useMemo, useState } from 'react';
import { View } from 'react-native';
import { knotText } from '@/components/text/pierce-designer.ts';
import { laneText, sectionText } from '@/components/text/pierce.ts';
import { useLayout } from '@/components/theme/layout.ts';
import { space } from '@/components/theme/space.ts';
import { Choice } from '@/components/ui/choice.tsx';
import { Panel } from '@/components/ui/panel.tsx';
import { Stack } from '@/components/ui/stack.tsx';
import { Small } from '@/components/ui/text.tsx';
import { useUnitSystem } from '@/components/ui/unit-system.ts';
import type { MachineProfile, Nozzle } from '@/strategy/machine.ts';
import { DEFAULT_RESERVE_RULES, type ReserveRules, type Stage } from '@/strategy/pierce/index.ts';
import type { Ghost } from './ghost.ts';
import { KnotEditor } from './knot-editor.tsx';
import type { KnotEditing } from './knot-editing.ts';
import { targetMoved, targetValue, type Target } from './knots.ts';
import { SectionFigures, type SectionFiguresProps } from './section-figures.tsx';
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

type SectionPanelProps = Pick<SectionFiguresProps, 'content' | 'machine' | 'nozzle'> & {
  live: LivePrediction;
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
  const { wide } = useLayout();
  const system = useUnitSystem();
  const [lane, setLane] = useState<LaneName>('meanPower');
  const [chosenTarget, setTarget] = useState<Target | null>(null);
  const [preview, setPreview] = useFrameState<{ target: Target; value: number } | null>(null);

  const lanes = wide ? laneNames : [lane];
  // while something is dragged only this panel is drawn anew; the form gets the number when it is let go
  const dragged = useMemo(
    () => (preview && edit ? previewed(live, preview, edit, rules) : null),
    [live, preview, edit, rules],
  );
  const shown = dragged ?? live;
  // the drawing follows the finger in each frame; figures and field as soon as there is time beside it
  const later = useDeferredValue(dragged);
  const told = dragged && later ? later : shown;
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

  return (
    <Stack gap="m">
      <Panel flush>
        <View style={{ padding: wide ? space.l : space.s, paddingBottom: space.s }}>
          <SectionView
            prediction={shown.prediction}
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
              <KnotEditor key={JSON.stringify(target)} stages={told.content.stages} {...{ editing, target, system }} />
            ) : (
              <Small>{knotText.none}</Small>
            )}
          </View>
        )}
      </Panel>
      {!wide && <LaneChoice lane={lane} onLane={setLane} />}
      <SectionFigures shown={told} {...{ content, machine, nozzle, rules }} />
    </Stack>
  );
}

/** On a phone: which lane stands under the section. */
const LaneChoice = memo(function LaneChoice({ lane, onLane }: { lane: LaneName; onLane: (lane: LaneName) => void }) {
  const { width } = useLayout();
  return (
    <Choice
      label={sectionText.lanes}
      // four words beside each other need this much
      kind={width < 372 ? 'list' : 'segments'}
      options={laneNames.map((name) => ({ value: name, label: laneText[name].short }))}
      value={lane}
      onChange={onLane}
    />
  );
});

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
