import { memo, useId, useMemo, useRef, useState, type KeyboardEvent } from 'react';
import { StyleSheet, View, type PointerEvent } from 'react-native';
import Svg, { Circle, G, Line, Path } from 'react-native-svg';
import { heatChartText } from '@/components/text/heat-charts.ts';
import { roles } from '@/components/theme/roles.ts';
import { webStyle } from '@/components/theme/web-style.ts';
import { Small } from '@/components/ui/text.tsx';
import { useUnitSystem } from '@/components/ui/unit-system.ts';
import { treatments, type Treatment } from '@/shared/corner-plans.ts';
import { quantityText } from '@/strategy/units/index.ts';
import { ChartAxes, chartSpace, LimitLine, type ChartSpace } from './chart-axes.tsx';
import type { ReturnPoint } from './return-points.ts';
import { useRunTime, type RunClock } from './run-clock.ts';

type ReturnScatterProps = {
  /** In the order of time. */
  points: readonly ReturnPoint[];
  /** K */
  limit: number;
  /** Of the whole cut, s. */
  duration: number;
  clock: RunClock;
  chosen: string | null;
  onChoose: (id: string) => void;
  height: number;
};

/**
 * All corners, the time at which the cut comes back to each against the temperature that waits there: a short bar untreated, a thin line down to the shape of its
 * treatment. Each kind of shape is one path, so that thousands of corners cost as little as ten. A tap takes the nearest, a drag tries on the way,
 * keys go along the cut and up and down by heat.
 */
export function ReturnScatter({ points, limit, duration, clock, chosen, onChoose, height }: ReturnScatterProps) {
  const system = useUnitSystem();
  const id = useId();
  const [width, setWidth] = useState(640);
  const frame = useRef<HTMLElement>(null);
  const held = useRef<number | null>(null);
  /** Under the finger while it drags. */
  const [aimed, setAimed] = useState<string | null>(null);
  const space = useMemo(() => {
    const hottest = points.reduce((most, { untreated, treated }) => Math.max(most, untreated, treated), limit);
    return chartSpace({
      width,
      height,
      first: 0,
      last: duration,
      hottest: limit + 1.08 * (hottest - limit) + 20,
      system,
    });
  }, [points, limit, duration, width, height, system]);
  const byHeat = useMemo(() => [...points].sort((a, b) => a.treated - b.treated || a.number - b.number), [points]);
  const shown = points.find((point) => point.id === (aimed ?? chosen));

  const nearest = (clientX: number, clientY: number): ReturnPoint | null => {
    const box = frame.current?.getBoundingClientRect();
    const [x, y] = [clientX - (box?.left ?? 0), clientY - (box?.top ?? 0)];
    let best: ReturnPoint | null = null;
    let least = Infinity;
    for (const point of points) {
      const across = space.x(point.time) - x;
      // anywhere on its line from untreated to treated
      const [high, low] = [space.y(point.untreated), space.y(point.treated)].sort((a, b) => a - b);
      const up = Math.max(0, (high ?? 0) - y, y - (low ?? 0));
      const distance = Math.hypot(across, up);
      if (distance >= least) continue;
      least = distance;
      best = point;
    }
    return best;
  };
  const aim = ({ nativeEvent: { clientX, clientY } }: PointerEvent) => setAimed(nearest(clientX, clientY)?.id ?? null);
  const down = (event: PointerEvent) => {
    const { button, pointerId } = event.nativeEvent;
    if (button !== 0 || held.current !== null) return;
    held.current = pointerId;
    frame.current?.setPointerCapture(pointerId);
    aim(event);
  };
  const drop = ({ nativeEvent: { pointerId, clientX, clientY } }: PointerEvent) => {
    if (held.current !== pointerId) return;
    held.current = null;
    setAimed(null);
    const point = nearest(clientX, clientY);
    if (point) onChoose(point.id);
  };
  const cancel = () => {
    held.current = null;
    setAimed(null);
  };
  const key = (event: KeyboardEvent<HTMLElement>) => {
    if (event.ctrlKey || event.metaKey || event.altKey) return;
    const next = keyed(event.key, points, byHeat, chosen);
    if (!next) return;
    event.preventDefault();
    onChoose(next.id);
  };
  const words = (point: ReturnPoint) =>
    heatChartText.point(
      point.number,
      point.treatment,
      quantityText(point.time, 'time', 'metric', { figures: 3 }).text,
      quantityText(point.untreated, 'temperature', system).text,
      quantityText(point.treated, 'temperature', system).text,
      point.treated > limit,
    );

  return (
    <View style={styles.whole}>
      <View
        ref={(host: unknown) => {
          frame.current = host instanceof HTMLElement ? host : null;
        }}
        onLayout={(event) => setWidth(Math.round(event.nativeEvent.layout.width) || 640)}
        role="slider"
        tabIndex={0}
        aria-label={heatChartText.scatter}
        aria-orientation="horizontal"
        aria-valuemin={0}
        aria-valuemax={points.length}
        aria-valuenow={points.findIndex((point) => point.id === chosen) + 1}
        aria-valuetext={shown ? words(shown) : heatChartText.noneChosen(points.length)}
        aria-describedby={id}
        onPointerDown={down}
        onPointerMove={(event) => {
          if (held.current === event.nativeEvent.pointerId) aim(event);
        }}
        onPointerUp={drop}
        onPointerCancel={cancel}
        onKeyDown={key}
        style={[styles.frame, { height }]}
      >
        <Svg width={width} height={height} aria-hidden>
          <Still points={points} space={space} limit={limit} />
          <Now space={space} clock={clock} />
          {shown && <Aim point={shown} space={space} />}
        </Svg>
      </View>
      <Small strong>{shown ? words(shown) : heatChartText.noneChosen(points.length)}</Small>
      <Small id={id}>{heatChartText.scatterKeys}</Small>
    </View>
  );
}

function keyed(
  key: string,
  byTime: readonly ReturnPoint[],
  byHeat: readonly ReturnPoint[],
  chosen: string | null,
): ReturnPoint | undefined {
  const beside = (points: readonly ReturnPoint[], by: number) => {
    const at = points.findIndex(({ id }) => id === chosen);
    return at < 0 ? points.at(by > 0 ? 0 : -1) : points[Math.min(points.length - 1, Math.max(0, at + by))];
  };
  switch (key) {
    case 'ArrowRight':
      return beside(byTime, 1);
    case 'ArrowLeft':
      return beside(byTime, -1);
    case 'ArrowUp':
      return beside(byHeat, 1);
    case 'ArrowDown':
      return beside(byHeat, -1);
    case 'Home':
      return byTime[0];
    case 'End':
      return byTime.at(-1);
    default:
      return undefined;
  }
}

/** Shapes about a point, as on the drawing but small enough for thousands. */
const shapes: Readonly<Record<Treatment, string>> = {
  loop: 'm-4.5 0a4.5 4.5 0 1 0 9 0a4.5 4.5 0 1 0 -9 0Z',
  dwell: 'm-4 -4h8v8h-8Z',
  ease: 'm0 -5.5l5.5 5.5l-5.5 5.5l-5.5 -5.5Z',
  round: 'm-4 4v-8h2.5a5.5 5.5 0 0 1 5.5 5.5v2.5Z',
  leave: 'm-1.6 0a1.6 1.6 0 1 0 3.2 0a1.6 1.6 0 1 0 -3.2 0Z',
};
const troubleShape = 'm0 -9l8 14h-16Z';

const Still = memo(function Still({
  points,
  space,
  limit,
}: {
  points: readonly ReturnPoint[];
  space: ChartSpace;
  limit: number;
}) {
  const system = useUnitSystem();
  const { x, y } = space;
  const at = ({ time, treated }: ReturnPoint) => `M${x(time).toFixed(1)} ${y(treated).toFixed(1)}`;
  const marked = (some: readonly ReturnPoint[], shape: string) => some.map((point) => `${at(point)}${shape}`).join('');
  const ways = points
    .map(({ time, untreated, treated }) => {
      const [across, from, to] = [x(time).toFixed(1), y(untreated).toFixed(1), y(treated)];
      const bar = `M${across} ${from}m-3.5 0h7`;
      return Math.abs(to - Number(from)) < 6 ? bar : `${bar}M${across} ${from}V${to.toFixed(1)}`;
    })
    .join('');
  return (
    <>
      <ChartAxes space={space} acrossLabel={heatChartText.returnTime} upLabel={heatChartText.returnTemperature} />
      <LimitLine
        space={space}
        kelvin={limit}
        words={heatChartText.limit(quantityText(limit, 'temperature', system).text)}
      />
      <Path testID="scatter-untreated" d={ways} fill="none" stroke={roles.softInk} strokeWidth={1} />
      {treatments.map((treatment) => (
        <Path
          key={treatment}
          testID={`scatter-${treatment}`}
          d={marked(
            points.filter((point) => point.treatment === treatment),
            shapes[treatment],
          )}
          fill={treatment === 'leave' ? roles.ink : roles.sheet}
          stroke={treatment === 'loop' ? roles.ember : roles.ink}
          strokeWidth={1.8}
        />
      ))}
      <Path
        testID="scatter-trouble"
        d={marked(
          points.filter(({ trouble }) => trouble),
          troubleShape,
        )}
        fill="none"
        stroke={roles.hot}
        strokeWidth={2}
      />
    </>
  );
});

/** The moment that the drawing shows. */
function Now({ space, clock }: { space: ChartSpace; clock: RunClock }) {
  const time = useRunTime(clock);
  if (time <= 0) return null;
  const at = space.x(Math.min(time, space.last));
  return (
    <Line
      testID="scatter-now"
      x1={at}
      x2={at}
      y1={space.top}
      y2={space.bottom}
      stroke={roles.ember}
      strokeWidth={1.6}
    />
  );
}

/** The chosen one: a heavy ring, and lines to both axes. */
function Aim({ point, space }: { point: ReturnPoint; space: ChartSpace }) {
  const [x, y] = [space.x(point.time), space.y(point.treated)];
  return (
    <G testID="scatter-chosen">
      <Path
        d={`M${space.left} ${y}H${x - 10}M${x} ${y + 10}V${space.bottom}`}
        stroke={roles.ember}
        strokeWidth={1}
        strokeDasharray="3 3"
      />
      <Circle cx={x} cy={y} r={10} fill="none" stroke={roles.ember} strokeWidth={3} />
    </G>
  );
}

const styles = StyleSheet.create({
  whole: { gap: 6 },
  frame: { width: '100%', ...webStyle({ touchAction: 'pan-y', cursor: 'pointer' }) },
});
