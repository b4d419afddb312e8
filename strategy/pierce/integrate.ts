/**
 * Dormand–Prince 5(4) for one quantity with error control, and sums of flows along with it. Our own since the ODE packages at hand
 * come without types and allocate in every step. Coefficients: Hairer, Nørsett, Wanner, Solving Ordinary Differential Equations I,
 * 2nd ed., table II.5.2 (from memory; the order is proven by test).
 */

/** Derivative at (time, value); fills the flows of that moment from `place` on. */
export type Slope = (time: number, value: number, flows: Float64Array, place: number) => number;

/** Called after every accepted step with its ends, the values and the slopes there; true ends the integration there. */
export type StepSeen = (
  start: number,
  startValue: number,
  startSlope: number,
  end: number,
  endValue: number,
  endSlope: number,
) => boolean;

/** Room that is used again from one integration to the next. */
export type IntegrateRoom = {
  /** Flows at the seven nodes of the step last tried, `width` places each: the first node is its start, the last its end. */
  readonly nodes: Float64Array;
  readonly width: number;
  /** Integrals of the first flows over time, added to. */
  readonly sums: Float64Array;
};

export type IntegrateOptions = {
  /** Error of the quantity allowed for one step, in its own unit. */
  readonly tolerance: number;
  readonly firstStep: number;
  /** Longest step, so that what is watched between steps is not missed. */
  readonly longestStep: number;
  /** Value at which to stop exactly. */
  readonly stopAt: number;
};

/** Where the integration came to an end: at `stopAt` (`reached`) or at the end of the time asked for. */
export type IntegrateResult = { readonly time: number; readonly value: number; readonly reached: boolean };

/** Nodes and weights of a step for integrals of what is known at its seven nodes, as a part of its length. */
export const STEP_NODES: readonly number[] = [0, 1 / 5, 3 / 10, 4 / 5, 8 / 9, 1, 1];
export const STEP_WEIGHTS: readonly number[] = [35 / 384, 0, 500 / 1113, 125 / 192, -2187 / 6784, 11 / 84, 0];

const SAFETY = 0.9;
/** Sizes of steps to a halving. Steps are of certain sizes only, so that rounding that differs from engine to engine does not move them. */
const SIZES = 8;
const STAGES = 7;
/** A step this much smaller than the span means that the derivative is not what it should be. */
const LEAST_STEP_SHARE = 1e-12;

export function integrateRoom(width: number, sums: number): IntegrateRoom {
  return { nodes: new Float64Array(STAGES * width), width, sums: new Float64Array(sums) };
}

/**
 * The quantity carried from `start` to `end` or until it reaches `stopAt`, whichever is first. The sums grow by the weights of the
 * fifth order, so that what balances in every moment balances in them. Deterministic: no clock, no chance. RangeError when the
 * step would have to become vanishingly small.
 */
export function integrate(
  slopeAt: Slope,
  room: IntegrateRoom,
  startValue: number,
  start: number,
  end: number,
  options: IntegrateOptions,
  seen?: StepSeen,
): IntegrateResult {
  const { nodes, width, sums } = room;
  const { tolerance, longestStep, stopAt } = options;
  const least = (end - start) * LEAST_STEP_SHARE;
  let time = start;
  let value = startValue;
  let h = sized(Math.min(options.firstStep, longestStep, end - start));
  let k1 = slopeAt(time, value, nodes, 0);
  // What the step last tried ended with.
  let trial = value;
  let k7 = k1;
  let error = 0;

  const attempt = (): void => {
    const k2 = slopeAt(time + h / 5, value + (h * k1) / 5, nodes, width);
    const k3 = slopeAt(time + 0.3 * h, value + h * ((3 / 40) * k1 + (9 / 40) * k2), nodes, 2 * width);
    const k4 = slopeAt(time + 0.8 * h, value + h * ((44 / 45) * k1 - (56 / 15) * k2 + (32 / 9) * k3), nodes, 3 * width);
    const k5 = slopeAt(
      time + (8 / 9) * h,
      value + h * ((19372 / 6561) * k1 - (25360 / 2187) * k2 + (64448 / 6561) * k3 - (212 / 729) * k4),
      nodes,
      4 * width,
    );
    const k6 = slopeAt(
      time + h,
      value + h * ((9017 / 3168) * k1 - (355 / 33) * k2 + (46732 / 5247) * k3 + (49 / 176) * k4 - (5103 / 18656) * k5),
      nodes,
      5 * width,
    );
    trial = value + h * ((35 / 384) * k1 + (500 / 1113) * k3 + (125 / 192) * k4 - (2187 / 6784) * k5 + (11 / 84) * k6);
    k7 = slopeAt(time + h, trial, nodes, 6 * width);
    // Fifth order less fourth order.
    error = Math.abs(
      h *
        ((71 / 57600) * k1 -
          (71 / 16695) * k3 +
          (71 / 1920) * k4 -
          (17253 / 339200) * k5 +
          (22 / 525) * k6 -
          (1 / 40) * k7),
    );
  };

  /** Adds the step up; whether whoever watches has seen enough. */
  const accept = (next: number, nextValue: number): boolean => {
    for (let flow = 0; flow < sums.length; flow++) {
      const sum =
        (35 / 384) * (nodes[flow] ?? 0) +
        (500 / 1113) * (nodes[2 * width + flow] ?? 0) +
        (125 / 192) * (nodes[3 * width + flow] ?? 0) -
        (2187 / 6784) * (nodes[4 * width + flow] ?? 0) +
        (11 / 84) * (nodes[5 * width + flow] ?? 0);
      sums[flow] = (sums[flow] ?? 0) + h * sum;
    }
    return seen !== undefined && seen(time, value, k1, next, nextValue, k7);
  };

  while (time < end) {
    // Is the rest hardly longer than a step? Then it becomes one, so that no sliver is left.
    const toEnd = time + h * 1.01 >= end;
    if (toEnd) h = end - time;
    attempt();
    if (!(error <= tolerance) && h > least) {
      h = sized(h * Math.max(0.2, SAFETY * (tolerance / error) ** 0.2));
      if (!(h > least)) throw new RangeError(`step became ${h} s at ${time} s`);
      continue;
    }
    if (trial >= stopAt) {
      stopExactly();
      accept(time + h, stopAt);
      return { time: time + h, value: stopAt, reached: true };
    }
    const next = toEnd ? end : time + h;
    const enough = accept(next, trial);
    time = next;
    value = trial;
    k1 = k7;
    if (enough) break;
    // The flows at the end are those of the next start.
    nodes.copyWithin(0, 6 * width, 7 * width);
    const growth = error === 0 ? 5 : Math.min(5, SAFETY * (tolerance / error) ** 0.2);
    h = sized(Math.min(longestStep, h * growth));
  }
  return { time, value, reached: false };

  /** The largest of the sizes that is not above a step wished for. */
  function sized(wished: number): number {
    return (end - start) * 2 ** (-Math.ceil(SIZES * Math.log2((end - start) / wished) - 1e-6) / SIZES);
  }

  /** Shortens the step until it ends at `stopAt`: Newton with the slope at its end, kept between what is too short and what passes. */
  function stopExactly(): void {
    let short = 0;
    let passes = h;
    let guess = value < trial ? h * ((stopAt - value) / (trial - value)) : h;
    for (let tries = 0; tries < 60; tries++) {
      h = guess > short && guess < passes ? guess : (short + passes) / 2;
      attempt();
      const over = trial - stopAt;
      if (over >= 0) passes = h;
      else short = h;
      if (Math.abs(over) <= 1e-15 * Math.abs(stopAt) || passes - short <= 1e-15 * (1 + time)) return;
      guess = h - over / k7;
    }
  }
}
