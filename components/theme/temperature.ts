/**
 * The one scale on which temperature is shown: temper colours of clean carbon steel, then its glow.
 * Temperatures after Dooley, Applied Science for Metal Workers (converted from °F; others differ by ±15 °C in the
 * temper colours and ±50 °C in the glow); the screen colours are ours, drawn to look like them on paper and at night.
 */
export const temperatureStops = [
  { celsius: 20, colour: '#A7ADAA', name: 'grey steel' },
  { celsius: 200, colour: '#BDB9A3', name: 'grey steel' },
  { celsius: 238, colour: '#D9BE62', name: 'straw' },
  { celsius: 260, colour: '#A5682A', name: 'brown' },
  { celsius: 280, colour: '#6E3B7E', name: 'purple' },
  { celsius: 300, colour: '#33559C', name: 'blue' },
  { celsius: 330, colour: '#6E8FA0', name: 'grey-blue' },
  { celsius: 514, colour: '#5A1612', name: 'first red' },
  { celsius: 800, colour: '#B5231B', name: 'cherry' },
  { celsius: 1100, colour: '#F07B1E', name: 'orange' },
  { celsius: 1300, colour: '#FFF3C9', name: 'white' },
] as const;

const zeroCelsius = 273.15; // K

/** Colour of steel at a temperature, K, as `rgb(r, g, b)`; held at the ends of the scale. */
export const temperatureColour = (kelvin: number): string => rgb(temperatureChannels(kelvin));

/** The same as red, green and blue, 0 to 255 each, not rounded. */
export function temperatureChannels(kelvin: number): readonly number[] {
  const celsius = kelvin - zeroCelsius;
  const above = temperatureStops.findIndex((stop) => stop.celsius >= celsius);
  const last = temperatureStops[temperatureStops.length - 1];
  if (above < 0 || last === undefined) return channels(last?.colour ?? '#FFFFFF');
  const upper = temperatureStops[above] ?? last;
  const lower = temperatureStops[above - 1] ?? upper;
  const share = upper === lower ? 0 : (celsius - lower.celsius) / (upper.celsius - lower.celsius);
  const from = channels(lower.colour);
  const to = channels(upper.colour);
  return from.map((value, i) => value + share * ((to[i] ?? value) - value));
}

/** Word for the colour a temperature, K, is near: the last stop it has reached. */
export function temperatureWord(kelvin: number): string {
  const celsius = kelvin - zeroCelsius;
  const reached = temperatureStops.filter((stop) => stop.celsius <= celsius);
  return reached[reached.length - 1]?.name ?? 'grey steel';
}

const channels = (hex: string): number[] => [1, 3, 5].map((at) => Number.parseInt(hex.slice(at, at + 2), 16));
const rgb = (values: readonly number[]): string => `rgb(${values.map((value) => Math.round(value)).join(', ')})`;
