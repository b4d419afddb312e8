import { useRouter } from 'expo-router';
import { useState } from 'react';
import { PlanForm } from '@/components/corners/plan-form.tsx';
import { newId } from '@/components/data/call.ts';
import { useCornerPlanAdd } from '@/components/data/corner-plans.ts';
import { layoutsText } from '@/components/text/layouts.ts';
import { momentText } from '@/components/text/moments.ts';
import { partsText } from '@/components/text/parts.ts';
import { ErrorNotice } from '@/components/ui/error-notice.tsx';
import { LinkRow, Rows } from '@/components/ui/link-row.tsx';
import { Panel } from '@/components/ui/panel.tsx';
import { Body, Small } from '@/components/ui/text.tsx';
import type { Layout } from '@/shared/layouts.ts';

const firstChoices = {
  revisionId: null,
  thickness: 0,
  plateTemperature: 293.15,
  skeleton: { left: 0, right: 0, below: 0, above: 0 },
  overrides: {},
};

type LayoutPlansProps = {
  layout: Layout;
  /** What is on the screen is not what would be planned. */
  unsaved: boolean;
  mayPlan: boolean;
};

/** Corner plans of a layout, which version each was made for, and a way to make one. */
export function LayoutPlans({ layout, unsaved, mayPlan }: LayoutPlansProps) {
  const router = useRouter();
  const add = useCornerPlanAdd();
  const [id] = useState(newId);
  const { cornerPlans, placements } = layout;
  return (
    <>
      <Panel title={layoutsText.plans}>
        {cornerPlans.length === 0 ? (
          <Body>{partsText.noPlans}</Body>
        ) : (
          <Rows label={layoutsText.plans}>
            {cornerPlans.map((plan) => (
              <LinkRow key={plan.id} href={`/corner-plans/${plan.id}`}>
                <Body>{partsText.planRow(plan.strategyName, plan.revisionNumber)}</Body>
                <Small>{layoutsText.plannedFor(plan.layoutVersion, layout.version)}</Small>
                <Small>{momentText(plan.changedAt)}</Small>
              </LinkRow>
            ))}
          </Rows>
        )}
      </Panel>
      {mayPlan && placements.length > 0 && (
        <Panel title={partsText.planWith}>
          {unsaved ? (
            <Body>{layoutsText.saveFirst}</Body>
          ) : (
            <PlanForm
              initial={firstChoices}
              ownPlate
              label={partsText.planButton}
              busy={add.isPending}
              error={add.isError ? <ErrorNotice error={add.error} /> : null}
              onPlan={(choices) =>
                add.mutate(
                  { id, layoutId: layout.id, ...choices },
                  { onSuccess: (plan) => router.push(`/corner-plans/${plan.id}`) },
                )
              }
            />
          )}
        </Panel>
      )}
    </>
  );
}
