import { Fragment } from 'react';
import { roles } from '@/components/theme/roles.ts';
import type { Stage } from '@/strategy/pierce/stage.ts';
import type { UnitSystem } from '@/strategy/units/index.ts';
import { laneKnots } from './knots.ts';
import { laneNumber, laneUnit, laneY, type LaneScale } from './lane-scale.ts';
import { lanePoints, letteringWidth, polylineData, type LaneName } from './section-layout.ts';
import { Lettering, Line, Path, Rect } from './still-shapes.tsx';

type LaneProps = {
  lane: LaneName;
  label: string;
  stages: readonly Stage[];
  /** Courses to compare with, dotted. */
  ghosts: readonly (readonly Stage[])[];
  scale: LaneScale;
  system: UnitSystem;
  x: (time: number) => number;
  left: number;
  right: number;
  top: number;
  box: number;
  chosen: number | null;
  /** Its knots are drawn here, and not by the layer that moves them. */
  knots: boolean;
};

/** One quantity over the pierce, its knots where stages begin and end. Its name has a line of its own above, so no knot runs into it. */
export function Lane(props: LaneProps) {
  const { lane, label, stages, ghosts, scale, system, x, left, right, top, box, chosen, knots } = props;
  const unit = laneUnit(lane, system);
  const { floor, most } = scale;
  const yOf = (value: number) => laneY(value, scale, top, box);
  const course = (of: readonly Stage[]) =>
    polylineData(
      lanePoints(of, lane).map(({ time, value }) => ({ x: x(time), y: yOf(laneNumber(value, lane, system)) })),
    );
  // the zero line has its figure only where it stands clear of the ends' figures
  const zeroClear = floor < 0 && yOf(floor) - yOf(0) > 15 && yOf(0) - yOf(most) > 15;
  const levels = zeroClear ? [floor, 0, most] : [floor, most];
  const name = `${label}, ${unit}`;
  return (
    <>
      {/* a stage's boundary passes behind the name */}
      <Rect x={left} y={top} width={letteringWidth(name) + 8} height={18} fill={roles.sheet} />
      <Lettering x={left} y={top + 14} colour={roles.softInk}>
        {name}
      </Lettering>
      {levels.map((value) => (
        <Fragment key={value}>
          <Line x1={left} x2={right} y1={yOf(value)} y2={yOf(value)} stroke={roles.rule} strokeWidth={1} />
          <Lettering x={left - 9} y={yOf(value) + 5} anchor="end" figure colour={roles.softInk}>
            {laneFigure(value)}
          </Lettering>
        </Fragment>
      ))}
      {ghosts.map((ghost, index) => (
        <Path
          key={index}
          testID="lane-ghost"
          d={course(ghost)}
          fill="none"
          stroke={roles.softInk}
          strokeWidth={1.6}
          strokeDasharray="1.5 3.5"
        />
      ))}
      <Path d={course(stages)} fill="none" stroke={roles.ink} strokeWidth={1.8} />
      {knots &&
        laneKnots(stages, lane).map((knot, index) => {
          const marked = knot.ends.some(({ stage }) => stage === chosen);
          return (
            <Rect
              key={index}
              testID="lane-knot"
              x={x(knot.time) - 4.5}
              y={yOf(laneNumber(knot.value, lane, system)) - 4.5}
              width={9}
              height={9}
              fill={marked ? roles.ember : roles.sheet}
              stroke={marked ? roles.ember : roles.ink}
              strokeWidth={1.6}
            />
          );
        })}
    </>
  );
}

const laneFigure = (value: number) => String(Number(value.toPrecision(3))).replace('-', '−');
