import { celsius, degrees, millimetres, seconds } from '../../units/said.ts';
import type { Candidate, CornerTreatment } from '../case.ts';
import { whyNot } from '../decide.ts';
import { candidateOf } from '../heated.ts';
import { dwellSaid, leaveSaid } from '../options.ts';
import type { CornerRules } from '../rules.ts';
import type { PlateWay } from './own-ways.ts';
import type { WayJudged } from './plate-model.ts';
import type { PlateCorner } from './prepared.ts';

type JudgedWay = WayJudged<PlateWay>;

/** What else stays under the limits and costs least of that: what it costs more, s, or null and why there is none. */
export type RunnerUp = {
  readonly treatment: CornerTreatment | null;
  readonly costsMore: number | null;
  readonly why: string;
};

export type Limits = { readonly limit: number; readonly plateTemperature: number; readonly rules: CornerRules };

/** A way on the plate as a plan holds it and says it. */
export function candidateOn(judged: JudgedWay, { limit, rules }: Limits): Candidate {
  const { way, wait, returnsAt, addedTime, over } = judged;
  const returns = celsius(returnsAt);
  if (way.treatment === 'leave')
    return { treatment: 'leave', fits: true, returnWith: returnsAt, addedTime, why: leaveSaid(returnsAt, limit) };
  if (way.treatment === 'dwell')
    return {
      treatment: 'dwell',
      fits: true,
      returnWith: returnsAt,
      addedTime,
      why: dwellSaid(wait, over === 0, returns, rules),
      dwell: wait,
    };
  if (!way.fits) throw new Error(`a ${way.treatment} has something that fits`);
  return candidateOf(way.fits, returnsAt);
}

/** What keeps a way from being under the limits; empty when it is. */
function overSaid({ returnsAt, over }: JudgedWay, { limit, rules }: Limits): string {
  if (over === 0) return '';
  if (returnsAt > limit) return `the tip returns at ${celsius(returnsAt)}, over the limit of ${celsius(limit)}`;
  return `the tip would burn back deeper than the ${millimetres(rules.burnBack?.limit ?? 0)} allowed`;
}

/** Rise of the plate, K, from which on it is worth a word. */
const worthAWord = 3;

function warmed({ background }: JudgedWay, { plateTemperature }: Limits): string {
  return background - plateTemperature < worthAWord
    ? ''
    : `; the plate there has warmed to ${celsius(background)} by then`;
}

export type Told = { readonly chosen: Candidate; readonly why: string; readonly problem: string | undefined };

/** Why a corner gets what it gets, and what must be looked at. */
export function told(
  corner: PlateCorner,
  chosen: JudgedWay,
  candidates: readonly Candidate[],
  every: readonly JudgedWay[],
  wanted: CornerTreatment | undefined,
  limits: Limits,
): Told {
  const { found, sharp } = corner;
  const leave = every[0] ?? chosen;
  const own = candidateOn(chosen, limits);
  if (corner.useless) return { chosen: own, ...corner.useless };
  const followed = wanted !== undefined && chosen.way.treatment === wanted;
  const automatic = byRule(corner, chosen, leave, own, candidates, every, limits);
  if (wanted === undefined) return automatic;
  if (!followed) {
    const reason = candidates.find(({ treatment }) => treatment === wanted);
    const refusal = reason?.fits
      ? 'the tip is under the limit without waiting'
      : (reason?.why ?? 'it is not possible here');
    return {
      chosen: own,
      why: `${wanted} was asked for and does not fit; ${automatic.why}`,
      problem: `${wanted} asked for by the programmer is refused: ${refusal}`,
    };
  }
  const why = `asked for by the programmer: ${own.why}${warmed(chosen, limits)}`;
  if (chosen.over === 0 || (wanted === 'leave' && !sharp && !found.corner.convex))
    return { chosen: own, why, problem: undefined };
  return { chosen: own, why, problem: `with the treatment asked for ${overSaid(chosen, limits)}` };
}

function byRule(
  { found, sharp }: PlateCorner,
  chosen: JudgedWay,
  leave: JudgedWay,
  own: Candidate,
  candidates: readonly Candidate[],
  every: readonly JudgedWay[],
  limits: Limits,
): Told {
  const told = (why: string, problem?: string): Told => ({ chosen: own, why, problem });
  const hot = warmed(chosen, limits);
  if (!found.corner.convex) return told('the corner is concave: more steel than a straight edge carries the heat away');
  const untreated = leave.over === 0 ? candidateOn(leave, limits).why : overLeft(leave, limits);
  if (leave.over === 0) return told(`${untreated}${hot}`);
  if (!sharp) {
    return told(
      `${degrees(found.corner.angle)} is not below the ${degrees(limits.rules.treatBelowAngle)} from which corners are treated${hot}`,
      `${untreated}, yet the angle is above the one from which corners are treated`,
    );
  }
  if (chosen.over === 0) {
    const cost =
      chosen.addedTime < 0 ? `and ${seconds(-chosen.addedTime)} less` : `for ${seconds(chosen.addedTime)} more`;
    const quicker = every.find((one) => one.over === 0 && one.addedTime < chosen.addedTime - noticed);
    const spent = quicker
      ? `; a ${quicker.way.treatment === chosen.way.treatment ? 'shorter wait' : quicker.way.treatment} would do here, but this cools the corners after it by more than it costs`
      : '';
    return told(`${untreated}; ${own.why}, ${cost}${spent}${hot}`);
  }
  const why =
    own.treatment === 'leave'
      ? `${untreated}, and nothing else is possible here`
      : `nothing that fits stays under the limit; the ${own.treatment} leaves the coolest tip`;
  return told(`${why}${hot}`, `${overSaid(chosen, limits)}: ${whyNot(candidates)}${hot}`);
}

/** Time below which two ways cost the same, s. */
const noticed = 0.05;

const overLeft = (leave: JudgedWay, limits: Limits): string =>
  leave.returnsAt > limits.limit ? candidateOn(leave, limits).why : `untreated ${overSaid(leave, limits)}`;

/** Of what else stays under the limits the least costly, or why there is none. */
export function runnerUpOf(
  chosen: JudgedWay,
  every: readonly JudgedWay[],
  candidates: readonly Candidate[],
  limits: Limits,
): RunnerUp {
  const others = every.filter((one) => one.way.treatment !== chosen.way.treatment && one.over === 0);
  const next = others.reduce<JudgedWay | null>(
    (best, one) => (best && best.addedTime <= one.addedTime ? best : one),
    null,
  );
  if (next) {
    return {
      treatment: next.way.treatment,
      costsMore: next.addedTime - chosen.addedTime,
      why: candidateOn(next, limits).why,
    };
  }
  const reasons = candidates.filter(({ treatment, ruledOut }) => treatment !== chosen.way.treatment && !ruledOut);
  const said = reasons.map(({ why }) => why).join('; ');
  return { treatment: null, costsMore: null, why: said || 'the corner rules of this strategy allow nothing else here' };
}
