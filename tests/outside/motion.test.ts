import {
  arcAcceleration,
  arcFeedLimit,
  pathTime,
  plateClock,
  sCurveMove,
  trapezoidMove,
} from '../../strategy/motion/index.ts';
import { lineBetween, loopAt, type Segment } from '../../strategy/path/index.ts';
import type { OutsideCheck } from './check.ts';
import { outsideChecks } from './check.ts';

const KINEMATICS = 'kinematics of constant acceleration';
const CENTRIPETAL = 'centripetal acceleration, kinematics';
const BIAGIOTTI =
  'Biagiotti and Melchiorri, Trajectory Planning for Automatic Machines and Robots (2008), ch. 3; structure seen in public code';

const check = (
  id: string,
  what: string,
  unit: string,
  got: () => number,
  expected: number,
  source: string,
): OutsideCheck => ({
  id,
  what,
  unit,
  got,
  expected,
  tolerance: { rel: 1e-6 },
  source,
  standing: 'computed from a published formula',
});

outsideChecks('time and speed of a move', [
  check('V01a-time', '0.1 m from rest to rest', 's', () => trapezoidMove(0.1, 0.5, 2).time, 0.4472135955, KINEMATICS),
  check('V01a-peak', 'its peak speed', 'm/s', () => trapezoidMove(0.1, 0.5, 2).peakSpeed, 0.4472135955, KINEMATICS),
  check(
    'V01b-time',
    '10 mm from rest to rest',
    's',
    () => trapezoidMove(0.01, 0.5, 2).time,
    0.141421356237,
    KINEMATICS,
  ),
  check('V01b-peak', 'its peak speed', 'm/s', () => trapezoidMove(0.01, 0.5, 2).peakSpeed, 0.141421356237, KINEMATICS),
  check(
    'V01d-time',
    '125 mm, where the feed is just reached',
    's',
    () => trapezoidMove(0.125, 0.5, 2).time,
    0.5,
    KINEMATICS,
  ),
  check('V01d-peak', 'its peak speed', 'm/s', () => trapezoidMove(0.125, 0.5, 2).peakSpeed, 0.5, KINEMATICS),
  check('V02a-time', '0.5 m with bounded jerk', 's', () => sCurveMove(0.5, 0.5, 2, 50).time, 1.29, BIAGIOTTI),
  check('V02a-peak', 'its peak speed', 'm/s', () => sCurveMove(0.5, 0.5, 2, 50).peakSpeed, 0.5, BIAGIOTTI),
  check('V02b-time', '50 mm with bounded jerk', 's', () => sCurveMove(0.05, 0.5, 2, 50).time, 0.35874754901, BIAGIOTTI),
  check('V02b-peak', 'its peak speed', 'm/s', () => sCurveMove(0.05, 0.5, 2, 50).peakSpeed, 0.27874754901, BIAGIOTTI),
  check('V02d-time', '1 m at 1 m/s with bounded jerk', 's', () => sCurveMove(1, 1, 10, 200).time, 1.15, BIAGIOTTI),
  check('V02d-peak', 'its peak speed', 'm/s', () => sCurveMove(1, 1, 10, 200).peakSpeed, 1, BIAGIOTTI),
  {
    ...check('V02-2', '2 mm with bounded jerk', 's', () => sCurveMove(0.002, 0.5, 2, 50).time, 0.1086, BIAGIOTTI),
    // given to four digits
    tolerance: { abs: 5e-5 },
  },
  check(
    'V02b-path',
    '50 mm with bounded jerk, as a path',
    's',
    () => pathTime([lineBetween({ x: 0, y: 0 }, { x: 0.03, y: 0.04 })], { feed: 0.5, acceleration: 2, jerk: 50 }).time,
    0.35874754901,
    BIAGIOTTI,
  ),
  check('V03-1', 'feed limit on 1 mm radius at 2 m/s²', 'm/s', () => arcFeedLimit(2, 1e-3), 0.04472135955, CENTRIPETAL),
  check('V03-5', 'feed limit on 5 mm radius at 2 m/s²', 'm/s', () => arcFeedLimit(2, 5e-3), 0.1, CENTRIPETAL),
  check(
    'V03-5-10',
    'feed limit on 5 mm radius at 10 m/s²',
    'm/s',
    () => arcFeedLimit(10, 5e-3),
    0.22360679775,
    CENTRIPETAL,
  ),
  check(
    'V04-0.5',
    'acceleration on 0.5 mm radius at 1 m/min',
    'm/s²',
    () => arcAcceleration(1 / 60, 5e-4),
    0.555555555556,
    CENTRIPETAL,
  ),
  check(
    'V04-1',
    'acceleration on 1 mm radius at 1 m/min',
    'm/s²',
    () => arcAcceleration(1 / 60, 1e-3),
    0.277777777778,
    CENTRIPETAL,
  ),
  check(
    'V04-3',
    'acceleration on 3 mm radius at 1 m/min',
    'm/s²',
    () => arcAcceleration(1 / 60, 3e-3),
    0.0925925925926,
    CENTRIPETAL,
  ),
  {
    ...check(
      'V06',
      'time to cut 2 m at 0.9 m/min',
      's',
      () => pathTime([lineBetween({ x: 0, y: 0 }, { x: 2, y: 0 })], { feed: 0.015, acceleration: 2, jerk: 50 }).time,
      133.333333333,
      'length over feed, kinematics',
    ),
    // starting and stopping, which the plain quotient leaves out, take 0.05 s
    tolerance: { abs: 0.06 },
  },
  {
    ...check(
      'V06-plate',
      'the same as a plate’s whole cut, without pierce and travel',
      's',
      () =>
        plateClock(
          {
            runs: [
              {
                contourId: 'a',
                name: 'outline a',
                pierce: { x: 0, y: 0 },
                pieces: [{ kind: 'contour', segments: [lineBetween({ x: 0, y: 0 }, { x: 2, y: 0 })] }],
              },
            ],
          },
          { feed: 0.015, acceleration: 2, jerk: 50, travel: 1, pierce: 0 },
        ).duration,
      133.333333333,
      'length over feed, kinematics',
    ),
    tolerance: { abs: 0.06 },
  },
  {
    ...check(
      'K02-time',
      'a loop of 5 mm at a right angle, at 1 m/min',
      's',
      () => {
        const corner = {
          point: { x: 0, y: 0 },
          incoming: { x: 1, y: 0 },
          outgoing: { x: 0, y: 1 },
          angle: Math.PI / 2,
        };
        const path = (segments: readonly Segment[]) =>
          pathTime(
            [lineBetween({ x: -0.1, y: 0 }, corner.point), ...segments, lineBetween(corner.point, { x: 0, y: 0.1 })],
            {
              feed: 1 / 60,
              acceleration: 2,
              jerk: 50,
            },
          );
        const straight = pathTime([lineBetween({ x: -0.1, y: 0 }, { x: 0.1, y: 0 })], {
          feed: 1 / 60,
          acceleration: 2,
          jerk: 50,
        });
        return path(loopAt(corner, 5e-3).segments).time - straight.time;
      },
      2.01,
      'length of the tangent loop over feed, geometry',
    ),
    // given to three digits
    tolerance: { abs: 0.005 },
  },
]);
