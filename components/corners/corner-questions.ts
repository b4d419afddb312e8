import type { CornerPlan, PlannedCorner, Treatment } from '@/shared/corner-plans.ts';
import { pathBefore, prospectsOf } from '@/strategy/corners/prospects.ts';
import type { ReturnQuestion, ReturnTreatment } from '@/strategy/heat/index.ts';
import { flatLoopAt, loopAt, pathLength, pathPart, type Loop, type LoopCorner } from '@/strategy/path/index.ts';

/** One treatment of a corner as the closed form is asked about it. */
export type CornerQuestion = {
  readonly treatment: Treatment;
  readonly question: ReturnQuestion;
  /** As the plan has it, K. */
  readonly returnsAt: number;
  readonly chosen: boolean;
};

type PlanOf = Pick<CornerPlan, 'part' | 'cutting' | 'plateTemperature'>;
type Option = PlannedCorner['options'][number];

/**
 * What is asked of the closed form about a corner, a treatment that fits each. With the plate's own warmth known the path counts since the corner before, and the
 * rest is in that; otherwise as far back as matters. None where the contour doesn't know the corner, or its contour is not in the plan.
 */
export function cornerQuestions({ part, cutting, plateTemperature }: PlanOf, planned: PlannedCorner): CornerQuestion[] {
  const contour = part.contours.find(({ id }) => id === planned.contourId);
  if (!contour) return [];
  const { id, role, segments } = contour;
  const found = prospectsOf({ id, role, contour: { segments } }, { cut: cutting }).find((one) => one.id === planned.id);
  if (!found) return [];
  const { onPath, drawnRound, corner } = found;
  const whole = pathBefore({ segments }, corner, onPath.point);
  const warmed = planned.background ?? null;
  const before =
    warmed === null ? whole : pathPart(whole, pathLength(whole) - 2 * found.room.before, pathLength(whole));
  const asked = (option: Option): CornerQuestion[] => {
    const form = option.form ?? (option.treatment === planned.treatment ? formOf(planned, cutting.kerfWidth) : null);
    const how = treatmentOf(onPath, option.treatment, form);
    if (!option.fits || option.returnTemperature === null || !how) return [];
    const round = form?.round ?? drawnRound;
    return [
      {
        treatment: option.treatment,
        chosen: option.treatment === planned.treatment,
        returnsAt: option.returnTemperature,
        question: {
          corner: onPath,
          before,
          ...(round === undefined ? {} : { round }),
          treatment: how,
          cut: cutting,
          plateTemperature: warmed ?? plateTemperature,
        },
      },
    ];
  };
  return planned.options.flatMap(asked);
}

type Form = NonNullable<Option['form']>;

/** Of the treatment that was planned: plans made before every option kept its form still hold this one. */
function formOf({ loop, dwell, ease, round }: PlannedCorner, kerfWidth: number): Form {
  return {
    ...(loop ? { loop: { shape: loop.shape ?? 'tangent', radius: loop.radius, extension: loop.extension } } : {}),
    ...(dwell === null ? {} : { dwell }),
    ...(ease ? { ease: { length: ease.before, feedShare: ease.feedShare, powerShare: ease.powerShare } } : {}),
    ...(round ? { round: round.radius + kerfWidth / 2 } : {}),
  };
}

/** Null where the plan does not hold how it would be done. */
function treatmentOf(corner: LoopCorner, treatment: Treatment, form: Form | null): ReturnTreatment | null {
  switch (treatment) {
    case 'leave':
      return { kind: 'leave' };
    case 'round':
      return form?.round === undefined ? null : { kind: 'leave' };
    case 'dwell':
      return form?.dwell === undefined ? null : { kind: 'dwell', duration: form.dwell };
    case 'ease':
      return form?.ease ? { kind: 'ease', ...form.ease } : null;
    case 'loop':
      return form?.loop ? { kind: 'loop', loop: loopOf(corner, form.loop) } : null;
  }
}

const loopOf = (corner: LoopCorner, { shape, radius, extension }: NonNullable<Form['loop']>): Loop =>
  shape === 'flat' ? flatLoopAt(corner, radius, extension) : loopAt(corner, radius);
