import { useMemo, useState, type ReactNode, type Ref } from 'react';
import { StyleSheet, View } from 'react-native';
import Svg, { Circle, G, Path } from 'react-native-svg';
import { dotsData } from '@/components/parts/drawing-marks.ts';
import type { DrawingSpace } from '@/components/parts/drawing-space.ts';
import { DrawingView, type DrawingControl, type DrawingMark } from '@/components/parts/drawing-view.tsx';
import { snapAt, type Snap } from '@/components/parts/measure.ts';
import type { CutPath } from '@/strategy/path/cut-path.ts';
import { cornerToolText, measureText } from '@/components/text/corner-preview.ts';
import { asSentence, cornerText } from '@/components/text/corners.ts';
import { roles } from '@/components/theme/roles.ts';
import { Button } from '@/components/ui/button.tsx';
import { Row, Stack } from '@/components/ui/stack.tsx';
import { Small } from '@/components/ui/text.tsx';
import type { CornerPlan, PlannedCorner } from '@/shared/corner-plans.ts';
import { outlinePaths } from '@/shared/layouts.ts';
import type { PlateClock } from '@/strategy/motion/index.ts';
import type { Point } from '@/strategy/path/index.ts';
import { badgeStretch, cornersInward } from './corner-inward.ts';
import type { PlateHeat } from './heat-field.ts';
import { createHeatLabels } from './heat-labels.ts';
import { HeatFigures, HeatLayer } from './heat-layer.tsx';
import { MeasureLayer } from './measure-layer.tsx';
import { MeasurePanel } from './measure-panel.tsx';
import { RunLayer, type Dropped } from './run-layer.tsx';
import type { RunClock } from './run-clock.ts';
import { boxSegments, plateAround } from './plan-plate.ts';
import { TipLayer } from './tip-layer.tsx';
import { BadgeShape } from './treatment-badge.tsx';

type PlanDrawingProps = {
  plan: CornerPlan;
  chosen: string | null;
  onChoose: (id: string | null) => void;
  /** Places measured so far; null while nothing is measured. */
  measured: readonly Snap[] | null;
  onMeasure: (places: readonly Snap[] | null) => void;
  /** Lead-ins and where they pierce; none until the path is known. */
  path: CutPath;
  timeline: PlateClock;
  dropped: readonly Dropped[];
  clock: RunClock;
  /** The plate's heat, drawn behind; null while there is none, or it is not wanted. */
  heat: PlateHeat | null;
  /** It is not of this plan. */
  heatOld: boolean;
  control: Ref<DrawingControl>;
  /** Beside the drawing's own buttons. */
  steps: ReactNode;
  /** Choices can be taken back by keys. */
  keys: boolean;
  height: number;
};

/** The part on its plate: contours, loops with their slugs, a badge a corner, what stands in a loop's way, the run of the cut, what is measured. */
export function PlanDrawing({
  plan,
  chosen,
  onChoose,
  measured,
  onMeasure,
  path,
  timeline,
  dropped,
  clock,
  heat,
  heatOld,
  control,
  steps,
  keys,
  height,
}: PlanDrawingProps) {
  const { corners } = plan;
  const { contours } = plan.part;
  const leadIns = useMemo(
    () =>
      path.runs.flatMap(({ pieces }) =>
        pieces.flatMap((piece) => (piece.kind === 'lead-in' ? [{ segments: piece.segments }] : [])),
      ),
    [path],
  );
  const loops = useMemo(
    () =>
      corners.flatMap(({ id, loop, round }) => [
        ...(loop ? [{ id, segments: loop.segments }] : []),
        ...(round ? [{ id, segments: round.finished }] : []),
      ]),
    [corners],
  );
  const slugs = useMemo(() => corners.flatMap(({ loop }) => (loop ? [{ segments: loop.slug }] : [])), [corners]);
  const eased = useMemo(
    () => corners.flatMap(({ id, ease }) => (ease ? [{ id, kind: 'ease' as const, segments: ease.segments }] : [])),
    [corners],
  );
  const { layout } = plan;
  const outline = useMemo(() => layout && outlinePaths(layout.outline), [layout]);
  const plate = useMemo(() => (layout ? null : plateAround(plan)), [layout, plan]);
  const edge = useMemo(() => outline ?? (plate ? [{ segments: boxSegments(plate) }] : []), [outline, plate]);
  const inward = useMemo(() => cornersInward(corners, contours), [corners, contours]);
  const marks = useMarks(plan, inward, chosen);
  const [labels] = useState(createHeatLabels);

  const index = corners.findIndex(({ id }) => id === chosen);
  const corner = corners[index];
  const blocked = corner ? inTheWay(corner) : null;
  const shown = useMemo(
    () => ({ paths: [...contours, ...loops], corners: corners.map(({ at }) => at) }),
    [contours, loops, corners],
  );
  const aim = (place: Point, reach: number) => {
    const next = snapAt(place, reach, shown);
    // a third place begins again
    onMeasure(measured?.length === 1 ? [...measured, next] : [next]);
  };

  return (
    <Stack gap="m">
      <DrawingView
        label={cornerText.drawing(plan.part.name, plan.totals)}
        contours={contours}
        plate={plate}
        {...(outline ? { outline } : {})}
        loops={loops}
        slugs={slugs}
        leadIns={leadIns}
        traces={eased}
        marks={marks}
        chosen={chosen}
        onChoose={onChoose}
        onAim={measured ? aim : null}
        under={
          heat
            ? (space, sheet) => (
                <View style={heatOld ? styles.old : undefined}>
                  <HeatLayer
                    heat={heat}
                    clock={clock}
                    space={space}
                    sheet={sheet}
                    plate={edge}
                    limit={plan.limit}
                    labels={labels}
                  />
                </View>
              )
            : undefined
        }
        over={(space, sheet) => (
          <>
            <Pierces space={space} path={path} />
            <RunLayer space={space} timeline={timeline} dropped={dropped} clock={clock} />
            {corner && blocked && <InTheWay space={space} from={corner.at} at={blocked.at} />}
            {heat && <HeatFigures labels={labels} sheet={sheet} />}
            <TipLayer
              corners={corners}
              inward={inward}
              chosen={chosen}
              heat={heatOld ? null : heat}
              clock={clock}
              space={space}
              sheet={sheet}
              limit={plan.limit}
            />
            {measured && <MeasureLayer space={space} places={measured} />}
          </>
        )}
        tools={
          <>
            <Button
              label={measured ? measureText.end : measureText.toggle}
              expanded={measured !== null}
              onPress={() => onMeasure(measured ? null : [])}
            />
            {steps}
          </>
        }
        ways={keys ? cornerToolText.keys : ''}
        control={control}
        height={height}
      />
      {measured && <MeasurePanel places={measured} />}
      {blocked && (
        <Row gap="s" wrap={false}>
          <Svg width={28} height={28} viewBox="-14 -14 28 28" aria-hidden style={{ flexShrink: 0 }}>
            <Obstacle />
          </Svg>
          <View style={{ flexShrink: 1 }}>
            <Small strong>{cornerToolText.inTheWay(index + 1)}</Small>
            <Small>{asSentence(blocked.why)}</Small>
          </View>
        </Row>
      )}
    </Stack>
  );
}

/** About what a pierce's crater takes of the plate, m; never larger than a finger's dot, never lost. */
const pierceSize = 5e-3;

/** Where it pierces, if it does so beside the contours. */
function Pierces({ space, path: { runs } }: { space: DrawingSpace; path: CutPath }) {
  const places = runs.flatMap(({ pierce, pieces }) => (pieces[0]?.kind === 'lead-in' ? [space.at(pierce)] : []));
  if (places.length === 0) return null;
  return (
    <Path
      testID="pierces"
      d={dotsData(places, 3)}
      stroke={roles.ember}
      strokeWidth={Math.min(7, Math.max(2.5, pierceSize * space.scale))}
      strokeLinecap="round"
    />
  );
}

/** A badge a corner. Choosing one changes that one and the one before, and leaves the others as they are. */
function useMarks(
  { corners }: CornerPlan,
  inward: ReadonlyMap<string, Point>,
  chosen: string | null,
): readonly DrawingMark[] {
  const unchosen = useMemo(
    () => corners.map((corner) => markOf(corner, inward.get(corner.id), false)),
    [corners, inward],
  );
  return useMemo(() => {
    const index = corners.findIndex(({ id }) => id === chosen);
    const corner = corners[index];
    return corner ? unchosen.with(index, markOf(corner, inward.get(corner.id), true)) : unchosen;
  }, [corners, inward, unchosen, chosen]);
}

const markOf = (
  { id, at, angle, treatment, trouble }: PlannedCorner,
  inward: Point | undefined,
  chosen: boolean,
): DrawingMark => ({
  id,
  at,
  off: badgeOff(inward, angle),
  weight: trouble !== null ? 2 : treatment === 'leave' ? 0 : 1,
  draw: <BadgeShape treatment={treatment} trouble={trouble !== null} chosen={chosen} />,
});

function badgeOff(inward: Point | undefined, angle: number): Point | undefined {
  const further = badgeStretch(angle);
  return inward && { x: inward.x * further, y: inward.y * further };
}

/** Where and why a loop was refused, when something stood in its way. */
function inTheWay({ options }: PlannedCorner): { at: Point; why: string } | null {
  const loop = options.find(({ treatment, fits }) => treatment === 'loop' && !fits);
  return loop?.at ? { at: loop.at, why: loop.why } : null;
}

/** What stands in the way, and a line to it from the corner whose loop was refused. */
function InTheWay({ space, from, at }: { space: DrawingSpace; from: Point; at: Point }) {
  const a = space.at(from);
  const b = space.at(at);
  return (
    <G testID="in-the-way">
      <Path d={`M${a.x} ${a.y}L${b.x} ${b.y}`} stroke={roles.hot} strokeWidth={1.6} strokeDasharray="3 3" />
      <G transform={`translate(${b.x} ${b.y})`}>
        <Obstacle />
      </G>
    </G>
  );
}

/** A ring with a bar across: no way through. */
function Obstacle() {
  return (
    <>
      <Circle r={10} fill={roles.sheet} stroke={roles.hot} strokeWidth={2.4} />
      <Path d="M-6.5 6.5 6.5 -6.5" stroke={roles.hot} strokeWidth={2.4} />
    </>
  );
}

const styles = StyleSheet.create({ old: { opacity: 0.4 } });
