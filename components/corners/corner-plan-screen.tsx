import { useQuery } from '@tanstack/react-query';
import { useMemo, useState } from 'react';
import { cornerPlanQuery, useCornerPlanRedo } from '@/components/data/corner-plans.ts';
import { isProblem } from '@/components/data/problem.ts';
import { pathsBox } from '@/components/parts/drawing-geometry.ts';
import { DrawingView } from '@/components/parts/drawing-view.tsx';
import { useActor } from '@/components/shell/actor.tsx';
import { Page } from '@/components/shell/page.tsx';
import { common } from '@/components/text/common.ts';
import { cornerText, treatmentText } from '@/components/text/corners.ts';
import { momentText } from '@/components/text/moments.ts';
import { stateText } from '@/components/text/pierce.ts';
import { useLayout } from '@/components/theme/layout.ts';
import { Button } from '@/components/ui/button.tsx';
import { ErrorNotice } from '@/components/ui/error-notice.tsx';
import { EstimateNote } from '@/components/ui/estimate-note.tsx';
import { Notice } from '@/components/ui/notice.tsx';
import { Panel } from '@/components/ui/panel.tsx';
import { Progress } from '@/components/ui/progress.tsx';
import { Sheet } from '@/components/ui/sheet.tsx';
import { Row, Stack } from '@/components/ui/stack.tsx';
import { Body, Small } from '@/components/ui/text.tsx';
import { useUnitSystem } from '@/components/ui/unit-system.ts';
import { treatments, type CornerPlan, type Treatment } from '@/shared/corner-plans.ts';
import { may } from '@/shared/policy.ts';
import type { Point } from '@/strategy/path/index.ts';
import { quantityText } from '@/strategy/units/index.ts';
import { CornerList } from './corner-list.tsx';
import { CornerSheet } from './corner-sheet.tsx';
import { cornersInward } from './corner-inward.ts';
import { PlanForm, type PlanChoices } from './plan-form.tsx';
import { TakeAway } from './take-away.tsx';
import { TemperatureScale } from './temperature-scale.tsx';
import { BadgeShape, TreatmentBadge } from './treatment-badge.tsx';

/** The part on its plate with what happens at each corner, and why. */
export function CornerPlanScreen({ id }: { id: string }) {
  const plan = useQuery(cornerPlanQuery(id));
  if (plan.data) {
    return <PlanOf plan={plan.data} refetch={async () => (await plan.refetch()).data ?? null} />;
  }
  return (
    <Page title={cornerText.page}>
      {plan.isError ? (
        <ErrorNotice error={plan.error} onRetry={() => void plan.refetch()} />
      ) : (
        <Progress label={common.loading} />
      )}
    </Page>
  );
}

function PlanOf({ plan, refetch }: { plan: CornerPlan; refetch: () => Promise<CornerPlan | null> }) {
  const actor = useActor();
  const { wide } = useLayout();
  const [chosen, setChosen] = useState<string | null>(null);
  const redo = useCornerPlanRedo();
  const mayWrite = actor !== null && may(actor, 'cornerPlan.write');
  const { contours } = plan.part;

  const inward = useMemo(() => cornersInward(plan.corners, contours), [plan.corners, contours]);
  const loops = useMemo(
    () => plan.corners.flatMap(({ id, loop }) => (loop ? [{ id, segments: loop.segments }] : [])),
    [plan.corners],
  );
  const plate = useMemo(() => {
    const box = pathsBox(contours);
    const { left, right, below, above } = plan.skeleton;
    return { minX: box.minX - left, minY: box.minY - below, maxX: box.maxX + right, maxY: box.maxY + above };
  }, [contours, plan.skeleton]);
  const marks = plan.corners.map((corner) => ({
    id: corner.id,
    at: corner.at,
    off: badgeOff(inward.get(corner.id), corner.angle),
    weight: corner.trouble !== null ? 2 : corner.treatment === 'leave' ? 0 : 1,
    draw: <BadgeShape treatment={corner.treatment} trouble={corner.trouble !== null} chosen={corner.id === chosen} />,
  }));

  const choices: PlanChoices = {
    revisionId: plan.revision.id,
    thickness: plan.thickness,
    plateTemperature: plan.plateTemperature,
    skeleton: plan.skeleton,
    overrides: plan.overrides,
  };
  const planAgain = (next: PlanChoices, from: Pick<CornerPlan, 'id' | 'version'> = plan) =>
    redo.mutate({ plan: from, body: next });
  const override = (cornerId: string, treatment: Treatment | null) => {
    const { [cornerId]: _before, ...rest } = plan.overrides;
    planAgain({ ...choices, overrides: treatment === null ? rest : { ...rest, [cornerId]: treatment } });
  };
  const trouble = redo.isError && (
    <RedoTrouble
      error={redo.error}
      onTheirs={async () => {
        await refetch();
        redo.reset();
      }}
      onMine={async () => {
        const theirs = await refetch();
        if (theirs && redo.variables) planAgain(redo.variables.body, theirs);
      }}
    />
  );

  const index = plan.corners.findIndex(({ id }) => id === chosen);
  const corner = plan.corners[index];
  const panel = corner ? (
    <CornerSheet
      corner={corner}
      number={index + 1}
      limit={plan.limit}
      onOverride={mayWrite ? (treatment) => override(corner.id, treatment) : null}
      busy={redo.isPending}
      onClose={() => setChosen(null)}
    />
  ) : (
    <Panel title={cornerText.corners}>
      {plan.corners.length > 0 && <Small>{cornerText.chooseOne}</Small>}
      <CornerList corners={plan.corners} chosen={chosen} onChoose={setChosen} />
    </Panel>
  );
  const settings = mayWrite ? (
    <Panel title={cornerText.settings}>
      {Object.keys(plan.overrides).length > 0 && (
        <Row justify="space-between">
          <Small strong>{cornerText.overrides(Object.keys(plan.overrides).length)}</Small>
          <Button
            kind="quiet"
            label={cornerText.clearOverrides}
            busy={redo.isPending}
            onPress={() => planAgain({ ...choices, overrides: {} })}
          />
        </Row>
      )}
      <PlanForm
        initial={choices}
        current={{
          id: plan.revision.id,
          label: cornerText.revisionOption(
            plan.revision.strategyName,
            plan.revision.number,
            stateText[plan.revision.state],
          ),
        }}
        label={cornerText.settingsSave}
        busy={redo.isPending}
        error={null}
        onPlan={(next) => planAgain(next)}
      />
    </Panel>
  ) : (
    <Small>{cornerText.operator}</Small>
  );

  return (
    <Page
      title={plan.part.name}
      eyebrow={cornerText.page}
      aside={
        <>
          {wide && trouble}
          {wide && panel}
          {settings}
        </>
      }
    >
      {!plan.revision.approved && (
        <Notice kind="caution">{cornerText.notApproved(stateText[plan.revision.state])}</Notice>
      )}
      <DrawingView
        label={cornerText.drawing(plan.part.name, plan.totals)}
        contours={contours}
        plate={plate}
        loops={loops}
        marks={marks}
        chosen={chosen}
        onChoose={setChosen}
        height={wide ? 560 : 360}
      />
      <Legend />
      {/* on a phone a corner's sheet follows the drawing it was tapped on */}
      {!wide && trouble}
      {!wide && panel}
      <Totals plan={plan} />
      {actor !== null && may(actor, 'cutPath.take') && <TakeAway planId={plan.id} approved={plan.revision.approved} />}
      <TemperatureScale />
      <EstimateNote />
    </Page>
  );
}

/** The narrower the tip, the further in its badge stands, so that it lies on the steel; within twice the usual distance. */
function badgeOff(inward: Point | undefined, angle: number): Point | undefined {
  const further = Math.min(2, Math.max(1, Math.SQRT1_2 / Math.sin(Math.min(angle, Math.PI) / 2)));
  return inward && { x: inward.x * further, y: inward.y * further };
}

function Legend() {
  return (
    <Row gap="l">
      {treatments.map((treatment) => (
        <Row key={treatment} gap="xs" wrap={false}>
          <TreatmentBadge treatment={treatment} />
          <Small>{treatmentText[treatment]}</Small>
        </Row>
      ))}
      <Row gap="xs" wrap={false}>
        <TreatmentBadge treatment="leave" trouble />
        <Small>{cornerText.trouble}</Small>
      </Row>
    </Row>
  );
}

/** The title block: of what, with which strategy, and what it costs. */
function Totals({ plan }: { plan: CornerPlan }) {
  const system = useUnitSystem();
  const { totals } = plan;
  const hot = (kelvin: number | null) =>
    kelvin === null ? common.none : quantityText(kelvin, 'temperature', system).text;
  return (
    <Stack gap="s">
      <Sheet
        label={plan.part.name}
        cells={[
          {
            label: cornerText.block.strategy,
            value: cornerText.revisionOption(
              plan.revision.strategyName,
              plan.revision.number,
              stateText[plan.revision.state],
            ),
            share: 3,
          },
          { label: cornerText.block.thickness, value: quantityText(plan.thickness, 'length', system).text },
          {
            label: cornerText.block.plateTemperature,
            value: quantityText(plan.plateTemperature, 'temperature', system).text,
          },
        ]}
      />
      <Sheet
        label={cornerText.page}
        cells={[
          { label: cornerText.block.corners, value: String(totals.corners) },
          { label: cornerText.block.loops, value: String(totals.loops) },
          { label: cornerText.block.dwells, value: String(totals.dwells) },
          { label: cornerText.block.trouble, value: String(totals.trouble) },
          { label: cornerText.block.time, value: quantityText(totals.addedTime, 'time', system, { figures: 3 }).text },
          {
            label: cornerText.block.length,
            value: quantityText(totals.addedLength, 'length', system, { figures: 3 }).text,
          },
          {
            label: cornerText.block.oxygen,
            value: quantityText(totals.addedOxygen, 'mass', system, { figures: 3 }).text,
          },
          { label: cornerText.block.untreated, value: hot(totals.hottestUntreated) },
          { label: cornerText.block.treated, value: hot(totals.hottestTreated) },
        ]}
      />
      <Small>{`${plan.changedBy.name}, ${momentText(plan.changedAt)}`}</Small>
    </Stack>
  );
}

type RedoTroubleProps = { error: unknown; onTheirs: () => Promise<void>; onMine: () => Promise<void> };

/** Planning again failed: said, and when somebody else was first, both ways on. */
function RedoTrouble({ error, onTheirs, onMine }: RedoTroubleProps) {
  if (!isProblem(error, 'stale')) return <ErrorNotice error={error} />;
  return (
    <Notice kind="caution" live>
      <Body>{cornerText.stale}</Body>
      <Row>
        <Button label={cornerText.replanMine} onPress={() => void onMine()} />
        <Button label={cornerText.takeTheirs} onPress={() => void onTheirs()} />
      </Row>
    </Notice>
  );
}
