import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  PIERCE_DEFAULTS,
  PIERCE_MODEL_VERSION,
  piercePredict,
  pierceParameterTable,
  routineTime,
  type PierceParameters,
  type PiercePrediction,
  type Stage,
  type StageQuantities,
} from '../../../strategy/pierce/index.ts';
import { NOZZLE_1_5, TEN_KILOWATT } from '../../support/machines.ts';
import {
  anyPlate,
  anyStages,
  anyThickness,
  conditions,
  continuous,
  held,
  input,
  threeRamps,
  throughAt,
} from './support.ts';

const RAMPS = threeRamps([500, 700, 1400, 2200]);

/** Thousands of random pierces go through the laws of a whole run. */
const MANY = { numRuns: 1000 };

/** Room for the step control where two runs take different steps. */
const SAME = 1e-7;

function numbersOf(value: unknown): readonly number[] {
  if (typeof value === 'number') return [value];
  if (typeof value !== 'object' || value === null) return [];
  return Object.values(value).flatMap(numbersOf);
}

describe('laws of the pierce', () => {
  it('a hotter plate is never through later', () => {
    fc.assert(
      fc.property(anyStages, anyThickness, anyPlate, anyPlate, (stages, thickness, a, b) => {
        const cold = piercePredict(input(stages, { thickness, plateTemperature: Math.min(a, b) }));
        const hot = piercePredict(input(stages, { thickness, plateTemperature: Math.max(a, b) }));
        expect(throughAt(hot.breakthrough)).toBeLessThanOrEqual(throughAt(cold.breakthrough) + SAME);
        expect(hot.perStage.at(-1)?.depthAtEnd ?? 0).toBeGreaterThanOrEqual(
          (cold.perStage.at(-1)?.depthAtEnd ?? 0) - SAME,
        );
      }),
      MANY,
    );
  });

  it('more power is never through later', () => {
    fc.assert(
      fc.property(anyStages, anyThickness, fc.double({ min: 1, max: 3, noNaN: true }), (stages, thickness, factor) => {
        const raised = (set: StageQuantities) => ({ ...set, peakPower: set.peakPower * factor });
        const more = stages.map((stage) => ({ ...stage, from: raised(stage.from), to: raised(stage.to) }));
        const plain = piercePredict(input(stages, { thickness }));
        const strong = piercePredict(input(more, { thickness }));
        expect(throughAt(strong.breakthrough)).toBeLessThanOrEqual(throughAt(plain.breakthrough) + SAME);
      }),
      MANY,
    );
  });

  it('a thicker plate is never through earlier', () => {
    fc.assert(
      fc.property(anyStages, anyThickness, anyThickness, (stages, a, b) => {
        const thin = piercePredict(input(stages, { thickness: Math.min(a, b) }));
        const thick = piercePredict(input(stages, { thickness: Math.max(a, b) }));
        expect(throughAt(thick.breakthrough)).toBeGreaterThanOrEqual(throughAt(thin.breakthrough) - SAME);
      }),
      MANY,
    );
  });

  it('what heat comes is what goes, to a millionth', () => {
    fc.assert(
      fc.property(anyStages, anyThickness, anyPlate, (stages, thickness, plateTemperature) => {
        const { ledger, energy, oxidationHeat, heatLeft } = piercePredict(
          input(stages, { thickness, plateTemperature }),
        );
        const came = ledger.absorbed + ledger.oxidation;
        const went = ledger.melt + ledger.superheat + ledger.conduction + ledger.pauses + ledger.wall;
        expect(Math.abs(came - went)).toBeLessThanOrEqual(1e-6 * came + 1e-9);
        expect(Math.min(...Object.values(ledger))).toBeGreaterThanOrEqual(0);
        expect(energy.absorbed).toBe(ledger.absorbed);
        expect(energy.absorbed).toBeLessThanOrEqual(energy.emitted * PIERCE_DEFAULTS.coupling * (1 + 1e-9));
        expect(oxidationHeat).toBe(ledger.oxidation);
        expect(heatLeft).toBeCloseTo(ledger.conduction + ledger.pauses + ledger.wall, 6);
      }),
      MANY,
    );
  });

  it('depth never goes back, and the trace ends where the routine does', () => {
    fc.assert(
      fc.property(anyStages, anyThickness, (stages, thickness) => {
        const { trace, breakthrough, routineTime: total } = piercePredict(input(stages, { thickness }));
        expect(trace.time).toHaveLength(trace.depth.length);
        expect(trace.time.length).toBeGreaterThanOrEqual(100);
        expect(trace.time.length).toBeLessThanOrEqual(200);
        expect(trace.time[0]).toBe(0);
        expect(trace.time.at(-1)).toBeCloseTo(total, 9);
        trace.time.forEach((time, index) => {
          if (index === 0) return;
          expect(time).toBeGreaterThan(trace.time[index - 1] ?? Number.NaN);
          expect(trace.depth[index]).toBeGreaterThanOrEqual(trace.depth[index - 1] ?? Number.NaN);
          if (breakthrough.kind === 'through' && time >= breakthrough.time) expect(trace.depth[index]).toBe(thickness);
        });
      }),
      MANY,
    );
  });

  it('the order of the answer holds: time of breakthrough lies in the stage that is named', () => {
    fc.assert(
      fc.property(anyStages, anyThickness, (stages, thickness) => {
        const { breakthrough } = piercePredict(input(stages, { thickness }));
        if (breakthrough.kind === 'none') return;
        const before = routineTime(stages.slice(0, breakthrough.stage));
        expect(breakthrough.time).toBeGreaterThanOrEqual(before);
        expect(breakthrough.time).toBeLessThanOrEqual(
          before + (stages[breakthrough.stage]?.duration ?? Number.NaN) + 1e-12,
        );
      }),
      MANY,
    );
  });

  it('a stage parted in two in the middle changes nothing', () => {
    const parted: readonly Stage[] = RAMPS.flatMap((stage) => {
      const middle = (from: number, to: number) => (from + to) / 2;
      const { from, to } = stage;
      const half: StageQuantities = {
        standoff: middle(from.standoff, to.standoff),
        focusPosition: middle(from.focusPosition, to.focusPosition),
        peakPower: middle(from.peakPower, to.peakPower),
        duty: middle(from.duty, to.duty),
        pulseFrequency: middle(from.pulseFrequency ?? 0, to.pulseFrequency ?? 0),
        oxygenPressure: middle(from.oxygenPressure, to.oxygenPressure),
      };
      return [
        { duration: stage.duration / 2, from, to: half },
        { duration: stage.duration / 2, from: half, to },
      ];
    });
    const whole = piercePredict(input(RAMPS));
    const halves = piercePredict(input(parted));
    expect(throughAt(halves.breakthrough)).toBeCloseTo(throughAt(whole.breakthrough), 7);
    expect(halves.energy.absorbed).toBeCloseTo(whole.energy.absorbed, 3);
    expect(halves.oxygenUsed).toBeCloseTo(whole.oxygenUsed, 9);
  });

  it('is plain JSON without a number that is none, whatever the stages', () => {
    fc.assert(
      fc.property(anyStages, anyThickness, anyPlate, (stages, thickness, plateTemperature) => {
        const prediction = piercePredict(input(stages, { thickness, plateTemperature }));
        for (const value of numbersOf(prediction)) expect(Number.isFinite(value)).toBe(true);
        expect(JSON.parse(JSON.stringify(prediction))).toEqual(prediction);
        expect(prediction.modelVersion).toBe(PIERCE_MODEL_VERSION);
      }),
    );
  });

  it('says the same each time it is asked', () => {
    expect(piercePredict(input(RAMPS))).toEqual(piercePredict(input(RAMPS)));
  });
});

describe('each of the six quantities acts', () => {
  const hold: StageQuantities = conditions(1600, 150, 0.006, 0.6e5);
  const through = (changed: Partial<StageQuantities>) => {
    const set = { ...hold, ...changed };
    return throughAt(piercePredict(input([{ duration: 60, from: set, to: set }], { thickness: 0.015 })).breakthrough);
  };
  const usual = through({});

  it('peak power and duty: more light, sooner through', () => {
    expect(through({ peakPower: hold.peakPower * 1.1 })).toBeLessThan(usual * 0.95);
    expect(through({ duty: hold.duty * 1.1 })).toBeLessThan(usual * 0.95);
  });

  it('oxygen pressure: more oxygen at the bottom burns more', () => {
    expect(through({ oxygenPressure: 1.5e5 })).toBeLessThan(usual);
    expect(through({ oxygenPressure: 0.1e5 })).toBeGreaterThan(usual * 1.02);
    expect(through({ oxygenPressure: 0 })).toBeGreaterThan(usual * 1.2);
  });

  it('standoff: a nozzle far away brings less oxygen into the bore', () => {
    expect(through({ standoff: 0.02 })).toBeGreaterThan(usual);
    expect(through({ standoff: 0.001 })).toBeLessThan(usual);
  });

  it('focus: a wide beam at the top makes a wide, slow bore', () => {
    expect(through({ focusPosition: 0.012 })).toBeGreaterThan(usual * 1.1);
  });

  it('frequency: long pauses freeze the bottom, short pulses never reach their peak', () => {
    expect(through({ pulseFrequency: 20 })).toBeGreaterThan(usual * 1.1);
    expect(through({ pulseFrequency: 5000 })).toBeGreaterThan(usual * 1.1);
  });

  it('more stages of higher power make a wider crater and come nearer to erupting', () => {
    const gentle = piercePredict(input(held(600, 5)));
    const flat = piercePredict(input(continuous(held(1500, 5))));
    const brute = piercePredict(input(continuous(held(4000, 5))));
    expect(gentle.perStage[0]?.eruptionIndex ?? 9).toBeLessThan(PIERCE_DEFAULTS.eruptionLimit);
    expect(flat.perStage[0]?.eruptionIndex ?? 0).toBeGreaterThan(PIERCE_DEFAULTS.eruptionLimit);
    expect(brute.perStage[0]?.eruptionIndex ?? 0).toBeGreaterThan(2 * PIERCE_DEFAULTS.eruptionLimit);
    expect(flat.craterRadius).toBeGreaterThan(gentle.craterRadius);
    expect(brute.craterRadius).toBeGreaterThan(flat.craterRadius);
  });
});

describe('no parameter is idle', () => {
  const answer = (parameters: Partial<PierceParameters>): PiercePrediction => {
    const slow = conditions(900, 40, 0.01, 0.3e5);
    const stages: readonly Stage[] = [{ duration: 2, from: { ...slow, focusPosition: 0.008 }, to: slow }, ...RAMPS];
    return piercePredict(input(stages, { parameters }));
  };

  it.each(pierceParameterTable.map((row) => [row.name, row] as const))('%s changes the prediction', (name, row) => {
    const low = answer({ [name]: row.min + 0.4 * (row.default - row.min) });
    const high = answer({ [name]: row.default + 0.4 * (row.max - row.default) });
    expect(row.default).toBeGreaterThanOrEqual(row.min);
    expect(row.default).toBeLessThanOrEqual(row.max);
    expect(low).not.toEqual(high);
    expect(row.meaning).not.toBe('');
    expect(row.origin).not.toBe('');
  });
});

describe('a prediction is refused', () => {
  it.each<[string, () => unknown, RegExp]>([
    ['without a stage', () => piercePredict(input([])), /at least one stage/],
    [
      'for a stage that takes no time',
      () => piercePredict(input(RAMPS.map((s) => ({ ...s, duration: 0 })))),
      /stages\[0\]\.duration: Duration 0 s is outside/,
    ],
    ['for a thickness of zero', () => piercePredict(input(RAMPS, { thickness: 0 })), /thickness 0 m is outside/],
    [
      'for a thickness that is no number',
      () => piercePredict(input(RAMPS, { thickness: Number.NaN })),
      /thickness NaN m/,
    ],
    [
      'for a plate hotter than 600 °C',
      () => piercePredict(input(RAMPS, { plateTemperature: 1000 })),
      /plate temperature 1000 K/,
    ],
    [
      'for a parameter outside its table',
      () => piercePredict(input(RAMPS, { parameters: { coupling: 0.95 } })),
      /coupling 0.95 is outside/,
    ],
    [
      'for a parameter that is no number',
      () => piercePredict(input(RAMPS, { parameters: { boreRadius: Number.NaN } })),
      /boreRadius NaN/,
    ],
    [
      'when burning would all but feed itself',
      () => piercePredict(input(RAMPS, { parameters: { burntShare: 0.45, expulsionHeat: 0.2e6 } })),
      /leaves .* J\/kg to the laser/,
    ],
    [
      'for a nozzle without a hole',
      () => piercePredict(input(RAMPS, { nozzle: { ...NOZZLE_1_5, diameter: 0 } })),
      /nozzle diameter 0 m/,
    ],
    [
      'for a source that never rises',
      () =>
        piercePredict(
          input(RAMPS, { profile: { ...TEN_KILOWATT, source: { ...TEN_KILOWATT.source, riseTime: Number.NaN } } }),
        ),
      /rise time NaN s/,
    ],
    [
      'for optics that are none',
      () =>
        piercePredict(input(RAMPS, { profile: { ...TEN_KILOWATT, optics: { ...TEN_KILOWATT.optics, halfAngle: 0 } } })),
      /halfAngle 0/,
    ],
  ])('%s', (_, act, message) => {
    expect(act).toThrow(RangeError);
    expect(act).toThrow(message);
  });
});

describe('a stall on the way', () => {
  it('is reported when a later stage with more power gets the bottom moving again', () => {
    const stages = [...held(700, 12), ...held(3000, 10)];
    const { stalls, breakthrough } = piercePredict(input(stages));
    expect(breakthrough.kind).toBe('through');
    expect(stalls).toHaveLength(1);
    expect(stalls[0]?.stage).toBe(0);
    expect((stalls[0]?.time ?? 0) + (stalls[0]?.duration ?? 0)).toBeCloseTo(12, 6);
  });

  it('begins at once when the first stage is too weak to melt at all', () => {
    const { stalls, perStage } = piercePredict(input(held(300, 4)));
    expect(perStage[0]?.depthAtEnd).toBe(0);
    expect(stalls[0]).toMatchObject({ stage: 0, time: 0, depth: 0 });
    expect(stalls[0]?.duration).toBeCloseTo(4, 9);
  });
});

describe('a double nozzle', () => {
  it('keeps the jet together and is never through later than a single one', () => {
    const single = piercePredict(input(RAMPS));
    const double = piercePredict(input(RAMPS, { nozzle: { type: 'double', diameter: 0.0015 } }));
    expect(throughAt(double.breakthrough)).toBeLessThan(throughAt(single.breakthrough));
  });
});
