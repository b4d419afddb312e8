export type { ParameterBounds, ParameterFit } from './parameter-fit.ts';
export { fitAtEnd, likeliestWay, movedInRange, mustBeFit } from './parameter-fit.ts';
