import { useMemo, useState } from 'react';
import { View } from 'react-native';
import Svg, { Circle, G, Line, Path } from 'react-native-svg';
import { polylineData } from '@/components/pierce/section-layout.ts';
import { heatChartText } from '@/components/text/heat-charts.ts';
import { treatmentText } from '@/components/text/corners.ts';
import { roles } from '@/components/theme/roles.ts';
import { Row, Stack } from '@/components/ui/stack.tsx';
import { Small } from '@/components/ui/text.tsx';
import { useUnitSystem } from '@/components/ui/unit-system.ts';
import type { Treatment } from '@/shared/corner-plans.ts';
import { quantityText } from '@/strategy/units/index.ts';
import { ChartAxes, chartSpace, LimitLine, type ChartSpace } from './chart-axes.tsx';
import type { CoolingCurve } from './cooling-curves.ts';
import { BadgeShape } from './treatment-badge.tsx';

type CoolingChartProps = { curves: readonly CoolingCurve[]; limit: number; height: number };

/** Lines told apart without colour: by their dashes. */
const dashes: Readonly<Record<Treatment, string | undefined>> = {
  leave: '2 4',
  loop: undefined,
  dwell: '12 5',
  ease: '12 4 2 4',
  round: '6 4',
};
const lineOf = ({ treatment, chosen }: Pick<CoolingCurve, 'treatment' | 'chosen'>) => ({
  stroke: chosen ? roles.ember : roles.ink,
  strokeWidth: chosen ? 2.8 : 1.8,
  strokeDasharray: dashes[treatment],
});

/**
 * The temperature at a corner's tip against time, a line a treatment: as it cools until the cut comes back, marked with the treatment's shape, and then faintly on to
 * its peak. Under it each line in words.
 */
export function CoolingChart({ curves, limit, height }: CoolingChartProps) {
  const system = useUnitSystem();
  const [width, setWidth] = useState(360);
  const space = useMemo(() => spaceOf(curves, limit, width, height, system), [curves, limit, width, height, system]);
  const inOrder = [...curves].sort((a, b) => Number(a.chosen) - Number(b.chosen));
  const time = (seconds: number) => quantityText(seconds, 'time', 'metric', { figures: 2 }).text;
  const hot = (kelvin: number) => quantityText(kelvin, 'temperature', system, { decimals: 0 }).text;
  const words = (curve: CoolingCurve) =>
    heatChartText.curve(
      treatmentText[curve.treatment],
      time(curve.back.time),
      hot(curve.back.kelvin),
      hot(curve.peak.kelvin),
      // less than a hundredth of a millimetre is nothing
      curve.burnBack < 1e-5 ? null : quantityText(curve.burnBack, 'length', system, { figures: 2 }).text,
    );
  return (
    <Stack gap="xs">
      <View onLayout={(event) => setWidth(Math.round(event.nativeEvent.layout.width) || 360)}>
        <Svg
          width={width}
          height={height}
          role="img"
          aria-label={heatChartText.cooling([...inOrder].reverse().map(words))}
        >
          <ChartAxes space={space} acrossLabel={heatChartText.sinceCorner} upLabel={heatChartText.atTip} />
          <LimitLine space={space} kelvin={limit} words={heatChartText.limit(hot(limit))} />
          <Line x1={space.x(0)} x2={space.x(0)} y1={space.top} y2={space.bottom} stroke={roles.rule} strokeWidth={1} />
          {inOrder.map((curve) => (
            <Curve key={curve.treatment} curve={curve} space={space} />
          ))}
          {spread(inOrder, space).map(({ curve, x, y, at }) => (
            <G key={curve.treatment}>
              {at !== x && <Path d={`M${at} ${y}H${x}`} stroke={roles.ink} strokeWidth={1} />}
              <G testID={`cooling-back-${curve.treatment}`} transform={`translate(${x} ${y}) scale(0.72)`}>
                <BadgeShape treatment={curve.treatment} chosen={curve.chosen} />
              </G>
            </G>
          ))}
        </Svg>
      </View>
      {[...inOrder].reverse().map((curve) => (
        <Row key={curve.treatment} gap="s" wrap={false} align="flex-start">
          <Svg width={44} height={22} aria-hidden style={{ flexShrink: 0 }}>
            <Path d="M2 11H42" {...lineOf(curve)} />
            <G transform="translate(22 11) scale(0.6)">
              <BadgeShape treatment={curve.treatment} chosen={curve.chosen} />
            </G>
          </Svg>
          <View style={{ flexShrink: 1 }}>
            <Small strong={curve.chosen}>{words(curve)}</Small>
          </View>
        </Row>
      ))}
      <Small>{heatChartText.coolingNote}</Small>
    </Stack>
  );
}

/** Room of a shape, px. */
const shapeRoom = 19;

type Placed = { readonly curve: CoolingCurve; readonly x: number; readonly y: number; readonly at: number };

/** The shapes at the moments of return, those that would lie on another moved along; `at` is where each belongs. The chosen one is drawn last and stays. */
function spread(curves: readonly CoolingCurve[], space: ChartSpace): readonly Placed[] {
  const placed: Placed[] = [];
  for (const curve of [...curves].reverse()) {
    const [at, y] = [space.x(curve.back.time), space.y(curve.back.kelvin)];
    let x = at;
    const lies = (other: Placed) => Math.abs(other.x - x) < shapeRoom && Math.abs(other.y - y) < shapeRoom;
    while (placed.some(lies) && x < space.right) x += shapeRoom / 2;
    placed.push({ curve, x, y, at });
  }
  return placed.reverse();
}

function spaceOf(
  curves: readonly CoolingCurve[],
  limit: number,
  width: number,
  height: number,
  system: Parameters<typeof chartSpace>[0]['system'],
): ChartSpace {
  const hottest = Math.max(limit, ...curves.map(({ back }) => back.kelvin));
  // peaks stand far above what is judged: of the hottest no more is shown than leaves the rest readable
  const peaks = Math.max(hottest, ...curves.map(({ peak }) => peak.kelvin));
  const first = curves[0]?.times[0] ?? 0;
  const last = curves[0]?.times.at(-1) ?? 1;
  return chartSpace({ width, height, first, last, hottest: Math.min(peaks * 1.03, hottest + 320), system });
}

function Curve({ curve, space }: { curve: CoolingCurve; space: ChartSpace }) {
  const { times, kelvin, back, peak, treatment } = curve;
  const points = times.map((time, i) => ({ time, x: space.x(time), y: Math.max(space.top, space.y(kelvin[i] ?? 0)) }));
  const until = points.filter(({ time }) => time <= back.time + 1e-9);
  const from = points.filter(({ time }) => time >= back.time - 1e-9);
  const at = space.y(peak.kelvin);
  return (
    <>
      <Path
        testID={`cooling-${treatment}`}
        d={polylineData(until)}
        fill="none"
        strokeLinejoin="round"
        {...lineOf(curve)}
      />
      <Path
        d={polylineData(from)}
        fill="none"
        strokeLinejoin="round"
        {...lineOf(curve)}
        strokeWidth={1.1}
        strokeOpacity={0.7}
      />
      {at >= space.top && (
        <Circle
          cx={space.x(peak.time)}
          cy={at}
          r={3.5}
          fill={roles.sheet}
          stroke={lineOf(curve).stroke}
          strokeWidth={1.6}
        />
      )}
    </>
  );
}
