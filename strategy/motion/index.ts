export type { DriveLimits } from './speed-change.ts';
export { speedChangeDistance, speedChangeTime, speedReached } from './speed-change.ts';
export type { Move } from './rest-to-rest.ts';
export { sCurveMove, trapezoidMove } from './rest-to-rest.ts';
export { arcAcceleration, arcFeedLimit, junctionFeedLimit } from './limits.ts';
export type { PathDrive, PathTime } from './path-time.ts';
export { pathTime } from './path-time.ts';
export type { PathClock } from './path-clock.ts';
export { clockDistance, clockTime, pathClock } from './path-clock.ts';
