import { useId, useState, type ReactNode } from 'react';
import { View } from 'react-native';
import Svg, { Defs, G, Path, Rect } from 'react-native-svg';
import { HatchPattern } from '@/components/pierce/hatch.tsx';
import { unbroken } from '@/components/text/common.ts';
import { summaryText } from '@/components/text/corner-summary.ts';
import { roles } from '@/components/theme/roles.ts';
import { Panel } from '@/components/ui/panel.tsx';
import { Row, Stack } from '@/components/ui/stack.tsx';
import { Body, Figure, Label, Small } from '@/components/ui/text.tsx';
import { useUnitSystem } from '@/components/ui/unit-system.ts';
import { treatments, type CornerPlan, type Treatment } from '@/shared/corner-plans.ts';
import { quantityText } from '@/strategy/units/index.ts';
import { TreatmentBadge } from './treatment-badge.tsx';

/** What the corners of a plan come to. */
export type PlanSummaryOf = {
  readonly corners: number;
  /** Over the limit if they were cut as drawn. */
  readonly burning: number;
  /** Of those, by what was done, brought under the limit. */
  readonly cured: Readonly<Record<Treatment, number>>;
  /** Still over the limit, or refused. */
  readonly trouble: number;
};

export function planSummary({ corners, limit }: Pick<CornerPlan, 'corners' | 'limit'>): PlanSummaryOf {
  const cured: Record<Treatment, number> = { loop: 0, dwell: 0, ease: 0, round: 0, leave: 0 };
  let burning = 0;
  let trouble = 0;
  for (const corner of corners) {
    if (corner.untreated > limit) burning += 1;
    if (corner.trouble !== null) trouble += 1;
    else cured[corner.treatment] += 1;
  }
  return { corners: corners.length, burning, cured, trouble };
}

type PlanSummaryProps = {
  plan: CornerPlan;
  /** The whole cut, s. */
  duration: number;
};

/** In one glance: how many corners would burn, what was done about them, what is left, and what it costs. */
export function PlanSummary({ plan, duration }: PlanSummaryProps) {
  const system = useUnitSystem();
  const { corners, burning, cured, trouble } = planSummary(plan);
  if (corners === 0) return null;
  const { addedTime } = plan.totals;
  const time = unbroken(quantityText(Math.abs(addedTime), 'time', system, { figures: 3 }).text);
  const cost = `${addedTime < 0 ? '−' : '+'}${time}`;
  const limit = quantityText(plan.limit, 'temperature', system).text;
  const done = treatments.filter((treatment) => treatment !== 'leave' && cured[treatment] > 0);
  return (
    <Panel>
      <Row gap="xl" align="flex-start">
        <Count figure={`${burning} / ${corners}`} words={summaryText.wouldBurn} />
        <Stack gap="hair">
          <Row gap="m">
            {done.length === 0 && <Figure large value="0" />}
            {done.map((treatment) => (
              <Row key={treatment} gap="xs" wrap={false}>
                <TreatmentBadge treatment={treatment} />
                <Figure large value={cured[treatment]} />
              </Row>
            ))}
          </Row>
          <Label>{summaryText.treated}</Label>
        </Stack>
        <Count
          figure={String(trouble)}
          words={summaryText.left}
          tone={trouble > 0 ? 'hot' : 'good'}
          mark={trouble > 0 ? <TreatmentBadge treatment="leave" trouble /> : null}
        />
        <Count
          figure={cost}
          words={
            duration > 0
              ? summaryText.costOf((100 * addedTime) / Math.max(1e-9, duration - addedTime))
              : summaryText.cost
          }
        />
      </Row>
      <SummaryBar cured={cured} trouble={trouble} corners={corners} />
      <Body>
        {summaryText.sentence({ corners, burning, cured, trouble, limit, cost: summaryText.more(time, addedTime < 0) })}
      </Body>
    </Panel>
  );
}

type CountProps = { figure: string; words: string; tone?: 'hot' | 'good'; mark?: ReactNode };

function Count({ figure, words, tone, mark = null }: CountProps) {
  return (
    <Stack gap="hair">
      <Row gap="xs" wrap={false}>
        {mark}
        <Figure large value={figure} {...(tone ? { tone } : {})} />
      </Row>
      <Label>{words}</Label>
    </Stack>
  );
}

const barHeight = 20;

/** All corners as one bar, a stretch a treatment, told apart by its hatching: left alone, each treatment, and what still burns. */
function SummaryBar({ cured, trouble, corners }: Omit<PlanSummaryOf, 'burning'>) {
  const [width, setWidth] = useState(360);
  const id = useId().replace(/\W/g, '');
  let from = 0;
  const parts = [
    ...treatments.filter((treatment) => treatment !== 'leave'),
    'leave' as const,
    'trouble' as const,
  ].flatMap((kind) => {
    const count = kind === 'trouble' ? trouble : cured[kind];
    if (count === 0) return [];
    const x = from;
    from += (count / corners) * width;
    return [{ kind, count, x, width: from - x }];
  });
  return (
    <View onLayout={(event) => setWidth(Math.round(event.nativeEvent.layout.width) || 360)}>
      <Svg width={width} height={barHeight} role="img" aria-label={summaryText.bar(cured, trouble)}>
        <Defs>
          <HatchPattern id={`${id}loop`} spacing={6} colour={roles.ember} weight={2} />
          <HatchPattern id={`${id}dwell`} spacing={6} colour={roles.ink} weight={2} falling />
          <HatchPattern id={`${id}ease`} spacing={12} colour={roles.ink} weight={1.4} />
          <HatchPattern id={`${id}round`} spacing={12} colour={roles.ink} weight={1.4} falling />
        </Defs>
        {parts.map(({ kind, x, width: long }) => (
          <G key={kind} testID={`summary-${kind}`}>
            <Rect
              x={x + 0.75}
              y={0.75}
              width={Math.max(1, long - 1.5)}
              height={barHeight - 1.5}
              fill={kind === 'leave' ? 'none' : kind === 'trouble' ? roles.hot : `url(#${id}${kind})`}
              stroke={kind === 'trouble' ? roles.hot : roles.ink}
              strokeWidth={1.5}
            />
            {kind === 'trouble' && long > 26 && (
              <Path
                d={`M${x + long / 2} 4l7 12h-14Z`}
                fill={roles.sheet}
                stroke={roles.sheet}
                strokeWidth={1}
                strokeLinejoin="round"
              />
            )}
          </G>
        ))}
      </Svg>
      <Row gap="m">
        {parts.map(({ kind, count }) => (
          <Row key={kind} gap="hair" wrap={false}>
            <TreatmentBadge treatment={kind === 'trouble' ? 'leave' : kind} trouble={kind === 'trouble'} size={28} />
            <Small>{summaryText.part(kind, count)}</Small>
          </Row>
        ))}
      </Row>
    </View>
  );
}
