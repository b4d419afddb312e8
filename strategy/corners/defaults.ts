import { dialForFocus, focusForDial } from '../beam/index.ts';
import type { MachineProfile } from '../machine.ts';
import { COLD_PLATE_TEMPERATURE, kerfConductionHeat } from '../steel/index.ts';
import type { CornerRules, CutConditions } from './rules.ts';

/** Share of the laser's power that the cut takes up; own choice, to be fitted by test cuts. */
const ABSORBED = 0.6;
/** Absorbed laser per volume of melt, J/m³ (Golyshev et al. 2015: 11 to 13 J/mm³). */
const MELT_ENERGY = 12e9;
/** Above this the oxidation front lags behind, m/s (about 2 m/min). */
const FASTEST = 2 / 60;

/**
 * Conditions of the straight cut to start a new strategy from, SI, for a thickness in m, within the machine's limits. The feed follows
 * from the energy to melt the kerf, v = P / (e·w·d), and the heat into the plate from what such a kerf loses by conduction (`kerfConductionHeat`); pressure, standoff and focus are common practice, no source. RangeError for a
 * thickness that is not positive.
 */
export function cutConditionDefaults(profile: MachineProfile, thickness: number): CutConditions {
  if (!(thickness > 0) || !Number.isFinite(thickness)) throw new RangeError(`thickness ${thickness} m is not positive`);
  const kerfWidth = rounded(within(0.4e-3 + 0.02 * (thickness - 0.01), 0.3e-3, 1.2e-3), 0.05e-3);
  const peakPower = rounded(within(200e3 * thickness, profile.source.minPower, 0.9 * profile.source.maxPower), 100);
  const feed = within(
    (ABSORBED * peakPower) / (MELT_ENERGY * kerfWidth * thickness),
    1e-3,
    Math.min(FASTEST, profile.axes.maxFeed),
  );
  const standoff = within(1.2e-3, profile.standoff.min, profile.standoff.max);
  const heat = kerfConductionHeat({ feed, kerfWidth, plateTemperature: COLD_PLATE_TEMPERATURE });
  return {
    feed: rounded(feed, 10e-3 / 60),
    peakPower,
    duty: 1,
    pulseFrequency: null,
    oxygenPressure: within(0.7e5, profile.oxygen.minPressure, profile.oxygen.maxPressure),
    standoff,
    focusPosition: reachable(profile, 3e-3, standoff),
    kerfWidth,
    heatIntoPlate: rounded(heat, 0.1e6),
  };
}

/** Corner rules to start a new strategy from, SI. Own choices; the limit is a calibration parameter, no published one was found. */
export const cornerRuleDefaults = (profile: MachineProfile): Pick<CornerRules, keyof typeof usual> => ({
  ...usual,
  loop: { ...usual.loop, radius: Math.max(usual.loop.radius, profile.smallestArc) },
});

const usual = {
  treatBelowAngle: (120 * Math.PI) / 180,
  returnExcessLimit: 70,
  loop: { allowed: true, radius: 5e-3, minExtension: 2e-3, maxExtension: 15e-3, clearance: 2e-3 },
  dwell: { allowed: true, maxDuration: 6, restart: 2 },
} satisfies CornerRules;

/** The wished focus position, or the nearest that the dial takes. */
function reachable({ focusScale }: MachineProfile, wished: number, standoff: number): number {
  if (dialForFocus(focusScale, wished, standoff).kind === 'ok') return wished;
  const ends = [focusScale.minDial, focusScale.maxDial].map((typed) => focusForDial(focusScale, typed, standoff));
  return within(wished, Math.min(...ends), Math.max(...ends));
}

const within = (value: number, least: number, most: number) => Math.min(most, Math.max(least, value));
const rounded = (value: number, step: number) => Number((Math.round(value / step) * step).toPrecision(9));
