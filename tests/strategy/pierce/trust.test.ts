import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  PIERCE_DEFAULTS,
  pierceMechanismTable,
  pierceOutline,
  piercePredict,
  pierceWarmth,
  leadInNeeded,
  oxygenMassFlow,
  peakRiseAroundLine,
  type PierceParameters,
  type Stage,
  type StageQuantities,
} from '../../../strategy/pierce/index.ts';
import {
  BORE_RADIUS,
  BOTTOM_LIGHT,
  boreMoment,
  boreMomentEmpty,
  boreMomentThrough,
  boreOf,
  boreRamp,
  boreSetAt,
  CONDUCTION,
  CRATER,
  EXPULSION,
  FLOWS,
  MELT,
  OXIDATION,
  PAUSES,
  SET_SIZE,
  WALL,
  WALL_LIGHT,
} from '../../../strategy/pierce/bore.ts';
import { pierceParameters } from '../../../strategy/pierce/parameters.ts';
import {
  heatingEnthalpy,
  HOT_DIFFUSIVITY,
  IRON_MELTING_TEMPERATURE,
  meltingEnthalpy,
  oxidation,
  STEEL_DENSITY,
  steelSpecificHeat,
} from '../../../strategy/steel/index.ts';
import { NOZZLE_1_5, TEN_KILOWATT } from '../../support/machines.ts';
import { seededNumbers } from '../../bench/line.ts';
import { movingDisk } from './moving-disk.ts';
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

describe('what the bottom conducts away', () => {
  it('is four times k·a·ΔT from a still disk on the surface, as the grid has it', () => {
    const grid = movingDisk(0, 0, 0.02);
    expect(grid.imbalance).toBeLessThan(1e-9);
    expect(Math.abs(grid.netHeat / 4 - 1)).toBeLessThan(0.02);
  });

  it.each([
    ['on the surface', 0, 0.1],
    ['two radii down', 2, 0.1],
    ['deep in its bore', 20, 0.1],
  ])('%s stays within a tenth of the model from rest to Péclet 2', (_, depth, within) => {
    const model = 4 + PIERCE_DEFAULTS.deepConduction * (1 - Math.exp(-depth));
    for (const peclet of [0, 0.3, 1, 2]) {
      // The rim's singularity makes the error fall as the cell to the power 2/3 below a bore and 1 on the surface.
      const [coarse, fine] = [movingDisk(peclet, depth, 0.08).netHeat, movingDisk(peclet, depth, 0.04).netHeat];
      const order = depth === 0 ? 1 : 2 / 3;
      const limit = fine + (fine - coarse) / (2 ** order - 1);
      expect(Math.abs(limit / model - 1), `Péclet ${peclet}: ${limit} against ${model}`).toBeLessThan(within);
    }
  });
});

/** The same balance carried by classical Runge–Kutta in equal steps from stage to stage. */
function inEqualSteps(stages: readonly Stage[], stepsPerStage: number): number {
  const bore = boreOf(TEN_KILOWATT, NOZZLE_1_5, 293.15, PIERCE_DEFAULTS);
  const set = new Float64Array(SET_SIZE);
  const ramp = new Float64Array(2 * SET_SIZE);
  const moment = boreMomentEmpty();
  let depth = 0;
  for (const stage of stages) {
    boreRamp(ramp, stage);
    const speed = (part: number, at: number) => {
      boreSetAt(set, ramp, part);
      return boreMoment(bore, set, at, moment);
    };
    const h = stage.duration / stepsPerStage;
    for (let i = 0; i < stepsPerStage; i++) {
      const k1 = speed(i / stepsPerStage, depth);
      const k2 = speed((i + 0.5) / stepsPerStage, depth + (h / 2) * k1);
      const k3 = speed((i + 0.5) / stepsPerStage, depth + (h / 2) * k2);
      const k4 = speed((i + 1) / stepsPerStage, depth + h * k3);
      depth += (h / 6) * (k1 + 2 * k2 + 2 * k3 + k4);
    }
  }
  return depth;
}

describe('the predictor’s own error', () => {
  it('is below a nanometre of depth, as a sixteen times halved step of another method shows', () => {
    // Without a kink inside a stage, so that the other method keeps its order.
    const smooth = continuous(threeRamps([500, 700, 1400, 2200]));
    const coarse = inEqualSteps(smooth, 64);
    const fine = inEqualSteps(smooth, 128);
    const finest = inEqualSteps(smooth, 2048);
    expect(Math.log2(Math.abs(coarse - finest) / Math.abs(fine - finest))).toBeGreaterThan(3.5);
    const { depth } = pierceOutline(input(smooth, { thickness: 0.05 }));
    expect(Math.abs(depth - finest)).toBeLessThan(1e-9);
  });

  it('does not part by more than 1e-9 where two engines round differently', () => {
    fc.assert(
      fc.property(anyStages, anyThickness, fc.constantFrom(1 + 2e-16, 1 - 2e-16), (stages, thickness, rounding) => {
        const nudged = stages.map((stage) => ({
          ...stage,
          from: { ...stage.from, peakPower: stage.from.peakPower * rounding },
          to: { ...stage.to, standoff: stage.to.standoff * rounding },
        }));
        const plain = pierceOutline(input(stages, { thickness }));
        const other = pierceOutline(input(nudged, { thickness }));
        expect(Math.abs(other.depth - plain.depth)).toBeLessThan(1e-9);
        expect(Math.abs(other.craterRadius - plain.craterRadius)).toBeLessThan(1e-9);
        expect(Math.abs(other.heatLeft / plain.heatLeft - 1)).toBeLessThan(1e-9);
      }),
      { numRuns: 400 },
    );
  });

  it('gives the same numbers with and without a trace', () => {
    fc.assert(
      fc.property(anyStages, anyThickness, anyPlate, (stages, thickness, plateTemperature) => {
        const whole = piercePredict(input(stages, { thickness, plateTemperature }));
        const outline = pierceOutline(input(stages, { thickness, plateTemperature }));
        expect(outline.breakthroughTime ?? Number.POSITIVE_INFINITY).toBe(throughAt(whole.breakthrough));
        expect(outline.ledger).toEqual(whole.ledger);
        expect(outline.craterRadius).toBe(whole.craterRadius);
        expect(outline.oxygenUsed).toBe(whole.oxygenUsed);
        expect(outline.heatLeft).toBe(whole.heatLeft);
        expect(outline.eruptionIndex).toBe(Math.max(...whole.perStage.map((stage) => stage.eruptionIndex)));
      }),
    );
  });
});

/** Ramps from one mean power to the next at 60 Hz, which leaves pauses that freeze the bottom; with standoff, focus and pressure on their way too. */
function rampsThrough(powers: readonly number[], duration: () => number): readonly Stage[] {
  const last = powers.length - 1;
  const knots = powers.map((power, i) => ({
    ...conditions(power, 60, 0.01 - (0.006 * i) / last, 0.4e5 + (0.4e5 * i) / last),
    focusPosition: 0.005 - (0.002 * i) / last,
  }));
  return knots.slice(1).flatMap((to, i) => {
    const from = knots[i];
    return from === undefined ? [] : [{ duration: duration(), from, to }];
  });
}

/**
 * Every part of the ledger as an integral of its own, J: the depth by classical Runge–Kutta in equal steps, then each flow by Simpson's
 * rule over them with the depth in their middle from the cubic through both ends. What balances in every moment need not balance so.
 */
function partsOf(stages: readonly Stage[], through: number | null, thickness: number) {
  const bore = boreOf(TEN_KILOWATT, NOZZLE_1_5, 293.15, PIERCE_DEFAULTS);
  const set = new Float64Array(SET_SIZE);
  const ramp = new Float64Array(2 * SET_SIZE);
  const moment = boreMomentEmpty();
  const sums = new Float64Array(FLOWS);
  let depth = 0;
  let start = 0;
  for (const stage of stages) {
    boreRamp(ramp, stage);
    const speedAt = (time: number, at: number) => {
      boreSetAt(set, ramp, time / stage.duration);
      return boreMoment(bore, set, at, moment);
    };
    const add = (weight: number) => sums.forEach((sum, flow) => (sums[flow] = sum + weight * (moment[flow] ?? 0)));
    const open = through === null ? stage.duration : Math.min(stage.duration, Math.max(0, through - start));
    const h = open / 400;
    for (let i = 0; i < 400 && open > 0; i++) {
      const time = i * h;
      const k1 = speedAt(time, depth);
      add(h / 6);
      const k2 = speedAt(time + h / 2, depth + (h / 2) * k1);
      const k3 = speedAt(time + h / 2, depth + (h / 2) * k2);
      const k4 = speedAt(time + h, depth + h * k3);
      const after = depth + (h / 6) * (k1 + 2 * k2 + 2 * k3 + k4);
      const slope = speedAt(time + h, after);
      add(h / 6);
      speedAt(time + h / 2, (depth + after) / 2 + (h / 8) * (k1 - slope));
      add((4 * h) / 6);
      depth = after;
    }
    for (let i = 0; i < 800; i++) {
      const rest = (stage.duration - open) / 800;
      boreSetAt(set, ramp, (open + (i + 0.5) * rest) / stage.duration);
      boreMomentThrough(bore, set, thickness, moment);
      add(rest);
    }
    start += stage.duration;
  }
  const sum = (place: number) => sums[place] ?? Number.NaN;
  return {
    absorbed: sum(BOTTOM_LIGHT) + sum(WALL_LIGHT),
    oxidation: sum(OXIDATION),
    melt: sum(MELT),
    superheat: sum(EXPULSION),
    conduction: sum(CONDUCTION),
    pauses: sum(PAUSES),
    wall: sum(WALL) + sum(WALL_LIGHT),
  };
}

describe('each term of the ledger, against what it must be', () => {
  it('the melt is the bore’s volume times its heat to melt', () => {
    fc.assert(
      fc.property(anyStages, anyThickness, anyPlate, (stages, thickness, plateTemperature) => {
        const parameters = { spotFollowing: 0 };
        const { ledger, depth } = pierceOutline(input(stages, { thickness, plateTemperature, parameters }));
        const mass = STEEL_DENSITY * Math.PI * PIERCE_DEFAULTS.boreRadius ** 2 * depth;
        expect(Math.abs(ledger.melt - mass * meltingEnthalpy(plateTemperature))).toBeLessThanOrEqual(
          1e-6 * ledger.melt + 1e-6,
        );
        expect(Math.abs(ledger.superheat - mass * PIERCE_DEFAULTS.expulsionHeat)).toBeLessThanOrEqual(
          1e-6 * ledger.superheat + 1e-6,
        );
      }),
    );
  });

  it('no more burns than the nozzle’s oxygen can, nor than the burnt share of what is removed', () => {
    const { heatPerOxygen, heatPerIron } = oxidation('FeO');
    fc.assert(
      fc.property(anyStages, anyThickness, anyPlate, (stages, thickness, plateTemperature) => {
        const { ledger, oxygenUsed } = pierceOutline(input(stages, { thickness, plateTemperature }));
        const removed = ledger.melt / meltingEnthalpy(plateTemperature);
        const most = 1 + 1e-9;
        expect(ledger.oxidation).toBeLessThanOrEqual(PIERCE_DEFAULTS.burntShare * removed * heatPerIron * most);
        expect(ledger.oxidation).toBeLessThanOrEqual(PIERCE_DEFAULTS.oxygenUse * oxygenUsed * heatPerOxygen * most);
      }),
    );
  });

  it('the oxygen used is the nozzle’s flow over the whole routine, through or not', () => {
    fc.assert(
      fc.property(anyStages, anyThickness, (any, thickness) => {
        // From 0.05 bar: from nothing the flow begins as a root of the pressure, which a plain sum does not follow.
        const least = (set: StageQuantities) => ({ ...set, oxygenPressure: Math.max(5e3, set.oxygenPressure) });
        const stages = any.map((stage) => ({ ...stage, from: least(stage.from), to: least(stage.to) }));
        const { oxygenUsed } = pierceOutline(input(stages, { thickness }));
        const parts = 400;
        const flow = (pressure: number) => oxygenMassFlow(0.0015, pressure, PIERCE_DEFAULTS.dischargeCoefficient);
        const sum = stages.reduce((all, { duration, from, to }) => {
          const at = (part: number) => from.oxygenPressure * (1 - part) + to.oxygenPressure * part;
          const mean = Array.from({ length: parts }, (_, i) => flow(at((i + 0.5) / parts))).reduce((a, b) => a + b, 0);
          return all + (duration * mean) / parts;
        }, 0);
        expect(Math.abs(oxygenUsed / sum - 1)).toBeLessThan(1e-4);
      }),
      { numRuns: 40 },
    );
  });

  it('the energy leaving the source is what a fine sum over the stages gives', () => {
    fc.assert(
      fc.property(anyStages, anyThickness, (stages, thickness) => {
        const { energy } = piercePredict(input(continuous(stages), { thickness }));
        const sum = stages.reduce(
          (all, { duration, from, to }) => all + (duration * (from.peakPower * from.duty + to.peakPower * to.duty)) / 2,
          0,
        );
        expect(Math.abs(energy.emitted / sum - 1)).toBeLessThan(1e-9);
      }),
    );
  });

  it('each part summed up by itself, over a depth followed by another method, balances and is what the ledger says', () => {
    // Pierces of five ramps, continuous and with long pauses in turn; the last two are through on the way.
    const next = seededNumbers(11);
    for (let round = 0; round < 12; round++) {
      const powers = Array.from({ length: 6 }, (_, i) => 500 + 600 * i * next());
      const ramps = rampsThrough(powers, () => 0.5 + 1.5 * next());
      const stages = round % 2 === 0 ? continuous(ramps) : ramps;
      const thickness = round < 10 ? 0.06 : 0.01;
      const { ledger, breakthroughTime } = pierceOutline(input(stages, { thickness }));
      const own = partsOf(stages, breakthroughTime, thickness);
      const came = own.absorbed + own.oxidation;
      const went = own.melt + own.superheat + own.conduction + own.pauses + own.wall;
      expect(Math.abs(came - went)).toBeLessThan(1e-6 * came);
      expect(own.pauses > 0).toBe(round % 2 === 1);
      expect(breakthroughTime !== null).toBe(round >= 10);
      for (const [name, heat] of Object.entries(own)) {
        expect(Math.abs(heat - (ledger[name as keyof typeof own] ?? Number.NaN)), name).toBeLessThan(1e-6 * came);
      }
    }
  });

  it('a longer pause between the same pulses is paid for, and only when it lasts longer than the bottom bears', () => {
    const at = (pulseFrequency: number) => {
      const set: StageQuantities = { ...conditions(1500, 100, 0.006, 0.6e5), pulseFrequency };
      return pierceOutline(input([{ duration: 3, from: set, to: set }], { thickness: 0.03 }));
    };
    // Duty 40 %: the pause is 0.6/f, and 5 ms are borne.
    expect(at(125).ledger.pauses).toBe(0);
    expect(at(120).ledger.pauses).toBe(0);
    expect(at(60).ledger.pauses).toBeGreaterThan(0);
    expect(at(20).ledger.pauses).toBeGreaterThan(at(60).ledger.pauses);
    expect(at(20).depth).toBeLessThan(at(60).depth);
  });
});

describe('the mechanism of each quantity', () => {
  const base: StageQuantities = conditions(1500, 150, 0.006, 0.6e5);
  const depthWith = (set: StageQuantities, parameters: Partial<PierceParameters>) =>
    pierceOutline(input([{ duration: 4, from: set, to: set }], { thickness: 0.06, parameters })).depth;

  it.each<[keyof StageQuantities, number, Partial<PierceParameters>]>([
    ['standoff', 0.015, { jetSpread: 0 }],
    ['standoff', 0.015, { burntShare: 0 }],
    ['oxygenPressure', 1.8e5, { burntShare: 0 }],
    ['pulseFrequency', 40, { pauseLoss: 0 }],
  ])('%s does not act on depth once its parameter is neutral', (quantity, value, neutral) => {
    const changed = { ...base, [quantity]: value };
    // The source's rise is the machine's; take it away with the parameter.
    const quick = { ...TEN_KILOWATT, source: { ...TEN_KILOWATT.source, riseTime: 0 } };
    const depth = (set: StageQuantities, parameters: Partial<PierceParameters>) =>
      pierceOutline(input([{ duration: 4, from: set, to: set }], { thickness: 0.06, parameters, profile: quick }))
        .depth;
    expect(Math.abs(depth(changed, neutral) - depth(base, neutral))).toBeLessThan(1e-9);
    expect(Math.abs(depth(changed, {}) - depth(base, {}))).toBeGreaterThan(1e-5);
  });

  it.each(pierceMechanismTable.map((row) => [row.quantity, row] as const))(
    '%s is told with the parameters that it acts by, and acts',
    (quantity, row) => {
      const changed: Record<keyof StageQuantities, number> = {
        standoff: 0.015,
        focusPosition: 0.009,
        peakPower: base.peakPower * 1.2,
        duty: 0.5,
        pulseFrequency: 40,
        oxygenPressure: 1.8e5,
      };
      expect(depthWith({ ...base, [quantity]: changed[quantity] }, {})).not.toBe(depthWith(base, {}));
      for (const name of row.parameters) expect(pierceParameters()[name]).toBeDefined();
      expect(row.depth.length).toBeGreaterThan(40);
    },
  );
});

describe('the crater', () => {
  it('is as wide as the greatest heat at the mouth melts, followed by another method, or as the bore', () => {
    const next = seededNumbers(23);
    let byHeat = 0;
    for (let round = 0; round < 10; round++) {
      const powers = Array.from({ length: 4 }, (_, i) => (round + 1) * (300 + 300 * i * next()));
      const stages = rampsThrough(powers, () => 0.4 + 1.2 * next());
      const { craterRadius } = pierceOutline(input(stages, { thickness: 0.06 }));
      const { heat, bore } = mouthOf(stages);
      // Point source on the surface, evaluated at the rise to melting: r³ = 2Q/(ρc·ΔT)·(3/2πe)^1.5.
      const rise = IRON_MELTING_TEMPERATURE - 293.15;
      const capacity = (STEEL_DENSITY * heatingEnthalpy(293.15)) / rise;
      const molten = Math.cbrt(((2 * heat) / capacity / rise) * (3 / (2 * Math.PI * Math.E)) ** 1.5);
      if (molten > bore) byHeat += 1;
      expect(Math.abs(craterRadius / Math.max(molten, bore) - 1), `round ${round}`).toBeLessThan(1e-4);
    }
    expect(byHeat).toBeGreaterThan(3);
  });
});

/** Greatest heat that stands at the mouth, J, and widest bore, m: fed by the flow that comes there, fading with its own time. */
function mouthOf(stages: readonly Stage[]) {
  const bore = boreOf(TEN_KILOWATT, NOZZLE_1_5, 293.15, PIERCE_DEFAULTS);
  const set = new Float64Array(SET_SIZE);
  const ramp = new Float64Array(2 * SET_SIZE);
  const moment = boreMomentEmpty();
  const memory = 0.003 ** 2 / (6 * HOT_DIFFUSIVITY);
  let depth = 0;
  let heat = 0;
  let greatest = 0;
  let widest = 0;
  for (const stage of stages) {
    boreRamp(ramp, stage);
    const slopes = (part: number, z: number, q: number) => {
      boreSetAt(set, ramp, part);
      const speed = boreMoment(bore, set, z, moment);
      widest = Math.max(widest, moment[BORE_RADIUS] ?? 0);
      return [speed, (moment[CRATER] ?? 0) - q / memory] as const;
    };
    const steps = 1000;
    const h = stage.duration / steps;
    for (let i = 0; i < steps; i++) {
      const a = slopes(i / steps, depth, heat);
      const b = slopes((i + 0.5) / steps, depth + (h / 2) * a[0], heat + (h / 2) * a[1]);
      const c = slopes((i + 0.5) / steps, depth + (h / 2) * b[0], heat + (h / 2) * b[1]);
      const d = slopes((i + 1) / steps, depth + h * c[0], heat + h * c[1]);
      depth += (h / 6) * (a[0] + 2 * b[0] + 2 * c[0] + d[0]);
      heat += (h / 6) * (a[1] + 2 * b[1] + 2 * c[1] + d[1]);
      greatest = Math.max(greatest, heat);
    }
  }
  return { heat: greatest, bore: widest };
}

describe('the eruption index', () => {
  const eruption = (set: StageQuantities) =>
    pierceOutline(input([{ duration: 0.01, from: set, to: set }], { parameters: { spotFollowing: 0 } })).eruptionIndex;

  it('is the melt of one pulse over the bore and one radius above it when the pauses are long', () => {
    // 0.2 ms of beam every 5 ms, and melt that needs 0.75 ms to the mouth.
    const set: StageQuantities = { ...conditions(480, 200, 0.006, 0), duty: 0.04, peakPower: 12_000 };
    const stage = { duration: 1e-4, from: set, to: set };
    const parameters = { spotFollowing: 0, meltSpeed: 1, pauseLoss: 0 };
    const { eruptionIndex, depth } = pierceOutline(input([stage], { parameters }));
    expect(depth).toBeGreaterThan(0);
    const ofOnePulse = depth / stage.duration / 200 / (depth + PIERCE_DEFAULTS.boreRadius);
    // What leaves while the pulse lasts is missing: half of 0.2 in 0.75.
    expect(eruptionIndex / ofOnePulse).toBeCloseTo(0.88, 2);
  });

  it('is what is made while the melt is on its way when power is continuous, whatever the frequency at duty 1', () => {
    const set: StageQuantities = { ...conditions(3000, 100, 0.006, 0.6e5), duty: 1, peakPower: 3000 };
    expect(eruption(set)).toBe(eruption({ ...set, pulseFrequency: null }));
    expect(eruption(set)).toBe(eruption({ ...set, pulseFrequency: 4000 }));
  });

  it('grows with power and with the length of pulses, and shrinks with pressure', () => {
    const set: StageQuantities = { ...conditions(1500, 50, 0.006, 0.6e5) };
    expect(eruption({ ...set, peakPower: 1.2 * set.peakPower })).toBeGreaterThan(eruption(set));
    expect(eruption({ ...set, pulseFrequency: 500 })).toBeLessThan(eruption(set));
    const rate = (oxygenPressure: number) =>
      pierceOutline(
        input([{ duration: 0.01, from: { ...set, oxygenPressure }, to: { ...set, oxygenPressure } }], {
          parameters: { burntShare: 0 },
        }),
      ).eruptionIndex;
    expect(rate(2e5)).toBeLessThan(rate(0.5e5));
  });
});

describe('the heat left around the hole', () => {
  const capacity = STEEL_DENSITY * steelSpecificHeat(473.15);

  it('given off at once is the closed form, and given off slowly less', () => {
    const at = (duration: number) => pierceWarmth({ perLength: 3e5, duration }, 0.01);
    expect(at(1e-5) / peakRiseAroundLine(3e5, 0.01, capacity)).toBeCloseTo(1, 6);
    expect(at(5)).toBeLessThan(at(1));
    expect(at(50)).toBeLessThan(at(5));
  });

  it('falls with distance, and the lead-in ends where it has fallen to what is allowed', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 1e4, max: 2e6, noNaN: true }),
        fc.double({ min: 0.1, max: 60, noNaN: true }),
        fc.double({ min: 233.15, max: 500, noNaN: true }),
        (perLength, duration, plateTemperature) => {
          const heat = { perLength, duration };
          const needed = leadInNeeded({ craterRadius: 1e-4, heat, plateTemperature });
          if (needed.kind === 'none') throw new Error(needed.why);
          const rise = pierceWarmth(heat, needed.length);
          if (needed.decides === 'heat') expect(Math.abs(rise / (523.15 - plateTemperature) - 1)).toBeLessThan(1e-5);
          else expect(rise).toBeLessThanOrEqual((523.15 - plateTemperature) * (1 + 1e-6));
          expect(pierceWarmth(heat, needed.length * 1.1)).toBeLessThan(rise);
        },
      ),
    );
  });

  it('asks for a lead-in beyond the crater when there is hardly any heat', () => {
    const needed = leadInNeeded({
      craterRadius: 0.002,
      heat: { perLength: 10, duration: 5 },
      plateTemperature: 293.15,
    });
    expect(needed).toMatchObject({
      kind: 'ok',
      decides: 'crater',
      sentence: /^2\.9 mm, to start clear of a crater 2\.0 mm/,
    });
  });

  it('has no lead-in for a plate that is too hot to begin with, and refuses what cannot be', () => {
    const heat = { perLength: 1e5, duration: 5 };
    expect(leadInNeeded({ craterRadius: 0.001, heat, plateTemperature: 550 })).toMatchObject({
      kind: 'none',
      why: /plate itself, at 277 °C, is not below the 250 °C/,
    });
    expect(() => pierceWarmth(heat, 0)).toThrow(/distance 0 m/);
    expect(() => pierceWarmth({ perLength: -1, duration: 1 }, 1)).toThrow(/heat -1/);
    expect(() => pierceWarmth({ perLength: 1, duration: Number.NaN }, 1)).toThrow(/duration NaN/);
  });
});

describe('what keeps a bottom from moving', () => {
  const cause = (set: Partial<StageQuantities>) => {
    const all = { ...conditions(400, 150, 0.006, 0.6e5), ...set };
    return piercePredict(input([{ duration: 10, from: all, to: all }])).stalls[0];
  };

  it.each<[string, Partial<StageQuantities>, string, RegExp]>([
    ['too little power', {}, 'power', /the mean power must grow\.$/],
    [
      'pulses shorter than the rise',
      { pulseFrequency: 5000, duty: 0.2, peakPower: 2500 },
      'rise',
      /over before the source has risen: lower the frequency\.$/,
    ],
    [
      'long pauses',
      { pulseFrequency: 5, duty: 0.1, peakPower: 4000 },
      'pauses',
      /freezes in the pauses: raise the frequency or the duty\.$/,
    ],
  ])('%s', (_, set, expected, why) => {
    expect(cause(set)).toMatchObject({ cause: expected, why });
  });

  it('a beam far wider than its bore', () => {
    const set = { ...conditions(900, 150, 0.006, 0.6e5), focusPosition: 0.03 };
    const { stalls } = piercePredict(
      input([{ duration: 5, from: set, to: set }], { parameters: { spotFollowing: 0, boreRadius: 0.6e-3 } }),
    );
    expect(stalls[0]).toMatchObject({
      cause: 'focus',
      why: /wider than the bore at the top: bring the focus nearer\.$/,
    });
  });

  it('names the stage and goes on with the next when that has more power', () => {
    const { stalls } = piercePredict(input([...RAMPS, ...held(300, 5), ...held(3000, 5)], { thickness: 0.03 }));
    expect(stalls.map(({ stage }) => stage)).toEqual([3]);
  });
});
