import { useRef } from 'react';
import { View } from 'react-native';
import Svg, { Path, Rect } from 'react-native-svg';
import { useWidth } from '@/components/parts/use-width.ts';
import { hatchData } from '@/components/pierce/hatch.tsx';
import { estimateText } from '@/components/text/plan-estimate.ts';
import { roles } from '@/components/theme/roles.ts';
import { Cell, Row } from '@/components/ui/stack.tsx';
import { Body, Figure, Small } from '@/components/ui/text.tsx';
import type { PlanComparison } from '@/shared/estimates.ts';

type Variant = PlanComparison['variants'][number];
export type Measure = keyof typeof estimateText.measure;
type Part = keyof typeof estimateText.parts;

/** What a bar is made of, in the order along it. */
function partsOf({ time, oxygen, heat, money }: Variant['estimate'], measure: Measure): readonly [Part, number][] {
  switch (measure) {
    case 'time':
      return [
        ['pierce', time.pierce],
        ['cut', time.cut],
        ['loop', time.loop],
        ['wait', time.dwell + time.restart],
        ['way', time.rapid + time.height],
        ['loading', time.loading],
      ];
    case 'oxygen':
      return [
        ['pierce', oxygen.pierces],
        ['cut', oxygen.cutting],
      ];
    case 'heat':
      return [
        ['pierce', heat.pierces ?? 0],
        ['cut', heat.cutting],
      ];
    case 'money':
      return money.kind === 'none'
        ? []
        : [
            ['machine', money.machine ?? 0],
            ['oxygen', money.oxygen ?? 0],
            ['electricity', money.electricity ?? 0],
          ];
  }
}

type BarsProps = {
  readonly variants: readonly Variant[];
  readonly measure: Measure;
  /** A value of the measure as it is read. */
  readonly shown: (value: number) => string;
};

/** One bar a plan on one scale, its parts told apart by how they are filled and by the legend. */
export function EstimateBars({ variants, measure, shown }: BarsProps) {
  const track = useRef<HTMLElement>(null);
  const width = useWidth(track, 300);
  const bars = variants.map((one) => {
    const parts = partsOf(one.estimate, measure).filter(([, value]) => value > 0);
    return { one, parts, whole: parts.reduce((sum, [, value]) => sum + value, 0) };
  });
  const most = Math.max(...bars.map(({ whole }) => whole), Number.MIN_VALUE);
  const used = new Set(bars.flatMap(({ parts }) => parts.map(([part]) => part)));
  return (
    <View style={{ gap: 12 }}>
      <View
        ref={(host: unknown) => {
          track.current = host instanceof HTMLElement ? host : null;
        }}
        role="list"
        aria-label={estimateText.measure[measure]}
        style={{ gap: 12 }}
      >
        {bars.map(({ one, parts, whole }) => {
          const name = estimateText.variant(one.variant, one.revision);
          const over = estimateText.over(one.corners.overLimit);
          const spoken = parts.map(([part, value]) => `${estimateText.parts[part]} ${shown(value)}`);
          return (
            <View key={one.variant} role="listitem" style={{ gap: 3 }}>
              <Row gap="m" align="baseline" wrap={false}>
                <Body strong={one.variant === 'planned'}>{name}</Body>
                <Cell>
                  <Small tone={one.corners.overLimit > 0 ? 'hot' : 'softInk'}>{over}</Small>
                </Cell>
                <Figure value={shown(whole)} />
              </Row>
              <View role="img" aria-label={estimateText.spoken(name, spoken)}>
                <Bar parts={parts} scale={(width - 2) / most} width={width} />
              </View>
            </View>
          );
        })}
      </View>
      <Row gap="m">
        {legendOrder
          .filter((part) => used.has(part))
          .map((part) => (
            <Row key={part} gap="xs" wrap={false}>
              <Svg width={30} height={height} aria-hidden style={{ flexShrink: 0 }}>
                <Filled part={part} x={1} width={28} />
              </Svg>
              <Small>{estimateText.parts[part]}</Small>
            </Row>
          ))}
      </Row>
    </View>
  );
}

const height = 22;
const legendOrder = Object.keys(estimateText.parts) as Part[]; // Object.keys loses the key type

function Bar({ parts, scale, width }: { parts: readonly [Part, number][]; scale: number; width: number }) {
  const ends = parts.map((_, i) => 1 + scale * parts.slice(0, i + 1).reduce((sum, [, value]) => sum + value, 0));
  return (
    <Svg width={width} height={height} aria-hidden>
      {parts.map(([part], i) => {
        const from = ends[i - 1] ?? 1;
        return <Filled key={part} part={part} x={from} width={(ends[i] ?? from) - from} />;
      })}
    </Svg>
  );
}

/** A part of a bar: solid, plain, hatched rising or falling, a thin bar, or an edge alone. */
function Filled({ part, x, width }: { part: Part; x: number; width: number }) {
  const box = { x, y: 1, width: Math.max(0.5, width), height: height - 2 };
  switch (part) {
    case 'pierce':
      return <Rect {...box} fill={roles.ink} stroke={roles.ink} strokeWidth={1} />;
    case 'cut':
    case 'machine':
      return <Rect {...box} fill={roles.steelFill} stroke={roles.ink} strokeWidth={1} />;
    case 'loop':
    case 'electricity':
      return (
        <>
          <Rect {...box} fill={roles.sheet} stroke={roles.ember} strokeWidth={1.4} />
          <Path d={hatchData(box.x, box.y, box.width, box.height, 6)} stroke={roles.ember} strokeWidth={1.6} />
        </>
      );
    case 'wait':
    case 'oxygen':
      return (
        <>
          <Rect {...box} fill={roles.sheet} stroke={roles.cold} strokeWidth={1.4} />
          <Path d={hatchData(box.x, box.y, box.width, box.height, 6, true)} stroke={roles.cold} strokeWidth={1.6} />
        </>
      );
    case 'way':
      return <Rect {...box} y={height / 2 - 3} height={6} fill={roles.softInk} />;
    case 'loading':
      return <Rect {...box} fill="none" stroke={roles.softInk} strokeWidth={1.4} strokeDasharray="4 3" />;
  }
}
