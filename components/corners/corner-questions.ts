import type { CornerPlan, PlannedCorner, Treatment } from '@/shared/corner-plans.ts';
import type { Prospect } from '@/strategy/corners/case.ts';
import { pathBefore, prospectsOf } from '@/strategy/corners/prospects.ts';
import type { ReturnQuestion, ReturnTreatment } from '@/strategy/heat/index.ts';
import {
  flatLoopAt,
  lineBetween,
  loopAt,
  pathLength,
  pathPart,
  pointCross,
  pointSubtract,
  type Loop,
  type LoopCorner,
  type Segment,
} from '@/strategy/path/index.ts';

/** One treatment of a corner as the closed form is asked about it. */
export type CornerQuestion = {
  readonly treatment: Treatment;
  readonly question: ReturnQuestion;
  /** As the plan has it, K. */
  readonly returnsAt: number;
  readonly chosen: boolean;
};

type PlanOf = Pick<CornerPlan, 'part' | 'cutting' | 'plateTemperature' | 'corners'>;
type Option = PlannedCorner['options'][number];

/**
 * What is asked of the closed form about a corner, a treatment that fits each. With the plate's own warmth known the path counts since the corner before, and the
 * rest is in that, but for what the tip of the corner before keeps of it; otherwise as far back as matters. None where the contour doesn't know the corner, or its contour is not in the plan.
 */
export function cornerQuestions(plan: PlanOf, planned: PlannedCorner): CornerQuestion[] {
  const { part, cutting, plateTemperature } = plan;
  const contour = part.contours.find(({ id }) => id === planned.contourId);
  if (!contour) return [];
  const { id, role, segments } = contour;
  const all = prospectsOf({ id, role, contour: { segments } }, { cut: cutting });
  const place = all.findIndex((one) => one.id === planned.id);
  const found = all[place];
  if (!found) return [];
  const { onPath, drawnRound, corner } = found;
  const warmed = planned.background ?? null;
  const last = all.at(place - 1);
  const behind = last && comesBackFirst(plan, last.id, planned) ? last : null;
  const { before, earlier } =
    warmed === null
      ? { before: pathBefore({ segments }, corner, onPath.point), earlier: [] }
      : sinceCornerBefore(found, behind);
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
          earlier,
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

/** Whether the cut comes to another corner before this one: behind a lead-in it has not. */
function comesBackFirst({ corners }: PlanOf, other: string, { id, returnTime = null }: PlannedCorner): boolean {
  const time = corners.find((one) => one.id === other)?.returnTime ?? null;
  return other !== id && time !== null && returnTime !== null && time < returnTime;
}

type PathTo = { readonly before: readonly Segment[]; readonly earlier: readonly Segment[] };

/** Least that a line is off another, m, that is not the same. */
const aside = 1e-6;

/** The path since the corner before, and that corner's own edge where it is cut by then and meets a straight one. */
function sinceCornerBefore(found: Prospect, behind: Prospect | null): PathTo {
  const before = edgeInto(found);
  const [first, ...rest] = before;
  if (!behind || first?.kind !== 'line') return { before, earlier: [] };
  // the path turns half a kerf's width off the finished corner, so its edge is longer than the part's
  const start = behind.onPath.point;
  const along = found.onPath.incoming;
  if (Math.abs(pointCross(pointSubtract(first.end, start), along)) > aside) return { before, earlier: [] };
  return { before: [lineBetween(start, first.end), ...rest], earlier: edgeInto(behind) };
}

/** The path to a corner since the one before it. */
function edgeInto({ contour, corner, onPath, room }: Prospect): Segment[] {
  const whole = pathBefore(contour.contour, corner, onPath.point);
  return pathPart(whole, pathLength(whole) - 2 * room.before, pathLength(whole));
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
