import type { Corner } from '../path/corner.ts';
import { celsius, degrees, seconds } from '../units/said.ts';
import type { Candidate, Case, CornerTreatment } from './case.ts';
import { leaveOption } from './options.ts';
import type { CornerRules } from './rules.ts';

/** The treatment chosen, why, and what must be looked at. */
export type Decision = { readonly chosen: Candidate; readonly why: string; readonly problem?: string };

/** What the programmer asked for when it fits; otherwise, and when nothing was asked, what the rule gives. */
export function decide(
  found: Case,
  candidates: readonly Candidate[],
  asked: CornerTreatment | undefined,
  sharp: boolean,
  rules: CornerRules,
  limit: number,
): Decision {
  const automatic = decideByRule(found, candidates, sharp, rules, limit);
  if (!asked) return automatic;
  const wanted = candidates.find((c) => c.treatment === asked);
  if (!wanted?.fits) {
    return {
      ...automatic,
      why: `${asked} was asked for and does not fit; ${automatic.why}`,
      problem: `${asked} asked for by the programmer is refused: ${wanted?.why ?? 'it is not possible here'}`,
    };
  }
  const chosen = { chosen: wanted, why: `asked for by the programmer: ${wanted.why}` };
  if ((wanted.returnWith ?? 0) <= limit || !found.corner.convex) return chosen;
  return {
    ...chosen,
    problem: `with the treatment asked for the tip returns at ${celsius(wanted.returnWith ?? 0)}, over the limit of ${celsius(limit)}`,
  };
}

function decideByRule(
  found: Case,
  candidates: readonly Candidate[],
  sharp: boolean,
  rules: CornerRules,
  limit: number,
): Decision {
  const leave = candidates.find((c) => c.treatment === 'leave') ?? leaveOption(found, limit);
  // concave? More steel than a straight edge carries the heat away
  if (!found.corner.convex)
    return { chosen: leave, why: 'the corner is concave: more steel than a straight edge carries the heat away' };
  if (found.without <= limit) return { chosen: leave, why: leave.why };
  if (!sharp) {
    return {
      chosen: leave,
      why: `${degrees(found.corner.angle)} is not below the ${degrees(rules.treatBelowAngle)} from which corners are treated`,
      problem: `${leave.why}, yet the angle is above the one from which corners are treated`,
    };
  }
  const under = candidates.filter((c) => c.fits && c.treatment !== 'leave' && (c.returnWith ?? Infinity) <= limit);
  const quickest = least(under, (c) => c.addedTime ?? Infinity);
  if (quickest) {
    const time = quickest.addedTime ?? 0;
    const cost = time < 0 ? `and ${seconds(-time)} less` : `for ${seconds(time)} more`;
    return { chosen: quickest, why: `${leave.why}; ${quickest.why}, ${cost}` };
  }
  const coolest =
    least(
      candidates.filter((c) => c.fits),
      (c) => c.returnWith ?? Infinity,
    ) ?? leave;
  return {
    chosen: coolest,
    why:
      coolest.treatment === 'leave'
        ? `${leave.why}, and nothing else is possible here`
        : `nothing that fits stays under the limit; the ${coolest.treatment} leaves the coolest tip`,
    problem: `the tip returns at ${celsius(coolest.returnWith ?? found.without)}, over the limit of ${celsius(limit)}: ${whyNot(candidates)}`,
  };
}

/** Why nothing does, of all that was tried. */
export const whyNot = (candidates: readonly Candidate[]): string =>
  candidates
    .filter((c) => c.treatment !== 'leave' && !c.ruledOut)
    .map((c) => c.why)
    .join('; ') || 'the corner rules of this strategy allow no treatment';

function least<T>(items: readonly T[], measure: (item: T) => number): T | undefined {
  return items.reduce<T | undefined>(
    (best, item) => (best === undefined || measure(item) < measure(best) ? item : best),
    undefined,
  );
}

/** A corner that has no width is left, and said to be. */
export const doubledBack = (corner: Corner, leave: Candidate): Decision => ({
  chosen: leave,
  ...doubledBackSaid(corner),
});

/** What is said of a corner that has no width. */
export function doubledBackSaid({ convex }: Pick<Corner, 'convex'>): {
  readonly why: string;
  readonly problem: string;
} {
  const why = convex
    ? 'the contour doubles back in a spike without width'
    : 'the contour doubles back in a slit without width';
  return { why, problem: `${why}: no path goes round it, and nothing can be said of its heat; mend the drawing` };
}
