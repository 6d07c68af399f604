import { type Species } from '../reduction/run-input'
import { GAS_CONSTANT_J_PER_MOL_K } from '../units/constants'
import { molarMass } from '../units/molar-mass'
import { AnalysisError } from '../analysis-error'
import { heatCapacityOrLeast } from '../equilibrium/least-heat-capacity'
import { diffusionVolume } from './diffusion-volume'
import { FULLER_RELATIVE_STANDARD_UNCERTAINTY, fullerDiffusivity } from './fuller-diffusivity'
import { gasViscosity, mixtureThermalConductivity, mixtureViscosity } from './gas-viscosity'
import { LENNARD_JONES } from './lennard-jones'
import { coupledMixtureDiffusivity, type MixturePartner, stagnantMixtureDiffusivity } from './mixture-diffusivity'
import { packedBedSherwood } from './particle-film'
import { bosanquetDiffusivity, effectiveDiffusivity, knudsenDiffusivity } from './pore-diffusivity'
import { type AssumedInput, type RegimeInput } from './regime-input'

/** A number with how well it is known and what was assumed for it. */
export interface RegimeQuantity {
  readonly value: number
  readonly relativeStandardUncertainty: number
  readonly assumed: readonly AssumedInput[]
}

/** Everything the criteria are built from; null where an input without a usual value is missing, with the missing inputs in words. */
export interface RegimeState {
  /** mean over the bed */
  readonly moleFraction: Readonly<Record<Species, number>>
  readonly keyConcentrationMolPerM3: number
  readonly particleDensity: RegimeQuantity
  readonly voidFraction: RegimeQuantity
  readonly diluentFraction: RegimeQuantity
  readonly bedLength: RegimeQuantity | null
  readonly superficialVelocityMPerS: number | null
  readonly molecularDiffusivity: RegimeQuantity | null
  readonly effectiveDiffusivity: RegimeQuantity | null
  readonly viscosityPaS: number | null
  readonly densityKgPerM3: number | null
  readonly filmMassCoefficient: RegimeQuantity | null
  readonly filmHeatCoefficient: RegimeQuantity | null
  /** species for which a property could not be estimated */
  readonly unknownSpecies: readonly Species[]
}

/** Values taken where nothing was entered. Judgement, each with a wide uncertainty, and named wherever it is used. */
export const REGIME_DEFAULTS = {
  particleDensity: assumed('particle density', 1_200, 'kg/m3', 0.2, 'usual for porous oxides'),
  diluentDensity: assumed('density of the diluent', 2_650, 'kg/m3', 0.1, 'quartz'),
  voidFraction: assumed('void fraction of the bed', 0.4, '1', 0.1, 'random packing'),
  poreFraction: assumed('pore fraction of the particle', 0.4, '1', 0.25, 'usual for porous oxides'),
  tortuosity: assumed('tortuosity', 3.5, '1', 0.5, 'usual range 2 to 6'),
  poreRadius: assumed('mean pore radius', 5e-9, 'm', 0.5, 'usual for mesoporous oxides'),
  particleConductivity: assumed(
    'thermal conductivity of the particle',
    0.2,
    'W/(m K)',
    0.5,
    'porous alumina 0.1 to 0.4',
  ),
  bedConductivity: assumed('radial thermal conductivity of the bed', 0.25, 'W/(m K)', 0.5, 'usual range 0.1 to 0.5'),
  wallBiot: assumed('Biot number at the wall', 1, '1', 0.5, 'narrow tubes at low flow'),
  bodenstein: assumed('Bodenstein number', 0.5, '1', 0.5, 'gas, usual range 0.3 to 2'),
  activationEnergy: assumed('activation energy', 80_000, 'J/mol', 0.3, 'usual for surface reactions'),
} as const

/** Relative standard uncertainty of a film coefficient at low Reynolds number: the correlations scatter by about this much. */
const FILM_RELATIVE_STANDARD_UNCERTAINTY = 0.3
const CONDUCTIVITY_RELATIVE_STANDARD_UNCERTAINTY = 0.15

/**
 * Gas, particle and bed properties at one point, with what had to be assumed.
 *
 * Mean composition of inlet and outlet by the main step; Fuller pair diffusivities coupled by the stoichiometry, Bosanquet in the pores;
 * viscosity by Chapman-Enskog and Wilke; films by Wakao-Funazkri, 2 at low flow.
 * Source: as in the single functions.
 *
 * @param input - the point [SI]
 * @returns properties [SI]
 * @throws {AnalysisError} not-positive when temperature, pressure or flow is not above zero | not-finite | unknown-species when a species is no formula
 */
export function regimeState(input: RegimeInput): RegimeState {
  for (const [name, value] of [
    ['temperature', input.temperatureK],
    ['pressure', input.pressurePa],
    ['flow', input.totalFlowMolPerS],
  ] as const)
    if (!(value > 0) || !Number.isFinite(value))
      throw new AnalysisError('not-positive', `The ${name} of the point must be a number above zero.`, { name, value })
  const others = [input.conversion, input.loading.catalystMassKg, ...Object.values(input.inletMoleFraction)]
  if (others.some((value) => !Number.isFinite(value) || value < -1))
    throw new AnalysisError('not-finite', 'Conversion, catalyst mass and composition of the point must be numbers.', {
      others,
    })
  const moleFraction = meanComposition(input)
  const concentration = input.pressurePa / (GAS_CONSTANT_J_PER_MOL_K * input.temperatureK)
  const { loading } = input
  const particleDensity = known(loading.particleDensityKgPerM3, REGIME_DEFAULTS.particleDensity, 0.05)
  const voidFraction = known(loading.bedVoidFraction, REGIME_DEFAULTS.voidFraction, 0.05)
  const diluentFraction = diluentShare(input, particleDensity)
  const area =
    loading.tubeInnerDiameterM === null ? null : (Math.PI * loading.tubeInnerDiameterM * loading.tubeInnerDiameterM) / 4
  const unknown = new Set<Species>()
  const molecularDiffusivity = diffusivityInMixture(input, moleFraction, unknown)
  const gas = gasProperties(input, moleFraction, unknown)
  const density = gas === null ? null : gas.massKgPerMol * concentration
  const velocity = area === null ? null : input.totalFlowMolPerS / concentration / area
  const films = filmCoefficients(input, gas, density, velocity, molecularDiffusivity)
  return {
    moleFraction,
    keyConcentrationMolPerM3: (moleFraction[input.keyReactant] ?? 0) * concentration,
    particleDensity,
    voidFraction,
    diluentFraction,
    bedLength: bedLengthOf(input, area, particleDensity, voidFraction),
    superficialVelocityMPerS: velocity,
    molecularDiffusivity,
    effectiveDiffusivity: diffusivityInParticle(input, molecularDiffusivity),
    viscosityPaS: gas?.viscosityPaS ?? null,
    densityKgPerM3: density,
    filmMassCoefficient: films?.mass ?? null,
    filmHeatCoefficient: films?.heat ?? null,
    unknownSpecies: [...unknown],
  }
}

/**
 * A usual value for an input that was not entered.
 *
 * @param name - in words [-]
 * @param value - usual value [unit]
 * @param unit - its unit [-]
 * @param relativeStandardUncertainty - how far it may be off, relative [-]
 * @param source - why this value [-]
 * @returns the record [-]
 */
function assumed(
  name: string,
  value: number,
  unit: string,
  relativeStandardUncertainty: number,
  source: string,
): AssumedInput {
  return { name, value, unit, relativeStandardUncertainty, source }
}

function known(entered: number | null, usual: AssumedInput, enteredUncertainty: number): RegimeQuantity {
  return entered !== null && entered > 0
    ? { value: entered, relativeStandardUncertainty: enteredUncertainty, assumed: [] }
    : { value: usual.value, relativeStandardUncertainty: usual.relativeStandardUncertainty, assumed: [usual] }
}

// Mean of inlet and outlet by the main step.
function meanComposition(input: RegimeInput): Record<Species, number> {
  const key = -(input.stoichiometry[input.keyReactant] ?? -1)
  const converted = ((input.inletMoleFraction[input.keyReactant] ?? 0) * input.conversion) / key
  const species = [...new Set([...Object.keys(input.inletMoleFraction), ...Object.keys(input.stoichiometry)])].sort()
  let total = 1
  for (const name of species) total += (input.stoichiometry[name] ?? 0) * converted
  const mean: Record<Species, number> = {}
  for (const name of species) {
    const inlet = input.inletMoleFraction[name] ?? 0
    mean[name] = (inlet + (inlet + (input.stoichiometry[name] ?? 0) * converted) / total) / 2
  }
  return mean
}

function diluentShare({ loading }: RegimeInput, particleDensity: RegimeQuantity): RegimeQuantity {
  if (!(loading.diluentMassKg > 0)) return { value: 0, relativeStandardUncertainty: 0, assumed: [] }
  const { diluentDensity } = REGIME_DEFAULTS
  const diluent = loading.diluentMassKg / diluentDensity.value
  const catalyst = loading.catalystMassKg / particleDensity.value
  const value = diluent / (diluent + catalyst)
  const ratio = Math.sqrt(
    particleDensity.relativeStandardUncertainty * particleDensity.relativeStandardUncertainty +
      diluentDensity.relativeStandardUncertainty * diluentDensity.relativeStandardUncertainty,
  )
  return {
    value,
    relativeStandardUncertainty: (1 - value) * ratio,
    assumed: [diluentDensity, ...particleDensity.assumed],
  }
}

// As entered, else from the masses, the densities and the tube.
function bedLengthOf(
  { loading }: RegimeInput,
  area: number | null,
  particleDensity: RegimeQuantity,
  voidFraction: RegimeQuantity,
): RegimeQuantity | null {
  if (loading.bedLengthM !== null) return { value: loading.bedLengthM, relativeStandardUncertainty: 0.05, assumed: [] }
  if (area === null) return null
  const solid =
    loading.catalystMassKg / particleDensity.value + loading.diluentMassKg / REGIME_DEFAULTS.diluentDensity.value
  return {
    value: solid / (1 - voidFraction.value) / area,
    relativeStandardUncertainty: 0.2,
    assumed: [
      ...particleDensity.assumed,
      ...voidFraction.assumed,
      ...(loading.diluentMassKg > 0 ? [REGIME_DEFAULTS.diluentDensity] : []),
    ],
  }
}

function diffusivityInMixture(
  input: RegimeInput,
  moleFraction: Readonly<Record<Species, number>>,
  unknown: Set<Species>,
): RegimeQuantity | null {
  const keyVolume = diffusionVolume(input.keyReactant)
  if (keyVolume === null) {
    unknown.add(input.keyReactant)
    return null
  }
  const partners: MixturePartner[] = []
  for (const [species, fraction] of Object.entries(moleFraction)) {
    if (species === input.keyReactant || !(fraction > 0)) continue
    const volume = diffusionVolume(species)
    if (volume === null) {
      unknown.add(species)
      continue
    }
    const diffusivityM2PerS = fullerDiffusivity({
      temperatureK: input.temperatureK,
      pressurePa: input.pressurePa,
      molarMassAKgPerMol: molarMass(input.keyReactant),
      molarMassBKgPerMol: molarMass(species),
      volumeA: keyVolume,
      volumeB: volume,
    })
    partners.push({
      moleFraction: fraction,
      diffusivityM2PerS,
      stoichiometricNumber: input.stoichiometry[species] ?? 0,
    })
  }
  if (partners.length === 0) return null
  const keyFraction = moleFraction[input.keyReactant] ?? 0
  const keyNumber = input.stoichiometry[input.keyReactant] ?? -1
  const coupled = keyNumber < 0 ? coupledMixtureDiffusivity(keyFraction, keyNumber, partners) : null
  return {
    value: coupled ?? stagnantMixtureDiffusivity(keyFraction, partners),
    relativeStandardUncertainty: FULLER_RELATIVE_STANDARD_UNCERTAINTY,
    assumed: [],
  }
}

function diffusivityInParticle(
  { loading, temperatureK, keyReactant }: RegimeInput,
  molecular: RegimeQuantity | null,
): RegimeQuantity | null {
  if (molecular === null) return null
  const radius = known(loading.meanPoreRadiusM, REGIME_DEFAULTS.poreRadius, 0.1)
  const poreFraction = known(loading.poreFraction, REGIME_DEFAULTS.poreFraction, 0.1)
  const tortuosity = known(loading.tortuosity, REGIME_DEFAULTS.tortuosity, 0.25)
  const knudsen = knudsenDiffusivity(radius.value, temperatureK, molarMass(keyReactant))
  const pore = bosanquetDiffusivity(molecular.value, knudsen)
  // share of the resistance that the wall makes up: that is how far the pore radius counts
  const wallShare = pore / knudsen
  return {
    value: effectiveDiffusivity(pore, poreFraction.value, tortuosity.value),
    relativeStandardUncertainty: root(
      wallShare * radius.relativeStandardUncertainty,
      (1 - wallShare) * molecular.relativeStandardUncertainty,
      poreFraction.relativeStandardUncertainty,
      tortuosity.relativeStandardUncertainty,
    ),
    assumed: [...radius.assumed, ...poreFraction.assumed, ...tortuosity.assumed],
  }
}

interface GasProperties {
  readonly massKgPerMol: number
  readonly viscosityPaS: number
  readonly conductivityWPerMK: number
  readonly heatCapacityJPerMolK: number
}

function gasProperties(
  input: RegimeInput,
  moleFraction: Readonly<Record<Species, number>>,
  unknown: Set<Species>,
): GasProperties | null {
  const gases = Object.entries(moleFraction).flatMap(([species, fraction]) => {
    if (!(fraction > 0)) return []
    const parameters = Object.hasOwn(LENNARD_JONES, species) ? LENNARD_JONES[species] : undefined
    if (parameters === undefined) {
      unknown.add(species)
      return []
    }
    const molarMassKgPerMol = molarMass(species)
    return [
      {
        moleFraction: fraction,
        molarMassKgPerMol,
        viscosityPaS: gasViscosity(input.temperatureK, molarMassKgPerMol, parameters),
        heatCapacityJPerMolK:
          input.heatCapacityJPerMolK?.[species] ?? heatCapacityOrLeast(species, input.temperatureK).valueJPerMolK,
      },
    ]
  })
  const total = gases.reduce((sum, gas) => sum + gas.moleFraction, 0)
  // a mixture in which more than a twentieth has no known properties is not estimated
  if (!(total > 0.95 && total < 1.05)) return null
  return {
    massKgPerMol: gases.reduce((sum, gas) => sum + gas.moleFraction * gas.molarMassKgPerMol, 0) / total,
    viscosityPaS: mixtureViscosity(gases),
    conductivityWPerMK: mixtureThermalConductivity(gases),
    heatCapacityJPerMolK: gases.reduce((sum, gas) => sum + gas.moleFraction * gas.heatCapacityJPerMolK, 0) / total,
  }
}

function filmCoefficients(
  { loading }: RegimeInput,
  gas: GasProperties | null,
  density: number | null,
  velocity: number | null,
  diffusivity: RegimeQuantity | null,
): { readonly mass: RegimeQuantity | null; readonly heat: RegimeQuantity } | null {
  const diameter = loading.particleDiameterM
  if (gas === null || density === null || diameter === null || !(diameter > 0)) return null
  // without a tube diameter there is no velocity: still gas is the safe side
  const reynolds = velocity === null ? 0 : (density * velocity * diameter) / gas.viscosityPaS
  const prandtl = ((gas.heatCapacityJPerMolK / gas.massKgPerMol) * gas.viscosityPaS) / gas.conductivityWPerMK
  const heat = {
    value: (packedBedSherwood(reynolds, prandtl) * gas.conductivityWPerMK) / diameter,
    relativeStandardUncertainty: root(FILM_RELATIVE_STANDARD_UNCERTAINTY, CONDUCTIVITY_RELATIVE_STANDARD_UNCERTAINTY),
    assumed: [],
  }
  if (diffusivity === null) return { mass: null, heat }
  const schmidt = gas.viscosityPaS / (density * diffusivity.value)
  return {
    mass: {
      value: (packedBedSherwood(reynolds, schmidt) * diffusivity.value) / diameter,
      relativeStandardUncertainty: root(FILM_RELATIVE_STANDARD_UNCERTAINTY, diffusivity.relativeStandardUncertainty),
      assumed: [],
    },
    heat,
  }
}

function root(...parts: readonly number[]): number {
  return Math.sqrt(parts.reduce((sum, part) => sum + part * part, 0))
}
