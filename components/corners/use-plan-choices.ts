import { useState } from 'react';
import { useCornerPlanRedo } from '@/components/data/corner-plans.ts';
import { useUndoKeys } from '@/components/pierce/use-undo-keys.ts';
import type { CornerPlan, Treatment } from '@/shared/corner-plans.ts';
import { noSteps, stepsAfter, type ChoiceStep } from './choice-steps.ts';
import type { PlanChoices } from './plan-form.tsx';

/** Fields of a form take back what was typed into them. */
const keepsItsOwn = 'textarea, input, select, dialog';

export const choicesOf = (plan: CornerPlan): PlanChoices => ({
  revisionId: plan.revision.id,
  thickness: plan.thickness,
  plateTemperature: plan.plateTemperature,
  skeleton: plan.skeleton,
  overrides: plan.overrides,
});

/**
 * Planning again with other choices, always from the version that is seen. What was chosen for corners can be taken back and made again, by buttons and
 * keys; when somebody else was first, nothing of it is lost.
 */
export function usePlanChoices(plan: CornerPlan, mayWrite: boolean, refetch: () => Promise<CornerPlan | null>) {
  const redo = useCornerPlanRedo();
  const [steps, setSteps] = useState(noSteps);
  const [asked, setAsked] = useState<ChoiceStep>('chosen');

  const planWith = (body: PlanChoices, step: ChoiceStep, from: CornerPlan = plan) => {
    setAsked(step);
    redo.mutate(
      { plan: from, body },
      { onSuccess: (next) => setSteps((now) => (same(from, next) ? now : stepsAfter(now, step, from.overrides))) },
    );
  };
  const take = (step: 'undone' | 'redone') => {
    const overrides = step === 'undone' ? steps.past.at(-1) : steps.future[0];
    if (overrides && !redo.isPending) planWith({ ...choicesOf(plan), overrides }, step);
  };
  useUndoKeys(mayWrite, (step) => take(step.do === 'undo' ? 'undone' : 'redone'), keepsItsOwn);

  return {
    busy: redo.isPending,
    error: redo.isError ? redo.error : null,
    planAgain: (body: PlanChoices) => planWith(body, 'chosen'),
    choose: (cornerId: string, treatment: Treatment | null) => {
      const { [cornerId]: _before, ...rest } = plan.overrides;
      const overrides = treatment === null ? rest : { ...rest, [cornerId]: treatment };
      planWith({ ...choicesOf(plan), overrides }, 'chosen');
    },
    canUndo: steps.past.length > 0,
    canRedo: steps.future.length > 0,
    undo: () => take('undone'),
    redo: () => take('redone'),
    /** Somebody else planned first: what they made, without what could be taken back here. */
    takeTheirs: async () => {
      await refetch();
      setSteps(noSteps);
      redo.reset();
    },
    /** The same asked for once more, over theirs. */
    insist: async () => {
      const theirs = await refetch();
      if (theirs && redo.variables) planWith(redo.variables.body, asked, theirs);
    },
  };
}

/** Were the corners' choices left as they were? Then there is nothing to take back. */
function same(a: CornerPlan, b: CornerPlan): boolean {
  const ids = new Set([...Object.keys(a.overrides), ...Object.keys(b.overrides)]);
  return [...ids].every((id) => a.overrides[id] === b.overrides[id]);
}
