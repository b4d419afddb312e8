export type { PlateProperties } from './properties.ts';
export { diffusionLength, diffusivity, midZoneProperties } from './properties.ts';
export { besselIScaled, besselK0, besselK0Scaled, erfc, exponentialIntegral, logGamma } from './special-functions.ts';
export { panelIntegral } from './gauss-legendre.ts';
export type { FromSource } from './line-source.ts';
export { continuousLine, instantaneousLine, movingLine, movingPoint } from './line-source.ts';
export type { Peak } from './wake.ts';
export { cutEndWake, cutWake, cutWakePeak, surfaceWake, surfaceWakePeak } from './wake.ts';
export type { Polar } from './images.ts';
export { cornerFactor, straightEdgeRise, tipFactor, wedgeRise, wedgeRiseByImages } from './images.ts';
export { rectangleRise } from './rectangle.ts';
export { biotNumber, lostShare, plateCoolingTime, radiativeCoefficient } from './surface-loss.ts';
export { levellingTime, stepShareAtDepth, surfaceRiseUnderFlux } from './half-space.ts';
export type { HeatedPiece } from './path-heat.ts';
export { heatedPath, pathRise } from './path-heat.ts';
export type { ReturnQuestion, ReturnTemperature, ReturnTreatment } from './return-temperature.ts';
export {
  leftOutStretch,
  measuringDepth,
  measuringPlace,
  returnOf,
  returnTemperature,
  straightEdgeReturn,
} from './return-temperature.ts';
