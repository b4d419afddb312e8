import { useQuery } from '@tanstack/react-query';
import { useRouter } from 'expo-router';
import { useState } from 'react';
import { PlanForm } from '@/components/corners/plan-form.tsx';
import { newId } from '@/components/data/call.ts';
import { useCornerPlanAdd } from '@/components/data/corner-plans.ts';
import { partFileAddress, partQuery } from '@/components/data/parts.ts';
import { useActor } from '@/components/shell/actor.tsx';
import { Page } from '@/components/shell/page.tsx';
import { common } from '@/components/text/common.ts';
import { momentText } from '@/components/text/moments.ts';
import { partsText } from '@/components/text/parts.ts';
import { ErrorNotice } from '@/components/ui/error-notice.tsx';
import { LinkRow, Rows } from '@/components/ui/link-row.tsx';
import { FileLink } from '@/components/ui/link.tsx';
import { Panel } from '@/components/ui/panel.tsx';
import { Progress } from '@/components/ui/progress.tsx';
import { Body, Small } from '@/components/ui/text.tsx';
import type { Part } from '@/shared/parts.ts';
import { may } from '@/shared/policy.ts';
import { PartDrawing } from './part-drawing.tsx';
import { ReadingNotes } from './reading-notes.tsx';

/** Skeleton and plate that planning starts with: what a nest usually leaves around a part. Own choice. */
const firstChoices = {
  revisionId: null,
  thickness: 0,
  plateTemperature: 293.15,
  skeleton: { left: 0.02, right: 0.02, below: 0.02, above: 0.02 },
  overrides: {},
};

/** A part as a technical drawing, with its title block, its corner plans and a way to make one. */
export function PartScreen({ id }: { id: string }) {
  const part = useQuery(partQuery(id));
  if (part.data) return <PartOf part={part.data} />;
  return (
    <Page title={partsText.one}>
      {part.isError ? (
        <ErrorNotice error={part.error} onRetry={() => void part.refetch()} />
      ) : (
        <Progress label={common.loading} />
      )}
    </Page>
  );
}

function PartOf({ part }: { part: Part }) {
  const actor = useActor();
  const [marked, setMarked] = useState(true);
  const aside = (
    <>
      <Panel title={partsText.plansTitle}>
        {part.cornerPlans.length === 0 ? (
          <Body>{partsText.noPlans}</Body>
        ) : (
          <Rows label={partsText.plansTitle}>
            {part.cornerPlans.map((plan) => (
              <LinkRow key={plan.id} href={`/corner-plans/${plan.id}`}>
                <Body>{partsText.planRow(plan.strategyName, plan.revisionNumber)}</Body>
                <Small>{momentText(plan.changedAt)}</Small>
              </LinkRow>
            ))}
          </Rows>
        )}
      </Panel>
      {actor && may(actor, 'cornerPlan.write') && (
        <Panel title={partsText.planWith}>
          <NewPlan partId={part.id} />
        </Panel>
      )}
    </>
  );
  return (
    <Page title={part.name} eyebrow={partsText.one} aside={aside} estimates>
      <PartDrawing part={part} noted={marked} />
      <Body>
        <FileLink address={partFileAddress(part.id)} name={part.fileName}>
          {partsText.download}
        </FileLink>
      </Body>
      <Small>{`${part.addedBy.name}, ${momentText(part.addedAt)}`}</Small>
      <ReadingNotes reading={part.reading} marked={marked} onMark={setMarked} />
    </Page>
  );
}

function NewPlan({ partId }: { partId: string }) {
  const router = useRouter();
  const add = useCornerPlanAdd();
  const [id] = useState(newId);
  return (
    <PlanForm
      initial={firstChoices}
      label={partsText.planButton}
      busy={add.isPending}
      error={add.isError ? <ErrorNotice error={add.error} /> : null}
      onPlan={(choices) =>
        add.mutate({ id, partId, ...choices }, { onSuccess: (plan) => router.push(`/corner-plans/${plan.id}`) })
      }
    />
  );
}
