import {
  CHOKING_GAUGE_PRESSURE,
  criticalFlowFactor,
  criticalPressureRatio,
  OXYGEN_NORMAL_DENSITY,
  oxygenMassFlow,
  PIERCE_DEFAULTS,
} from '../../strategy/pierce/index.ts';
import { normalFlowFromStandardCubicFeet, quantityIn } from '../../strategy/units/index.ts';
import { outsideChecks, type OutsideCheck } from './check.ts';

const ISENTROPIC =
  'isentropic nozzle flow (St Venant–Wantzel), seen through compressible-flow pages; ideal oxygen, γ 1.4, 20 °C, C_d 1';
const ISO_9300 = 'form of ISO 9300, from memory';
const TABLE = 'gas supplier’s conversion table for oxygen';
const FORMULA = 'computed from a published formula' as const;

/** Diameter mm, gauge pressure bar, flow kg/s, the same in litres a minute at normal state. */
const FLOWS = [
  [1.0, 0.5, 0.000281512015149, 11.8313219258],
  [1.0, 0.7, 0.000330890183919, 13.9065761934],
  [1.0, 1.0, 0.000392294909819, 16.4872798252],
  [1.0, 1.5, 0.000489723175017, 20.5819724429],
  [1.2, 0.5, 0.000405377301814, 17.0371035731],
  [1.2, 1.0, 0.00056490467014, 23.7416829483],
  [1.2, 1.5, 0.000705201372025, 29.6380403178],
  [1.5, 0.7, 0.000744502913818, 31.2897964352],
  [1.5, 1.0, 0.000882663547094, 37.0963796068],
  [1.5, 1.5, 0.00110187714379, 46.3094379966],
  [1.8, 0.5, 0.000912098929081, 38.3334830395],
  [1.8, 0.7, 0.0010720841959, 45.0573068667],
  [1.8, 1.0, 0.00127103550781, 53.4187866338],
  [2.0, 0.5, 0.00112604806059, 47.3252877031],
  [2.0, 0.7, 0.00132356073568, 55.6263047737],
  [2.0, 1.0, 0.00156917963928, 65.9491193009],
  [2.0, 1.5, 0.00195889270007, 82.3278897718],
] as const;

function flow(millimetres: number, bar: number): number {
  return oxygenMassFlow(millimetres * 1e-3, bar * 1e5, 1);
}

/** The choked formula where it does not hold: p·A·C*·√(M/RT). */
function choked(millimetres: number, bar: number): number {
  const area = (Math.PI / 4) * (millimetres * 1e-3) ** 2;
  return (area * (101_325 + bar * 1e5) * criticalFlowFactor()) / Math.sqrt((8.314462618 / 31.9988e-3) * 293.15);
}

/** Throat Reynolds number of a 1.5 mm nozzle at 1 bar, viscosity 2.03e-5 Pa·s. */
function throatReynolds(): number {
  return (4 * flow(1.5, 1)) / (Math.PI * 1.5e-3 * 2.03e-5);
}

outsideChecks('oxygen flow', [
  {
    id: 'G01-1.4',
    what: 'critical pressure ratio, γ 1.4',
    unit: '',
    got: () => criticalPressureRatio(1.4),
    expected: 0.528281787717,
    tolerance: { rel: 1e-6 },
    source: ISENTROPIC,
    standing: FORMULA,
  },
  {
    id: 'G01-1.395',
    what: 'critical pressure ratio, γ 1.395',
    unit: '',
    got: () => criticalPressureRatio(1.395),
    expected: 0.529125387109,
    tolerance: { rel: 1e-6 },
    source: ISENTROPIC,
    standing: FORMULA,
  },
  {
    id: 'G02',
    what: 'critical flow factor C*, γ 1.4',
    unit: '',
    got: () => criticalFlowFactor(1.4),
    expected: 0.684731456377,
    tolerance: { rel: 1e-6 },
    source: ISO_9300,
    standing: 'memory',
  },
  {
    id: 'G03',
    what: 'gauge pressure from which a nozzle into air chokes',
    unit: 'bar',
    got: () => CHOKING_GAUGE_PRESSURE / 1e5,
    expected: 0.904760470091,
    tolerance: { rel: 1e-4 },
    source: ISENTROPIC,
    standing: FORMULA,
  },
  ...FLOWS.flatMap(([millimetres, bar, mass, litres]): readonly OutsideCheck[] => [
    {
      id: `G04-${millimetres}-${bar}`,
      what: `oxygen through ${millimetres} mm at ${bar} bar`,
      unit: 'g/s',
      got: () => flow(millimetres, bar) * 1e3,
      expected: mass * 1e3,
      tolerance: { rel: 1e-4 },
      source: ISENTROPIC,
      standing: FORMULA,
    },
    {
      id: `G04-${millimetres}-${bar}-litres`,
      what: `the same at 0 °C, 101 325 Pa`,
      unit: 'L/min',
      got: () => (flow(millimetres, bar) / OXYGEN_NORMAL_DENSITY) * 60e3,
      expected: litres,
      tolerance: { rel: 1e-4 },
      source: ISENTROPIC,
      standing: FORMULA,
    },
  ]),
  ...(
    [
      [1.0, 0.5, 26.9819822826],
      [1.5, 0.7, 71.3581067557],
      [2.0, 1.5, 187.753293936],
    ] as const
  ).map(([millimetres, bar, expected]): OutsideCheck => ({
    id: `G04-${millimetres}-${bar}-scfh`,
    what: `oxygen through ${millimetres} mm at ${bar} bar in standard cubic feet (70 °F, 1 atm)`,
    unit: 'scfh',
    got: () => flow(millimetres, bar) / OXYGEN_NORMAL_DENSITY / normalFlowFromStandardCubicFeet(1),
    expected,
    tolerance: { rel: 0.002 },
    source: `${ISENTROPIC}; 0.03756 kg a standard cubic foot, ${TABLE}`,
    standing: FORMULA,
  })),
  ...(
    [
      [0.3, 1.17],
      [0.5, 1.047],
      [0.7, 1.009],
    ] as const
  ).map(([bar, expected]): OutsideCheck => ({
    id: `G03-over-${bar}`,
    what: `what the choked formula alone would claim at ${bar} bar, over what flows`,
    unit: '',
    got: () => choked(1.5, bar) / flow(1.5, bar),
    expected,
    tolerance: { abs: 0.005 },
    source: ISENTROPIC,
    standing: FORMULA,
  })),
  {
    id: 'G05',
    what: 'density of oxygen at normal state, ideal gas',
    unit: 'kg/m³',
    got: () => OXYGEN_NORMAL_DENSITY,
    expected: 1.42762753096,
    tolerance: { rel: 1e-5 },
    source: 'ideal gas law; normal state as in DIN 1343',
    standing: FORMULA,
  },
  {
    id: 'G06-Re',
    what: 'throat Reynolds number, 1.5 mm at 1 bar',
    unit: '',
    got: throatReynolds,
    expected: 36_907.7876143,
    tolerance: { rel: 1e-3 },
    source: ISO_9300,
    standing: 'memory',
  },
  {
    id: 'G06-Cd',
    what: 'discharge coefficient of a toroidal nozzle at that Reynolds number',
    unit: '',
    got: () => 0.9959 - 2.72 / Math.sqrt(throatReynolds()),
    expected: 0.981741739535,
    tolerance: { rel: 1e-3 },
    source: 'ISO 9300:2005, coefficients from memory',
    standing: 'memory',
  },
  {
    id: 'G06-conical',
    what: 'default discharge coefficient, middle of 0.85…0.95 for conical cutting nozzles',
    unit: '',
    got: () => PIERCE_DEFAULTS.dischargeCoefficient,
    expected: 0.9,
    tolerance: { abs: 0.05 },
    source: 'range for conical nozzles, from memory',
    standing: 'memory',
  },
  {
    id: 'G07-normal',
    what: 'mass of a normal cubic metre of oxygen',
    unit: 'kg',
    got: () => OXYGEN_NORMAL_DENSITY,
    expected: 1.4291,
    tolerance: { rel: 0.002 },
    source: TABLE,
    standing: 'published',
  },
  {
    id: 'G07-standard',
    what: 'mass of a standard cubic foot of oxygen (70 °F, 1 atm)',
    unit: 'kg',
    got: () => quantityIn(normalFlowFromStandardCubicFeet(1), 'volumeFlow', 'm³/h') * OXYGEN_NORMAL_DENSITY,
    expected: 0.03756,
    tolerance: { rel: 0.002 },
    source: TABLE,
    standing: 'published',
  },
]);
