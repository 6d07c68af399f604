import { type LoadingInput, type Species, type Stoichiometry } from '../reduction/run-input'

/** One point of a run, as far as transport needs to know it. */
export interface RegimeInput {
  readonly holdNumber: number | null
  readonly temperatureK: number
  /** absolute, mean over the bed */
  readonly pressurePa: number
  readonly totalFlowMolPerS: number
  readonly inletMoleFraction: Readonly<Record<Species, number>>
  readonly keyReactant: Species
  /** main step of the reaction */
  readonly stoichiometry: Stoichiometry
  readonly conversion: number
  /** observed rate of consumption of the key reactant, mean over the bed [mol kg-1 s-1]; null when there is none */
  readonly rateMolPerKgS: number | null
  readonly rateRelativeStandardUncertainty: number
  /** null when unknown */
  readonly orderInKeyReactant: number | null
  /** null when unknown: a usual one is assumed and named */
  readonly activationEnergyJPerMol: number | null
  readonly reactionEnthalpyJPerMol: number | null
  readonly loading: LoadingInput
  /** largest temperature difference seen in the bed; null when it was not measured */
  readonly measuredBedSpanK?: number | null
  /** molar heat capacity by species at the temperature of the point [J mol-1 K-1]; tabulated ones otherwise */
  readonly heatCapacityJPerMolK?: Readonly<Record<Species, number>>
}

export type RegimeVerdict = 'pass' | 'fail' | 'cannot-tell'

/** What had to be assumed because it was not entered. */
export interface AssumedInput {
  readonly name: string
  readonly value: number
  readonly unit: string
  readonly relativeStandardUncertainty: number
  readonly source: string
}

/** One criterion with all that is needed to judge it. */
export interface RegimeCriterion {
  readonly id:
    | 'pore-diffusion'
    | 'film-mass'
    | 'film-heat'
    | 'pellet-heat'
    | 'bed-heat'
    | 'axial-dispersion'
    | 'wall-flow'
    | 'bed-length'
    | 'pressure-drop'
    | 'dilution'
    | 'bed-temperature-span'
  readonly name: string
  readonly formula: string
  readonly value: number | null
  readonly limit: number | null
  readonly mustBe: 'below' | 'above'
  readonly unit: string
  /** factor to the limit: above 1 on the safe side, below 1 on the other; null without a value, or for a value of zero that must be small */
  readonly margin: number | null
  /** one standard uncertainty of the decimal logarithm of the value */
  readonly log10StandardUncertainty: number | null
  readonly verdict: RegimeVerdict
  readonly sentence: string
  readonly assumed: readonly AssumedInput[]
  /** inputs without which there is no value, in words */
  readonly missing: readonly string[]
  readonly source: string
}
