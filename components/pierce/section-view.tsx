import { Fragment, useId, useState } from 'react';
import { View } from 'react-native';
import Svg, { ClipPath, Defs, G } from 'react-native-svg';
import { roles } from '@/components/theme/roles.ts';
import { knotText } from '@/components/text/pierce-designer.ts';
import { laneText, sectionText, sectionWords } from '@/components/text/pierce.ts';
import type { Condition, Prediction } from '@/shared/strategies.ts';
import type { Stage } from '@/strategy/pierce/stage.ts';
import { quantityIn, type UnitSystem } from '@/strategy/units/index.ts';
import type { Ghost } from './ghost.ts';
import { centreLine, HatchPattern } from './hatch.tsx';
import type { KnotEditing } from './knot-editing.ts';
import { KnotLayer } from './knot-layer.tsx';
import { laneScale } from './lane-scale.ts';
import { Lane } from './lane.tsx';
import { niceTicks } from './nice-ticks.ts';
import { dimensionRow, sectionGeometry } from './section-geometry.ts';
import {
  dimensionSpan,
  fittingLabel,
  laneNames,
  letteringWidth,
  polylineData,
  stageEnds,
  traceUntilThrough,
  type LaneName,
} from './section-layout.ts';
import { Circle, Lettering, Line, Path, Rect } from './still-shapes.tsx';

type SectionViewProps = {
  prediction: Prediction;
  stages: readonly Stage[];
  system: UnitSystem;
  /** Lanes under the section, from the top; all of them when nothing is said. */
  lanes?: readonly LaneName[];
  /** The stage being edited. */
  chosen?: number | null;
  /** Height of the plate's section, px. */
  depth?: number;
  /** Height of a lane's drawn range, px. */
  laneBox?: number;
  /** Pierces to compare with. */
  ghosts?: readonly Ghost[];
  /** Stages whose scales must be held as well: those from before a drag, so that nothing jumps under the finger. */
  held?: readonly Stage[];
  /** The knots can be moved; without it they are drawn only. */
  editing?: KnotEditing;
};

/** Depth against time, the plate in section, for a cold and a hot plate, with lanes for what the machine is told. */
export function SectionView({
  prediction,
  stages,
  system,
  lanes = laneNames,
  chosen = null,
  depth = 250,
  laneBox = 52,
  ghosts = noGhosts,
  held,
  editing,
}: SectionViewProps) {
  const [measured, setMeasured] = useState(720);
  const id = useId().replace(/\W/g, '');
  const { cold, hot, routineTime } = prediction;
  const ends = stageEnds(stages);
  const timeSpan = Math.max(
    ends.at(-1) ?? 0,
    routineTime,
    ...(held ? [stageEnds(held).at(-1) ?? 0] : []),
    ...ghosts.map((ghost) => ghost.routineTime),
  );
  const geometry = sectionGeometry({
    measured,
    depth,
    lanes: lanes.length,
    box: laneBox,
    timeSpan,
    editable: editing !== undefined,
  });
  const { width, height, left, right, top, bottom, lanesBottom, x } = geometry;
  const end = x(routineTime);
  const y = (z: number) => top + (z / cold.thickness) * depth;
  const courses = [stages, ...(held ? [held] : []), ...ghosts.map((ghost) => ghost.stages)];
  const scales = lanes.map((lane) => laneScale(courses, lane, system));
  const trace = (condition: Condition) =>
    traceUntilThrough(condition).map((p) => ({ x: x(p.time), y: y((p.depth / condition.thickness) * cold.thickness) }));
  const coldTrace = trace(cold);
  const coldEnd = cold.breakthrough.kind === 'ok' ? x(cold.breakthrough.value) : end;
  const lengthUnit = system === 'metric' ? 'mm' : 'in';
  const depthTicks = niceTicks(quantityIn(cold.thickness, 'length', lengthUnit), depth > 200 ? 5 : 4);
  const timeTicks = niceTicks(timeSpan, width > 560 ? 7 : 4);

  return (
    <View onLayout={(event) => setMeasured(Math.round(event.nativeEvent.layout.width) || 720)}>
      <Svg
        width="100%"
        height={height}
        viewBox={`0 0 ${width} ${height}`}
        role="img"
        aria-label={sectionWords(prediction, stages, system)}
      >
        <Defs>
          <HatchPattern id={`${id}steel`} spacing={9} colour={roles.steelLine} weight={0.9} />
          <HatchPattern id={`${id}spare`} spacing={10} colour={roles.ember} weight={1} falling />
          <ClipPath id={`${id}plate`}>
            <Rect x={left} y={top} width={Math.max(0, end - left)} height={depth} />
          </ClipPath>
        </Defs>

        {/* the steel still standing below the bore, at each moment */}
        <G clipPath={`url(#${id}plate)`}>
          <Path
            d={`${polylineData(coldTrace)}L${coldEnd} ${bottom}L${left} ${bottom}Z`}
            fill={roles.steelFill}
            stroke="none"
          />
          <Path
            d={`${polylineData(coldTrace)}L${coldEnd} ${bottom}L${left} ${bottom}Z`}
            fill={`url(#${id}steel)`}
            stroke="none"
          />
          {cold.breakthrough.kind === 'ok' && (
            <Rect
              testID="section-reserve"
              x={coldEnd}
              y={top}
              width={Math.max(0, end - coldEnd)}
              height={depth}
              fill={`url(#${id}spare)`}
              fillOpacity={0.55}
            />
          )}
        </G>
        {ends.map((end, index) => {
          const from = x(end - (stages[index]?.duration ?? 0));
          const label = fittingLabel(x(end) - from, sectionText.stage(index + 1));
          return (
            <Fragment key={index}>
              {label !== null && (
                <Lettering
                  x={(from + x(end)) / 2}
                  y={17}
                  anchor="middle"
                  colour={index === chosen ? roles.ember : roles.ink}
                >
                  {label}
                </Lettering>
              )}
              {index < ends.length - 1 && (
                <Line
                  testID="section-boundary"
                  x1={x(end)}
                  x2={x(end)}
                  y1={6}
                  y2={lanesBottom - 12}
                  stroke={roles.softInk}
                  strokeWidth={1}
                  strokeDasharray={centreLine}
                />
              )}
            </Fragment>
          );
        })}

        {ghosts.map((ghost) => (
          <GhostTrace key={ghost.label} ghost={ghost} thickness={cold.thickness} {...{ x, y, bottom, right }} />
        ))}
        <Line x1={left} x2={end} y1={top} y2={top} stroke={roles.ink} strokeWidth={2.4} />
        <Line x1={left} x2={end} y1={bottom} y2={bottom} stroke={roles.ink} strokeWidth={2.4} />
        <Path d={polylineData(trace(hot))} fill="none" stroke={roles.hot} strokeWidth={2} strokeDasharray="7 5" />
        <Path d={polylineData(coldTrace)} fill="none" stroke={roles.cold} strokeWidth={2.6} />
        {cold.breakthrough.kind === 'ok' && (
          <Circle
            testID="section-through-cold"
            cx={coldEnd}
            cy={bottom}
            r={5.5}
            fill={roles.cold}
            stroke={roles.sheet}
            strokeWidth={1}
          />
        )}
        {hot.breakthrough.kind === 'ok' && (
          <Circle
            testID="section-through-hot"
            cx={x(hot.breakthrough.value)}
            cy={bottom}
            r={5.5}
            fill={roles.sheet}
            stroke={roles.hot}
            strokeWidth={2.2}
          />
        )}

        {depthTicks.map((tick) => (
          <Fragment key={tick}>
            <Line
              x1={left - 5}
              x2={left}
              y1={y(tick * quantityOne(lengthUnit))}
              y2={y(tick * quantityOne(lengthUnit))}
              stroke={roles.softInk}
              strokeWidth={1}
            />
            <Lettering x={left - 9} y={y(tick * quantityOne(lengthUnit)) + 5} anchor="end" figure>
              {String(tick)}
            </Lettering>
          </Fragment>
        ))}
        <Lettering
          x={0}
          y={0}
          transform={`translate(14 ${(top + bottom) / 2}) rotate(-90)`}
          anchor="middle"
          colour={roles.softInk}
        >
          {`${sectionText.depth}, ${lengthUnit}`}
        </Lettering>

        <DimensionRow
          condition={cold}
          plate={sectionText.cold}
          short={sectionText.coldShort}
          colour={roles.cold}
          x={x}
          end={end}
          y={bottom + dimensionRow}
          routineTime={routineTime}
        />
        <DimensionRow
          condition={hot}
          plate={sectionText.plateAt(hot.plateTemperature, system)}
          short={sectionText.short(hot.plateTemperature, system)}
          colour={roles.hot}
          x={x}
          end={end}
          y={bottom + 2 * dimensionRow}
          routineTime={routineTime}
          dashed
        />

        {lanes.map((lane, index) => (
          <Lane
            key={lane}
            lane={lane}
            // a chosen knot's value stands in the same line and needs the room
            label={
              editing?.target?.kind === 'knot' && editing.target.lane === lane
                ? knotText.laneShort(lane)
                : laneText[lane].name
            }
            stages={stages}
            ghosts={ghosts.map((ghost) => ghost.stages)}
            scale={scales[index] ?? { floor: 0, most: 1 }}
            system={system}
            x={x}
            left={left}
            right={right}
            top={geometry.laneTop(index)}
            box={laneBox}
            chosen={chosen}
            knots={editing === undefined}
          />
        ))}

        {timeTicks.map((tick) => (
          <Lettering
            key={tick}
            x={x(tick)}
            y={geometry.timeBase}
            anchor={x(tick) > right - 12 ? 'end' : 'middle'}
            figure
          >
            {`${tick} s`}
          </Lettering>
        ))}
        {/* over all the rest, so that the ground of a lettering leaves no hole in it */}
        {chosen !== null && ends[chosen] !== undefined && (
          <Rect
            x={x((ends[chosen] ?? 0) - (stages[chosen]?.duration ?? 0))}
            y={top}
            width={x(stages[chosen]?.duration ?? 0) - left}
            height={lanesBottom - top - 12}
            fill={roles.ember}
            fillOpacity={0.08}
          />
        )}
      </Svg>
      {editing && <KnotLayer {...{ editing, stages, lanes, scales, geometry, system }} />}
    </View>
  );
}

const noGhosts: readonly Ghost[] = [];

type GhostTraceProps = {
  ghost: Ghost;
  thickness: number;
  x: (time: number) => number;
  y: (depth: number) => number;
  bottom: number;
  right: number;
};

/** Another pierce's depth on a cold plate, thin and dotted, with its name where it ends. */
function GhostTrace({ ghost, thickness, x, y, bottom, right }: GhostTraceProps) {
  const points = traceUntilThrough(ghost.cold).map((p) => ({
    x: x(p.time),
    y: y((p.depth / ghost.cold.thickness) * thickness),
  }));
  const last = points.at(-1);
  if (!last) return null;
  const width = letteringWidth(ghost.label) + 8;
  const from = Math.max(0, Math.min(right - width, last.x + 8));
  const base = Math.min(last.y, bottom) - 8;
  return (
    <G testID="section-ghost">
      <Path
        d={polylineData(points)}
        fill="none"
        stroke={roles.ink}
        strokeWidth={1.6}
        strokeDasharray="1.5 3.5"
        strokeLinecap="round"
      />
      <Rect x={from} y={base - 14} width={width} height={19} fill={roles.sheet} />
      <Lettering x={from + 4} y={base}>
        {ghost.label}
      </Lettering>
    </G>
  );
}

const quantityOne = (unit: 'mm' | 'in') => (unit === 'mm' ? 1e-3 : 0.0254);

type DimensionRowProps = {
  condition: Condition;
  plate: string;
  short: string;
  colour: string;
  x: (time: number) => number;
  end: number;
  y: number;
  routineTime: number;
  dashed?: boolean;
};

/** Time to breakthrough and time in reserve, as dimension lines with oblique ticks. */
function DimensionRow({ condition, plate, short, colour, x, end, y, routineTime, dashed = false }: DimensionRowProps) {
  const through = condition.breakthrough;
  const spans =
    through.kind === 'ok'
      ? [
          dimensionSpan(x(0), x(through.value), sectionText.through(plate, short, through.value)),
          dimensionSpan(x(through.value), end, sectionText.inReserve(routineTime - through.value)),
        ]
      : [dimensionSpan(x(0), end, sectionText.notThrough(plate))];
  return (
    <>
      {spans.map((span, index) => (
        <Fragment key={index}>
          {span.gap && (
            <Rect x={span.gap.from} y={y - 11} width={span.gap.to - span.gap.from} height={20} fill={roles.sheet} />
          )}
          <Path
            d={
              span.gap
                ? `M${span.from} ${y}H${span.gap.from}M${span.gap.to} ${y}H${span.to}`
                : `M${span.from} ${y}H${span.to}`
            }
            stroke={colour}
            strokeWidth={1.2}
            strokeDasharray={dashed ? '7 5' : undefined}
          />
          <Path
            d={[span.from, span.to].map((at) => `M${at - 5} ${y + 5}L${at + 5} ${y - 5}`).join('')}
            stroke={colour}
            strokeWidth={1.6}
          />
          {span.text !== null && (
            <Lettering x={(span.from + span.to) / 2} y={y + 5} anchor="middle" colour={colour}>
              {span.text}
            </Lettering>
          )}
        </Fragment>
      ))}
    </>
  );
}
