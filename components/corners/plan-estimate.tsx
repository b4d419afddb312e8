import { useQuery, useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { planEstimateQuery } from '@/components/data/estimates.ts';
import { estimateText, figureText } from '@/components/text/plan-estimate.ts';
import { Button } from '@/components/ui/button.tsx';
import { Choice } from '@/components/ui/choice.tsx';
import { ErrorNotice } from '@/components/ui/error-notice.tsx';
import { Facts } from '@/components/ui/facts.tsx';
import { Fold } from '@/components/ui/fold.tsx';
import { Notice } from '@/components/ui/notice.tsx';
import { Panel } from '@/components/ui/panel.tsx';
import { Progress } from '@/components/ui/progress.tsx';
import { Row, Stack } from '@/components/ui/stack.tsx';
import { Body, Heading, Small } from '@/components/ui/text.tsx';
import { useUnitSystem } from '@/components/ui/unit-system.ts';
import type { CornerPlan } from '@/shared/corner-plans.ts';
import type { PlanComparison } from '@/shared/estimates.ts';
import type { PlanVariant } from '@/strategy/estimate/compare.ts';
import { quantityText } from '@/strategy/units/index.ts';
import { EstimateBars, type Measure } from './plan-estimate-bars.tsx';
import { EstimateTable } from './plan-estimate-table.tsx';

/** Plans with more corners are worked out only when asked for: it takes the server seconds. */
const mostUnasked = 600;

/** What a plan costs beside the same plate cut in other ways. */
export function PlanEstimate({ plan }: { plan: Pick<CornerPlan, 'id' | 'version' | 'corners'> }) {
  const client = useQueryClient();
  const [asked, setAsked] = useState<boolean | null>(null);
  const large = plan.corners.length > mostUnasked;
  const wanted = asked ?? !large;
  const query = planEstimateQuery(plan.id, plan.version);
  const estimate = useQuery({ ...query, enabled: wanted });
  const stop = () => {
    setAsked(false);
    void client.cancelQueries({ queryKey: query.queryKey });
  };
  // the last good figures stay while the plan's next ones are worked out, or when they can't be
  const [last, setLast] = useState<PlanComparison | null>(null);
  if (estimate.data && estimate.data !== last) setLast(estimate.data);
  const shown = estimate.data ?? last;
  return (
    <Panel title={estimateText.title}>
      <Body>{estimateText.words}</Body>
      {!wanted && !estimate.data && (
        <Row>
          <Button label={estimateText.ask} onPress={() => setAsked(true)} />
          {large && <Small>{estimateText.large(plan.corners.length)}</Small>}
        </Row>
      )}
      {wanted && estimate.isPending && (
        <>
          <Progress label={shown ? estimateText.again : estimateText.fetching} />
          <Row>
            <Button kind="quiet" label={estimateText.stop} onPress={stop} />
          </Row>
        </>
      )}
      {estimate.isError && <ErrorNotice error={estimate.error} onRetry={() => void estimate.refetch()} />}
      {shown && !estimate.data && <Small strong>{estimateText.old}</Small>}
      {shown && <Comparison comparison={shown} />}
    </Panel>
  );
}

function Comparison({ comparison: { variants, missing } }: { comparison: PlanComparison }) {
  const system = useUnitSystem();
  const [chosenMeasure, setMeasure] = useState<Measure>('time');
  const [chosenAgainst, setAgainst] = useState<PlanVariant>('untreated');
  const planned = variants.find(({ variant }) => variant === 'planned');
  const money = planned?.estimate.money;
  const paid = money?.kind === 'ok' ? money.currency : null;
  const measure = chosenMeasure === 'money' && paid === null ? 'time' : chosenMeasure;
  const others = variants.filter(({ variant }) => variant !== 'planned');
  const against = others.some(({ variant }) => variant === chosenAgainst) ? chosenAgainst : others[0]?.variant;
  const measures: readonly Measure[] = ['time', 'oxygen', 'heat', ...(paid === null ? [] : (['money'] as const))];
  const shown = (value: number) =>
    measure === 'money' ? estimateText.amount(value, paid ?? '') : figureText[measure].show(value, system, false);
  const cautions = variants.flatMap(({ variant, revision, cautions: own }) =>
    own.map((why) => estimateText.caution(estimateText.variant(variant, revision), why)),
  );
  const hidden = planned?.estimate.hiddenLoading ?? 0;
  return (
    <Stack gap="l">
      {cautions.length > 0 && (
        <Notice kind="caution">
          {cautions.map((why) => (
            <Body key={why}>{why}</Body>
          ))}
        </Notice>
      )}
      <Stack>
        <Choice
          label={estimateText.bars}
          options={measures.map((value) => ({ value, label: estimateText.measure[value] }))}
          value={measure}
          onChange={setMeasure}
        />
        <EstimateBars variants={variants} measure={measure} shown={shown} />
      </Stack>
      {planned && against !== undefined && (
        <Stack>
          <Choice
            label={estimateText.against}
            options={others.map(({ variant, revision }) => ({
              value: variant,
              label: estimateText.variant(variant, revision),
            }))}
            value={against}
            onChange={setAgainst}
          />
          <EstimateTable variants={variants} against={against} />
        </Stack>
      )}
      <Stack gap="xs">
        {hidden > 0 && <Small>{estimateText.hidden(hidden, system)}</Small>}
        {paid === null && <Small>{estimateText.noMoney}</Small>}
        {missing.map(({ variant, why }) => (
          <Small key={variant}>{estimateText.missing(variant, why)}</Small>
        ))}
      </Stack>
      {planned && <Origins ledger={planned.estimate.ledger} />}
    </Stack>
  );
}

type Ledger = PlanComparison['variants'][number]['estimate']['ledger'];

/** What the figures follow from, and that the energy of the cut closes. */
function Origins({ ledger }: { ledger: Ledger }) {
  const system = useUnitSystem();
  const energy = (joules: number) => figureText.heat.show(joules, system, false);
  return (
    <Fold label={estimateText.origin}>
      <Stack>
        <Stack gap="xs">
          {estimateText.origins.map((words) => (
            <Small key={words}>{words}</Small>
          ))}
        </Stack>
        <Heading level={3}>{estimateText.ledger}</Heading>
        <Facts
          items={(['absorbed', 'oxidation', 'melt', 'inPlate', 'rest'] as const).map((line) => ({
            label: estimateText.ledgerLines[line],
            value: energy(ledger[line]),
          }))}
        />
        {ledger.absorption !== null && (
          <Small>
            {estimateText.absorption(quantityText(ledger.absorption, 'ratio', system, { decimals: 0 }).text)}
          </Small>
        )}
      </Stack>
    </Fold>
  );
}
