export {
  beamMeanIntensity,
  beamParameterProduct,
  beamPropagationRatio,
  beamRadiusAt,
  beamRayleighLength,
  beamSpotDiameter,
  type Optics,
} from './beam.ts';
export { dialForFocus, focusForDial, type DialReading } from './focus-dial.ts';
