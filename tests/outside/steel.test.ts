import {
  carbonEquivalentCet,
  carbonEquivalentCev,
  coolingTimes,
  cutEdgeCoolingTime,
  IRON_FUSION_HEAT,
  IRON_LIQUID_ENTHALPY,
  IRON_MELTING_TEMPERATURE,
  IRON_SOLID_ENTHALPY,
  kerfConductionFactor,
  kerfConductionHeat,
  LEDGER_BURNT_SHARE,
  LEDGER_LASER,
  LEDGER_TOTAL,
  meltingEnthalpyPerVolume,
  oxidation,
  OXYGEN_MOLAR_MASS,
  STEEL_DENSITY,
  steelConductivity,
  steelDiffusivity,
  steelEnthalpy,
  steelSpecificHeat,
  type Oxide,
} from '../../strategy/steel/index.ts';
import { kelvinFromCelsius } from '../../strategy/units/index.ts';
import { outsideChecks, type OutsideCheck } from './check.ts';

const EN_FIRE_HEAT = 'EN 1993-1-2:2005, 3.4.1.2, formula seen through three secondary reproductions that agree';
const EN_FIRE_CONDUCTIVITY = 'EN 1993-1-2:2005, 3.4.1.3, formula seen through a secondary reproduction';
const NIST_IRON = 'NIST Chemistry WebBook, iron (Chase 1998), enthalpies from the coefficients on the page';
const CRC = 'CRC Handbook of Chemistry and Physics, from memory';
const FORMULA = 'computed from a published formula' as const;

function property(
  letter: string,
  what: string,
  unit: string,
  of: (kelvin: number) => number,
  source: string,
  rel: number,
  values: readonly (readonly [number, number])[],
): readonly OutsideCheck[] {
  return values.map(([celsius, expected]) => ({
    id: `${letter}-${celsius}`,
    what: `${what} of carbon steel at ${celsius} °C`,
    unit,
    got: () => of(kelvinFromCelsius(celsius)),
    expected,
    tolerance: { rel },
    source,
    standing: FORMULA,
  }));
}

outsideChecks('steel by EN 1993-1-2', [
  ...property('M01', 'specific heat', 'J/(kg K)', steelSpecificHeat, EN_FIRE_HEAT, 1e-6, [
    [20, 439.80176],
    [100, 487.62],
    [300, 564.74],
    [400, 605.88],
    [500, 666.5],
    [600, 760.217391304],
    [650, 813.75],
    [700, 1008.15789474],
    [735, 5000],
    [750, 1482.89473684],
    [800, 803.260869565],
    [900, 650],
    [1200, 650],
  ]),
  ...property('M02', 'conductivity', 'W/(m K)', steelConductivity, EN_FIRE_CONDUCTIVITY, 1e-6, [
    [20, 53.334],
    [100, 50.67],
    [600, 34.02],
    [799.999, 27.3600333],
    [800, 27.3],
  ]),
  ...property('M03', 'diffusivity', 'm²/s', steelDiffusivity, `${EN_FIRE_HEAT}; density from memory`, 1e-6, [
    [20, 1.5448187673e-5],
    [200, 1.13835949268e-5],
    [400, 8.55312207879e-6],
    [600, 5.70068247761e-6],
    [735, 7.5221656051e-7],
    [900, 5.35031847134e-6],
  ]),
  ...property('M04', 'enthalpy above 20 °C', 'J/kg', steelEnthalpy, EN_FIRE_HEAT, 1e-5, [
    [200, 88_191.1512],
    [400, 201_344.484533],
    [600, 335_737.817867],
    [735, 475_427.813304],
    [900, 632_063.842889],
    [1200, 827_063.842889],
  ]),
]);

const NIST_TABLE = 'NIST Chemistry WebBook, iron (Chase 1998), table of the heat capacity of α-iron';

outsideChecks(
  'steel beside iron',
  (
    [
      [298, 25.09],
      [400, 27.4],
      [500, 29.68],
      [600, 32.06],
      [700, 34.6],
    ] as const
  ).map(([kelvin, expected]): OutsideCheck => ({
    id: `M09-${kelvin}`,
    what: `specific heat of carbon steel at ${kelvin} K by the mole of iron, against iron's own`,
    unit: 'J/(mol K)',
    got: () => steelSpecificHeat(kelvin) * 55.845e-3,
    expected,
    tolerance: { rel: 0.025 },
    source: NIST_TABLE,
    standing: 'published',
  })),
);

outsideChecks('melting of iron', [
  {
    id: 'M05',
    what: 'enthalpy of liquid iron at melting above 298 K',
    unit: 'J/kg',
    got: () => IRON_LIQUID_ENTHALPY,
    expected: 1_297_490.2,
    tolerance: { rel: 1e-3 },
    source: NIST_IRON,
    standing: FORMULA,
  },
  {
    id: 'M06',
    what: 'enthalpy of solid iron at melting above 298 K',
    unit: 'J/kg',
    got: () => IRON_SOLID_ENTHALPY,
    expected: 1_050_078.2,
    tolerance: { rel: 1e-3 },
    source: NIST_IRON,
    standing: FORMULA,
  },
  {
    id: 'M07',
    what: 'heat of fusion of iron',
    unit: 'J/kg',
    got: () => IRON_FUSION_HEAT,
    expected: 247_412,
    tolerance: { rel: 0.01 },
    source: NIST_IRON,
    standing: FORMULA,
  },
  {
    id: 'M07-CRC',
    what: 'heat of fusion of iron by mole',
    unit: 'kJ/mol',
    got: () => (IRON_FUSION_HEAT * 55.845e-3) / 1e3,
    expected: 13.81,
    tolerance: { rel: 0.01 },
    source: CRC,
    standing: 'memory',
  },
  {
    id: 'M08',
    what: 'energy to melt iron from 25 °C by volume',
    unit: 'J/mm³',
    got: () => meltingEnthalpyPerVolume(298.15) / 1e9,
    expected: 10.2112479074,
    tolerance: { rel: 0.005 },
    source: `${NIST_IRON}; 7870 kg/m³`,
    standing: FORMULA,
  },
  {
    id: 'M10-melting',
    what: 'melting temperature of iron',
    unit: 'K',
    got: () => IRON_MELTING_TEMPERATURE,
    expected: 1811,
    tolerance: { rel: 0.005 },
    source: CRC,
    standing: 'memory',
  },
  {
    id: 'M10-fusion',
    what: 'latent heat of fusion of iron per mole (55.845 g/mol)',
    unit: 'kJ/mol',
    got: () => IRON_FUSION_HEAT * 55.845e-6,
    expected: 13.81,
    tolerance: { rel: 0.005 },
    source: CRC,
    standing: 'memory',
  },
  {
    id: 'M10-density',
    what: 'density of steel against iron',
    unit: 'kg/m³',
    got: () => STEEL_DENSITY,
    expected: 7874,
    tolerance: { rel: 0.005 },
    source: CRC,
    standing: 'memory',
  },
]);

/** Heat of formation per mole of oxide, kJ: from the heat per kilogram of oxygen, so that both mole counts are in it. */
function formationHeat(oxide: Oxide, oxygenMoles: number): number {
  return (oxidation(oxide).heatPerOxygen * oxygenMoles * OXYGEN_MOLAR_MASS) / 1e3;
}

function perKilogram(
  id: string,
  oxide: Oxide,
  field: 'heatPerIron' | 'oxygenPerIron' | 'heatPerOxygen',
  expected: number,
  scale: number,
  unit: string,
): OutsideCheck {
  return {
    id,
    what: `${field} of ${oxide}`,
    unit,
    got: () => oxidation(oxide)[field] / scale,
    expected,
    tolerance: { rel: 1e-4 },
    source: 'NIST Chemistry WebBook (Chase 1998), heats of formation; IUPAC atomic weights',
    standing: FORMULA,
  };
}

outsideChecks('oxidation of iron and the ledger of the cut', [
  {
    id: 'O01',
    what: 'heat of formation of FeO',
    unit: 'kJ/mol',
    got: () => formationHeat('FeO', 0.5),
    expected: 272.0441,
    tolerance: { abs: 0.01 },
    source: 'NIST Chemistry WebBook, C1345251 (Chase 1998)',
    standing: 'published',
  },
  {
    id: 'O02',
    what: 'heat of formation of Fe2O3',
    unit: 'kJ/mol',
    got: () => formationHeat('Fe2O3', 1.5),
    expected: 825.5032,
    tolerance: { abs: 0.01 },
    source: 'NIST Chemistry WebBook, C1317608 (Chase 1998)',
    standing: 'published',
  },
  {
    id: 'O03',
    what: 'heat of formation of Fe3O4',
    unit: 'kJ/mol',
    got: () => formationHeat('Fe3O4', 2),
    expected: 1120.894,
    tolerance: { abs: 1 },
    source: 'NIST-JANAF, seen through an encyclopaedia',
    standing: 'published',
  },
  {
    id: 'O03-CODATA',
    what: 'heat of formation of Fe3O4 in other tables',
    unit: 'kJ/mol',
    got: () => formationHeat('Fe3O4', 2),
    expected: 1118.4,
    tolerance: { rel: 0.003 },
    source: 'CODATA-type tables, from memory',
    standing: 'memory',
  },
  perKilogram('O04a-heat', 'FeO', 'heatPerIron', 4.87141373444, 1e6, 'MJ/kg'),
  perKilogram('O04a-oxygen', 'FeO', 'oxygenPerIron', 0.286496552959, 1, 'kg/kg'),
  perKilogram('O04a-per-oxygen', 'FeO', 'heatPerOxygen', 17.0033938773, 1e6, 'MJ/kg'),
  perKilogram('O04b-heat', 'Fe3O4', 'heatPerIron', 6.6905, 1e6, 'MJ/kg'),
  perKilogram('O04b-oxygen', 'Fe3O4', 'oxygenPerIron', 0.381995, 1, 'kg/kg'),
  perKilogram('O04c-heat', 'Fe2O3', 'heatPerIron', 7.39102157758, 1e6, 'MJ/kg'),
  perKilogram('O04c-oxygen', 'Fe2O3', 'oxygenPerIron', 0.429744829439, 1, 'kg/kg'),
  perKilogram('O04c-per-oxygen', 'Fe2O3', 'heatPerOxygen', 17.1986282819, 1e6, 'MJ/kg'),
  {
    id: 'O05',
    what: 'heat of burning to FeO as taken, at 298 K, against iron and oxide both liquid at 2000 K',
    unit: 'kJ/mol',
    got: () => formationHeat('FeO', 0.5),
    expected: 255.870624456,
    tolerance: { rel: 0.07 },
    source:
      'NIST Chemistry WebBook for iron; coefficients of liquid FeO and oxygen from memory; papers use about 257.6',
    standing: 'memory',
  },
  {
    id: 'O06',
    what: 'energy per volume of melt at the least roughness, laser and oxidation',
    unit: 'J/mm³',
    got: () => LEDGER_TOTAL / 1e9,
    expected: 26,
    tolerance: { rel: 0.15 },
    source: 'Fomin et al., J. Appl. Mech. Tech. Phys. 58 (2017), abstract',
    standing: 'published',
  },
  {
    id: 'O07',
    what: 'of that the absorbed laser light, middle of 11…13',
    unit: 'J/mm³',
    got: () => LEDGER_LASER / 1e9,
    expected: 12,
    tolerance: { abs: 1 },
    source: 'Golyshev et al., Quantum Electron. 45 (2015), abstract',
    standing: 'published',
  },
  {
    id: 'O08',
    what: 'share of oxidation in the energy, middle of 40…60 %',
    unit: '',
    got: () => (LEDGER_BURNT_SHARE * STEEL_DENSITY * oxidation('FeO').heatPerIron) / LEDGER_TOTAL,
    expected: 0.5,
    tolerance: { abs: 0.1 },
    source: 'Powell, CO₂ Laser Cutting; Steen, Laser Material Processing; both from memory',
    standing: 'memory',
  },
  {
    id: 'O09',
    what: 'share of the iron burnt to FeO',
    unit: '',
    got: () => LEDGER_BURNT_SHARE,
    expected: 0.365172686959,
    tolerance: { rel: 0.005 },
    source: 'Fomin et al. 2017 and Golyshev et al. 2015, abstracts; NIST heat of formation',
    standing: FORMULA,
  },
  {
    id: 'O10',
    what: 'oxygen burnt by a 0.6 mm kerf in 20 mm at 1 m/min with 37 % to FeO',
    unit: 'g/s',
    got: () => 200e-9 * STEEL_DENSITY * 0.37 * oxidation('FeO').oxygenPerIron * 1e3,
    expected: 0.166425847614,
    tolerance: { rel: 1e-3 },
    source: 'as O09',
    standing: FORMULA,
  },
]);

outsideChecks(
  'cutting speed from the ledger',
  (
    [
      [0.4, 10, 3],
      [0.6, 20, 1],
      [0.8, 30, 0.5],
    ] as const
  ).map(([kerf, plate, expected]): OutsideCheck => ({
    id: `O17-${plate}`,
    what: `speed that 2.4 kW absorbed sustain in a ${kerf} mm kerf of ${plate} mm`,
    unit: 'm/min',
    got: () => (2400 / (LEDGER_LASER * kerf * 1e-3 * plate * 1e-3)) * 60,
    expected,
    tolerance: { rel: 1e-6 },
    source: 'Golyshev et al., Quantum Electron. 45 (2015), abstract: 11…13 J/mm³; arithmetic, ±30 % as a prediction',
    standing: FORMULA,
  })),
);

outsideChecks('heat a kerf leaves in the plate', [
  {
    id: 'H33',
    what: 'heat per cut face, 0.6 mm kerf, 1 m/min, cold plate',
    unit: 'J/mm²',
    got: () => kerfConductionHeat({ feed: 1 / 60, kerfWidth: 0.6e-3, plateTemperature: 1809 - 1500 }) / 1e6,
    expected: 6.48,
    tolerance: { rel: 0.01 },
    source:
      'front half-circle at melting, insulated walls: solved anew at this Péclet number by another hand (finite volumes)',
    standing: FORMULA,
  },
  {
    id: 'O06-closes',
    what: 'melting and conduction together, within the 26 J/mm³ of the cut',
    unit: 'J/mm³',
    got: () =>
      meltingEnthalpyPerVolume(293.15) / 1e9 +
      kerfConductionHeat({ feed: 1 / 60, kerfWidth: 0.6e-3, plateTemperature: 293.15 }) / 1e6 / 0.6,
    expected: 26,
    tolerance: { bound: 'at most' },
    source: 'Fomin et al., J. Appl. Mech. Tech. Phys. 58 (2017), abstract',
    standing: 'published',
  },
  ...(
    [
      [0.2, 1.712],
      [0.5, 2.112],
      [1, 2.514],
      [2, 3.037],
      [3, 3.411],
      [5, 3.969],
    ] as const
  ).map(([peclet, expected]): OutsideCheck => ({
    id: `H30-${peclet}`,
    what: `net heat of a moving kerf at Pe ${peclet}`,
    unit: '',
    got: () => kerfConductionFactor(peclet),
    expected,
    tolerance: { rel: 0.01 },
    source:
      'front half-circle at melting, insulated walls: own finite volumes on two grids, extrapolated; the table is kept',
    standing: FORMULA,
  })),
  ...(
    [
      [0.2, 1.19],
      [0.5, 1.61],
      [1, 2.057],
      [2, 2.636],
      [5, 3.648],
      [10, 4.647],
    ] as const
  ).map(([peclet, expected]): OutsideCheck => ({
    id: `H31-${peclet}`,
    what: `at Pe ${peclet} more than a whole moving cylinder held at melting leaves, whose walls behind take heat back`,
    unit: '',
    got: () => kerfConductionFactor(peclet),
    expected,
    tolerance: { bound: 'at least' },
    source: 'separation of variables, series of Bessel functions: Carslaw and Jaeger, ch. 13',
    standing: FORMULA,
  })),
  ...(
    [
      [100, 0.947229551451],
      [200, 0.881266490765],
      [300, 0.815303430079],
      [400, 0.749340369393],
    ] as const
  ).map(([celsius, expected]): OutsideCheck => {
    const heat = (t: number) =>
      kerfConductionHeat({ feed: 1 / 60, kerfWidth: 0.6e-3, plateTemperature: kelvinFromCelsius(t) });
    return {
      id: `K04-${celsius}`,
      what: `conduction out of the kerf of a plate at ${celsius} °C against one at 20 °C`,
      unit: '',
      got: () => heat(celsius) / heat(20),
      expected,
      tolerance: { rel: 1e-4 },
      source: '(Tm − Tp)/(Tm − T0) with melting at 1536 °C; conduction is linear',
      standing: FORMULA,
    };
  }),
  ...(
    [
      [0.5, 2.42838976879],
      [1, 3.11665831864],
      [2, 4],
      [5, 5.56311956963],
    ] as const
  ).map(([peclet, expected]): OutsideCheck => ({
    id: `H32-${peclet}`,
    what: `net heat of a moving kerf at Pe ${peclet}, as a band`,
    unit: '',
    got: () => kerfConductionFactor(peclet),
    expected,
    tolerance: { rel: 0.5 },
    source: 'Schulz et al., J. Phys. D 26 (1993) 1357: 4·(Pe/2)^0.36, from memory; its Péclet number is not confirmed',
    standing: 'memory',
  })),
]);

const CEV_SOURCE = 'IIW, as in EN 1011-2, seen through a secondary page';
const CET_SOURCE = 'EN 1011-2:2001, C.3, from memory';

outsideChecks(
  'carbon equivalents',
  (
    [
      ['W04a', { carbon: 0.17, manganese: 1.4, copper: 0.55 }, 0.44, 0.3375],
      ['W04b', { carbon: 0.2, manganese: 1.6, copper: 0.55 }, 0.503333333333, 0.3875],
      ['W04d', { carbon: 0.23, manganese: 1.35 }, 0.455, 0.365],
    ] as const
  ).flatMap(([id, analysis, cev, cet]): readonly OutsideCheck[] => [
    {
      id: `${id}-CEV`,
      what: `CEV of C ${analysis.carbon}, Mn ${analysis.manganese}`,
      unit: '%',
      got: () => carbonEquivalentCev(analysis),
      expected: cev,
      tolerance: { rel: 1e-6 },
      source: CEV_SOURCE,
      standing: FORMULA,
    },
    {
      id: `${id}-CET`,
      what: `CET of C ${analysis.carbon}, Mn ${analysis.manganese}`,
      unit: '%',
      got: () => carbonEquivalentCet(analysis),
      expected: cet,
      tolerance: { rel: 1e-6 },
      source: CET_SOURCE,
      standing: 'memory',
    },
  ]),
);

const EN_COOLING = 'EN 1011-2:2001, annex D, formulas seen through a calculator and a public program';

outsideChecks('cooling from 800 to 500 °C', [
  ...(
    [
      ['W01a', 1, 20, 5.28846153846, 2.84089158037, 14.6586052756],
      ['W01b', 2, 15, 10.5769230769, 20.2018956827, 20.7303983862],
    ] as const
  ).flatMap(([id, input, thickness, thick, thin, transition]): OutsideCheck[] => {
    const times = () =>
      coolingTimes({
        heatPerLength: input * 1e6,
        plateTemperature: kelvinFromCelsius(20),
        thickness: thickness * 1e-3,
      });
    const row = (what: string, unit: string, got: () => number, expected: number): OutsideCheck => ({
      id: `${id}-${what.replaceAll(' ', '-')}`,
      what: `${input} kJ/mm in ${thickness} mm: ${what}`,
      unit,
      got,
      expected,
      tolerance: { rel: 1e-4 },
      source: EN_COOLING,
      standing: FORMULA,
    });
    return [
      row('heat flow in three directions', 's', () => times().thick, thick),
      row('heat flow in two directions', 's', () => times().thin, thin),
      row('transition thickness', 'mm', () => times().transition * 1e3, transition),
    ];
  }),
  {
    id: 'W03',
    what: 'edge of a 20 mm cut that leaves 2158 W at 1 m/min',
    unit: 's',
    got: () => cutEdgeCoolingTime(2158 / (0.02 / 60), kelvinFromCelsius(20)),
    expected: 0.0476277473437,
    tolerance: { rel: 1e-3 },
    source: `${EN_COOLING}; its constants are fitted to arc welds`,
    standing: FORMULA,
  },
]);
