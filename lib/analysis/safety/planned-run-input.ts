import { type Species } from '../reduction/run-input'

/** What a person plans before a run, as far as it is known. */
export interface PlannedRunInput {
  readonly feed: readonly { readonly species: Species; readonly moleFraction: number }[]
  /** species that the reaction can make, products of side reactions included */
  readonly productsPossible: readonly Species[]
  /** active metal or metals of the sample, as written: `Ni`, `Ni, Fe`; empty when unknown */
  readonly activeMetal: string
  readonly temperatureRangeK?: { readonly low: number; readonly high: number } | null
  /** absolute */
  readonly pressurePa: number | null
  readonly rigLimits: { readonly maximumPressurePa: number | null; readonly maximumTemperatureK: number | null }
  /** per mole of key reactant, negative when heat is released */
  readonly reactionEnthalpyJPerMol?: number | null
  readonly keyReactant: Species
  /** of the feed, at the temperature of the run; without it tabulated ones, and the lowest possible for gases that are not tabulated */
  readonly feedHeatCapacityJPerMolK?: number | null
  readonly particleDiameterM?: number | null
  readonly tubeInnerDiameterM?: number | null
  readonly bedLengthM?: number | null
  readonly catalystMassKg?: number | null
  /** of the weighing, relative to the mass */
  readonly massRelativeStandardUncertainty?: number | null
}
