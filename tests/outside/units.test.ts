import {
  celsiusFromKelvin,
  kelvinFromFahrenheit,
  normalFlowFromStandardCubicFeet,
  quantityFrom,
  quantityIn,
  quantityParse,
  type Dimension,
} from '../../strategy/units/index.ts';
import { outsideChecks, type OutsideCheck, type Standing } from './check.ts';

const EXACT = 'exact by definition; NIST SP 811, appendix B (2008)';
const SP_811 = 'NIST SP 811, appendix B, seen through a handbook’s reprint';

function one(
  id: string,
  spelling: string,
  dimension: Dimension,
  expected: number,
  unit: string,
  source = EXACT,
  standing: Standing = 'published',
): OutsideCheck {
  const got = () => quantityFrom(1, dimension, spelling);
  return { id, what: `1 ${spelling}`, unit, got, expected, tolerance: { rel: 1e-9 }, source, standing };
}

/** As somebody types it, through the parser. */
function typed(text: string, dimension: Dimension, unit: string): () => number {
  return () => {
    const parsed = quantityParse(text, dimension, unit);
    if (parsed.kind === 'none') throw new Error(parsed.why);
    return parsed.value;
  };
}

outsideChecks('units', [
  one('N01-inch', 'in', 'length', 0.0254, 'm'),
  one('N01-foot', 'ft', 'length', 0.3048, 'm'),
  one('N01-pound', 'lb', 'mass', 0.45359237, 'kg'),
  one('N01-psi', 'psi', 'pressure', 6894.75729317, 'Pa'),
  one('N01-bar', 'bar', 'pressure', 100_000, 'Pa'),
  one('N01-atm', 'atm', 'pressure', 101_325, 'Pa'),
  one('N01-btu', 'Btu', 'energy', 1055.05585262, 'J', SP_811),
  one('N01-cal', 'cal', 'energy', 4.184, 'J', SP_811),
  one('N01-hp', 'hp', 'power', 745.699871582, 'W'),
  {
    ...one('N01-lbf', 'psi', 'pressure', 4.44822161526, 'N'),
    what: '1 lbf, as 1 psi on a square inch',
    got: () => quantityFrom(1, 'pressure', 'psi') * 0.0254 ** 2,
  },
  one('N02-cfh', 'ft³/h', 'volumeFlow', 7.86579072e-6, 'm³/s'),
  {
    ...one('N02-cfh-litres', 'ft³/h', 'volumeFlow', 0.4719474432, 'L/min'),
    got: () => quantityIn(quantityFrom(1, 'volumeFlow', 'cfh'), 'volumeFlow', 'L/min'),
  },
  {
    ...one('N02-ipm', 'ipm', 'speed', 0.423333333333, 'mm/s'),
    got: () => quantityIn(quantityFrom(1, 'speed', 'ipm'), 'speed', 'mm/s'),
  },
  {
    ...one('N02-ipm-metres', 'ipm', 'speed', 0.0254, 'm/min'),
    got: () => quantityIn(quantityFrom(1, 'speed', 'ipm'), 'speed', 'm/min'),
  },
  {
    id: 'N03',
    what: '1 scfh (70 °F, 1 atm) as flow at 0 °C, 1 atm',
    unit: 'm³/h',
    got: () => quantityIn(normalFlowFromStandardCubicFeet(1), 'volumeFlow', 'm³/h'),
    expected: 0.0262853172048,
    tolerance: { rel: 1e-6 },
    source: 'ideal gas between the two states; normal state as in DIN 1343, seen through a compressor maker’s glossary',
    standing: 'computed from a published formula',
  },
  ...(
    [
      [32, 0],
      [212, 100],
      [1500, 815.555555556],
    ] as const
  ).map(([fahrenheit, celsius]): OutsideCheck => ({
    id: `N04-${fahrenheit}`,
    what: `${fahrenheit} °F`,
    unit: '°C',
    got: () => celsiusFromKelvin(kelvinFromFahrenheit(fahrenheit)),
    expected: celsius,
    tolerance: { abs: 1e-6 },
    source: EXACT,
    standing: 'published',
  })),
  {
    id: 'N05',
    what: '25.4 kJ/in as heat input per length',
    unit: 'J/mm',
    got: () => quantityIn(quantityFrom(25.4, 'energyPerLength', 'kJ/in'), 'energyPerLength', 'J/mm'),
    expected: 1000,
    tolerance: { rel: 1e-9 },
    source: EXACT,
    standing: 'published',
  },
  {
    ...one('N01-typed-fraction', 'in', 'length', 0.01905, 'm'),
    what: '3/4" as typed',
    got: typed('3/4"', 'length', 'mm'),
  },
  {
    ...one('N01-typed-psi', 'psi', 'pressure', 82_737.087518, 'Pa'),
    what: '12 psi as typed',
    got: typed('12 psi', 'pressure', 'bar'),
  },
]);
