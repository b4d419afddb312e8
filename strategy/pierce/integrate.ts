/**
 * Dormand–Prince 5(4) with error control on the first component. Our own since the ODE packages at hand come without types.
 * Coefficients: Hairer, Nørsett, Wanner, Solving Ordinary Differential Equations I, 2nd ed., table II.5.2 (from memory; the
 * order is proven by test).
 */

/** Fills `slope` with the derivative at (time, state). Must not keep either array. */
export type Derivative = (time: number, state: Float64Array, slope: Float64Array) => void;

/** What is asked after every accepted step. */
export type StepWatch = {
  /** Called with the step's ends and the slopes there; arrays are reused, copy what is kept. */
  readonly step: (
    start: number,
    startState: Float64Array,
    startSlope: Float64Array,
    end: number,
    endState: Float64Array,
    endSlope: Float64Array,
  ) => void;
};

export type IntegrateOptions = {
  /** Error of the first component allowed for one step, in its own unit. */
  readonly tolerance: number;
  readonly firstStep: number;
  /** Longest step, so that what is watched between steps is not missed. */
  readonly longestStep: number;
  /** Value of the first component at which to stop exactly. */
  readonly stopAt: number;
};

/** Where the integration came to an end: at `stopAt` (`reached`) or at the end of the time asked for. */
export type IntegrateResult = { readonly time: number; readonly reached: boolean };

const NODES = [0, 1 / 5, 3 / 10, 4 / 5, 8 / 9, 1, 1] as const;
const TABLEAU: readonly (readonly number[])[] = [
  [],
  [1 / 5],
  [3 / 40, 9 / 40],
  [44 / 45, -56 / 15, 32 / 9],
  [19372 / 6561, -25360 / 2187, 64448 / 6561, -212 / 729],
  [9017 / 3168, -355 / 33, 46732 / 5247, 49 / 176, -5103 / 18656],
  [35 / 384, 0, 500 / 1113, 125 / 192, -2187 / 6784, 11 / 84],
];
/** Fifth order less fourth order: the error estimate. */
const ERROR_WEIGHTS = [71 / 57600, 0, -71 / 16695, 71 / 1920, -17253 / 339200, 22 / 525, -1 / 40] as const;

const SAFETY = 0.9;
const STAGES = 7;
/** A step this much smaller than the span means that the derivative is not what it should be. */
const LEAST_STEP_SHARE = 1e-12;

/**
 * Carries `state` (changed in place) from `start` to `end` or until its first component reaches `stopAt`, whichever is first.
 * Deterministic: no clock, no chance. RangeError when the step would have to become vanishingly small.
 */
export function integrate(
  derivative: Derivative,
  state: Float64Array,
  start: number,
  end: number,
  options: IntegrateOptions,
  watch: StepWatch,
): IntegrateResult {
  const size = state.length;
  const slopes = Array.from({ length: STAGES }, () => new Float64Array(size));
  const trial = new Float64Array(size);
  const [first] = slopes;
  const last = slopes[STAGES - 1];
  if (first === undefined || last === undefined) throw new RangeError('no room for slopes');

  /** One step of size h from (time, state) into `trial`; the estimated error of the first component. */
  const attempt = (time: number, h: number): number => {
    for (let s = 1; s < STAGES; s++) {
      const weights = TABLEAU[s] ?? [];
      const slope = slopes[s];
      if (slope === undefined) continue;
      for (let i = 0; i < size; i++) {
        let sum = 0;
        for (let j = 0; j < weights.length; j++) sum += (weights[j] ?? 0) * (slopes[j]?.[i] ?? 0);
        trial[i] = (state[i] ?? 0) + h * sum;
      }
      derivative(time + (NODES[s] ?? 0) * h, trial, slope);
    }
    let error = 0;
    for (let s = 0; s < STAGES; s++) error += (ERROR_WEIGHTS[s] ?? 0) * (slopes[s]?.[0] ?? 0);
    return Math.abs(h * error);
  };

  let time = start;
  let h = Math.min(options.firstStep, options.longestStep, end - start);
  derivative(time, state, first);
  while (time < end) {
    // Is the rest hardly longer than a step? Then it becomes one, so that no sliver is left.
    if (time + h * 1.01 >= end) h = end - time;
    const error = attempt(time, h);
    if (!(error <= options.tolerance) && h > (end - start) * LEAST_STEP_SHARE) {
      h *= Math.max(0.2, SAFETY * (options.tolerance / error) ** 0.2);
      if (!(h > (end - start) * LEAST_STEP_SHARE)) throw new RangeError(`step became ${h} s at ${time} s`);
      continue;
    }
    if ((trial[0] ?? 0) >= options.stopAt) {
      h = stepTo(options.stopAt, time, h);
      attempt(time, h);
      watch.step(time, state, first, time + h, trial, last);
      state.set(trial);
      return { time: time + h, reached: true };
    }
    const next = time + h >= end ? end : time + h;
    watch.step(time, state, first, next, trial, last);
    state.set(trial);
    first.set(last);
    time = next;
    const growth = error === 0 ? 5 : Math.min(5, SAFETY * (options.tolerance / error) ** 0.2);
    h = Math.min(options.longestStep, h * growth);
  }
  return { time: end, reached: false };

  /** Size of the step that ends with the first component at `target`, given that one of size `long` passes it. */
  function stepTo(target: number, time0: number, long: number): number {
    let low = 0;
    let lowValue = (state[0] ?? 0) - target;
    let high = long;
    let highValue = (trial[0] ?? 0) - target;
    let lastSide = 0;
    // Regula falsi that halves the value of an end kept twice (Illinois): six to ten tries down to rounding.
    for (let tries = 0; tries < 60 && highValue > 0 && high - low > 1e-15 * (1 + time0); tries++) {
      const guess = high - (highValue * (high - low)) / (highValue - lowValue);
      const inside = guess > low && guess < high ? guess : (low + high) / 2;
      attempt(time0, inside);
      const value = (trial[0] ?? 0) - target;
      if (value >= 0) {
        high = inside;
        highValue = value;
        if (lastSide === 1) lowValue /= 2;
        lastSide = 1;
      } else {
        low = inside;
        lowValue = value;
        if (lastSide === -1) highValue /= 2;
        lastSide = -1;
      }
    }
    return high;
  }
}
