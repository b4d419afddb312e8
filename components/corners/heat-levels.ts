import { temperatureStops } from '@/components/theme/temperature.ts';
import { kelvinFromCelsius, type UnitSystem } from '@/strategy/units/index.ts';

/** Below the first temper colour nothing is named: round values, °C, and °F. */
const round = {
  metric: [50, 100, 150, 200],
  inch: [100, 200, 300, 400].map((fahrenheit) => (fahrenheit - 32) / 1.8),
} as const satisfies Record<UnitSystem, readonly number[]>;

/** Temperatures, K, that are drawn as lines: round ones while the steel is grey, then where each colour of the scale begins. */
export const heatLevels = (system: UnitSystem): readonly number[] =>
  [...round[system], ...temperatureStops.map(({ celsius }) => celsius).filter((celsius) => celsius > 200)].map(
    kelvinFromCelsius,
  );
