import { useMemo, useState } from 'react';
import { heatChartText } from '@/components/text/heat-charts.ts';
import { cornerExplainText, returnExplained } from '@/components/text/corner-explain.ts';
import { useLayout } from '@/components/theme/layout.ts';
import { Button } from '@/components/ui/button.tsx';
import { Row, Stack } from '@/components/ui/stack.tsx';
import { Heading, Small } from '@/components/ui/text.tsx';
import { useUnitSystem } from '@/components/ui/unit-system.ts';
import type { CornerPlan, PlannedCorner } from '@/shared/corner-plans.ts';
import { quantityText } from '@/strategy/units/index.ts';
import { CoolingChart } from './cooling-chart.tsx';
import { coolingCurves } from './cooling-curves.ts';
import { CornerExplainDialog } from './corner-explain.tsx';
import { cornerQuestions } from './corner-questions.ts';

type CornerHeatProps = {
  plan: Pick<CornerPlan, 'part' | 'cutting' | 'plateTemperature' | 'corners' | 'thickness' | 'limit'>;
  corner: PlannedCorner;
  number: number;
};

/** How a corner's tip cools with each treatment, and where its return temperature comes from. */
export function CornerHeat({ plan, corner, number }: CornerHeatProps) {
  const system = useUnitSystem();
  const { wide } = useLayout();
  const [explaining, setExplaining] = useState(false);
  const questions = useMemo(() => cornerQuestions(plan, corner), [plan, corner]);
  const curves = useMemo(() => coolingCurves(questions), [questions]);
  const own = questions.find(({ chosen }) => chosen) ?? null;
  const away = curves.find(({ chosen }) => chosen)?.back.time ?? null;
  const value = quantityText(corner.treated, 'temperature', system).text;
  return (
    <Stack gap="s">
      <Heading level={3}>{heatChartText.coolingTitle}</Heading>
      {curves.length > 0 ? (
        <CoolingChart curves={curves} limit={plan.limit} height={wide ? 260 : 230} />
      ) : (
        <Small>{heatChartText.noCurve}</Small>
      )}
      <Row>
        <Button
          label={cornerExplainText.open}
          spoken={cornerExplainText.spoken(value)}
          onPress={() => setExplaining(true)}
        />
      </Row>
      <CornerExplainDialog
        told={explaining ? returnExplained(plan, corner, number, own?.question ?? null, away, system) : null}
        onClose={() => setExplaining(false)}
      />
    </Stack>
  );
}
