import { useQuery } from '@tanstack/react-query';
import { useCallback, useMemo, useRef, useState } from 'react';
import { View } from 'react-native';
import { cornerPlanQuery } from '@/components/data/corner-plans.ts';
import { cutPathQuery } from '@/components/data/take-away.ts';
import type { DrawingControl } from '@/components/parts/drawing-view.tsx';
import type { Snap } from '@/components/parts/measure.ts';
import { useActor } from '@/components/shell/actor.tsx';
import { Page } from '@/components/shell/page.tsx';
import { common } from '@/components/text/common.ts';
import { cornerToolText } from '@/components/text/corner-preview.ts';
import { asSentence, cornerText } from '@/components/text/corners.ts';
import { heatText } from '@/components/text/heat.ts';
import { heatChartText } from '@/components/text/heat-charts.ts';
import { stateText } from '@/components/text/pierce.ts';
import { useLayout } from '@/components/theme/layout.ts';
import { Button } from '@/components/ui/button.tsx';
import { ErrorNotice } from '@/components/ui/error-notice.tsx';
import { EstimateNote } from '@/components/ui/estimate-note.tsx';
import { Notice } from '@/components/ui/notice.tsx';
import { TextLink } from '@/components/ui/link.tsx';
import { Panel } from '@/components/ui/panel.tsx';
import { Progress } from '@/components/ui/progress.tsx';
import { Row, Stack } from '@/components/ui/stack.tsx';
import { Body, Small } from '@/components/ui/text.tsx';
import type { CornerPlan, PlannedCorner } from '@/shared/corner-plans.ts';
import { may } from '@/shared/policy.ts';
import { BottomSheet } from './bottom-sheet.tsx';
import { ChoiceBar } from './choice-bar.tsx';
import { CornerList } from './corner-list.tsx';
import { CornerSheet } from './corner-sheet.tsx';
import { heatAsked } from './heat-asked.ts';
import { HeatPanel } from './heat-panel.tsx';
import { OrderSuggestions } from './order-suggestions.tsx';
import { PlanDrawing } from './plan-drawing.tsx';
import { PlanEstimate } from './plan-estimate.tsx';
import { PlanForm } from './plan-form.tsx';
import { planPath } from './plan-path.ts';
import { planRun } from './plan-run.ts';
import { PlanLegend } from './plan-legend.tsx';
import { PlanSummary } from './plan-summary.tsx';
import { PlanTotals } from './plan-totals.tsx';
import { RedoTrouble } from './redo-trouble.tsx';
import { returnPoints } from './return-points.ts';
import { ReturnScatter } from './return-scatter.tsx';
import { createRunClock } from './run-clock.ts';
import { RunPanel } from './run-panel.tsx';
import { TakeAway } from './take-away.tsx';
import { choicesOf, usePlanChoices } from './use-plan-choices.ts';
import { usePlateHeat } from './use-plate-heat.ts';

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
  const [listed, setListed] = useState(false);
  const [measured, setMeasured] = useState<readonly Snap[] | null>(null);
  const [clock] = useState(createRunClock);
  const control = useRef<DrawingControl>(null);
  const drawing = useRef<HTMLElement>(null);
  const mayWrite = actor !== null && may(actor, 'cornerPlan.write');
  const choices = usePlanChoices(plan, mayWrite, refetch);
  const { corners } = plan;
  const shown = useQuery(cutPathQuery(plan.id, plan.version));
  const edges = useMemo(() => planPath(plan), [plan]);
  const path = shown.data ?? edges;
  const { timeline, dropped } = useMemo(() => planRun(plan, path), [plan, path]);
  const heated = shown.data ?? (shown.isError ? edges : null);
  const asked = useMemo(() => heated && heatAsked(plan, heated), [plan, heated]);
  const heat = usePlateHeat(asked);
  const [heatShown, setHeatShown] = useState(true);
  const points = useMemo(() => returnPoints(plan, timeline), [plan, timeline]);

  const index = corners.findIndex(({ id }) => id === chosen);
  const corner = corners[index];
  const show = useCallback((one: PlannedCorner) => control.current?.goTo(one.at, stretchAround(one)), []);
  /** Chosen beside the drawing: the drawing follows. */
  const chooseAndShow = useCallback(
    (id: string) => {
      setChosen(id);
      const one = corners.find((other) => other.id === id);
      if (one) show(one);
    },
    [corners, show],
  );
  /** On a phone the sheet covers the lower half: what it is of must stand above it. */
  const uncover = () => {
    if (!wide) drawing.current?.scrollIntoView({ block: 'start' });
  };

  const trouble = choices.error !== null && (
    <RedoTrouble error={choices.error} onTheirs={choices.takeTheirs} onMine={choices.insist} />
  );
  const sheet = corner && (
    <CornerSheet
      corner={corner}
      number={index + 1}
      plan={plan}
      onOverride={mayWrite ? (treatment) => choices.choose(corner.id, treatment) : null}
      busy={choices.busy}
      first={index === 0}
      last={index === corners.length - 1}
      onTurn={(by) => {
        const next = corners[index + by];
        if (next) chooseAndShow(next.id);
      }}
      onShow={() => show(corner)}
      onClose={() => {
        setChosen(null);
        setListed(true);
      }}
      framed={wide}
    />
  );
  const list = <CornerList corners={corners} limit={plan.limit} chosen={chosen} onChoose={chooseAndShow} />;

  return (
    <Page
      title={plan.part.name}
      eyebrow={cornerText.page}
      aside={
        <>
          {wide && trouble}
          {wide && sheet}
          {wide && (
            <Panel title={cornerText.corners}>
              {corners.length > 0 && !corner && <Small>{cornerText.chooseOne}</Small>}
              {list}
            </Panel>
          )}
          <PlanSettings plan={plan} mayWrite={mayWrite} choices={choices} />
        </>
      }
    >
      {!plan.revision.approved && (
        <Notice kind="caution">{cornerText.notApproved(stateText[plan.revision.state])}</Notice>
      )}
      {plan.layout && plan.layout.version !== plan.layout.newest && (
        <Notice kind="caution">
          <Body>{cornerText.otherVersion(plan.layout.version, plan.layout.newest)}</Body>
          {mayWrite && (
            <Row>
              <Button
                label={cornerText.planNewest}
                busy={choices.busy}
                onPress={() => choices.planAgain(choicesOf(plan))}
              />
            </Row>
          )}
        </Notice>
      )}
      {plan.layout && mayWrite && (
        <Body>
          <TextLink href={`/layouts/${plan.layout.id}`}>{cornerText.openLayout}</TextLink>
        </Body>
      )}
      <PlanSummary plan={plan} duration={timeline.duration} />
      <View
        // on the web a view's host is the page's own element
        ref={(host: unknown) => {
          drawing.current = host instanceof HTMLElement ? host : null;
        }}
      >
        <PlanDrawing
          plan={plan}
          chosen={chosen}
          onChoose={(id) => {
            setChosen(id);
            if (id !== null) uncover();
          }}
          measured={measured}
          onMeasure={setMeasured}
          path={path}
          timeline={timeline}
          dropped={dropped}
          clock={clock}
          heat={heatShown ? heat.heat : null}
          heatOld={heat.old || choices.busy}
          control={control}
          steps={
            <>
              {heat.heat && (
                <Button
                  label={heatShown ? heatText.hide : heatText.show}
                  expanded={heatShown}
                  onPress={() => setHeatShown(!heatShown)}
                />
              )}
              {mayWrite && corners.length > 0 && <ChoiceBar {...choices} />}
            </>
          }
          keys={mayWrite && corners.length > 0}
          height={wide ? 520 : 360}
        />
      </View>
      {shown.isError && <ErrorNotice error={shown.error} onRetry={() => void shown.refetch()} />}
      <RunPanel
        timeline={timeline}
        dropped={dropped}
        clock={clock}
        alongEdges={!shown.data}
        problems={shown.data?.problems.map(({ why }) => asSentence(why)) ?? []}
      />
      <HeatPanel state={heat} />
      {!wide && corners.length > 0 && (
        <Button
          fill
          label={cornerToolText.open(corners.length)}
          onPress={() => {
            setListed(true);
            uncover();
          }}
        />
      )}
      {!wide && trouble}
      <PlanLegend plan={plan} />
      {points.length > 0 && (
        <Panel title={heatChartText.scatterTitle}>
          <ReturnScatter
            points={points}
            limit={plan.limit}
            duration={timeline.duration}
            clock={clock}
            chosen={chosen}
            onChoose={chooseAndShow}
            height={wide ? 300 : 250}
          />
        </Panel>
      )}
      <OrderSuggestions plan={plan} mayWrite={mayWrite} />
      <PlanTotals plan={plan} />
      {actor !== null && may(actor, 'rate.read') && <PlanEstimate plan={plan} />}
      {actor !== null && may(actor, 'cutPath.take') && <TakeAway planId={plan.id} approved={plan.revision.approved} />}
      <EstimateNote />
      {!wide && (corner ?? listed) && (
        <BottomSheet
          title={corner ? cornerText.row(index + 1) : cornerText.corners}
          closeLabel={common.close}
          onClose={() => {
            setChosen(null);
            setListed(false);
          }}
        >
          {trouble}
          {sheet ?? list}
        </BottomSheet>
      )}
    </Page>
  );
}

/** What is shown around a corner, m: its loop with room on all sides, or a stretch on which its badge stands clear. */
const stretchAround = ({ loop }: PlannedCorner): number =>
  Math.max(0.06, loop ? 5 * (loop.extension + 2 * loop.radius) : 0);

type PlanSettingsProps = { plan: CornerPlan; mayWrite: boolean; choices: ReturnType<typeof usePlanChoices> };

function PlanSettings({ plan, mayWrite, choices }: PlanSettingsProps) {
  if (!mayWrite) return <Small>{cornerText.operator}</Small>;
  const byHand = Object.keys(plan.overrides).length;
  const { revision } = plan;
  return (
    <Panel title={cornerText.settings}>
      {byHand > 0 && (
        <Row justify="space-between">
          <Small strong>{cornerText.overrides(byHand)}</Small>
          <Button
            kind="quiet"
            label={cornerText.clearOverrides}
            busy={choices.busy}
            onPress={() => choices.planAgain({ ...choicesOf(plan), overrides: {} })}
          />
        </Row>
      )}
      <Stack>
        <PlanForm
          initial={choicesOf(plan)}
          ownPlate={plan.layout !== null}
          current={{
            id: revision.id,
            label: cornerText.revisionOption(revision.strategyName, revision.number, stateText[revision.state]),
          }}
          label={cornerText.settingsSave}
          busy={choices.busy}
          error={null}
          onPlan={choices.planAgain}
        />
      </Stack>
    </Panel>
  );
}
