import { returnOf } from '../heat/return-temperature.ts';
import type { Loop } from '../path/loop.ts';
import type { Candidate, Case, Context, CornerPlanRequest, Prospect, Way } from './case.ts';
import { contextOf, loopPlaces } from './context.ts';
import { decide, doubledBack } from './decide.ts';
import { heated } from './heated.ts';
import { loopOption, mostReach } from './loop-option.ts';
import { dwellOption, easeWay, leaveOption, leftAlone, roundWay } from './options.ts';
import type { PlannedCorner } from './planned.ts';
import { plannedCorner } from './planned.ts';
import { doublesBack, pathAfter, pathBefore, prospectsOf, treated } from './prospects.ts';
import type { CornerPlanTotals } from './totals.ts';
import { totalsOf } from './totals.ts';

export type CornerPlan = {
  /** A straight edge's return temperature and the excess allowed over it, K. */
  readonly limit: number;
  readonly corners: readonly PlannedCorner[];
  readonly totals: CornerPlanTotals;
};

/**
 * The corner plan: for every corner of the contours the treatment it gets, why, the return temperatures (K) and the added time (s).
 *
 * A tip below the rules' angle that returns hotter than a straight edge by more than the rules' excess is treated; of what fits and stays under the limit, the least added time wins.
 * What the programmer asked for is followed when it fits; a loop that does not fit stays refused, with the reason. Contours are taken as cut in the order
 * given: each loop placed is an obstacle to the next, and what lies within a contour cut before has dropped out. Throws RangeError for a thickness, feed or
 * temperature that is not positive, and for two contours of the same id.
 */
export function cornerPlan(request: CornerPlanRequest): CornerPlan {
  const { contours, thickness, rules, overrides } = request;
  if (!(thickness > 0)) throw new RangeError(`thickness ${thickness} m is outside (0, ∞)`);
  const prospects = contours.flatMap((contour) => prospectsOf(contour, request));
  const places = loopPlaces(
    prospects.map(({ onPath, corner, id }) => {
      const tried = treated(corner, rules.treatBelowAngle) || (overrides?.[id] === 'loop' && !doublesBack(corner));
      return { at: onPath.point, reach: tried ? mostReach(corner, request) : 0 };
    }),
  );
  const context = contextOf(request, places.near);
  const corners = prospects.map((prospect, i) => {
    const { planned, loop } = planCorner(prospect, context);
    if (loop) places.put(i, { name: `the loop of corner ${planned.id}`, loop });
    return planned;
  });
  return { limit: context.limit, corners, totals: totalsOf(corners, request) };
}

/** A corner on a plate of one temperature, and the loop it gets. */
export function planCorner(prospect: Prospect, context: Context): { planned: PlannedCorner; loop: Loop | undefined } {
  const { request } = context;
  const { cut, plateTemperature, properties, rules, overrides } = request;
  const { id, contour, corner, onPath } = prospect;
  const before = pathBefore(contour.contour, corner, onPath.point);
  const without = returnOf({ corner: onPath, before, ...leftAlone(prospect), cut, plateTemperature, properties });
  const found: Case = { ...prospect, before, without };

  const asked = overrides?.[id];
  const sharp = treated(corner, rules.treatBelowAngle);
  const candidates: Candidate[] = [leaveOption(found, context.limit)];
  const usable = !doublesBack(corner);
  const hot = (way: Way | Candidate): Candidate => ('fits' in way ? way : heated(found, way, context));
  if (usable && (sharp || (asked && asked !== 'leave'))) {
    candidates.push(
      loopOption(found, context),
      dwellOption(found, context),
      hot(easeWay(found, pathAfter(contour.contour, corner, onPath.point, found.room.after), request)),
      hot(roundWay(found, request)),
    );
  }
  const { chosen, why, problem } = usable
    ? decide(found, candidates, asked, sharp, rules, context.limit)
    : doubledBack(corner, candidates[0] ?? leaveOption(found, context.limit));

  const planned = plannedCorner(prospect, { candidates, chosen, why, problem, without }, context);
  return { planned, loop: chosen.loop };
}
