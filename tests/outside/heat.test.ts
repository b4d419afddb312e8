import type { PlateProperties } from '../../strategy/heat/index.ts';
import {
  besselK0,
  biotNumber,
  continuousLine,
  cornerFactor,
  cutEndWake,
  cutWake,
  cutWakePeak,
  diffusionLength,
  diffusivity,
  heatedPath,
  instantaneousLine,
  levellingTime,
  lostShare,
  movingLine,
  movingPoint,
  pathRise,
  plateCoolingTime,
  radiativeCoefficient,
  rectangleRise,
  stepShareAtDepth,
  straightEdgeRise,
  surfaceRiseUnderFlux,
  surfaceWake,
  surfaceWakePeak,
  tipFactor,
  wedgeRise,
  wedgeRiseByImages,
} from '../../strategy/heat/index.ts';
import { lineBetween } from '../../strategy/path/index.ts';
import type { OutsideCheck } from './check.ts';
import { outsideChecks } from './check.ts';

/** Constants of ENV 1993-1-2:1995, simple model, from memory: one set for all values below. */
const plate: PlateProperties = { conductivity: 45, density: 7850, specificHeat: 600 };
const FORMULA = 'computed from a published formula' as const;
const exact = { rel: 1e-6 };

const ROSENTHAL = 'Rosenthal, Trans. ASME 68 (1946) 849; form seen in a public exercise and a docstring that cite it';
const CARSLAW_LINE =
  'Carslaw and Jaeger, Conduction of Heat in Solids, 2nd ed. 1959, 10.3(1); number seen in the docstring of an open library';
const CARSLAW = 'Carslaw and Jaeger, Conduction of Heat in Solids, 2nd ed. 1959';
const RYKALIN =
  'Rykalin, Calculation of Heat Flow in Welding (1951), from memory; instantaneous plane and line sources';
const BECK = "Beck et al., Heat Conduction Using Green's Functions, X22Y22; from memory, agrees with an image sum";
const LUMPED = 'lumped capacity, Incropera, Fundamentals of Heat and Mass Transfer, ch. 5; from memory';

type Row = readonly [id: string, what: string, unit: string, got: () => number, expected: number];
const checks = (source: string, rows: readonly Row[], tolerance: OutsideCheck['tolerance'] = exact): OutsideCheck[] =>
  rows.map(([id, what, unit, got, expected]) => ({
    id,
    what,
    unit,
    got,
    expected,
    tolerance,
    source,
    standing: FORMULA,
  }));

const v = 1 / 60; // m/s
const q = 1e5; // W/m
const heat = 3e5; // J/m
const face = 2000 / (v * 0.02); // J/m²

outsideChecks('moving sources', [
  ...checks('definition', [['H01', 'diffusivity', 'm²/s', () => diffusivity(plate), 9.55414012739e-6]]),
  ...checks(ROSENTHAL, [
    [
      'H02a',
      'moving point, 5 mm behind and 2 mm aside',
      'K',
      () => movingPoint(2000, 0.01, { ahead: -0.005, aside: 0.002 }, plate),
      1073.73734234,
    ],
    [
      'H02b',
      'moving point, 3 mm abreast',
      'K',
      () => movingPoint(2000, 0.01, { ahead: 0, aside: 0.003 }, plate),
      490.53954309,
    ],
    [
      'H02d',
      'moving point, 20 mm behind, 5 mm aside and below',
      'K',
      () => movingPoint(2000, 0.01, { ahead: -0.02, aside: 0.005, below: 0.005 }, plate),
      176.723186977,
    ],
    [
      'H04a',
      'moving line, 5 mm behind and 2 mm aside',
      'K',
      () => movingLine(q, v, { ahead: -0.005, aside: 0.002 }, plate),
      142.665074914,
    ],
    [
      'H04b',
      'moving line, 1 mm abreast',
      'K',
      () => movingLine(q, v, { ahead: 0, aside: 0.001 }, plate),
      179.364089979,
    ],
    [
      'H04d',
      'moving line, 50 mm behind and 5 mm aside',
      'K',
      () => movingLine(q, v, { ahead: -0.05, aside: 0.005 }, plate),
      53.7154325593,
    ],
    [
      'H25',
      'moving line on a plate that cools from both faces',
      'K',
      () => movingLine(q, v, { ahead: -0.05, aside: 0.005 }, plate, { coefficient: 20, thickness: 0.02 }),
      53.6459298616,
    ],
  ]),
  ...checks('Abramowitz and Stegun, table 9.8, from memory', [
    ['H05-0.1', 'K0(0.1)', '1', () => besselK0(0.1), 2.4270690247],
    ['H05-1', 'K0(1)', '1', () => besselK0(1), 0.421024438241],
    ['H05-2', 'K0(2)', '1', () => besselK0(2), 0.11389387275],
    ['H05-5', 'K0(5)', '1', () => besselK0(5), 0.00369109833404],
  ]),
  ...checks(RYKALIN, [
    ['H06a', 'wake of a cut on its line after 1 s', 'K', () => cutWake(face, 0, 1, plate), 116.259809747],
    ['H06b', 'wake of a cut 5 mm aside after 3 s', 'K', () => cutWake(face, 0.005, 3, plate), 53.9720179386],
    [
      'H07',
      'wake of a surface source at 6 mm after 5 s',
      'K',
      () => surfaceWake(2000 / v, 0.006, 5, plate),
      70.3068724656,
    ],
    ['H08a-rise', 'peak 1 mm beside a cut', 'K', () => cutWakePeak(face, 0.001, plate).rise, 308.242961171],
    [
      'H08a-time',
      'time of the peak 1 mm beside a cut',
      's',
      () => cutWakePeak(face, 0.001, plate).time,
      0.0523333333333,
    ],
    ['H08b-rise', 'peak 5 mm beside a cut', 'K', () => cutWakePeak(face, 0.005, plate).rise, 61.6485922342],
    ['H08b-time', 'time of the peak 5 mm beside a cut', 's', () => cutWakePeak(face, 0.005, plate).time, 1.30833333333],
    ['H09', 'peak 10 mm from a surface source', 'K', () => surfaceWakePeak(2000 / v, 0.01, plate).rise, 59.668618114],
  ]),
]);

const longCut = (wait: number) =>
  pathRise(heatedPath([lineBetween({ x: -0.1, y: 0 }, { x: 0, y: 0 })], v, 0, q), { x: 0, y: 0 }, wait, plate);
const superposed = { rel: 1e-5 };

outsideChecks('line sources and what they leave', [
  ...checks(CARSLAW_LINE, [
    [
      'H10a',
      'instantaneous line at 10 mm after 10 s',
      'K',
      () => instantaneousLine(heat, 0.01, 10, plate),
      40.8374379397,
    ],
    [
      'H10b',
      'instantaneous line at 5 mm after 1 s',
      'K',
      () => instantaneousLine(heat, 0.005, 1, plate),
      275.802312558,
    ],
    [
      'H29-1',
      "a pierce's heat 10 mm away after 1 s",
      'K',
      () => instantaneousLine(6000 / 0.02, 0.01, 1, plate),
      38.7520768399,
    ],
    [
      'H29-5',
      "a pierce's heat 10 mm away after 5 s",
      'K',
      () => instantaneousLine(6000 / 0.02, 0.01, 5, plate),
      62.870670747,
    ],
    [
      'H29-60',
      "a pierce's heat 10 mm away after 60 s",
      'K',
      () => instantaneousLine(6000 / 0.02, 0.01, 60, plate),
      8.4646218598,
    ],
  ]),
  ...checks(`${CARSLAW}, ch. 10`, [
    ['H11a', 'continuous line at 1 mm after 1 s', 'K', () => continuousLine(q, 0.001, 1, plate), 546.794448698],
    ['H11b', 'continuous line at 5 mm after 5 s', 'K', () => continuousLine(q, 0.005, 5, plate), 279.987283458],
  ]),
  ...checks(
    `${CARSLAW}, ch. 10, superposed along the cut`,
    [
      ['H12a', 'end of a 100 mm cut after 0.5 s', 'K', () => longCut(0.5), 80.8906713609],
      ['H12b', 'end of a 100 mm cut after 1 s', 'K', () => longCut(1), 57.6481454837],
      ['H12d', 'end of a 100 mm cut after 4 s', 'K', () => longCut(4), 29.0030658018],
      ['H12e', 'end of a 100 mm cut after 8 s', 'K', () => longCut(8), 20.5300406901],
      ['H12f', 'end of a 100 mm cut after 16 s', 'K', () => longCut(16), 14.524669554],
    ],
    superposed,
  ),
  ...checks('derived from the plane source', [
    [
      'H13',
      'end of a long cut after 2 s, one over the root of time',
      'K',
      () => cutEndWake(q / v, 2, plate),
      41.1040499257,
    ],
  ]),
  ...checks('method of images, Carslaw and Jaeger, ch. 10 and 14', [
    [
      'H14a',
      'at a straight edge, twice the infinite plate',
      'K',
      () => straightEdgeRise(heat, { x: 0.005, y: 0 }, { x: 0, y: 0 }, 2, plate),
      382.514929381,
    ],
    [
      'H14b',
      'inside a straight edge',
      'K',
      () => straightEdgeRise(heat, { x: 0.005, y: 0 }, { x: 0.008, y: 0.002 }, 2, plate),
      251.355809225,
    ],
  ]),
  ...checks(
    `${CARSLAW}, ch. 14: images`,
    (
      [
        ['H15a', 90, 622.087399716],
        ['H15b', 60, 933.016840009],
        ['H15d', 30, 1866.03325812],
      ] as const
    ).map(([id, degrees, expected]): Row => {
      const beta = (degrees * Math.PI) / 180;
      const [source, at] = [
        { r: 0.006, theta: beta / 2 },
        { r: 0.003, theta: beta / 3 },
      ];
      return [
        id,
        `in a wedge of ${degrees}°, by images`,
        'K',
        () => wedgeRiseByImages(heat, beta, source, at, 2, plate),
        expected,
      ];
    }),
  ),
  ...checks(
    `${CARSLAW}, ch. 14: series of Bessel functions`,
    (
      [
        ['H15a-series', 90, 622.087399716],
        ['H15b-series', 60, 933.016840009],
        ['H15d-series', 30, 1866.03325812],
      ] as const
    ).map(([id, degrees, expected]): Row => {
      const beta = (degrees * Math.PI) / 180;
      const [source, at] = [
        { r: 0.006, theta: beta / 2 },
        { r: 0.003, theta: beta / 3 },
      ];
      return [
        id,
        `in a wedge of ${degrees}°, by the series`,
        'K',
        () => wedgeRise(heat, beta, source, at, 2, plate),
        expected,
      ];
    }),
  ),
  ...checks(
    'exact: only the first term of the series survives at the tip (Carslaw and Jaeger, ch. 14)',
    [180, 120, 90, 60, 45, 40, 30].map((degrees, i): Row => {
      const beta = (degrees * Math.PI) / 180;
      const tip = () =>
        wedgeRise(heat, beta, { r: 0.006, theta: 0.4 * beta }, { r: 0, theta: 0 }, 2, plate) /
        instantaneousLine(heat, 0.006, 2, plate);
      return [
        `H17-${degrees}`,
        `tip of ${degrees}° against an infinite plate`,
        '1',
        tip,
        [2, 3, 4, 6, 8, 9, 12][i] ?? NaN,
      ];
    }),
  ),
  ...checks('exact: 2π over the angle', [['H17-law', 'tip factor of 45°', '1', () => tipFactor(Math.PI / 4), 8]]),
  ...checks(
    'derived from the tip factor, half the heat into the part',
    (
      [
        [150, 1.2],
        [90, 2],
        [60, 3],
        [30, 6],
      ] as const
    ).map(([degrees, expected]): Row => [
      `H18-${degrees}`,
      `corner of ${degrees}° against a straight edge`,
      '1',
      () => cornerFactor((degrees * Math.PI) / 180),
      expected,
    ]),
  ),
  ...checks(
    BECK,
    (
      [
        ['H19a', 5, 0.000130746522399],
        ['H19b', 60, 3.84473280089],
        ['H19d', 6000, 1.06328378854],
      ] as const
    ).map(([id, age, expected]): Row => [
      id,
      `insulated plate of 300 × 200 mm after ${age} s`,
      'K',
      () => rectangleRise(heat, { length: 0.3, width: 0.2 }, { x: 0.1, y: 0.02 }, { x: 0.05, y: 0.03 }, age, plate),
      expected,
    ]),
  ),
]);

outsideChecks('levelling and losses of a plate', [
  ...checks(
    'first cosine mode of an insulated slab (Beck et al., X22)',
    [
      ['H21a', 'surface pulse levelled through 10 mm', 's', () => levellingTime(0.01, plate), 3.91203842126],
      ['H21b', 'surface pulse levelled through 20 mm', 's', () => levellingTime(0.02, plate), 15.6481536851],
    ],
    { rel: 1e-4 },
  ),
  ...checks(LUMPED, [
    ['H22a-Bi', 'Biot number of 10 mm', '1', () => biotNumber(0.01, 20, plate), 0.00222222222222],
    ['H22a-tau', 'cooling time constant of 10 mm', 's', () => plateCoolingTime(0.01, 20, plate), 1177.5],
    ['H22b-Bi', 'Biot number of 20 mm', '1', () => biotNumber(0.02, 20, plate), 0.00444444444444],
    ['H22b-tau', 'cooling time constant of 20 mm', 's', () => plateCoolingTime(0.02, 20, plate), 2355],
    ['H24-10', 'heat lost in 10 s', '1', () => lostShare(10, 2355), 0.00423728178224],
    ['H24-600', 'heat lost in 10 min', '1', () => lostShare(600, 2355), 0.224910730696],
    ['H24-3600', 'heat lost in 1 h', '1', () => lostShare(3600, 2355), 0.783174505198],
  ]),
  ...checks(
    'Stefan-Boltzmann law, CODATA; emissivity 0.7 of EN 1993-1-2, seen in an abstract',
    [
      [
        'H23a',
        'radiative coefficient at 100 °C',
        'W/(m² K)',
        () => radiativeCoefficient(373.15, 293.15),
        5.95532199982,
      ],
      [
        'H23b',
        'radiative coefficient at 300 °C',
        'W/(m² K)',
        () => radiativeCoefficient(573.15, 293.15),
        14.2507426654,
      ],
    ],
    { rel: 1e-4 },
  ),
  ...checks(`${CARSLAW}, ch. 2`, [
    ['H26', 'surface under 10 MW/m² after 0.1 s', 'K', () => surfaceRiseUnderFlux(1e7, 0.1, plate), 245.097199425],
    [
      'H27',
      'step of temperature 5 mm deep after 1 s',
      '1',
      () => stepShareAtDepth(0.005, 1, 9.55414012739e-6),
      0.252696636256,
    ],
  ]),
  ...checks('definition of the diffusion length', [
    ['H28-1', 'diffusion length after 1 s', 'm', () => diffusionLength(plate, 1), 0.00618195442474],
    ['H28-60', 'diffusion length after 60 s', 'm', () => diffusionLength(plate, 60), 0.0478852130681],
  ]),
]);
