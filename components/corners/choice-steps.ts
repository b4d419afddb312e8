import type { CornerPlan } from '@/shared/corner-plans.ts';

type Overrides = CornerPlan['overrides'];

/** What was chosen by hand before, and what was taken back: each as the whole of the choices then. */
export type ChoiceSteps = { readonly past: readonly Overrides[]; readonly future: readonly Overrides[] };

export const noSteps: ChoiceSteps = { past: [], future: [] };

/** How the plan came by its choices. */
export type ChoiceStep = 'chosen' | 'undone' | 'redone';

/** Choices that can be taken back. */
const mostSteps = 200;

/** The steps after the plan was made again with other choices; `before` are those it had. */
export function stepsAfter({ past, future }: ChoiceSteps, step: ChoiceStep, before: Overrides): ChoiceSteps {
  switch (step) {
    case 'chosen':
      return { past: [...past, before].slice(-mostSteps), future: [] };
    case 'undone':
      return { past: past.slice(0, -1), future: [before, ...future] };
    case 'redone':
      return { past: [...past, before], future: future.slice(1) };
  }
}
