import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  pierceInterval,
  pierceOutline,
  pierceParameterTable,
  pierceStageDefaults,
  strategyPrediction,
  type PierceFit,
  type PierceParameterName,
  type PierceParameters,
} from '../../../strategy/pierce/index.ts';
import { toleranceFactor } from '../../../strategy/pierce/tolerance-factor.ts';
import { NOZZLE_1_5, TEN_KILOWATT } from '../../support/machines.ts';
import { seededNumbers } from '../../bench/line.ts';
import { held, input } from './support.ts';

const STAGES = pierceStageDefaults(TEN_KILOWATT, 0.02);
const PIERCE = input(STAGES, { thickness: 0.02 });

/** Three parameters that test cuts would fit, correlated as the first two are: more coupling looks like less fading. */
const FIT: PierceFit = {
  parameters: { coupling: 0.44, attenuationLength: 0.017, boreRadius: 0.8e-3 },
  names: ['coupling', 'attenuationLength', 'boreRadius'],
  covariance: [
    [0.0025, -0.002, 0.0005],
    [-0.002, 0.005, 0],
    [0.0005, 0, 0.0015],
  ],
  coverage: 1.959964,
  trials: { count: 5, scatter: 0.03 },
};

function rowOf(name: PierceParameterName) {
  const row = pierceParameterTable.find((one) => one.name === name);
  if (row === undefined) throw new Error(name);
  return row;
}

/** Lower triangle L with L·Lᵀ the covariance (Cholesky). */
function rootOfMatrix(matrix: readonly (readonly number[])[]): number[][] {
  const root = matrix.map((row) => row.map(() => 0));
  const at = (i: number, j: number) => root[i]?.[j] ?? 0;
  matrix.forEach((row, i) => {
    for (let j = 0; j <= i; j++) {
      let sum = row[j] ?? 0;
      for (let k = 0; k < j; k++) sum -= at(i, k) * at(j, k);
      const target = root[i];
      if (target !== undefined) target[j] = i === j ? Math.sqrt(sum) : sum / at(j, j);
    }
  });
  return root;
}

/** Times of breakthrough for parameters drawn from the fit, in order. */
function drawn({ parameters, names, covariance }: PierceFit, count: number): number[] {
  const next = seededNumbers(7);
  const normal = () => Math.sqrt(-2 * Math.log(1 - next())) * Math.cos(2 * Math.PI * next());
  const root = rootOfMatrix(covariance);
  return Array.from({ length: count }, () => {
    const dice = names.map(normal);
    const changed: Partial<Record<PierceParameterName, number>> = {};
    names.forEach((name, i) => {
      const { min, max } = rowOf(name);
      const value = parameters[name] ?? Number.NaN;
      const by = (root[i] ?? []).reduce((sum, entry, j) => sum + entry * (dice[j] ?? 0), 0);
      changed[name] = min + (max - min) / (1 + Math.exp(-Math.log((value - min) / (max - value)) - by));
    });
    const all: Partial<PierceParameters> = { ...parameters, ...changed };
    return pierceOutline({ ...PIERCE, parameters: all }).breakthroughTime ?? Number.POSITIVE_INFINITY;
  }).sort((a, b) => a - b);
}

function ok(fit: PierceFit, pierce = PIERCE) {
  const interval = pierceInterval(pierce, fit);
  if (interval.kind === 'none') throw new Error(interval.why);
  return interval;
}

describe('the interval of a fitted model', () => {
  const share = (times: readonly number[], of: (time: number) => boolean) => times.filter(of).length / times.length;

  it.each<[string, number, number]>([
    ['as sure as a few test cuts make it', 1, 2000],
    ['twice as sure', 1 / 4, 2000],
  ])('%s, leaves out as many of the times drawn from the fit as it says, at either end', (_, factor, count) => {
    const fit = { ...FIT, covariance: FIT.covariance.map((row) => row.map((entry) => entry * factor)) };
    const times = drawn(fit, count);
    const { breakthrough } = ok(fit);
    const before = share(times, (time) => time < (breakthrough.least ?? 0));
    const after = share(times, (time) => time > (breakthrough.most ?? Number.POSITIVE_INFINITY));
    // 2.5 % at either end; by chance it is off by 0.35 % in the mean of 2000.
    for (const left of [before, after]) {
      expect(left).toBeGreaterThan(0.012);
      expect(left).toBeLessThan(0.04);
    }
  });

  it('is as wide as the deviation of what is drawn once the fit is so sure that the model is straight', () => {
    const sure = { ...FIT, covariance: FIT.covariance.map((row) => row.map((entry) => entry / 100)) };
    const times = drawn(sure, 2000);
    const mean = times.reduce((sum, one) => sum + one, 0) / times.length;
    const deviation = Math.sqrt(times.reduce((sum, one) => sum + (one - mean) ** 2, 0) / (times.length - 1));
    const { breakthrough } = ok(sure);
    const width = (breakthrough.most ?? 0) - (breakthrough.least ?? 0);
    // The deviation of 2000 draws is itself uncertain by 1.6 %.
    expect(Math.abs(width / (2 * FIT.coverage * deviation) - 1)).toBeLessThan(0.05);
  });

  it('lies about the prediction, grows with what it must hold, and is nothing when the fit is sure', () => {
    const time = pierceOutline({ ...PIERCE, parameters: FIT.parameters }).breakthroughTime ?? Number.NaN;
    const { breakthrough, reserve } = ok(FIT);
    const routine = STAGES.reduce((sum, { duration }) => sum + duration, 0);
    expect(breakthrough.least).toBeLessThan(time);
    expect(breakthrough.most).toBeGreaterThan(time);
    expect(reserve.least).toBeCloseTo(routine / (breakthrough.most ?? 0), 12);
    expect(reserve.most).toBeCloseTo(routine / (breakthrough.least ?? 0), 12);
    const narrow = ok({ ...FIT, coverage: 1 }).breakthrough;
    expect(narrow.least).toBeGreaterThan(breakthrough.least ?? 0);
    expect(narrow.most).toBeLessThan(breakthrough.most ?? 0);
    const sure = ok({ ...FIT, covariance: FIT.covariance.map((row) => row.map(() => 0)) });
    expect(sure.breakthrough).toEqual({ least: time, most: time });
  });

  it('does not depend on the order in which the fit names its parameters', () => {
    const turned: PierceFit = {
      ...FIT,
      names: [...FIT.names].reverse(),
      covariance: FIT.covariance.map((row) => [...row].reverse()).reverse(),
    };
    const [a, b] = [ok(FIT), ok(turned)];
    expect(b.breakthrough.least).toBeCloseTo(a.breakthrough.least ?? 0, 9);
    expect(b.breakthrough.most).toBeCloseTo(a.breakthrough.most ?? 0, 9);
  });

  it('has no latest moment where a bottom that takes up less light stalls before it is through', () => {
    const unsure = { ...FIT, covariance: FIT.covariance.map((row) => row.map((entry) => 36 * entry)) };
    const { breakthrough, reserve } = ok(unsure);
    expect(breakthrough.most).toBeNull();
    expect(reserve.least).toBeNull();
    expect(share(drawn(unsure, 1000), (time) => time === Number.POSITIVE_INFINITY)).toBeGreaterThan(0.025);
  });

  it('has no end where the hole would not be through within the routine', () => {
    const time = pierceOutline({ ...PIERCE, parameters: FIT.parameters }).breakthroughTime ?? Number.NaN;
    const [last] = STAGES.slice(-1);
    if (last === undefined) throw new Error('no stage');
    const before = STAGES.slice(0, -1).reduce((sum, { duration }) => sum + duration, 0);
    const short = [...STAGES.slice(0, -1), { ...last, duration: time * 1.001 - before }];
    const { breakthrough, reserve, slowest } = ok(FIT, { ...PIERCE, stages: short });
    expect(breakthrough.most).toBeNull();
    expect(reserve.least).toBeNull();
    expect(breakthrough.least).toBeLessThan(time);
    expect(slowest).toEqual({ breakthrough: null, reserve: null });
  });

  it('says by when all but a few are through, from the scatter of the trials, and nothing without trials', () => {
    const time = pierceOutline({ ...PIERCE, parameters: FIT.parameters }).breakthroughTime ?? Number.NaN;
    expect(ok(FIT).slowest?.breakthrough).toBeCloseTo(time * Math.exp(4.202680741 * 0.03), 6);
    expect(ok({ ...FIT, trials: null }).slowest).toBeNull();
  });

  it('cannot be said where the hole is not through, or where a value stands at the end of its range', () => {
    expect(pierceInterval(input(held(700, 8)), FIT)).toMatchObject({ kind: 'none', why: /not through/ });
    const atEnd = { ...FIT, parameters: { ...FIT.parameters, coupling: 0.9 } };
    expect(pierceInterval(PIERCE, atEnd)).toMatchObject({ kind: 'none', why: /took coupling to the end of its range/ });
  });

  it.each<[string, Partial<PierceFit>, RegExp]>([
    ['a covariance of another size', { covariance: [[1]] }, /not 3 by 3/],
    [
      'a covariance that is not the same both ways',
      {
        covariance: [
          [1, 2, 0],
          [0, 1, 0],
          [0, 0, 1],
        ],
      },
      /of coupling and attenuationLength differ/,
    ],
    [
      'a negative variance',
      {
        covariance: [
          [-1, 0, 0],
          [0, 1, 0],
          [0, 0, 1],
        ],
      },
      /variance -1 of coupling/,
    ],
    [
      'a number that is none',
      {
        covariance: [
          [Number.NaN, 0, 0],
          [0, 1, 0],
          [0, 0, 1],
        ],
      },
      /NaN/,
    ],
    [
      'no matrix of any spread',
      {
        covariance: [
          [1, -9, 0],
          [-9, 1, 0],
          [0, 0, 0],
        ],
      },
      /gives a variance of -/,
    ],
    ['a name given twice', { names: ['coupling', 'coupling', 'boreRadius'] }, /twice/],
    ['a name without a value', { names: ['coupling', 'attenuationLength', 'wallShare'] }, /no value for wallShare/],
    ['a coverage of nothing', { coverage: 0 }, /coverage 0/],
    ['a scatter below nothing', { trials: { count: 5, scatter: -1 } }, /scatter -1/],
    ['a single trial', { trials: { count: 1, scatter: 0.1 } }, /1 trials/],
  ])('is refused for %s', (_, changed, message) => {
    expect(() => pierceInterval(PIERCE, { ...FIT, ...changed })).toThrow(RangeError);
    expect(() => pierceInterval(PIERCE, { ...FIT, ...changed })).toThrow(message);
  });

  it('comes with the prediction of a strategy, for the cold and the hot plate, and is null without a fit', () => {
    const asked = {
      stages: STAGES,
      thickness: { min: 0.018, max: 0.02 },
      hottestPlateTemperature: 423.15,
      profile: TEN_KILOWATT,
      nozzle: NOZZLE_1_5,
    };
    const plain = strategyPrediction(asked);
    expect([plain.cold.interval, plain.hot.interval]).toEqual([null, null]);
    const fitted = strategyPrediction({ ...asked, fit: FIT });
    expect(fitted.cold.interval).toEqual(pierceInterval(PIERCE, FIT));
    expect(fitted.hot.interval).toEqual(pierceInterval({ ...PIERCE, plateTemperature: 423.15 }, FIT));
    expect(fitted.cold.breakthrough).toEqual(
      strategyPrediction({ ...asked, parameters: FIT.parameters }).cold.breakthrough,
    );
    expect(JSON.parse(JSON.stringify(fitted))).toEqual(fitted);
  });
});

describe('a tolerance factor', () => {
  it('falls with more trials, towards the quantile itself, and grows with what it must cover', () => {
    expect(toleranceFactor(10_000)).toBeGreaterThan(1.6448);
    expect(toleranceFactor(10_000)).toBeLessThan(1.69);
    fc.assert(
      fc.property(fc.integer({ min: 2, max: 60 }), fc.double({ min: 0.5, max: 0.98, noNaN: true }), (n, share) => {
        expect(toleranceFactor(n + 1, share)).toBeLessThan(toleranceFactor(n, share));
        expect(toleranceFactor(n, share + 0.01)).toBeGreaterThan(toleranceFactor(n, share));
        expect(toleranceFactor(n, share, 0.9)).toBeLessThan(toleranceFactor(n, share, 0.95));
      }),
      { numRuns: 6 },
    );
  });

  it('is refused for one trial, half a trial, and for what is certain', () => {
    expect(() => toleranceFactor(1)).toThrow(/1 trials/);
    expect(() => toleranceFactor(2.5)).toThrow(/2.5 trials/);
    expect(() => toleranceFactor(5, 1)).toThrow(/share 1/);
    expect(() => toleranceFactor(5, 0.95, Number.NaN)).toThrow(/confidence NaN/);
  });
});
