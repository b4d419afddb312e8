/** Words for numbers in the sentences of a corner plan. */

export const celsius = (kelvin: number): string => `${Math.round(kelvin - 273.15)} °C`;
export const millimetres = (length: number): string => `${(length * 1000).toFixed(1)} mm`;
export const seconds = (time: number): string => `${time.toFixed(1)} s`;
export const degrees = (angle: number): string => `${Math.round((angle * 180) / Math.PI)}°`;
