import { describe, expect, it } from 'vitest';
import { pierceSensitivity, pierceStageDefaults, strategyPrediction } from '../../../strategy/pierce/index.ts';
import { NOZZLE_1_5, TEN_KILOWATT } from '../../support/machines.ts';
import { held } from './support.ts';

const base = {
  thickness: { min: 0.018, max: 0.02 },
  hottestPlateTemperature: 423.15,
  profile: TEN_KILOWATT,
  nozzle: NOZZLE_1_5,
};

describe('what the reserve bears', () => {
  const input = { ...base, stages: pierceStageDefaults(TEN_KILOWATT, 0.02) };
  const rows = pierceSensitivity(input);
  const change = (id: string) => rows.find((row) => row.id === id)?.change ?? Number.NaN;

  it('as set and on the hot plate it is the reserve of the prediction', () => {
    const { cold, hot } = strategyPrediction(input);
    expect(rows.find(({ id }) => id === 'as-set')?.reserve).toEqual(cold.reserve);
    expect(rows.find(({ id }) => id === 'hot-plate')?.reserve).toEqual(hot.reserve);
    expect(change('as-set')).toBe(0);
  });

  it('less light, a worn nozzle and a thicker plate cost reserve; more light and a hot plate bring some', () => {
    for (const id of ['coupling-down', 'worn-nozzle', 'thicker']) expect(change(id)).toBeLessThan(0);
    for (const id of ['coupling-up', 'hot-plate']) expect(change(id)).toBeGreaterThan(0);
    expect(change('coupling-up')).toBeLessThan(-change('coupling-down'));
  });

  it('has no change to tell where the pierce is not through', () => {
    const weak = pierceSensitivity({ ...base, stages: held(900, 20) });
    expect(weak.map((row) => row.change)).toEqual([null, null, null, null, null, null]);
    expect(weak[0]?.reserve).toEqual({ kind: 'none', why: 'Not through.' });
  });

  it('keeps within what parameters and plates may be', () => {
    const extreme = { ...base, thickness: { min: 0.05, max: 0.06 }, parameters: { coupling: 0.9, jetSpread: 0.4 } };
    expect(pierceSensitivity({ ...extreme, stages: held(9000, 60) })).toHaveLength(6);
  });
});
