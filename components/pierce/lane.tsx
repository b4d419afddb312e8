import { roles } from '@/components/theme/roles.ts';
import { family } from '@/components/theme/type.ts';
import type { Stage } from '@/strategy/pierce/stage.ts';
import { quantityIn, type Dimension, type UnitSystem } from '@/strategy/units/index.ts';
import { niceCeiling } from './nice-ticks.ts';
import { lanePoints, letteringWidth, polylineData, type LaneName } from './section-layout.ts';

/** Height of a lane with the line its name stands on, px. */
export const laneHeight = 92;
const nameRow = 24;
const box = 52;

const measures: Readonly<Record<LaneName, { dimension: Dimension; metric: string; inch: string }>> = {
  standoff: { dimension: 'length', metric: 'mm', inch: 'in' },
  focusPosition: { dimension: 'length', metric: 'mm', inch: 'in' },
  meanPower: { dimension: 'power', metric: 'kW', inch: 'kW' },
  oxygenPressure: { dimension: 'pressure', metric: 'bar', inch: 'psi' },
};

type LaneProps = {
  lane: LaneName;
  label: string;
  stages: readonly Stage[];
  system: UnitSystem;
  x: (time: number) => number;
  left: number;
  right: number;
  top: number;
  chosen: number | null;
};

/** One quantity over the pierce, its knots where stages begin and end. Its name has a line of its own above, so no knot runs into it. */
export function Lane({ lane, label, stages, system, x, left, right, top, chosen }: LaneProps) {
  const { dimension, [system]: unit } = measures[lane];
  const points = lanePoints(stages, lane).map((point) => ({
    ...point,
    value: quantityIn(point.value, dimension, unit),
  }));
  const most = niceCeiling(Math.max(0, ...points.map((point) => point.value)));
  const least = Math.min(0, ...points.map((point) => point.value));
  const floor = least < 0 ? -niceCeiling(-least) : 0;
  const y = (value: number) => top + nameRow + box - ((value - floor) / (most - floor)) * box;
  const at = points.map((point) => ({ ...point, x: x(point.time), y: y(point.value) }));
  // the zero line has its figure only where it stands clear of the ends' figures
  const zeroClear = floor < 0 && y(floor) - y(0) > 15 && y(0) - y(most) > 15;
  const levels = zeroClear ? [floor, 0, most] : [floor, most];
  const name = `${label}, ${unit}`;
  return (
    <g>
      {/* a stage's boundary passes behind the name */}
      <rect x={left} y={top} width={letteringWidth(name) + 8} height={18} fill={roles.sheet} />
      <text x={left} y={top + 14} fontFamily={family.label} fontSize={14} fill={roles.softInk}>
        {name}
      </text>
      {levels.map((value) => (
        <g key={value}>
          <line x1={left} x2={right} y1={y(value)} y2={y(value)} stroke={roles.rule} strokeWidth={1} />
          <text
            x={left - 9}
            y={y(value) + 5}
            textAnchor="end"
            fontFamily={family.figure}
            fontSize={14}
            fill={roles.softInk}
          >
            {laneFigure(value)}
          </text>
        </g>
      ))}
      <path d={polylineData(at)} fill="none" stroke={roles.ink} strokeWidth={1.8} />
      {at.map(
        (point, index) =>
          point.knot && (
            <rect
              key={index}
              data-testid="lane-knot"
              x={point.x - 4.5}
              y={point.y - 4.5}
              width={9}
              height={9}
              fill={point.knot.stage === chosen ? roles.ember : roles.sheet}
              stroke={point.knot.stage === chosen ? roles.ember : roles.ink}
              strokeWidth={1.6}
            />
          ),
      )}
    </g>
  );
}

const laneFigure = (value: number) => String(Number(value.toPrecision(3))).replace('-', '−');
