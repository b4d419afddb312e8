/** 0 °C in kelvin, exact by definition of the degree Celsius (BIPM, SI Brochure, 9th ed.). */
export const ZERO_CELSIUS = 273.15;

/** Temperature in K from °C. */
export function kelvinFromCelsius(celsius: number): number {
  return celsius + ZERO_CELSIUS;
}

/** Temperature in °C from K. */
export function celsiusFromKelvin(kelvin: number): number {
  return kelvin - ZERO_CELSIUS;
}

/** Temperature in K from °F; (F − 32) / 1.8 °C by definition. */
export function kelvinFromFahrenheit(fahrenheit: number): number {
  return (fahrenheit - 32) / 1.8 + ZERO_CELSIUS;
}

/** Temperature in °F from K. */
export function fahrenheitFromKelvin(kelvin: number): number {
  return (kelvin - ZERO_CELSIUS) * 1.8 + 32;
}
