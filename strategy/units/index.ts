export { dimensionUnits, quantityFrom, quantityIn, unitSymbol, type Dimension, type Unit } from './dimension.ts';
export { normalFlowFromStandardCubicFeet } from './gas-volume.ts';
export { quantityParse, type QuantityParsed } from './parse.ts';
export {
  celsiusFromKelvin,
  fahrenheitFromKelvin,
  kelvinFromCelsius,
  kelvinFromFahrenheit,
  ZERO_CELSIUS,
} from './temperature.ts';
export {
  MINUS,
  numberText,
  quantityText,
  type QuantityText,
  type QuantityTextOptions,
  type UnitSystem,
} from './text.ts';
