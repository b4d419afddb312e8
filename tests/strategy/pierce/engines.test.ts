import path from 'node:path';
import { createContext, runInContext } from 'node:vm';
import { build } from 'esbuild';
import { describe, expect, it } from 'vitest';
import { pierceOutline, pierceStageDefaults, strategyPrediction } from '../../../strategy/pierce/index.ts';
import { FOUR_KILOWATT, NOZZLE_1_5, TEN_KILOWATT } from '../../support/machines.ts';
import { seededNumbers } from '../../bench/line.ts';
import { conditions, input, threeRamps } from './support.ts';

/** What the language leaves to the engine, and the computation uses. Sums, products, quotients and roots are exact everywhere. */
const LEFT_TO_ENGINE = ['exp', 'log', 'log1p', 'log2', 'pow', 'cbrt', 'hypot'] as const;

/**
 * The prediction as another engine would run it: in a realm of its own, without `**` so that powers can be got at, and with each of those
 * functions up to two units in the last place off, another way each time.
 */
async function otherEngine(seed: number) {
  const { outputFiles } = await build({
    entryPoints: [path.join(import.meta.dirname, '../../../strategy/pierce/index.ts')],
    bundle: true,
    write: false,
    format: 'iife',
    globalName: 'pierce',
    target: 'es2015',
  });
  const code = outputFiles[0]?.text ?? '';
  expect(code).not.toMatch(/[^*/]\*\*[^*/]/);
  const next = seededNumbers(seed);
  let asked = 0;
  const off = () => {
    asked += 1;
    return 1 + (Math.floor(5 * next()) - 2) * 1.1e-16;
  };
  const realm = createContext({ off, names: LEFT_TO_ENGINE });
  runInContext(
    'for (const name of names) { const exact = Math[name]; Math[name] = (...all) => exact(...all) * off(); }',
    realm,
  );
  runInContext(code, realm);
  return {
    asked: () => asked,
    /** What a function of the face gives there, as plain data. */
    call: (name: string, argument: unknown): unknown =>
      JSON.parse(String(runInContext(`JSON.stringify(pierce.${name}(${JSON.stringify(argument)}))`, realm))),
  };
}

/** Greatest difference between two answers of the same shape, relative to a thousandth at least; sentences must be the same. */
function difference(a: unknown, b: unknown): number {
  if (typeof a === 'number' && typeof b === 'number') return Math.abs(a - b) / Math.max(Math.abs(a), 1e-3);
  if (typeof a === 'object' && typeof b === 'object' && a !== null && b !== null) {
    expect(Object.keys(a)).toEqual(Object.keys(b));
    return Math.max(0, ...Object.entries(a).map(([name, one]) => difference(one, Reflect.get(b, name))));
  }
  expect(a).toEqual(b);
  return 0;
}

describe('two engines', () => {
  it('agree to 1e-9 on every number of a strategy, though their functions differ in the last place', async () => {
    const engine = await otherEngine(5);
    for (const [profile, mm] of [
      [TEN_KILOWATT, 20],
      [TEN_KILOWATT, 32],
      [FOUR_KILOWATT, 12],
    ] as const) {
      const asked = {
        stages: pierceStageDefaults(profile, mm * 1e-3),
        thickness: { min: mm * 0.9e-3, max: mm * 1e-3 },
        hottestPlateTemperature: 423.15,
        profile,
        nozzle: NOZZLE_1_5,
      };
      expect(difference(strategyPrediction(asked), engine.call('strategyPrediction', asked))).toBeLessThan(1e-9);
    }
    expect(engine.asked()).toBeGreaterThan(1000);
  });

  it('agree on hundreds of random pierces, in time, depth and heat', async () => {
    const engine = await otherEngine(6);
    const next = seededNumbers(9);
    for (let round = 0; round < 300; round++) {
      const powers = [500 + 500 * next(), 700 + 600 * next(), 1000 + 900 * next(), 1200 + 2500 * next()] as const;
      const set = conditions(800 + 3000 * next(), 20 + 400 * next(), 0.004 + 0.01 * next(), 1.5e5 * next());
      const stages = [...threeRamps(powers), { duration: 1 + 5 * next(), from: set, to: set }];
      const pierce = input(stages, { thickness: 0.006 + 0.03 * next(), plateTemperature: 263.15 + 300 * next() });
      expect(difference(pierceOutline(pierce), engine.call('pierceOutline', pierce)), `round ${round}`).toBeLessThan(
        1e-9,
      );
    }
  });
});
