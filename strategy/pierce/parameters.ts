import {
  COLD_PLATE_TEMPERATURE,
  HOT_CONDUCTIVITY,
  LEDGER_BURNT_SHARE,
  LEDGER_TOTAL,
  meltingEnthalpy,
  oxidation,
  STEEL_DENSITY,
} from '../steel/index.ts';

/** Changes whenever the same input would give another prediction. Stored with every prediction. */
export const PIERCE_MODEL_VERSION = 'pierce-2';

/** The numbers the model cannot know by itself. Coupling, attenuation length and bore radius are what test cuts fit first. SI. */
export type PierceParameters = {
  readonly coupling: number;
  readonly attenuationLength: number;
  readonly boreRadius: number;
  readonly spotFollowing: number;
  readonly guidedShare: number;
  readonly burntShare: number;
  readonly oxygenUse: number;
  readonly oxygenDepth: number;
  readonly dischargeCoefficient: number;
  readonly jetSpread: number;
  readonly expulsionHeat: number;
  readonly conductivity: number;
  readonly deepConduction: number;
  readonly wallShare: number;
  readonly remeltTime: number;
  readonly pauseLoss: number;
  readonly meltSpeed: number;
  readonly eruptionLimit: number;
  readonly backfallShare: number;
};

export type PierceParameterName = keyof PierceParameters;

export type PierceParameterRow = {
  readonly name: PierceParameterName;
  readonly default: number;
  /** Closed range outside which a prediction is refused. */
  readonly min: number;
  readonly max: number;
  readonly unit: string;
  readonly meaning: string;
  readonly origin: string;
};

/** Beam radius at the plate's top for which `boreRadius` holds, m: a 0.2 mm spot of 4 mm·mrad focused 5 mm above the plate. */
export const REFERENCE_BEAM_RADIUS = 0.2236e-3;

/** What the ledger of the cut leaves beside melting a cold plate, J/kg: superheat and what the thrown melt carries away. */
const LEDGER_EXPULSION = LEDGER_TOTAL / STEEL_DENSITY - meltingEnthalpy(COLD_PLATE_TEMPERATURE);

/** Least net heat that removing a volume must cost, J/m³. Below it burning would all but feed itself, which no pierce does. */
const LEAST_NET_HEAT = 2e9;

const OWN_ESTIMATE = 'own estimate, to be fitted to test cuts; no source';

/** Every parameter: default, range, unit, meaning and where it comes from. */
export const pierceParameterTable: readonly PierceParameterRow[] = [
  row(
    'coupling',
    0.4,
    0.1,
    0.9,
    '',
    'share of the light that enters the bore and is absorbed at its bottom while shallow',
    OWN_ESTIMATE,
  ),
  row(
    'attenuationLength',
    0.018,
    0.004,
    0.06,
    'm',
    'depth over which the light that reaches the bottom falls to 1/e: absorbed by the wall and in the rising melt',
    'own estimate: a flat 1 kW is to stall near 12 mm; to be fitted to test cuts, no source',
  ),
  row(
    'boreRadius',
    0.75e-3,
    0.3e-3,
    1.5e-3,
    'm',
    'radius of the bore for a beam radius of 0.22 mm at the top of the plate',
    OWN_ESTIMATE,
  ),
  row(
    'spotFollowing',
    1,
    0,
    1,
    '',
    'how far the bore widens and narrows with the beam at the top of the plate: 1 as much, 0 not at all',
    OWN_ESTIMATE,
  ),
  row(
    'guidedShare',
    0.85,
    0,
    1,
    '',
    'share of the light that would miss the bottom in free space and is guided down by the wall',
    'kerfs guide the light: free-space width overstates the width at depth; the figure is an own estimate, no source',
  ),
  row(
    'burntShare',
    LEDGER_BURNT_SHARE,
    0,
    0.45,
    '',
    'share of the molten iron that burns to FeO with all the oxygen it can take',
    'from 26 J/mm³ in total (Fomin et al. 2017) and 12 J/mm³ absorbed (Golyshev et al. 2015), abstracts',
  ),
  row(
    'oxygenUse',
    0.15,
    0.01,
    1,
    '',
    'share of the oxygen arriving at the bottom that could react there',
    OWN_ESTIMATE,
  ),
  row(
    'oxygenDepth',
    0.025,
    0.005,
    1,
    'm',
    'depth over which the oxygen that reaches the bottom falls to 1/e, against the melt coming up',
    OWN_ESTIMATE,
  ),
  row(
    'dischargeCoefficient',
    0.9,
    0.5,
    1,
    '',
    'flow through the nozzle against the ideal one',
    'conical cutting nozzles 0.85 to 0.95, from memory',
  ),
  row(
    'jetSpread',
    0.1,
    0,
    0.4,
    '',
    'growth of the jet’s radius with the distance from the nozzle; half of it for a double nozzle, whose outer stream shields the jet',
    'round free jets spread at about 0.1, from memory',
  ),
  row(
    'expulsionHeat',
    LEDGER_EXPULSION,
    0.2e6,
    3e6,
    'J/kg',
    'heat beyond melting that the thrown melt takes along: superheat, vapour, what it leaves on its way',
    'what closes 26 J/mm³ (Fomin et al. 2017, abstract) over melting from 20 °C',
  ),
  row(
    'conductivity',
    HOT_CONDUCTIVITY,
    20,
    55,
    'W/(m K)',
    'conductivity of the steel around the hot bottom',
    'EN 1993-1-2:2005, 3.4.1.3, at 600 to 1000 °C',
  ),
  row(
    'deepConduction',
    1.6,
    0,
    2.5,
    '',
    'growth of what the bottom conducts away, in k·a·ΔT above the 4 of a disk on the surface, once it is deep in an insulated bore',
    'own finite-volume solution: 5.6 ± 0.2 in all for a deep bore at Péclet 0 to 1; no outside source',
  ),
  row(
    'wallShare',
    0.01,
    0,
    0.3,
    '',
    'share of the bore’s wall that the rising melt keeps at melting; its loss grows with depth',
    OWN_ESTIMATE,
  ),
  row(
    'remeltTime',
    0.005,
    0.0005,
    0.1,
    's',
    'pause between pulses that the bottom bears before it freezes over',
    OWN_ESTIMATE,
  ),
  row(
    'pauseLoss',
    1,
    0,
    3,
    '',
    'heat to open a frozen bottom again, as a multiple of what was conducted away while it was frozen',
    OWN_ESTIMATE,
  ),
  row(
    'meltSpeed',
    0.15,
    0.03,
    1,
    'm/s',
    'speed at which the melt rises to the mouth without the jet; the jet’s pressure adds to it',
    OWN_ESTIMATE,
  ),
  row(
    'eruptionLimit',
    0.07,
    0.02,
    0.5,
    '',
    'share of the bore that one pulse’s melt may fill before it is thrown out',
    OWN_ESTIMATE,
  ),
  row(
    'backfallShare',
    0.5,
    0,
    1,
    '',
    'share of the thrown melt’s heat that falls back beside the mouth when the pierce erupts',
    OWN_ESTIMATE,
  ),
];

/** The defaults as a record. */
export const PIERCE_DEFAULTS: PierceParameters = defaults();

/**
 * The defaults with some of them replaced. RangeError when one is outside its range, or when burning would give nearly as
 * much heat as removing the steel takes in the hottest plate that is accepted.
 */
export function pierceParameters(changed: Partial<PierceParameters> = {}): PierceParameters {
  const all: PierceParameters = { ...PIERCE_DEFAULTS, ...changed };
  for (const { name, min, max, unit } of pierceParameterTable) {
    const value = all[name];
    if (!(value >= min && value <= max)) {
      throw new RangeError(`${name} ${value} is outside [${min}, ${max}]${unit === '' ? '' : ` ${unit}`}`);
    }
  }
  return all;
}

/**
 * Heat that must come from the laser to remove a kilogram from the plate when oxygen is ample, J/kg.
 * RangeError when it is below what a pierce can live on.
 */
export function netRemovalHeat(parameters: PierceParameters, plateTemperature: number): number {
  const net =
    meltingEnthalpy(plateTemperature) + parameters.expulsionHeat - parameters.burntShare * oxidation('FeO').heatPerIron;
  if (net * STEEL_DENSITY < LEAST_NET_HEAT) {
    throw new RangeError(
      `expulsionHeat ${parameters.expulsionHeat} J/kg with burntShare ${parameters.burntShare} leaves ${net} J/kg to the laser, less than ${LEAST_NET_HEAT / STEEL_DENSITY} J/kg`,
    );
  }
  return net;
}

function row(
  name: PierceParameterName,
  value: number,
  min: number,
  max: number,
  unit: string,
  meaning: string,
  origin: string,
): PierceParameterRow {
  return { name, default: value, min, max, unit, meaning, origin };
}

function defaults(): PierceParameters {
  const of = (name: PierceParameterName): number => {
    const found = pierceParameterTable.find((candidate) => candidate.name === name);
    if (found === undefined) throw new RangeError(`${name} is missing from the parameter table`);
    return found.default;
  };
  return {
    coupling: of('coupling'),
    attenuationLength: of('attenuationLength'),
    boreRadius: of('boreRadius'),
    spotFollowing: of('spotFollowing'),
    guidedShare: of('guidedShare'),
    burntShare: of('burntShare'),
    oxygenUse: of('oxygenUse'),
    oxygenDepth: of('oxygenDepth'),
    dischargeCoefficient: of('dischargeCoefficient'),
    jetSpread: of('jetSpread'),
    expulsionHeat: of('expulsionHeat'),
    conductivity: of('conductivity'),
    deepConduction: of('deepConduction'),
    wallShare: of('wallShare'),
    remeltTime: of('remeltTime'),
    pauseLoss: of('pauseLoss'),
    meltSpeed: of('meltSpeed'),
    eruptionLimit: of('eruptionLimit'),
    backfallShare: of('backfallShare'),
  };
}
